import type { VNode } from 'preact';
import type {
  Answer,
  Assessment,
  Figure,
  ZoneQuantity,
  ZoneResult,
} from '../assessment/assessment.js';
import { zoneCurve, zoneCurveText } from '../web/charts/zone-curve.js';
import { quantityText } from '../web/format/figure-text.js';
import { OpenableFigure } from '../web/layout/parts.js';
import { resultTexts as words } from '../web/texts/en-results.js';
import { sentence } from '../web/views/sentence.js';

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
      <table class="dense">
        <thead>
          <tr>
            <th scope="col">{words.what}</th>
            <th scope="col">{words.standing}</th>
            {shown.map((answer) => (
              <th key={answer} scope="col">
                {words.answers[answer]}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {zone.quantities.map((quantity) => (
            <tr key={`${quantity.quantity} ${quantity.caseName}`}>
              <th scope="row">
                {sentence(quantity.quantityTitle)}
                <span class="case">{words.cases[quantity.caseName]}</span>
              </th>
              <td>
                <span class={`standing ${quantity.standing.replace(' ', '-')}`}>
                  {words.standings[quantity.standing]}
                </span>
              </td>
              {shown.map((answer) => {
                const figure = quantity.answers[answer];
                return (
                  <td key={answer}>
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

/** Address of the picture of one curve; the hash makes a changed plan another picture. */
const curvePath = (
  planId: string,
  zone: string,
  quantity: string,
  caseName: string,
  hash: string,
) =>
  `/plans/${planId}/curves/${encodeURIComponent(zone)}/${encodeURIComponent(quantity)}/${caseName}.svg?v=${hash.slice(0, 12)}`;

function Curves(props: {
  readonly planId: string;
  readonly zone: ZoneResult;
  readonly assessment: Assessment;
}): VNode {
  const { planId, zone, assessment } = props;
  return (
    <>
      {zone.quantities.map(({ quantity, quantityTitle, caseName }) => {
        const curve = zoneCurve(zone, quantity, caseName, assessment.events);
        if (curve === null) return null;
        const title = `${sentence(quantityTitle)}, ${words.cases[caseName]}`;
        return (
          <details class="more" key={`${quantity} ${caseName}`}>
            <summary>
              {words.curve}: {title}
            </summary>
            <figure class="drawn" tabIndex={0} aria-label={`${words.curve}: ${title}`}>
              <img
                src={curvePath(planId, zone.id, quantity, caseName, assessment.inputHash)}
                alt={zoneCurveText(curve)}
                width={720}
                height={320}
                loading="lazy"
              />
              <figcaption>{zoneCurveText(curve)}</figcaption>
            </figure>
          </details>
        );
      })}
    </>
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

/** Every breathing zone, folded to its gravest standing; the one that decides stands open. */
export function ZoneResults(props: {
  readonly planId: string;
  readonly assessment: Assessment;
}): VNode {
  const { planId, assessment } = props;
  return (
    <section aria-labelledby="zones-title">
      <h2 id="zones-title">{words.zones}</h2>
      <p class="hint">{words.zonesHint}</p>
      {assessment.zones.map((zone) => {
        const standing = gravest(zone);
        return (
          <details class="row zone" key={zone.id} open={assessment.governing?.zone === zone.id}>
            <summary>
              <span class="row-title">{zone.title}</span>
              {standing && (
                <span class={`standing ${standing.replace(' ', '-')}`}>
                  {words.standings[standing]}
                </span>
              )}
            </summary>
            <p class="hint">{zoneFacts(zone)}</p>
            {zone.notComputed === null ? (
              <>
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
                <Curves planId={planId} zone={zone} assessment={assessment} />
              </>
            ) : (
              <p>
                <strong>{words.notComputed}:</strong> {zone.notComputed}
              </p>
            )}
          </details>
        );
      })}
    </section>
  );
}
