import type { VNode } from 'preact';
import type {
  Answer,
  Assessment,
  CaseName,
  Reading,
  SectionMoment,
  ZoneQuantity,
  ZoneResult,
} from '../assessment/assessment.js';
import { clockText } from '../assessment/clock-text.js';
import { curveSizes } from '../web/charts/curve-scale.js';
import { curveWords } from '../web/charts/curve-words.js';
import { MomentMark } from '../web/charts/moment-mark.js';
import { numberedCues, zoneCurve } from '../web/charts/zone-curve.js';
import { quantityText } from '../assessment/figure-text.js';
import { Table } from '../web/layout/parts.js';
import { resultTexts as words } from '../web/texts/en-results.js';
import { sentence } from '../assessment/sentence.js';

const answers: readonly Answer[] = ['mixed', 'layered', 'layeredP50', 'bound'];

/** Address of the picture of one curve; the hash makes a changed plan another picture. */
const curvePath = (
  planId: string,
  zone: string,
  quantity: string,
  caseName: CaseName,
  hash: string,
  size: 'wide' | 'narrow',
) =>
  `/plans/${planId}/curves/${encodeURIComponent(zone)}/${encodeURIComponent(quantity)}/${caseName}-${size}.svg?v=${hash.slice(0, 12)}`;

/** Why a row stands in the table: which answer is at its worst or passes a level then. */
function whyText(why: Reading['why']): string {
  const byWhat = new Map<string, string[]>();
  for (const { answer, what } of why) {
    byWhat.set(what, [...(byWhat.get(what) ?? []), words.answers[answer].toLowerCase()]);
  }
  return [...byWhat]
    .map(([what, of]) => {
      const does = what === 'worst' ? words.atWorst : words.passes[what as 'aim'];
      return `${of.join(', ')} ${does}`;
    })
    .join('; ');
}

/** What the curve shows, as a table: every answer at the worst moments and where levels are passed. */
function Readings(props: {
  readonly entry: ZoneQuantity;
  readonly zone: string;
  readonly title: string;
}): VNode {
  const { entry, zone, title } = props;
  const shown = answers.filter((answer) => entry.answers[answer] !== undefined);
  const unit = Object.values(entry.answers)[0]?.unit ?? 'gasFraction';
  return (
    <Table
      caption={`${zone}: ${title}, ${words.readings}`}
      columns={[words.time, ...shown.map((answer) => words.answers[answer])]}
      rows={entry.readings.map(({ atS, why, values }) => [
        <>
          {clockText(atS)}
          <span class="case">{whyText(why)}</span>
        </>,
        ...shown.map((answer) => {
          const value = values[answer];
          return value === undefined ? '\u2013' : quantityText(value, unit);
        }),
      ])}
      rowHeads
    />
  );
}

/** The curves of a zone, case by case; the one that decides stands open. */
export function ZoneCurves(props: {
  readonly planId: string;
  readonly zone: ZoneResult;
  readonly assessment: Assessment;
  readonly moment: SectionMoment | null;
  readonly isGoverning: boolean;
}): VNode {
  const { planId, zone, assessment, moment, isGoverning } = props;
  const { governing, events, inputHash } = assessment;
  return (
    <>
      {zone.quantities.map((entry) => {
        const { quantity, quantityTitle, caseName } = entry;
        const curve = zoneCurve(zone, quantity, caseName, events);
        if (curve === null) return null;
        const title = `${sentence(quantityTitle).replace(/\.$/, '')}, ${words.cases[caseName]}`;
        const path = (size: 'wide' | 'narrow') =>
          curvePath(planId, zone.id, quantity, caseName, inputHash, size);
        const decides =
          isGoverning && governing?.quantity === quantityTitle && governing.caseName === caseName;
        const band = curve.series.some(({ answer }) => answer === 'layeredP05');
        return (
          <details class="more" key={`${quantity} ${caseName}`} open={decides}>
            <summary>
              {words.curve}: {title}
            </summary>
            <figure class="curve">
              <div class="curve-frame">
                <picture>
                  <source
                    media="(max-width: 34rem)"
                    srcset={path('narrow')}
                    width={curveSizes.narrow.width}
                    height={curveSizes.narrow.height}
                  />
                  <img
                    src={path('wide')}
                    alt={`${words.curve}: ${zone.title}, ${title}. ${words.curveAlt}`}
                    width={curveSizes.wide.width}
                    height={curveSizes.wide.height}
                    loading="lazy"
                  />
                </picture>
                <MomentMark
                  curve={curve}
                  caseName={caseName}
                  size={curveSizes.wide}
                  name="wide"
                  moment={moment}
                />
                <MomentMark
                  curve={curve}
                  caseName={caseName}
                  size={curveSizes.narrow}
                  name="narrow"
                  moment={moment}
                />
              </div>
              {band && <figcaption>{sentence(curveWords.band)}</figcaption>}
            </figure>
            <Readings entry={entry} zone={zone.title} title={title} />
          </details>
        );
      })}
    </>
  );
}

/** The numbers along the upper edge of every curve, once for all of them. */
export function CueKey({ assessment }: { readonly assessment: Assessment }): VNode | null {
  const cues = numberedCues(assessment.events);
  if (cues.length === 0) return null;
  return (
    <details class="more">
      <summary>{words.cueKey}</summary>
      <ol class="cue-key">
        {cues.map(({ number, title, events }) => (
          <li key={title} value={number}>
            {title}: {events.map(({ atS }) => clockText(atS)).join(', ')}
          </li>
        ))}
      </ol>
    </details>
  );
}
