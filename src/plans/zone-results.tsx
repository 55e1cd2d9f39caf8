import type { VNode } from 'preact';
import type {
  Answer,
  Assessment,
  Figure,
  Governing,
  SectionMoment,
  ZoneQuantity,
  ZoneResult,
} from '../assessment/assessment.js';
import { quantityText } from '../assessment/figure-text.js';
import { OpenableFigure } from '../web/layout/parts.js';
import { resultTexts as words } from '../web/texts/en-results.js';
import { sentence } from '../assessment/sentence.js';
import { CueKey, ZoneCurves } from './zone-curves.js';

const answers: readonly Answer[] = ['mixed', 'layered', 'layeredP50', 'bound'];
const standings = ['meets aim', 'meets limit', 'below limit', 'past never'] as const;

/** The gravest standing of a zone, for the line that it folds to. */
function gravest(zone: ZoneResult): (typeof standings)[number] | undefined {
  return standings.findLast((standing) =>
    zone.quantities.some((quantity) => quantity.standing === standing),
  );
}

const levelText = (figure: Figure | null): string =>
  figure === null ? '\u2013' : quantityText(figure.value, figure.unit);

function QuantityTable(props: { readonly zone: ZoneResult }): VNode {
  const { zone } = props;
  const shown = answers.filter((answer) =>
    zone.quantities.some((quantity) => quantity.answers[answer] !== undefined),
  );
  return (
    <div class="table-frame" role="region" aria-label={zone.title} tabIndex={0}>
      <table class="dense stacks" role="table">
        <thead role="rowgroup">
          <tr role="row">
            <th scope="col" role="columnheader">
              {words.what}
            </th>
            <th scope="col" role="columnheader">
              {words.standing}
            </th>
            {shown.map((answer) => (
              <th key={answer} scope="col" role="columnheader">
                {words.answers[answer]}
              </th>
            ))}
          </tr>
        </thead>
        <tbody role="rowgroup">
          {zone.quantities.map((quantity) => (
            <tr key={`${quantity.quantity} ${quantity.caseName}`} role="row">
              <th scope="row" role="rowheader">
                {sentence(quantity.quantityTitle)}
                <span class="case">{words.cases[quantity.caseName]}</span>
              </th>
              <td role="cell" class="first">
                <span class={`standing ${quantity.standing.replace(' ', '-')}`}>
                  {words.standings[quantity.standing]}
                </span>
              </td>
              {shown.map((answer) => {
                const figure = quantity.answers[answer];
                return (
                  <td key={answer} role="cell" data-label={words.answers[answer]}>
                    {figure === undefined ? '\u2013' : <OpenableFigure figure={figure} />}
                  </td>
                );
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

function Levels(props: { readonly quantities: readonly ZoneQuantity[] }): VNode {
  const seen = new Map(props.quantities.map((quantity) => [quantity.quantity, quantity]));
  return (
    <dl class="levels">
      {[...seen.values()].map(({ quantity, quantityTitle, levels }) => (
        <div key={quantity}>
          <dt>{sentence(quantityTitle)}</dt>
          <dd>
            {words.levels.aim} {levelText(levels.aim)}, {words.levels.limit.toLowerCase()}{' '}
            {levelText(levels.limit)}, {words.levels.never.toLowerCase()} {levelText(levels.never)}
          </dd>
        </div>
      ))}
    </dl>
  );
}

function Crossings(props: { readonly quantities: readonly ZoneQuantity[] }): VNode | null {
  const lines = props.quantities.flatMap(({ quantityTitle, caseName, crossings }) =>
    crossings.map(({ level, answer, at }) => ({
      key: `${quantityTitle} ${caseName} ${level} ${answer}`,
      label: `${quantityTitle}, ${words.cases[caseName]}, ${words.answers[answer].toLowerCase()}, ${words.levels[level].toLowerCase()}`,
      at,
    })),
  );
  if (lines.length === 0) return null;
  return (
    <details class="more">
      <summary>{words.crossings}</summary>
      <ul>
        {lines.map(({ key, label, at }) => (
          <li key={key}>
            <OpenableFigure figure={at} label={label} />
          </li>
        ))}
      </ul>
    </details>
  );
}

function zoneFacts(zone: ZoneResult): string {
  const height = `${words.height} ${String(zone.heightM)}\u00a0m ${words.aboveFloor}`;
  const count =
    zone.count === null
      ? ''
      : `${quantityText(zone.count.value, zone.count.unit)}\u00a0${words.people}, `;
  return `${zone.spaceTitle}: ${count}${height}`;
}

/** Whether a zone is the one of the number that decides; the check near the floor is another. */
const governs = (governing: Governing | null, zone: ZoneResult): boolean =>
  governing !== null &&
  zone.id.replace(/@0\.2$/, '') === governing.zone &&
  (zone.kind === 'floorLevelCheck') === governing.zoneTitle.includes('0.2 m above the floor');

/** Every breathing zone, folded to its gravest standing; the one that decides is first and open. */
export function ZoneResults(props: {
  readonly planId: string;
  readonly assessment: Assessment;
  readonly moment: SectionMoment | null;
}): VNode {
  const { planId, assessment, moment } = props;
  const { governing } = assessment;
  const zones = assessment.zones.toSorted(
    (one, other) => Number(governs(governing, other)) - Number(governs(governing, one)),
  );
  const counted = zones.filter(({ notComputed }) => notComputed === null);
  const uncounted = zones.filter(({ notComputed }) => notComputed !== null);
  return (
    <section aria-labelledby="zones-title">
      <h2 id="zones-title">{words.zones}</h2>
      <p class="hint">{words.zonesHint}</p>
      <CueKey assessment={assessment} />
      {counted.map((zone) => {
        const standing = gravest(zone);
        const isGoverning = governs(governing, zone);
        return (
          <details class="row zone" key={zone.id} open={isGoverning}>
            <summary>
              <span class="row-title">{zone.title}</span>
              {standing && (
                <span class={`standing ${standing.replace(' ', '-')}`}>
                  {words.standings[standing]}
                </span>
              )}
            </summary>
            <p class="hint">{zoneFacts(zone)}</p>
            <QuantityTable zone={zone} />
            <Levels quantities={zone.quantities} />
            {zone.quantities.map(
              ({ partialPressure, caseName, quantity }) =>
                partialPressure && (
                  <OpenableFigure
                    key={`${quantity} ${caseName}`}
                    figure={partialPressure}
                    label={`${words.partialPressure}, ${words.cases[caseName]}`}
                  />
                ),
            )}
            <Crossings quantities={zone.quantities} />
            <ZoneCurves
              planId={planId}
              zone={zone}
              assessment={assessment}
              moment={moment}
              isGoverning={isGoverning}
            />
          </details>
        );
      })}
      {uncounted.length > 0 && (
        <details class="row zone">
          <summary>
            <span class="row-title">
              {words.notComputed} ({String(uncounted.length)})
            </span>
          </summary>
          <ul>
            {uncounted.map(({ id, title, notComputed }) => (
              <li key={id}>
                <strong>{title}:</strong> {notComputed}
              </li>
            ))}
          </ul>
        </details>
      )}
    </section>
  );
}
