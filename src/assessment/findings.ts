import type { Finding, FindingKind } from './assessment.js';
import type { Policy } from './catalogue-types.js';
import type { PlanFile } from './plan-file.js';
import { standardPressure } from '../science/atmosphere.js';
import type { ResolvedPlan } from './resolved-plan.js';
import { plausibilityFindings } from './plausibility-findings.js';
import { freshAirOf } from './figures.js';

const limits = {
  volumeMismatch: 0.15,
  volumePerPersonM3: { low: 2, high: 60 },
  outdoorChangesPerHour: 12,
  totalChangesPerHour: 20,
  pressureMismatchPa: 3000,
  roomTemperatureK: { low: 278.15, high: 313.15 },
  idleLossPerHour: { low: 0.003, high: 0.1 },
  coldStockKg: 50,
  coldStockRoomM3: 2000,
  floorHeightM: 0.7,
} as const;

/** Statements of a plan that a careful reader would question, and hazards that it names. */
export function planFindings(
  plan: PlanFile,
  resolved: ResolvedPlan,
  policy: Policy,
): readonly Finding[] {
  const findings: Finding[] = [];
  const find = (code: string, kind: FindingKind, path: string, text: string) =>
    findings.push({ code, kind, path, text });

  spaceFindings(plan, resolved, policy, find);
  airFindings(resolved, find);
  siteFindings(plan, resolved, policy, find);
  stockFindings(plan, resolved, find);
  actFindings(plan, resolved, find);
  meterFindings(plan, find);
  return [...findings, ...plausibilityFindings(plan, resolved, policy)];
}

type Find = (code: string, kind: FindingKind, path: string, text: string) => void;

function spaceFindings(plan: PlanFile, resolved: ResolvedPlan, policy: Policy, find: Find): void {
  resolved.spaces.forEach((space, index) => {
    const path = `/venue/spaces/${String(index)}`;
    const gross = space.shapeVolumeM3;
    const stated = plan.venue.spaces[index]?.volumeM3 !== undefined;
    if (stated && space.volumeM3 > gross) {
      find(
        'volume-above-gross',
        'plausibility',
        `${path}/volumeM3`,
        `${space.title}: the free volume is larger than area times height. Check which volume was measured.`,
      );
    } else if (stated && space.volumeM3 < gross * (1 - limits.volumeMismatch)) {
      find(
        'volume-mismatch',
        'plausibility',
        `${path}/volumeM3`,
        `${space.title}: the free volume differs from area times height by more than 15 %. Confirm what fills the rest.`,
      );
    }
    const people = resolved.groups
      .filter((group) => group.space === space.id)
      .reduce((sum, group) => sum + group.count, 0);
    if (people > 0) {
      const each = space.volumeM3 / people;
      if (each < limits.volumePerPersonM3.low) {
        find(
          'crowded',
          'caution',
          path,
          `${space.title}: under 2 m3 of air for each person. Breath alone spoils this air quickly.`,
        );
      }
    }
    const kind = policy.roomTypes.find((row) => row.id === space.kind);
    if (kind && (space.volumeM3 < kind.volumeM3.low || space.volumeM3 > kind.volumeM3.high)) {
      find(
        'unusual-volume',
        'plausibility',
        `${path}/volumeM3`,
        `${space.title}: unusual volume for this kind of room (${kind.title}). Check the figure.`,
      );
    }
  });
}

function airFindings(resolved: ResolvedPlan, find: Find): void {
  resolved.airSystems.forEach((system, index) => {
    const path = `/venue/airSystems/${String(index)}`;
    if (system.extractLevel === null) {
      find(
        'extract-level',
        'plausibility',
        path,
        `${system.title}: nobody says whether the extract is high or low. High extract leaves dense gas on the floor.`,
      );
    }
    for (const served of system.serves) {
      const space = resolved.spaces.find((candidate) => candidate.id === served.space);
      if (!space) continue;
      const changes = (freshAirOf(resolved, space.id) * 3600) / space.volumeM3;
      if (changes > limits.outdoorChangesPerHour) {
        find(
          'much-outdoor-air',
          'plausibility',
          path,
          `${space.title}: more than 12 outdoor air changes per hour. Check that this is outdoor air, not total air.`,
        );
      }
      const total =
        ((freshAirOf(resolved, space.id) + system.recirculatedM3PerS * served.share) * 3600) /
        space.volumeM3;
      if (total > limits.totalChangesPerHour) {
        find(
          'much-air',
          'plausibility',
          path,
          `${space.title}: more than 20 total air changes per hour. Check the flow and its unit.`,
        );
      }
    }
    if (system.recirculatedM3PerS > 0) {
      find(
        'recirculation',
        'note',
        path,
        `${system.title} returns room air. Returned air clears no gas and carries it to every space on this system.`,
      );
    }
  });
}

