import type { VNode } from 'preact';
import type { PlanVenue } from '../assessment/plan-file.js';
import { chartSvg } from '../web/charts/chart-svg.js';
import { quantityText } from '../assessment/figure-text.js';
import {
  ErrorSummary,
  problemOf,
  SelectField,
  TextArea,
  TextField,
  type FormState,
} from '../web/forms/fields.js';
import { formTokenField } from '../web/forms/form-token.js';
import { Page } from '../web/layout/page.js';
import { Table } from '../web/layout/parts.js';
import type { Viewer } from '../web/session/viewer.js';
import { airLogTexts as words } from '../web/texts/en-air-log.js';
import { venueTexts } from '../web/texts/en-venues.js';
import type { AirLogResult } from './air-log.js';
import { decayCurve } from './decay-curve.js';
import { systemsServing } from './measured-air.js';

// Small enough that its words stay readable on a phone, where it shrinks to the width of the page.
const curveWidth = 480;
const curveHeight = 260;

export interface AirLogPageProps {
  readonly viewer: Viewer;
  readonly venue: PlanVenue;
  readonly venueId: string;
  readonly version: number;
  readonly state: FormState;
  readonly result?: AirLogResult | undefined;
  /** Somebody saved the venue meanwhile. */
  readonly isOvertaken?: boolean;
}

function Result({ result }: { readonly result: AirLogResult }): VNode {
  const { fit, planning, positions } = result;
  const span = ([low, high]: readonly [number, number], unit: 'perHour' | 'm3PerS'): string =>
    `${quantityText(low, unit, 'down')} to ${quantityText(high, unit, 'up')}`;
  const background = result.isBackgroundGiven ? words.backgroundGiven : words.backgroundFitted;
  const positionName = (position: string): string =>
    position === 'main' || position === 'low' || position === 'high'
      ? words.positionNames[position]
      : words.positionNames.main;
  return (
    <section aria-labelledby="result-title" id="result">
      <h2 id="result-title">{words.result}</h2>
      <dl class="facts">
        <dt>{words.flow}</dt>
        <dd>
          <strong>{quantityText(fit.freshAirM3PerS, 'm3PerS')}</strong> ({words.interval}:{' '}
          {span(fit.freshAirInterval95, 'm3PerS')})
        </dd>
        <dt>{words.rate}</dt>
        <dd>
          {quantityText(fit.airChangesPerHour, 'perHour')} ({words.interval}:{' '}
          {span(fit.interval95, 'perHour')})
        </dd>
        <dt>{words.planning}</dt>
        <dd>
          <strong>{quantityText(planning.low, 'm3PerS', 'down')}</strong>, {words.planningHint}
        </dd>
        <dt>{words.volume}</dt>
        <dd>{quantityText(result.volumeM3, 'm3')}</dd>
        <dt>{words.backgroundUsed}</dt>
        <dd>
          {fit.backgroundPpm.toFixed(0)} ppm, {background}
        </dd>
        <dt>{words.used}</dt>
        <dd>
          {result.timesS.length}, {quantityText(result.timesS.at(-1) ?? 0, 's')}
        </dd>
        <dt>{words.scatter}</dt>
        <dd>{(fit.rSquared * 100).toFixed(1)} %</dd>
      </dl>
      <figure
        class="drawn"
        role="img"
        aria-label={words.curve}
        // The drawing is ours: numbers of the fit and words of this page.
        dangerouslySetInnerHTML={{
          __html: chartSvg(decayCurve(result), curveWidth, curveHeight),
        }}
      />
      <p class="hint">{words.curve}.</p>
      {positions.length > 0 && (
        <Table
          caption={words.positions}
          columns={[words.position, words.rate, words.interval]}
          rowHeads
          rows={positions
            .filter(({ position }) => position !== 'mean')
            .map(({ position, fit: one }) => [
              positionName(position),
              quantityText(one.airChangesPerHour, 'perHour'),
              span(one.interval95, 'perHour'),
            ])}
        />
      )}
      <h3>{words.warnings}</h3>
      <ul class="findings">
        {result.warnings.map((warning) => (
          <li class="finding caution" key={warning}>
            {warning}
          </li>
        ))}
      </ul>
    </section>
  );
}

