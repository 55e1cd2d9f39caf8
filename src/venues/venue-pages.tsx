import type { VNode } from 'preact';
import type { PlanVenue } from '../assessment/plan-file.js';
import type { PlanSummary } from '../storage/plans.repository.js';
import type { VenueSummary } from '../storage/venues.repository.js';
import { ErrorSummary, Form, TextField, CheckField, type FormState } from '../web/forms/fields.js';
import { Table } from '../web/layout/parts.js';
import { Page } from '../web/layout/page.js';
import { SectionDrawing } from '../web/section/section-drawing.js';
import type { Viewer } from '../web/session/viewer.js';
import { airLogTexts } from '../web/texts/en-air-log.js';
import { venueTexts as words } from '../web/texts/en-venues.js';
import { viewTexts } from '../web/texts/en-views.js';
import type { NoticeName } from '../web/texts/en.js';
import { DescribedFields, Rows } from '../web/views/described-fields.js';
import { Differences } from '../web/views/differences-table.js';
import type { ChoiceLists } from '../web/views/field-spec.js';
import type { Difference } from '../web/views/form-differences.js';
import { dateText } from '../web/views/date-text.js';
import { venueSections } from './venue-form.js';
import { venueSection } from './venue-section.js';

export function VenueListPage(props: {
  readonly viewer: Viewer;
  readonly venues: readonly VenueSummary[];
  readonly notice?: NoticeName | undefined;
}): VNode {
  const { viewer, venues, notice } = props;
  return (
    <Page title={words.listTitle} viewer={viewer} path="/venues" notice={notice}>
      <h1>{words.listTitle}</h1>
      <p class="lead">{words.listIntro}</p>
      <p class="actions">
        <a class="button" href="/venues/new">
          {words.newVenue}
        </a>
      </p>
      <Table
        caption={words.listTitle}
        columns={[words.name, words.spaceCount, words.planCount, words.changed]}
        rows={venues.map(({ id, name, spaceCount, planCount, updatedAt }) => [
          <a href={`/venues/${id}`}>{name}</a>,
          String(spaceCount),
          String(planCount),
          dateText(updatedAt),
        ])}
        rowHeads
        empty={words.none}
      />
    </Page>
  );
}

interface VenueForm {
  readonly viewer: Viewer;
  readonly state: FormState;
  readonly lists: ChoiceLists;
  readonly opened?: string | undefined;
}

/** Everything that can be entered about a venue, in the order in which one walks through it. */
function VenueFields({ state, lists, opened }: VenueForm): VNode {
  const sections = venueSections;
  const described = { state, lists, opened };
  return (
    <>
      <TextField name="title" label={words.venueName} required state={state} />
      <Rows list="spaces" spec={sections.spaces} {...described} />
      <Rows list="openings" spec={sections.openings} {...described} />
      <Rows list="airSystems" spec={sections.airSystems} {...described} />
      <Rows list="infiltration" spec={sections.infiltration} {...described} />
      <Rows list="transfers" spec={sections.transfers} {...described} />
      <section class="rows" aria-labelledby="site-title" id="site">
        <h2 id="site-title">{words.site.title}</h2>
        <DescribedFields specs={sections.site} {...described} />
      </section>
    </>
  );
}

export interface VenuePageProps extends VenueForm {
  /** None while it is being created. */
  readonly saved?:
    { readonly id: string; readonly version: number; readonly venue: PlanVenue } | undefined;
  readonly notice?: NoticeName | undefined;
  readonly isUnsaved?: boolean | undefined;
  readonly plans?: readonly PlanSummary[] | undefined;
  /** Somebody else was quicker: where the entries differ from what is saved now. */
  readonly differences?: readonly Difference[] | undefined;
  /** Why the venue was not deleted. */
  readonly removal?: FormState | undefined;
}

function Beside({ saved, plans }: Pick<VenuePageProps, 'saved' | 'plans'>): VNode {
  const view = saved && venueSection(saved.venue);
  return (
    <div class="beside" tabIndex={0} role="region" aria-label={words.section}>
      <h2>{words.section}</h2>
      {view !== undefined && view.spaces.length > 0 ? (
        <figure class="drawn" tabIndex={0} aria-label={words.section}>
          <SectionDrawing view={view} />
          <figcaption>{words.sectionOf}</figcaption>
        </figure>
      ) : (
        <p class="none">{words.sectionNone}</p>
      )}
      {saved && (
        <>
          <h2>{airLogTexts.title}</h2>
          <p>
            <a href={`/venues/${saved.id}/air-log`}>{airLogTexts.link}</a>
          </p>
          <h2>{words.plansHere}</h2>
          {plans && plans.length > 0 && (
            <ul>
              {plans.map(({ id, title }) => (
                <li key={id}>
                  <a href={`/plans/${id}`}>{title}</a>
                </li>
              ))}
            </ul>
          )}
          <p>
            <a href={`/plans/new?venue=${saved.id}`}>{words.planHere}</a>
          </p>
        </>
      )}
    </div>
  );
}

function Removal(props: {
  readonly viewer: Viewer;
  readonly saved: { readonly id: string; readonly version: number };
  readonly state: FormState | undefined;
}): VNode {
  const { viewer, saved } = props;
  const state = props.state ?? { values: {}, problems: [] };
  return (
    <details class="removal" open={props.state !== undefined}>
      <summary>{words.remove}</summary>
      <p class="hint">{words.removeHint}</p>
      {state.problems.map(({ problem }) => (
        <p class="problem" key={problem}>
          {problem}
        </p>
      ))}
      <Form action={`/venues/${saved.id}/delete`} viewer={viewer}>
        <input type="hidden" name="version" value={String(saved.version)} />
        <CheckField name="sure" label={words.confirmRemove} state={state} />
        <button type="submit" class="second">
          {words.remove}
        </button>
      </Form>
    </details>
  );
}

export function VenuePage(props: VenuePageProps): VNode {
  const { viewer, state, saved, differences, isUnsaved } = props;
  const title = saved?.venue.title ?? words.newTitle;
  const save = saved === undefined ? words.create : words.save;
  return (
    <Page
      title={title}
      viewer={viewer}
      path="/venues"
      notice={props.notice}
      hasErrors={state.problems.length > 0}
      wide
    >
      <p class="back">
        <a href="/venues">{words.listTitle}</a>
      </p>
      <h1>{title}</h1>
      {saved === undefined && <p class="lead">{words.newIntro}</p>}
      {differences && saved && (
        <Differences
          differences={differences}
          words={words.conflict}
          openSaved={`/venues/${saved.id}`}
        />
      )}
      <ErrorSummary problems={state.problems} />
      {isUnsaved === true && (
        <p class="notice" role="status">
          {viewTexts.unsaved}
        </p>
      )}
      <div class="columns">
        <div>
          <Form action={saved === undefined ? '/venues' : `/venues/${saved.id}`} viewer={viewer}>
            {saved && <input type="hidden" name="version" value={String(saved.version)} />}
            {/* First in the form, so that the Enter key saves. */}
            <p class="actions unseen" aria-hidden="true">
              <button type="submit" name="do" value="save" tabIndex={-1}>
                {differences === undefined ? save : words.conflict.saveMine}
              </button>
            </p>
            <VenueFields {...props} />
            <p class="actions">
              <button type="submit" name="do" value="save">
                {differences === undefined ? save : words.conflict.saveMine}
              </button>
            </p>
          </Form>
          {saved && <Removal viewer={viewer} saved={saved} state={props.removal} />}
        </div>
        <Beside saved={saved} plans={props.plans} />
      </div>
    </Page>
  );
}