function siteFindings(plan: PlanFile, resolved: ResolvedPlan, policy: Policy, find: Find): void {
  const { altitudeM, pressurePa, temperatureK } = resolved.site;
  if (
    plan.venue.site.altitudeM !== undefined &&
    Math.abs(pressurePa - standardPressure(altitudeM)) > limits.pressureMismatchPa
  ) {
    find(
      'altitude-pressure',
      'plausibility',
      '/venue/site/pressurePa',
      'Altitude and pressure disagree by more than 3 kPa. Use the pressure at the site, not reduced to sea level.',
    );
  }
  if (temperatureK < limits.roomTemperatureK.low || temperatureK > limits.roomTemperatureK.high) {
    find(
      'room-temperature',
      'plausibility',
      '/venue/site/temperatureK',
      'Room temperature below 5 or above 40 degC. Check the figure.',
    );
  }
  const row = [...policy.altitude]
    .sort((a, b) => b.fromM - a.fromM)
    .find((candidate) => altitudeM >= candidate.fromM);
  if (row) {
    find(
      `altitude-${row.word}`,
      row.word === 'refer' ? 'danger' : 'caution',
      '/venue/site/altitudeM',
      row.text,
    );
  }
}

function stockFindings(plan: PlanFile, resolved: ResolvedPlan, find: Find): void {
  resolved.stock.forEach((item, index) => {
    const path = `/stock/${String(index)}`;
    const stated = plan.stock?.[index];
    const room = resolved.spaces.find((space) => space.id === item.place);
    if (item.form === 'dryIce' && item.idleLossPerHour > 0) {
      const { low, high } = limits.idleLossPerHour;
      if (item.idleLossPerHour < low || item.idleLossPerHour > high) {
        find(
          'idle-loss',
          'plausibility',
          `${path}/idleLossPerHour`,
          `${item.title}: a box usually loses 0.3 to 10 % per hour. Check the figure.`,
        );
      }
    }
    if (
      (item.form === 'dryIce' || item.form === 'cryogen') &&
      room &&
      item.massKg * item.count > limits.coldStockKg &&
      room.volumeM3 < limits.coldStockRoomM3
    ) {
      find(
        'much-cold-stock',
        'caution',
        path,
        `${item.title}: more than 50 kg of cold stock in ${room.title}. Keep the surplus outdoors.`,
      );
    }
    if (item.form === 'liquefied' && stated?.pressurePa !== undefined) {
      find(
        'liquefied-by-pressure',
        'danger',
        `${path}/pressurePa`,
        `${item.title}: the gauge of a liquefied gas says nothing about its content. Weigh it.`,
      );
    }
  });
}

function actFindings(plan: PlanFile, resolved: ResolvedPlan, find: Find): void {
  resolved.acts.forEach((act, index) => {
    const path = `/acts/${String(index)}`;
    const sum = (kind: 'planned' | 'worstCredible') =>
      act[kind].reduce((total, release) => total + release.amountMol, 0);
    if (
      act.planned.length > 0 &&
      act.worstCredible.length === 0 &&
      !resolved.stock.some((item) => item.place === act.space && item.open)
    ) {
      find(
        'no-worst-case',
        'caution',
        `${path}/releases/worstCredible`,
        `${act.title}: no worst credible release is stated and no open container is listed in its space.`,
      );
    }
    if (act.worstCredible.length > 0 && sum('worstCredible') < sum('planned')) {
      find(
        'worst-below-planned',
        'plausibility',
        `${path}/releases/worstCredible`,
        `${act.title}: the worst credible release is smaller than the planned one.`,
      );
    }
    for (const release of act.planned) {
      const source = resolved.stock.find((item) => item.id === release.stock);
      if (source && release.amountMol > source.amountMol * source.count) {
        find(
          'more-than-stock',
          'danger',
          path,
          `${act.title}: lets out more than ${source.title} holds.`,
        );
      }
    }
  });
  const lowSeats = plan.event.audience.some((group) => group.zone.heightM <= limits.floorHeightM);
  const young = plan.event.audience.some(
    (group) => group.ageGroup === 'child' || group.ageGroup === 'toddler',
  );
  if (young && !lowSeats) {
    find(
      'children-not-on-floor',
      'note',
      '/event/audience',
      'Children are present and all mouths are above 0.7 m. Make sure that nobody sits on the floor.',
    );
  }
  const ends = [...resolved.performances].sort((a, b) => a.startS - b.startS);
  ends.forEach((performance, index) => {
    const next = ends[index + 1];
    if (next && next.startS <= performance.endS) {
      find(
        'no-time-between',
        'plausibility',
        '/event/performances',
        'Two performances follow each other without time for the air to clear.',
      );
    }
  });
}

function meterFindings(plan: PlanFile, find: Find): void {
  const gases = new Set(
    plan.acts.flatMap((act) => act.releases.planned.map((release) => release.gas)),
  );
  const meters = plan.meters ?? [];
  if (gases.has('CO2') && !meters.some((meter) => meter.gas === 'CO2')) {
    find(
      'no-carbon-dioxide-meter',
      'caution',
      '/meters',
      'Carbon dioxide is let out and no carbon dioxide meter is listed. An oxygen meter is blind to its harm.',
    );
  }
  meters.forEach((meter, index) => {
    if (meter.gas === 'O2' && meter.cellType === 'capillary' && gases.has('He')) {
      find(
        'capillary-cell-in-helium',
        'danger',
        `/meters/${String(index)}/cellType`,
        'A capillary oxygen cell reads high in helium. It counts as no meter; use a partial-pressure cell.',
      );
    }
    if (meter.cellType === undefined || meter.cellType === 'unknown') {
      find(
        'cell-type',
        'caution',
        `/meters/${String(index)}/cellType`,
        'The cell type of this meter is not stated. Without it the meter cannot be relied on.',
      );
    }
  });
}
