import { Body, Controller, Get, Header, Param, Post, Query, Res } from '@nestjs/common';
import type { VNode } from 'preact';
import { renderToString } from 'preact-render-to-string';
import type { CaseName } from '../assessment/assessment.js';
import { CatalogueData } from '../catalogue/catalogue.module.js';
import { Settings } from '../config.js';
import { Conflict, DomainError, InvalidInput, NotFound, type ErrorDetail } from '../errors.js';
import { VenuesService } from '../venues/venues.service.js';
import { chartSvg } from '../web/charts/chart-svg.js';
import { curveOption } from '../web/charts/curve-option.js';
import { curveSizes } from '../web/charts/curve-scale.js';
import { zoneCurve } from '../web/charts/zone-curve.js';
import { checkedForm } from '../web/forms/checked-form.js';
import { emptyForm, fieldId, type FormState } from '../web/forms/fields.js';
import type { FormFields } from '../web/forms/form-fields.js';
import { ClientSignal } from '../web/http/client-signal.js';
import { ReturnsPage, sendElsewhere, sendPage, type PageReply } from '../web/http/exchange.js';
import { pageHtml } from '../web/layout/page.js';
import { chosenMoment } from '../web/section/moment-view.js';
import { CurrentViewer, type Viewer } from '../web/session/viewer.js';
import { noticeNamed } from '../web/texts/en.js';
import { planTexts as words } from '../web/texts/en-plans.js';
import { formDifferences } from '../web/views/form-differences.js';
import { placesOnPage, withRow } from '../web/views/form-rows.js';
import { formTexts } from '../web/views/form-texts.js';
import { fieldNameAt } from '../web/views/pointer-names.js';
import { RemovalForm } from '../web/views/saving-form.js';
import { afterRowCommand, sentForm, type SentForm } from '../web/views/sent-form.js';
import { withHeights } from './breathing-heights.js';
import { planLists } from './plan-choices.js';
import { PlanCreateForm, PlanImportForm } from './plan-create.form.js';
import { planDocument, planTextsOf } from './plan-document.js';
import { actRows, planForm } from './plan-form.js';
import { importedPlan } from './plan-import.js';
import { pageMessages } from './plan-messages.js';
import { ImportPage, NewPlanPage, PlanListPage, PlanPage } from './plan-pages.js';
import { NoResults, PlanResults, Waiting, type PlaceLink } from './plan-results.js';
import { MomentPart } from './section-results.js';
import type { Outcome } from './assessments.service.js';
import { PlansService, type OpenPlan, type SavedPlan } from './plans.service.js';

/** Fields of the page that belong to the plan but not to its document. */
const beside = ['venueId', 'demonstration'] as const;

const cases: readonly CaseName[] = ['planned', 'worstCredible', 'fansOff'];
const isCase = (text: string): text is CaseName => cases.some((name) => name === text);

/** Longest that one question for results is held before it is answered with "not yet" [ms]. */
const longestHoldMs = 25_000;

interface Shown {
  readonly viewer: Viewer;
  readonly saved: SavedPlan;
  readonly fields: FormFields;
  readonly problems?: readonly ErrorDetail[];
  readonly version?: number | undefined;
  readonly opened?: string | undefined;
  readonly isUnsaved?: boolean;
  readonly differences?: ReturnType<typeof formDifferences>;
  readonly removal?: FormState;
  readonly notice?: unknown;
  /** Name of the moment that the section shows. */
  readonly at?: unknown;
  /** The reader asked to wait for the results. */
  readonly isPatient?: boolean;
}

@Controller('plans')
export class PlansController {
  constructor(
    private readonly plans: PlansService,
    private readonly venues: VenuesService,
    private readonly data: CatalogueData,
    private readonly settings: Settings,
  ) {}

  @Get()
  @ReturnsPage()
  async list(@CurrentViewer() viewer: Viewer, @Query('notice') notice: unknown): Promise<string> {
    const plans = await this.plans.list();
    return pageHtml(<PlanListPage viewer={viewer} plans={plans} notice={noticeNamed(notice)} />);
  }

