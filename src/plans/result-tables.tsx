import type { ComponentChildren, VNode } from 'preact';
import type { Assessment, Figure } from '../assessment/assessment.js';
import type { Rounding } from '../assessment/figure-text.js';
import { OpenableFigure, Table } from '../web/layout/parts.js';
import { en } from '../web/texts/en.js';
import { resultTexts as words } from '../web/texts/en-results.js';

const opened = (figure: Figure | null, rounding?: Rounding): ComponentChildren =>
  figure === null ? '\u2013' : <OpenableFigure figure={figure} rounding={rounding} />;

/** A part of the results that folds away: wanted by the one who doubts, not by everyone. */
export function Folded(props: {
  readonly title: string;
  readonly count?: number | undefined;
  readonly children: ComponentChildren;
}): VNode {
  return (
    <details class="fold">
      <summary>
        <h2>
          {props.title}
          {props.count !== undefined && <span class="count"> {props.count}</span>}
        </h2>
      </summary>
      {props.children}
    </details>
  );
}

export function AmountsAndHolds(props: { readonly assessment: Assessment }): VNode {
  const { largestAmounts, holdTimes, acts, zones } = props.assessment;
  const quantities = new Map(
    zones.flatMap((zone) =>
      zone.quantities.map(({ quantity, quantityTitle }) => [quantity, quantityTitle] as const),
    ),
  );
  const titleOf = (id: string) => acts.find((act) => act.id === id)?.title ?? id;
  return (
    <>
      <Folded title={words.largest} count={largestAmounts.length}>
        <Table
          caption={words.largest}
          columns={words.largestColumns}
          rows={largestAmounts.map((row) => [
            titleOf(row.act),
            row.gas,
            opened(row.mass, 'down'),
            opened(row.volume, 'down'),
            opened(row.planned),
            row.limitedBy,
          ])}
          rowHeads
          empty={words.noLargest}
        />
      </Folded>
      <Folded title={words.hold} count={holdTimes.length}>
        <Table
          caption={words.hold}
          columns={words.holdColumns}
          rows={holdTimes.map((row) => [
            row.spaceTitle,
            quantities.get(row.quantity) ?? row.quantity,
            opened(row.toLevel),
            row.time === null ? (
              row.words
            ) : (
              <>
                {opened(row.time)} {row.words}
              </>
            ),
          ])}
          rowHeads
          empty={words.noHold}
        />
      </Folded>
    </>
  );
}

export function ControlResults(props: { readonly assessment: Assessment }): VNode {
  const { controls } = props.assessment;
  return (
    <Folded title={words.controls} count={controls.length}>
      <Table
        caption={words.controls}
        columns={words.controlColumns}
        rows={controls.map((row) => [
          <>
            {row.title}
            {row.chosen && <span class="case">{words.chosen}</span>}
            <span class="hint">{row.words}</span>
          </>,
          opened(row.before),
          opened(row.after),
          row.credited ? words.credited : words.notCredited,
        ])}
        rowHeads
        empty={words.noControls}
      />
    </Folded>
  );
}

/** Words by demonstration and by space. */
export function WordsByPart(props: { readonly assessment: Assessment }): VNode {
  const { acts, spaces } = props.assessment;
  return (
    <>
      {acts.length > 0 && (
        <Table
          caption={words.acts}
          columns={words.actColumns}
          rows={acts.map(({ title, spaceTitle, decision }) => [
            title,
            spaceTitle,
            en.decisions[decision.asFiled],
            en.decisions[decision.withControls],
          ])}
          rowHeads
        />
      )}
      <Folded title={words.spaces} count={spaces.length}>
        <Table
          caption={words.spaces}
          columns={words.spaceColumns}
          rows={spaces.map(({ title, volume, freshAir, decision }) => [
            title,
            opened(volume),
            opened(freshAir),
            en.decisions[decision.asFiled],
            en.decisions[decision.withControls],
          ])}
          rowHeads
        />
      </Folded>
    </>
  );
}

/** What a sceptical reader asks for: rules, assumptions, the table itself. */
export function Workings(props: { readonly assessment: Assessment }): VNode {
  const { assessment } = props;
  const { site, climate } = assessment;
  return (
    <>
      <Folded title={words.rules} count={assessment.rulesCited.length}>
        <Table
          caption={words.rules}
          columns={words.ruleColumns}
          rows={assessment.rulesCited.map((rule) => [
            <>
              {rule.instrument}
              <span class="hint">{rule.section}</span>
            </>,
            rule.edition,
            <>
              {rule.duty}
              <span class="hint">{rule.why}</span>
            </>,
            `${rule.checked}${rule.confirm ? `; ${words.confirm}` : ''}`,
          ])}
          rowHeads
          empty={words.noRules}
        />
      </Folded>
      <Folded title={words.assumptions} count={assessment.assumptions.length}>
        <Table
          caption={words.assumptions}
          columns={words.assumptionColumns}
          rows={assessment.assumptions.map((row) => [
            row.text,
            opened(row.figure),
            `${en.origins[row.origin]}; ${row.source}`,
          ])}
          rowHeads
          empty={words.noAssumptions}
        />
      </Folded>
      <Folded title={words.cautions} count={assessment.cautions.length}>
        <ul>
          {assessment.cautions.map(({ id, text }) => (
            <li key={id}>{text}</li>
          ))}
        </ul>
      </Folded>
      <Folded title={words.site}>
        <ul class="plain">
          <li>
            <OpenableFigure label={words.siteAltitude} figure={site.altitude} />
          </li>
          <li>
            <OpenableFigure label={words.sitePressure} figure={site.pressure} />
          </li>
          <li>
            <OpenableFigure label={words.siteTemperature} figure={site.temperature} />
          </li>
          <li>
            <OpenableFigure label={words.siteOxygen} figure={site.freshAirOxygenPressure} />
          </li>
          {climate && (
            <>
              <li>
                <OpenableFigure
                  label={`${words.climate}, ${words.climatePlanned.toLowerCase()} (${climate.instrument})`}
                  figure={climate.planned}
                />
              </li>
              <li>
                <OpenableFigure
                  label={`${words.climate}, ${words.climateWorst.toLowerCase()}`}
                  figure={climate.worstCredible}
                />
              </li>
            </>
          )}
        </ul>
      </Folded>
      <Folded title={words.table}>
        <Table
          caption={words.table}
          columns={words.tableColumns}
          rows={assessment.decisionTable.map((row) => [
            String(row.row),
            row.test,
            row.word === null ? '\u2013' : en.decisions[row.word],
            row.fired ? <strong>{row.where === '' ? words.fired : row.where}</strong> : '\u2013',
          ])}
          rowHeads
        />
        <p class="hint">
          {words.engine} {assessment.engineVersion}. {words.hash}{' '}
          <code class="hash">{assessment.inputHash}</code>
        </p>
      </Folded>
    </>
  );
}
