import type { VNode } from 'preact';
import type { PlanSummary } from '../storage/plans.repository.js';
import {
  CheckField,
  ErrorSummary,
  Form,
  SelectField,
  TextArea,
  TextField,
  type FormState,
} from '../web/forms/fields.js';
import { formTokenField } from '../web/forms/form-token.js';
import { Table } from '../web/layout/parts.js';
import { Page } from '../web/layout/page.js';
import type { Viewer } from '../web/session/viewer.js';
import { planTexts as words } from '../web/texts/en-plans.js';
import { resultTexts } from '../web/texts/en-results.js';
import { viewTexts } from '../web/texts/en-views.js';
import type { NoticeName } from '../web/texts/en.js';
import { dateText } from '../web/views/date-text.js';
import { DescribedFields, Rows } from '../web/views/described-fields.js';
import { Differences } from '../web/views/differences-table.js';
import type { ChoiceLists, Option } from '../web/views/field-spec.js';
import type { Difference } from '../web/views/form-differences.js';
import { planSections } from './plan-form.js';

export function PlanListPage(props: {
  readonly viewer: Viewer;
  readonly plans: readonly PlanSummary[];
  readonly notice?: NoticeName | undefined;
}): VNode {
  const { viewer, plans, notice } = props;
  return (
    <Page title={words.listTitle} viewer={viewer} path="/plans" notice={notice}>
      <h1>{words.listTitle}</h1>
      <p class="lead">{words.listIntro}</p>
      <p class="actions">
        <a class="button" href="/plans/new">
          {words.newPlan}
        </a>
        <a class="button second" href="/plans/import">
          {words.importLink}
        </a>
      </p>
      <Table
        caption={words.listTitle}
        columns={[words.planTitle, words.venue, words.changed]}
        rows={plans.map(({ id, title, venueName, updatedAt }) => [
          <a href={`/plans/${id}`}>{title}</a>,
          venueName ?? words.notStated,
          dateText(updatedAt),
        ])}
        rowHeads
        empty={words.none}
      />
    </Page>
  );
}

export function NewPlanPage(props: {
  readonly viewer: Viewer;
  readonly state: FormState;
  readonly venues: readonly Option[];
}): VNode {
  const { viewer, state, venues } = props;
  return (
    <Page
      title={words.newTitle}
      viewer={viewer}
      path="/plans"
      hasErrors={state.problems.length > 0}
    >
      <h1>{words.newTitle}</h1>
      <ErrorSummary problems={state.problems} />
      <p class="lead">{words.newIntro}</p>
      <Form action="/plans" viewer={viewer}>
        <TextField name="title" label={words.planTitle} required state={state} />
        <SelectField
          name="venueId"
          label={words.venue}
          state={state}
          options={[{ value: '', label: words.noVenue }, ...venues]}
        />
        <TextField name="date" label={words.date} type="date" state={state} />
        <p class="actions">
          <button type="submit">{words.create}</button>
        </p>
      </Form>
    </Page>
  );
}

export function ImportPage(props: { readonly viewer: Viewer; readonly state: FormState }): VNode {
  const { viewer, state } = props;
  return (
    <Page
      title={words.importTitle}
      viewer={viewer}
      path="/plans"
      hasErrors={state.problems.length > 0}
    >
      <h1>{words.importTitle}</h1>
      <ErrorSummary problems={state.problems} />
      <p class="lead">{words.importIntro}</p>
      <form method="post" action="/plans/import" encType="multipart/form-data" novalidate>
        <input type="hidden" name={formTokenField} value={viewer.formToken} />
        <div class="field">
          <label for="field-file">{words.importFile}</label>
          <input
            id="field-file"
            name="file"
            type="file"
            accept=".json,.yaml,.yml,application/json,application/yaml,text/yaml"
          />
        </div>
        <TextArea name="text" label={words.importText} rows={10} state={state} />
        <p class="actions">
          <button type="submit">{words.importButton}</button>
        </p>
      </form>
    </Page>
  );
}

export interface PlanPageProps {
  readonly viewer: Viewer;
  readonly plan: { readonly id: string; readonly version: number; readonly title: string };
  readonly venueId: string | undefined;
  readonly state: FormState;
  readonly lists: ChoiceLists;
  readonly results: VNode;
  /** The results are still being worked out; a script fetches them. */
  readonly isWaiting: boolean;
  readonly opened?: string | undefined;
  readonly notice?: NoticeName | undefined;
  readonly isUnsaved?: boolean | undefined;
  readonly differences?: readonly Difference[] | undefined;
  readonly removal?: FormState | undefined;
}

