import { Body, Controller, Get, Param, Post, Query, Res } from '@nestjs/common';
import type { PlanVenue } from '../assessment/plan-file.js';
import { CatalogueData } from '../catalogue/catalogue.module.js';
import { Conflict, type ErrorDetail } from '../errors.js';
import { PlansRepository } from '../storage/plans.repository.js';
import { checkedForm } from '../web/forms/checked-form.js';
import type { FormFields } from '../web/forms/form-fields.js';
import { ReturnsPage, sendElsewhere, sendPage, type PageReply } from '../web/http/exchange.js';
import { pageHtml } from '../web/layout/page.js';
import { CurrentViewer, type Viewer } from '../web/session/viewer.js';
import { venueTexts as words } from '../web/texts/en-venues.js';
import { noticeNamed } from '../web/texts/en.js';
import type { ChoiceLists } from '../web/views/field-spec.js';
import { formDifferences } from '../web/views/form-differences.js';
import { placesOnPage, withRow } from '../web/views/form-rows.js';
import { formTexts } from '../web/views/form-texts.js';
import { rowNumbersIn } from '../web/views/form-value.js';
import { problemsOnPage } from '../web/views/pointer-names.js';
import { RemovalForm } from '../web/views/saving-form.js';
import { afterRowCommand, sentForm, type SentForm } from '../web/views/sent-form.js';
import { venueForm, venueSections } from './venue-form.js';
import { VenueListPage, VenuePage } from './venue-pages.js';
import { VenuesService, type SavedVenue } from './venues.service.js';

const textsOf = (venue: PlanVenue): FormFields => formTexts(withServedSpaces(venue), venueForm);

/** Systems that name one space are shown as serving it with all of their air. */
function withServedSpaces(venue: PlanVenue): PlanVenue {
  if (venue.airSystems === undefined) return venue;
  return {
    ...venue,
    airSystems: venue.airSystems.map(({ space, ...system }) =>
      space === undefined ? system : { ...system, serves: [{ space, share: 1 }] },
    ),
  };
}

/** Lists without rows are left out, as a person writing the file would. */
function withoutEmptyLists(value: Readonly<Record<string, unknown>>): PlanVenue {
  const filled = Object.entries(value).filter(
    ([key, entry]) => key === 'spaces' || !Array.isArray(entry) || entry.length > 0,
  );
  return { site: {}, ...Object.fromEntries(filled) } as unknown as PlanVenue;
}

@Controller('venues')
export class VenuesController {
  constructor(
    private readonly venues: VenuesService,
    private readonly plans: PlansRepository,
    private readonly data: CatalogueData,
  ) {}

  @Get()
  @ReturnsPage()
  async list(@CurrentViewer() viewer: Viewer, @Query('notice') notice: unknown): Promise<string> {
    const venues = await this.venues.list();
    return pageHtml(<VenueListPage viewer={viewer} venues={venues} notice={noticeNamed(notice)} />);
  }