/** Where the figure goes, and when and by whom it was measured. */
function UseFields({ venue, state }: Pick<AirLogPageProps, 'venue' | 'state'>): VNode {
  const space = state.values.space ?? '';
  const parts = [
    { value: '', label: venueTexts.choose },
    ...systemsServing(venue, space).map(({ part, system }) => ({
      value: part,
      label: system.title ?? system.id ?? part,
    })),
    { value: 'leakage', label: words.parts.leakage },
    { value: 'newSystem', label: words.parts.newSystem },
  ];
  return (
    <section aria-labelledby="use-title">
      <h2 id="use-title">{words.useTitle}</h2>
      <p>{words.useHint}</p>
      <SelectField
        name="part"
        label={words.part}
        hint={words.partHint}
        options={parts}
        state={state}
      />
      <TextField name="on" label={words.on} type="date" state={state} />
      <TextField name="by" label={words.by} hint={words.byHint} state={state} />
      <TextField name="note" label={words.note} hint={words.noteHint} state={state} />
      <p class="actions">
        <button type="submit" name="do" value="use">
          {words.use}
        </button>
      </p>
    </section>
  );
}

function LogFields({ venue, state }: Pick<AirLogPageProps, 'venue' | 'state'>): VNode {
  const spaces = venue.spaces.map(({ id, title }) => ({ value: id, label: title ?? id }));
  const units = Object.entries(words.timesInOptions).map(([value, label]) => ({ value, label }));
  const fileProblem = problemOf(state, 'file');
  return (
    <section aria-labelledby="log-title">
      <h2 id="log-title">{words.log}</h2>
      <SelectField name="space" label={words.space} options={spaces} state={state} />
      <div class="field">
        <label for="field-file">{words.file}</label>
        <p class="hint" id="field-file-hint">
          {words.fileHint}
        </p>
        {fileProblem !== undefined && <p class="problem">{fileProblem}</p>}
        <input
          id="field-file"
          name="file"
          type="file"
          accept=".csv,.txt,.tsv,text/csv,text/plain"
          aria-describedby="field-file-hint"
        />
      </div>
      <TextArea name="text" label={words.text} hint={words.textHint} rows={8} state={state} />
      <SelectField name="timesIn" label={words.timesIn} options={units} state={state} />
      <div class="fields">
        <TextField
          name="fromMin"
          label={words.fromMin}
          hint={words.fromMinHint}
          unit="min"
          inputMode="decimal"
          state={state}
        />
        <TextField
          name="untilMin"
          label={words.untilMin}
          hint={words.untilMinHint}
          unit="min"
          inputMode="decimal"
          state={state}
        />
        <TextField
          name="volumeM3"
          label={words.volume}
          hint={words.volumeHint}
          unit="m³"
          inputMode="decimal"
          state={state}
        />
        <TextField
          name="backgroundPpm"
          label={words.background}
          hint={words.backgroundHint}
          unit="ppm"
          inputMode="decimal"
          state={state}
        />
        <TextField
          name="people"
          label={words.people}
          hint={words.peopleHint}
          inputMode="numeric"
          state={state}
        />
      </div>
      <p class="actions">
        <button type="submit" name="do" value="work">
          {words.work}
        </button>
      </p>
    </section>
  );
}

/** Ventilation from a log: entered, worked out, drawn and, on request, written into the venue. */
export function AirLogPage(props: AirLogPageProps): VNode {
  const { viewer, venue, venueId, version, state, result } = props;
  return (
    <Page title={words.title} viewer={viewer} path="/venues" hasErrors={state.problems.length > 0}>
      <p class="back">
        <a href={`/venues/${venueId}`}>{venue.title}</a>
      </p>
      <h1>{words.title}</h1>
      <ErrorSummary problems={state.problems} />
      {props.isOvertaken === true && (
        <p class="notice" role="alert">
          {words.conflict}
        </p>
      )}
      <p class="lead">{words.intro}</p>
      <p>{words.introCold}</p>
      <form
        method="post"
        action={`/venues/${venueId}/air-log#result`}
        encType="multipart/form-data"
        novalidate
      >
        <input type="hidden" name={formTokenField} value={viewer.formToken} />
        <input type="hidden" name="version" value={String(version)} />
        {/* First in the form, so that the Enter key works it out and never stores. */}
        <button
          type="submit"
          name="do"
          value="work"
          class="unseen"
          tabIndex={-1}
          aria-hidden="true"
        >
          {words.work}
        </button>
        {result && <Result result={result} />}
        {result && <UseFields {...props} />}
        <LogFields {...props} />
      </form>
    </Page>
  );
}
