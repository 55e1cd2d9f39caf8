import { InvalidInput, type ErrorDetail } from '../errors.js';
import type { GasLibrary } from '../science/gases/gas-library.js';
import type { PlanFile } from './plan-file.js';

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
  });
  return problems;
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