  @Get('new')
  @ReturnsPage()
  async newPlan(@CurrentViewer() viewer: Viewer, @Query('venue') venue: unknown): Promise<string> {
    const values = typeof venue === 'string' ? { venueId: venue } : {};
    return this.#newPage(viewer, { values, problems: [] });
  }

  @Post()
  async create(
    @Body() body: unknown,
    @CurrentViewer() viewer: Viewer,
    @Res() reply: PageReply,
  ): Promise<void> {
    const { form, fields, problems } = checkedForm(PlanCreateForm, body);
    const refuse = async (reasons: readonly ErrorDetail[]): Promise<void> => {
      sendPage(reply, await this.#newPage(viewer, { values: fields, problems: reasons }), 422);
    };
    if (form === undefined) {
      await refuse(problems);
      return;
    }
    const event = { title: form.title, ...(form.date !== undefined && { date: form.date }) };
    try {
      const { id } = await this.plans.create(planDocument({ event }), form.venueId, viewer.id);
      sendElsewhere(reply, `/plans/${id}?notice=created`);
    } catch (error) {
      if (!(error instanceof NotFound)) throw error;
      await refuse([{ path: '/venueId', problem: `${error.message} ${error.hint}` }]);
    }
  }

  @Get('import')
  @ReturnsPage()
  importPage(@CurrentViewer() viewer: Viewer): string {
    return pageHtml(<ImportPage viewer={viewer} state={emptyForm} />);
  }

  @Post('import')
  async bringIn(
    @Body() body: unknown,
    @CurrentViewer() viewer: Viewer,
    @Res() reply: PageReply,
  ): Promise<void> {
    const { form, fields, problems } = checkedForm(PlanImportForm, body);
    const refuse = (reasons: readonly ErrorDetail[]): void => {
      const state = { values: { ...fields, text: fields.text ?? fields.file }, problems: reasons };
      sendPage(reply, pageHtml(<ImportPage viewer={viewer} state={state} />), 422);
    };
    if (form === undefined) {
      refuse(problems);
      return;
    }
    const { file, text } = form;
    if ((file === undefined) === (text === undefined)) {
      refuse([
        { path: '/text', problem: file === undefined ? words.importEmpty : words.importBoth },
      ]);
      return;
    }
    try {
      const plan = await this.plans.bringIn(importedPlan(file ?? text ?? ''), viewer.id);
      sendElsewhere(reply, `/plans/${plan.id}?notice=created`);
    } catch (error) {
      if (!(error instanceof InvalidInput)) throw error;
      refuse([
        { path: '/text', problem: `${error.message} ${error.hint}` },
        ...error.details.slice(0, 30).map(({ problem }) => ({ path: '/text', problem })),
      ]);
    }
  }

  @Get(':id')
  @ReturnsPage()
  async one(
    @Param('id') id: string,
    @CurrentViewer() viewer: Viewer,
    @Query('notice') notice: unknown,
    @Query('at') at: unknown,
    @Query('wait') wait: unknown,
  ): Promise<string> {
    const saved = await this.plans.read(id);
    const fields = this.#textsOf(saved);
    return this.#page({ viewer, saved, fields, notice, at, isPatient: wait !== undefined });
  }

  /** The results alone, for a page that was sent before they were there; 202 while they are not. */
  @Get(':id/results')
  @ReturnsPage()
  async results(
    @Param('id') id: string,
    @Res({ passthrough: true }) reply: PageReply,
  ): Promise<string> {
    const saved = await this.plans.read(id);
    const open = await this.plans.within(saved, longestHoldMs);
    if (open.outcome === null) void reply.status(202);
    return renderToString(this.#results(open, this.#textsOf(saved)));
  }

  /** The section at another moment, for the slider on the page. */
  @Get(':id/moment')
  @ReturnsPage()
  async moment(
    @Param('id') id: string,
    @Query('at') at: unknown,
    @ClientSignal() signal: AbortSignal,
  ): Promise<string> {
    const { outcome } = await this.plans.open(id, signal);
    if (outcome.assessment === undefined) throw outcome.failure;
    const moment = chosenMoment(outcome.assessment.section, at);
    return renderToString(<MomentPart assessment={outcome.assessment} moment={moment} />);
  }

  @Post(':id')
  async save(
    @Param('id') id: string,
    @Body() body: unknown,
    @CurrentViewer() viewer: Viewer,
    @Res() reply: PageReply,
  ): Promise<void> {
    const saved = await this.plans.read(id);
    const { policy } = this.data.catalogue;
    const sent = sentForm(body, planForm, {
      beside,
      filled: (fields) => withHeights(fields, policy),
    });
    const { version } = sent;
    if (sent.command.kind !== 'save') {
      const after =
        sent.command.kind === 'addDemonstration'
          ? this.#withDemonstration(sent, saved)
          : afterRowCommand(sent, planForm);
      const page = await this.#page({ viewer, saved, ...after, version, isUnsaved: true });
      sendPage(reply, page);
      return;
    }
    const document = planDocument(sent.value);
    const problems =
      sent.problems.length > 0
        ? sent.problems
        : pageMessages(
            this.plans.problemsOf(document),
            planForm,
            placesOnPage(sent.fields, planForm),
          );
    if (problems.length > 0 || version === undefined) {
      const page = await this.#page({ viewer, saved, fields: sent.fields, problems, version });
      sendPage(reply, page, 422);
      return;
    }
    const venueId = sent.fields.venueId ?? null;
    try {
      await this.plans.save(id, version, { document, venueId }, viewer.id);
    } catch (error) {
      if (error instanceof NotFound) {
        const reasons = [{ path: '/venueId', problem: `${error.message} ${error.hint}` }];
        const shown = { viewer, saved, fields: sent.fields, problems: reasons, version };
        sendPage(reply, await this.#page(shown), 422);
        return;
      }
      if (!(error instanceof Conflict)) throw error;
      const now = await this.plans.read(id);
      const differences = formDifferences(
        this.#textsOf(now),
        sent.fields,
        planForm,
        planLists(sent.fields, now.venue?.venue, this.data),
      );
      const page = await this.#page({ viewer, saved: now, fields: sent.fields, differences });
      sendPage(reply, page, 409);
      return;
    }
    sendElsewhere(reply, `/plans/${id}?notice=saved`);
  }

  @Post(':id/delete')
  async remove(
    @Param('id') id: string,
    @Body() body: unknown,
    @CurrentViewer() viewer: Viewer,
    @Res() reply: PageReply,
  ): Promise<void> {
    const saved = await this.plans.read(id);
    const { form, fields, problems } = checkedForm(RemovalForm, body);
    const refuse = async (status: number, reasons: readonly ErrorDetail[]): Promise<void> => {
      const removal = { values: fields, problems: reasons };
      sendPage(
        reply,
        await this.#page({ viewer, saved, fields: this.#textsOf(saved), removal }),
        status,
      );
    };
    if (form === undefined) {
      await refuse(422, problems);
      return;
    }
    try {
      await this.plans.remove(id, form.version);
    } catch (error) {
      if (!(error instanceof Conflict)) throw error;
      await refuse(409, [{ path: '', problem: `${error.message} ${error.hint}` }]);
      return;
    }
    sendElsewhere(reply, '/plans?notice=deleted');
  }

  /** Exactly the plan file that the command line reads. */
  @Get(':id/export.json')
  @Header('content-type', 'application/json; charset=utf-8')
  @Header('cache-control', 'no-store')
  async export(
    @Param('id') id: string,
    @Res({ passthrough: true }) reply: PageReply,
  ): Promise<string> {
    const { plan, file } = await this.plans.read(id);
    const name = plan.title.replaceAll(/[^A-Za-z0-9]+/g, '-').slice(0, 60);
    void reply.header('content-disposition', `attachment; filename="${name || 'plan'}.json"`);
    return `${JSON.stringify(file, null, 2)}\n`;
  }

  @Get(':id/curves/:zone/:quantity/:file')
  @Header('content-type', 'image/svg+xml')
  @Header('cache-control', 'private, no-cache')
  async curve(
    @Param('id') id: string,
    @Param('zone') zoneId: string,
    @Param('quantity') quantity: string,
    @Param('file') file: string,
    @ClientSignal() signal: AbortSignal,
  ): Promise<string> {
    const { outcome } = await this.plans.open(id, signal);
    if (outcome.assessment === undefined) throw outcome.failure;
    const [caseName = '', sizeName = ''] = file.replace(/\.svg$/, '').split('-');
    const size = curveSizes[sizeName === 'narrow' ? 'narrow' : 'wide'];
    const zone = outcome.assessment.zones.find((one) => one.id === zoneId);
    const curve =
      zone && isCase(caseName)
        ? zoneCurve(zone, quantity, caseName, outcome.assessment.events)
        : null;
    if (curve === null) {
      throw new NotFound('There is no such curve.', 'Open it from the page of the plan.');
    }
    return chartSvg(curveOption(curve, size), size.width, size.height);
  }

  #textsOf({ plan }: SavedPlan): FormFields {
    const texts = planTextsOf(plan.document, this.data.catalogue.policy);
    return plan.venueId === null ? texts : { ...texts, venueId: plan.venueId };
  }

  /** The form with a demonstration of the catalogue added, as it would be shown at this venue. */
  #withDemonstration(
    sent: SentForm,
    saved: SavedPlan,
  ): { readonly fields: FormFields; readonly opened: string | undefined } {
    const { demonstration: chosen, ...fields } = sent.fields;
    const demonstration = this.data.catalogue.demonstrations.find(({ id }) => id === chosen);
    if (demonstration === undefined) return { fields, opened: undefined };
    const draft = this.plans.draftAct(demonstration, saved.venue?.venue);
    const texts = formTexts({ ...draft }, actRows.fields);
    const added = withRow(fields, 'acts', actRows, texts);
    return { fields: added.fields, opened: added.row };
  }

  async #newPage(viewer: Viewer, state: FormState): Promise<string> {
    const venues = await this.venues.list();
    const options = venues.map(({ id, name }) => ({ value: id, label: name }));
    return pageHtml(<NewPlanPage viewer={viewer} state={state} venues={options} />);
  }