function AddDemonstration({ lists }: Pick<PlanPageProps, 'lists'>): VNode {
  return (
    <span class="add-choice">
      <label for="field-demonstration">{words.acts.fromCatalogue}</label>
      <select id="field-demonstration" name="demonstration">
        <option value="">{words.choose}</option>
        {(lists.demonstrations ?? []).map(({ value, label }) => (
          <option key={value} value={value}>
            {label}
          </option>
        ))}
      </select>
      <button type="submit" name="do" value="addDemonstration" class="second">
        {words.acts.addFromCatalogue}
      </button>
      <button type="submit" name="do" value="add:acts" class="second">
        {words.acts.addBlank}
      </button>
    </span>
  );
}

function PlanFields(props: PlanPageProps): VNode {
  const { state, lists, opened } = props;
  const described = { state, lists, opened };
  const sections = planSections;
  return (
    <>
      <section aria-labelledby="event-title" class="rows">
        <h2 id="event-title">{words.event.title}</h2>
        <SelectField
          name="venueId"
          label={words.venue}
          state={state}
          options={[{ value: '', label: words.noVenue }, ...(lists.venues ?? [])]}
        />
        <DescribedFields specs={sections.event} {...described} />
        <Rows list="event.performances" spec={sections.performances} {...described} />
      </section>
      <Rows list="event.audience" spec={sections.audience} {...described} />
      <Rows
        list="acts"
        spec={sections.acts}
        {...described}
        adding={<AddDemonstration lists={lists} />}
      />
      <Rows list="stock" spec={sections.stock} {...described} />
      <Rows list="meters" spec={sections.meters} {...described} />
      <Rows list="controls" spec={sections.controls} {...described} />
      <Rows list="roles" spec={sections.roles} {...described} />
    </>
  );
}

function Removal({ viewer, plan, removal }: PlanPageProps): VNode {
  const state = removal ?? { values: {}, problems: [] };
  return (
    <details class="removal" open={removal !== undefined}>
      <summary>{words.remove}</summary>
      {state.problems.map(({ problem }) => (
        <p class="problem" key={problem}>
          {problem}
        </p>
      ))}
      <Form action={`/plans/${plan.id}/delete`} viewer={viewer}>
        <input type="hidden" name="version" value={String(plan.version)} />
        <CheckField name="sure" label={words.confirmRemove} state={state} />
        <button type="submit" class="second">
          {words.remove}
        </button>
      </Form>
    </details>
  );
}

/** The plan on one page, top to bottom, with its results beside it. */
export function PlanPage(props: PlanPageProps): VNode {
  const { viewer, plan, venueId, state, differences, isUnsaved, results } = props;
  const save = differences === undefined ? words.save : words.conflict.saveMine;
  return (
    <Page
      title={plan.title}
      viewer={viewer}
      path="/plans"
      notice={props.notice}
      hasErrors={state.problems.length > 0}
      scripts={props.isWaiting ? ['moments.js', 'waiting.js'] : ['moments.js']}
      wide
    >
      <p class="back">
        <a href="/plans">{words.listTitle}</a>
      </p>
      <h1>{plan.title}</h1>
      <ul class="tools">
        <li class="jump">
          <a href="#results">{words.toResults}</a>
        </li>
        <li>
          <a href={`/plans/${plan.id}/sheets/risk.pdf`}>{words.download}</a>
        </li>
        <li>
          <a href={`/plans/${plan.id}/sheets/workings.pdf`}>{words.workings}</a>
        </li>
        <li>
          <a href={`/plans/${plan.id}/export.json`}>{words.export}</a>
        </li>
        {venueId !== undefined && (
          <li>
            <a href={`/venues/${venueId}`}>{words.editVenue}</a>
          </li>
        )}
      </ul>
      {differences && (
        <Differences
          differences={differences}
          words={words.conflict}
          openSaved={`/plans/${plan.id}`}
        />
      )}
      <ErrorSummary problems={state.problems} />
      {isUnsaved === true && (
        <p class="notice" role="status">
          {viewTexts.unsaved}
        </p>
      )}
      <div class="columns plan">
        <div>
          <Form action={`/plans/${plan.id}`} viewer={viewer}>
            <input type="hidden" name="version" value={String(plan.version)} />
            {/* First in the form, so that the Enter key saves. */}
            <p class="unseen" aria-hidden="true">
              <button type="submit" name="do" value="save" tabIndex={-1}>
                {save}
              </button>
            </p>
            <PlanFields {...props} />
            <p class="actions">
              <button type="submit" name="do" value="save">
                {save}
              </button>
            </p>
          </Form>
          <Removal {...props} />
        </div>
        <div class="beside" id="results" tabIndex={0} role="region" aria-label={resultTexts.title}>
          {(isUnsaved === true || state.problems.length > 0) && <p class="hint">{words.asSaved}</p>}
          <div id="results-part">{results}</div>
          <p class="unseen" role="status" id="results-said" />
        </div>
      </div>
    </Page>
  );
}