  @Get('new')
  @ReturnsPage()
  newVenue(@CurrentViewer() viewer: Viewer): string {
    const { fields, row } = withRow({}, 'spaces', venueSections.spaces);
    const state = { values: fields, problems: [] };
    return pageHtml(
      <VenuePage viewer={viewer} state={state} lists={this.#lists(fields)} opened={row} />,
    );
  }

  @Post()
  async create(
    @Body() body: unknown,
    @CurrentViewer() viewer: Viewer,
    @Res() reply: PageReply,
  ): Promise<void> {
    const sent = sentForm(body, venueForm);
    if (sent.command.kind !== 'save') {
      const { fields, opened } = afterRowCommand(sent, venueForm);
      this.#show(reply, 200, { viewer, fields, opened, isUnsaved: true });
      return;
    }
    const problems = this.#problemsOf(sent);
    if (problems.length > 0) {
      this.#show(reply, 422, { viewer, fields: sent.fields, problems });
      return;
    }
    const { id } = await this.venues.create(withoutEmptyLists(sent.value));
    sendElsewhere(reply, `/venues/${id}?notice=created`);
  }

  @Get(':id')
  @ReturnsPage()
  async one(
    @Param('id') id: string,
    @CurrentViewer() viewer: Viewer,
    @Query('notice') notice: unknown,
  ): Promise<string> {
    const saved = await this.venues.get(id);
    const fields = textsOf(saved.venue);
    return pageHtml(
      <VenuePage
        viewer={viewer}
        state={{ values: fields, problems: [] }}
        lists={this.#lists(fields)}
        saved={saved}
        plans={await this.plans.list({ venueId: id })}
        notice={noticeNamed(notice)}
      />,
    );
  }

  @Post(':id')
  async save(
    @Param('id') id: string,
    @Body() body: unknown,
    @CurrentViewer() viewer: Viewer,
    @Res() reply: PageReply,
  ): Promise<void> {
    const saved = await this.venues.get(id);
    const sent = sentForm(body, venueForm);
    // A form keeps the version it was opened with, however often rows are added to it.
    const opened = { ...saved, version: sent.version ?? saved.version };
    if (sent.command.kind !== 'save') {
      const after = afterRowCommand(sent, venueForm);
      this.#show(reply, 200, { viewer, ...after, saved: opened, isUnsaved: true });
      return;
    }
    const problems = this.#problemsOf(sent);
    if (problems.length > 0 || sent.version === undefined) {
      this.#show(reply, 422, { viewer, fields: sent.fields, problems, saved: opened });
      return;
    }
    try {
      await this.venues.save(id, sent.version, withoutEmptyLists(sent.value));
    } catch (error) {
      if (!(error instanceof Conflict)) throw error;
      await this.#showConflict(reply, viewer, id, sent.fields);
      return;
    }
    sendElsewhere(reply, `/venues/${id}?notice=saved`);
  }

  @Post(':id/delete')
  async remove(
    @Param('id') id: string,
    @Body() body: unknown,
    @CurrentViewer() viewer: Viewer,
    @Res() reply: PageReply,
  ): Promise<void> {
    const saved = await this.venues.get(id);
    const { form, fields, problems } = checkedForm(RemovalForm, body);
    const refuse = (status: number, reasons: readonly ErrorDetail[]) => {
      const texts = textsOf(saved.venue);
      const page = (
        <VenuePage
          viewer={viewer}
          state={{ values: texts, problems: [] }}
          lists={this.#lists(texts)}
          saved={saved}
          removal={{ values: fields, problems: reasons }}
        />
      );
      sendPage(reply, pageHtml(page), status);
    };
    if (form === undefined) {
      refuse(422, problems);
      return;
    }
    try {
      await this.venues.remove(id, form.version);
    } catch (error) {
      if (!(error instanceof Conflict)) throw error;
      refuse(409, [{ path: '', problem: `${error.message} ${error.hint}` }]);
      return;
    }
    sendElsewhere(reply, '/venues?notice=deleted');
  }

  #problemsOf(sent: SentForm): readonly ErrorDetail[] {
    if (sent.problems.length > 0) return sent.problems;
    return problemsOnPage(
      this.venues.problemsOf(withoutEmptyLists(sent.value)),
      placesOnPage(sent.fields, venueForm),
    );
  }

  async #showConflict(
    reply: PageReply,
    viewer: Viewer,
    id: string,
    yours: FormFields,
  ): Promise<void> {
    const saved = await this.venues.get(id);
    const differences = formDifferences(textsOf(saved.venue), yours, venueForm, this.#lists(yours));
    this.#show(reply, 409, { viewer, fields: yours, saved, differences });
  }

  #show(
    reply: PageReply,
    status: number,
    props: {
      readonly viewer: Viewer;
      readonly fields: FormFields;
      readonly problems?: readonly ErrorDetail[];
      readonly opened?: string | undefined;
      readonly saved?: SavedVenue;
      readonly isUnsaved?: boolean;
      readonly differences?: ReturnType<typeof formDifferences>;
    },
  ): void {
    const { fields, problems = [], ...rest } = props;
    const page = (
      <VenuePage {...rest} state={{ values: fields, problems }} lists={this.#lists(fields)} />
    );
    sendPage(reply, pageHtml(page), status);
  }

  /** What can be chosen, with the spaces as they stand in the form. */
  #lists(fields: FormFields): ChoiceLists {
    const { policy, rulePacks } = this.data.catalogue;
    const spaces = rowNumbersIn(fields, 'spaces').flatMap((row) => {
      const at = `spaces.${String(row)}`;
      const value = fields[`${at}.id`];
      return value === undefined ? [] : [{ value, label: fields[`${at}.title`] ?? value }];
    });
    return {
      spaces,
      spacesAndOutside: [...spaces, { value: 'outside', label: words.outside }],
      roomTypes: policy.roomTypes.map(({ id, title }) => ({ value: id, label: title })),
      rulePacks: rulePacks.map(({ id, title }) => ({ value: id, label: title })),
    };
  }
}
