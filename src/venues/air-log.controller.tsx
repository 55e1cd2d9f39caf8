import { Body, Controller, Get, Param, Post, Query, Res } from '@nestjs/common';
import type { PlanVenue } from '../assessment/plan-file.js';
import { Conflict, InvalidInput, type ErrorDetail } from '../errors.js';
import { checkedForm } from '../web/forms/checked-form.js';
import type { FormFields } from '../web/forms/form-fields.js';
import { ReturnsPage, sendElsewhere, sendPage, type PageReply } from '../web/http/exchange.js';
import { pageHtml } from '../web/layout/page.js';
import { CurrentViewer, type Viewer } from '../web/session/viewer.js';
import { airLogTexts as words } from '../web/texts/en-air-log.js';
import { airLogOutcome, type AirLogResult } from './air-log.js';
import { AirLogForm } from './air-log-form.js';
import { AirLogPage } from './air-log-pages.js';
import {
  countedLeakage,
  systemsServing,
  withMeasuredAir,
  type RunningPart,
} from './measured-air.js';
import { VenuesService, type SavedVenue } from './venues.service.js';

type Written =
  | { readonly venue: PlanVenue; readonly problems: readonly [] }
  | { readonly venue: undefined; readonly problems: readonly ErrorDetail[] };

/** Where a figure comes from, in the words that the venue keeps beside it. */
function noteOf({ fit, timesS, volumeM3 }: AirLogResult, form: AirLogForm): string {
  const minutes = Math.round((timesS.at(-1) ?? 0) / 60);
  const parts = [
    `CO2 decay log: ${String(timesS.length)} readings in ${String(minutes)} min`,
    `background ${fit.backgroundPpm.toFixed(0)} ppm`,
    `${String(Number(volumeM3.toPrecision(4)))} m3`,
    `${String(Number(fit.airChangesPerHour.toPrecision(3)))} air changes per hour`,
    ...(form.note === undefined ? [] : [form.note]),
  ];
  return parts.join(', ');
}

/** Ventilation of a space from a log of falling readings. */
@Controller('venues/:id/air-log')
export class AirLogController {
  constructor(private readonly venues: VenuesService) {}

  @Get()
  @ReturnsPage()
  async page(
    @Param('id') id: string,
    @Query('space') space: unknown,
    @CurrentViewer() viewer: Viewer,
  ): Promise<string> {
    const saved = await this.venues.get(id);
    const values = typeof space === 'string' ? { space } : {};
    return this.#html(saved, { viewer, fields: values });
  }

  @Post()
  async work(
    @Param('id') id: string,
    @Body() body: unknown,
    @CurrentViewer() viewer: Viewer,
    @Res() reply: PageReply,
  ): Promise<void> {
    const saved = await this.venues.get(id);
    const { form, fields: sent, problems } = checkedForm(AirLogForm, body);
    // A chosen file cannot be chosen again for the reader: its lines stay in the text.
    const { file, ...typed } = sent;
    const fields = file === undefined ? typed : { ...typed, text: file };
    const show = (status: number, more: Partial<Shown>): void => {
      sendPage(reply, this.#html(saved, { viewer, fields, ...more }), status);
    };
    if (form === undefined) {
      show(422, { problems });
      return;
    }
    const outcome = airLogOutcome(form, saved.venue, this.venues.asRead(saved.venue));
    if (outcome.result === undefined) {
      show(422, { problems: outcome.problems });
      return;
    }
    const { result } = outcome;
    if (form.do === 'work') {
      show(200, { result });
      return;
    }
    const written = this.#written(saved.venue, form, result);
    if (written.venue === undefined) {
      show(422, { problems: written.problems, result });
      return;
    }
    try {
      await this.venues.save(id, form.version, written.venue);
    } catch (error) {
      if (error instanceof Conflict) {
        show(409, { result, isOvertaken: true });
        return;
      }
      if (!(error instanceof InvalidInput)) throw error;
      show(422, { result, problems: [{ path: '', problem: `${error.message} ${error.hint}` }] });
      return;
    }
    sendElsewhere(reply, `/venues/${id}?notice=saved`);
  }

  #written(venue: PlanVenue, form: AirLogForm, result: AirLogResult): Written {
    const systems = systemsServing(venue, form.space).map(({ part }) => part);
    const parts: readonly RunningPart[] = [...systems, 'leakage', 'newSystem'];
    const part = parts.find((one) => one === form.part);
    const { on, by } = form;
    if (part === undefined || on === undefined) {
      const problems = [
        ...(part === undefined ? [{ path: '/part', problem: words.problems.part }] : []),
        ...(on === undefined ? [{ path: '/on', problem: words.problems.on }] : []),
      ];
      return { venue: undefined, problems };
    }
    const measured = {
      freshAirM3PerS: result.fit.freshAirM3PerS,
      lowM3PerS: result.planning.low,
      highM3PerS: result.planning.high,
      volumeM3: result.volumeM3,
      on,
      by,
      note: noteOf(result, form),
    };
    const leakage = countedLeakage(this.venues.asRead(venue), form.space);
    const changed = withMeasuredAir(venue, form.space, part, measured, leakage);
    return changed === undefined
      ? { venue: undefined, problems: [{ path: '/part', problem: words.problems.leakageOnly }] }
      : { venue: changed, problems: [] };
  }

  #html(saved: SavedVenue, { fields, problems = [], ...shown }: Shown): string {
    const { id, version, venue } = saved;
    const first = venue.spaces[0]?.id;
    const space = fields.space ?? first;
    const page = (
      <AirLogPage
        {...shown}
        venue={venue}
        venueId={id}
        version={version}
        state={{ values: { ...fields, space }, problems }}
      />
    );
    return pageHtml(page);
  }
}

interface Shown {
  readonly viewer: Viewer;
  readonly fields: FormFields;
  readonly problems?: readonly ErrorDetail[];
  readonly result?: AirLogResult;
  readonly isOvertaken?: boolean;
}