  async #page(shown: Shown): Promise<string> {
    const { viewer, saved, fields, problems = [], version, notice, at, isPatient, ...rest } = shown;
    const { plan, venue } = saved;
    const patienceMs = isPatient === true ? longestHoldMs : this.settings.pageWaitS * 1000;
    const open = await this.plans.within(saved, patienceMs);
    const venues = await this.venues.list();
    const lists = {
      ...planLists(fields, venue?.venue, this.data),
      venues: venues.map(({ id, name }) => ({ value: id, label: name })),
    };
    return pageHtml(
      <PlanPage
        {...rest}
        viewer={viewer}
        plan={{ id: plan.id, version: version ?? plan.version, title: plan.title }}
        venueId={venue?.id}
        state={{ values: fields, problems }}
        lists={lists}
        notice={noticeNamed(notice)}
        results={this.#results(open, fields, at)}
        isWaiting={open.outcome === null}
      />,
    );
  }

  #results(open: OpenPlan<Outcome | null>, fields: FormFields, at?: unknown): VNode {
    const { plan, venue, file, outcome } = open;
    const places = placesOnPage(fields, planForm);
    const linkTo: PlaceLink = (pointer) => {
      if (pointer.startsWith('/venue/')) {
        const name = pointer.slice('/venue/'.length).replaceAll('/', '.');
        return venue && `/venues/${venue.id}#${fieldId(name)}`;
      }
      const name = fieldNameAt(pointer, places);
      return name === undefined ? undefined : `#${fieldId(name)}`;
    };
    if (outcome === null) return <Waiting planId={plan.id} />;
    if (outcome.assessment !== undefined) {
      return (
        <PlanResults
          planId={plan.id}
          assessment={outcome.assessment}
          linkTo={linkTo}
          at={typeof at === 'string' ? at : undefined}
        />
      );
    }
    const failure: DomainError = outcome.failure;
    const missing = this.plans.missingIn(file);
    const details = missing.length > 0 ? missing : failure.details;
    return (
      <NoResults
        message={failure.message}
        hint={failure.hint}
        problems={pageMessages(details, planForm, places)}
      />
    );
  }
}
