import { InvalidInput, type ErrorDetail } from '../errors.js';
import type { GasLibrary } from '../science/gases/gas-library.js';
import { airPathProblems } from '../science/room-air/air-path-problems.js';
import type { PhysicalFigure, PlanFile } from './plan-file.js';

/** Names in the plan that point nowhere, stand twice, or say two things at once. */
export function referenceProblems(plan: PlanFile, gases: GasLibrary): readonly ErrorDetail[] {
  const problems: ErrorDetail[] = [];
  const complain = (path: string, problem: string) => problems.push({ path, problem });

  const spaces = new Set(plan.venue.spaces.map((space) => space.id));
  const stock = new Set((plan.stock ?? []).map((item) => item.id));
  const acts = new Set(plan.acts.map((act) => act.id));
  const knowsGas = (gas: string) => gas === 'air' || gas in gases.species;

  const unique = (ids: readonly string[], path: string) => {
    const seen = new Set<string>();
    ids.forEach((id, index) => {
      if (seen.has(id)) complain(`${path}/${String(index)}/id`, `the id ${id} stands twice`);
      seen.add(id);
    });
  };
  unique(
    plan.venue.spaces.map((space) => space.id),
    '/venue/spaces',
  );
  unique(
    plan.acts.map((act) => act.id),
    '/acts',
  );
  unique(
    (plan.stock ?? []).map((item) => item.id),
    '/stock',
  );
  unique(
    plan.event.audience.map((group) => group.id),
    '/event/audience',
  );

  const space = (id: string | undefined, path: string, orOutside = false) => {
    if (id === undefined || spaces.has(id) || (orOutside && id === 'outside')) return;
    complain(path, `there is no space ${id} in the venue`);
  };
  const contents = (
    item: { gas?: string; composition?: Record<string, number> },
    path: string,
    required: boolean,
  ) => {
    if (item.gas !== undefined && item.composition !== undefined) {
      complain(path, 'gives both gas and composition: give one');
    }
    if (required && item.gas === undefined && item.composition === undefined) {
      complain(path, 'names no gas');
    }
    if (item.gas !== undefined && !knowsGas(item.gas)) {
      complain(`${path}/gas`, `the gas ${item.gas} is not in the gas data`);
    }
    if (item.composition) {
      for (const gas of Object.keys(item.composition)) {
        if (!knowsGas(gas))
          complain(`${path}/composition`, `the gas ${gas} is not in the gas data`);
      }
      const sum = Object.values(item.composition).reduce((total, part) => total + part, 0);
      if (Math.abs(sum - 1) > 1e-6) {
        complain(`${path}/composition`, `the fractions sum to ${String(sum)}, not 1`);
      }
    }
  };

  timeProblems(plan, complain);
  plan.venue.openings?.forEach((opening, index) => {
    space(opening.from, `/venue/openings/${String(index)}/from`, true);
    space(opening.to, `/venue/openings/${String(index)}/to`, true);
    if (opening.from === opening.to) {
      complain(`/venue/openings/${String(index)}/to`, 'joins a space to itself');
    }
  });
  plan.venue.airSystems?.forEach((system, index) => {
    const path = `/venue/airSystems/${String(index)}`;
    space(system.space, `${path}/space`);
    system.serves?.forEach((served, at) => {
      space(served.space, `${path}/serves/${String(at)}/space`);
    });
    if ((system.space === undefined) === (system.serves === undefined)) {
      complain(path, 'names its space either in "space" or in "serves"');
    }
    if (system.serves) {
      const shares = system.serves.reduce((sum, served) => sum + served.share, 0);
      if (Math.abs(shares - 1) > 1e-6) {
        complain(`${path}/serves`, `the shares sum to ${String(shares)}, not 1`);
      }
    }
    if (system.drive === 'balanced') {
      if (system.supplyM3PerS === undefined || system.extractM3PerS === undefined) {
        complain(path, 'a balanced system gives supplyM3PerS and extractM3PerS');
      }
    } else if (system.freshAirM3PerS === undefined) {
      complain(path, 'gives no freshAirM3PerS; mark it unknown if nobody can say');
    }
  });
  plan.venue.infiltration?.forEach((row, index) => {
    space(row.space, `/venue/infiltration/${String(index)}/space`);
  });
  plan.venue.transfers?.forEach((row, index) => {
    space(row.from, `/venue/transfers/${String(index)}/from`);
    space(row.to, `/venue/transfers/${String(index)}/to`);
  });
  transferProblems(plan, complain);
  plan.event.audience.forEach((group, index) => {
    space(group.zone.space, `/event/audience/${String(index)}/zone/space`);
  });
  plan.acts.forEach((act, index) => {
    const path = `/acts/${String(index)}`;
    space(act.space, `${path}/space`);
    if ((act.minute === undefined) === (act.startsAt === undefined)) {
      complain(path, 'gives its time either as minute of each performance or as startsAt');
    }
    for (const kind of ['planned', 'worstCredible'] as const) {
      act.releases[kind].forEach((release, at) => {
        const here = `${path}/releases/${kind}/${String(at)}`;
        space(release.space, `${here}/space`);
        contents(release, here, true);
        const amounts = [release.amountMol, release.massKg, release.volumeM3].filter(
          (amount) => amount !== undefined,
        );
        if (amounts.length !== 1) {
          complain(here, 'gives one of amountMol, massKg and volumeM3, and only one');
        }
        if (release.stock !== undefined && !stock.has(release.stock)) {
          complain(`${here}/stock`, `there is no stock ${release.stock}`);
        }
      });
    }
    act.inhaled?.forEach((inhalation, at) => {
      contents(inhalation, `${path}/inhaled/${String(at)}`, false);
    });
    act.sound?.forEach((sound, at) => {
      contents(sound, `${path}/sound/${String(at)}`, false);
    });
  });
  plan.stock?.forEach((item, index) => {
    const path = `/stock/${String(index)}`;
    contents(item, path, true);
    const byPressure = item.waterVolumeM3 !== undefined && item.pressurePa !== undefined;
    const ways = [byPressure, item.massKg !== undefined, item.amountMol !== undefined];
    if (ways.filter(Boolean).length !== 1) {
      complain(
        path,
        'gives its content one way: massKg, amountMol, or waterVolumeM3 with pressurePa',
      );
    }
    if (!['outside', 'lift', 'vehicle'].includes(item.place)) space(item.place, `${path}/place`);
  });
  plan.transport?.forEach((leg, index) => {
    leg.load.forEach((item, at) => {
      if (!stock.has(item)) {
        complain(`/transport/${String(index)}/load/${String(at)}`, `there is no stock ${item}`);
      }
    });
  });
  plan.controls?.forEach((control, index) => {
    if (control.act !== undefined && !acts.has(control.act)) {
      complain(`/controls/${String(index)}/act`, `there is no act ${control.act}`);
    }
    space(control.space, `/controls/${String(index)}/space`);
    if (
      control.group !== undefined &&
      !plan.event.audience.some((group) => group.id === control.group)
    ) {
      complain(`/controls/${String(index)}/group`, `there is no group ${control.group}`);
    }
  });
  return problems;
}

type Complain = (path: string, problem: string) => void;
interface Timed {
  readonly fromS?: number;
  readonly toS?: number;
}

const isAtTheSameTime = (one: Timed, other: Timed): boolean =>
  (one.fromS ?? 0) < (other.toS ?? Infinity) && (other.fromS ?? 0) < (one.toS ?? Infinity);

/** Times that run backwards, and two states of one thing, or two performances, at the same time. */
function timeProblems(plan: PlanFile, complain: Complain): void {
  const lists = [
    ['/venue/openings', plan.venue.openings ?? []],
    ['/venue/airSystems', plan.venue.airSystems ?? []],
    ['/stock', plan.stock ?? []],
  ] as const;
  for (const [path, list] of lists) {
    list.forEach((one: Timed & { readonly id?: string }, index) => {
      if (one.toS !== undefined && one.toS <= (one.fromS ?? 0)) {
        complain(`${path}/${String(index)}/toS`, 'is not after its start');
      }
      const before = list
        .slice(0, index)
        .find(
          (other: Timed & { readonly id?: string }) =>
            one.id !== undefined && other.id === one.id && isAtTheSameTime(other, one),
        );
      // Stock of one id twice is named as such already.
      if (before && path !== '/stock') {
        complain(
          `${path}/${String(index)}`,
          `overlaps another time of ${one.id ?? ''}: end the one before the other begins`,
        );
      }
    });
  }
  (plan.venue.infiltration ?? []).forEach((row, index, all) => {
    if (all.slice(0, index).some((other) => other.space === row.space)) {
      complain(`/venue/infiltration/${String(index)}`, `gives the gaps of ${row.space} twice`);
    }
  });
  const minuteOf = (startsAt: string): number => {
    const [hours = '0', minutes = '0'] = startsAt.split(':');
    return 60 * Number(hours) + Number(minutes);
  };
  const shows = plan.event.performances.map(({ startsAt, durationMin }, index) => ({
    index,
    start: minuteOf(startsAt),
    end: minuteOf(startsAt) + durationMin,
  }));
  for (const show of shows) {
    const earlier = shows.find(
      (other) =>
        other.start < show.end &&
        show.start < other.end &&
        (other.start < show.start || (other.start === show.start && other.index < show.index)),
    );
    if (!earlier) continue;
    complain(
      `/event/performances/${String(show.index)}/startsAt`,
      `begins before performance ${String(earlier.index + 1)} has ended`,
    );
  }
}

/** Transfers whose air comes from nowhere, told with the places of the plan. */
function transferProblems({ venue }: PlanFile, complain: Complain): void {
  const stated = (figure: PhysicalFigure | undefined): number => {
    const value = typeof figure === 'object' ? (figure.high ?? figure.value) : figure;
    return value ?? Number.NaN;
  };
  const problems = airPathProblems({
    spaces: venue.spaces.map(({ id }) => ({ id, floorAreaM2: 1, heightM: 1 })),
    openings: (venue.openings ?? []).map(({ from, to }) => ({
      from,
      to,
      kind: 'doorway',
      widthM: 1,
      heightM: 1,
    })),
    airSystems: (venue.airSystems ?? []).map(({ space, serves, drive }) => ({
      ...(space === undefined ? {} : { space }),
      ...(serves ? { serves } : {}),
      drive,
    })),
    // A space whose gaps nobody stated has the usual ones.
    infiltration: venue.spaces.map(({ id }) => ({
      space: id,
      airChangesPerHour: stated(
        venue.infiltration?.find((row) => row.space === id)?.airChangesPerHour,
      ),
    })),
    transfers: (venue.transfers ?? []).map(({ from, to, flowM3PerS }) => ({
      from,
      to,
      flowM3PerS: stated(flowM3PerS),
    })),
  });
  for (const { path, problem } of problems) complain(`/venue${path}`, problem);
}

/** @throws {InvalidInput} naming every reference that leads nowhere */
export function requireReferences(plan: PlanFile, gases: GasLibrary): void {
  const problems = referenceProblems(plan, gases);
  const [first] = problems;
  if (first) {
    throw new InvalidInput(
      `The plan refers to something that is not there at ${first.path}: ${first.problem}.`,
      'Correct the places listed under details.',
      problems,
    );
  }
}
