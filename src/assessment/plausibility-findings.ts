import { gasesOfRelease } from './plan-facts.js';
import type { Finding, FindingKind, HoldTime } from './assessment.js';
import type { Policy } from './catalogue-types.js';
import type { PhysicalFigure, PlanFile } from './plan-file.js';
import { policyDefault } from './policy-rows.js';
import type { ResolvedPlan, ResolvedStock } from './resolved-plan.js';

/** Bounds beyond which a careful reader asks again: common practice, no source. */
const limits = {
  roomyM3PerPerson: 60,
  sunkenChangesPerHour: 1,
  /** Reference volume over water volume: 2.7 m3 in 10 L of helium. */
  heliumFilling: 270,
  balloonM3: 0.015,
  /** From this many on they are ordinary balloons, not one large one. */
  manyBalloons: 5,
  balloonGasFactor: 1.3,
  cryogenLossPerDay: 0.003,
  cryogenM3: 0.05,
} as const;
const sunkenKinds: ReadonlySet<string> = new Set([
  'orchestra-pit',
  'trap-room',
  'store',
  'basement',
]);
/** Gases whose content a gauge does not show: they lie liquid in their cylinder. */
const liquefiable: ReadonlySet<string> = new Set(['CO2', 'SF6', 'C3H8', 'N2O']);
const fuels: ReadonlySet<string> = new Set(['H2', 'CH4', 'C3H8']);
const referenceMolarVolumeM3 = 0.0240551;

type Find = (code: string, kind: FindingKind, path: string, text: string) => void;

const originOf = (figure: PhysicalFigure | undefined): string | undefined =>
  typeof figure === 'object' ? (figure.origin ?? 'supplied') : undefined;

function airPlausibility(plan: PlanFile, resolved: ResolvedPlan, find: Find): void {
  (plan.venue.airSystems ?? []).forEach((system, index) => {
    const path = `/venue/airSystems/${String(index)}`;
    const title = system.title ?? system.id ?? 'The air system';
    const flows = [system.freshAirM3PerS, system.supplyM3PerS, system.extractM3PerS];
    const origins = flows.map(originOf).filter((origin) => origin !== undefined);
    if (origins.includes('drawing')) {
      find(
        'design-flow',
        'plausibility',
        path,
        `${title}: the flow is only that of the design. Part of it is credited until somebody measures.`,
      );
    }
    const flow = resolved.airSystems[index];
    const delivers = flow
      ? flow.freshAirM3PerS + (flow.supplyM3PerS ?? 0) + (flow.extractM3PerS ?? 0)
      : 0;
    if (delivers > 0 && !origins.includes('measured') && flow?.recirculatedM3PerS === 0) {
      find(
        'all-outdoor-air',
        'plausibility',
        path,
        `${title}: all of its air counts as outdoor air and nothing shows that it is. Ask for the share of returned air.`,
      );
    }
    const runs = resolved.performances.some(
      (show) =>
        (system.fromS ?? 0) < show.endS && show.startS < (system.toS ?? Number.POSITIVE_INFINITY),
    );
    if (delivers > 0 && !runs) {
      find(
        'flow-while-off',
        'plausibility',
        path,
        `${title}: a flow is stated, and it is off during every performance. It clears nothing then.`,
      );
    }
  });
  resolved.spaces.forEach((space, index) => {
    const changes = resolved.infiltration.find((row) => row.space === space.id)?.airChangesPerHour;
    const hasFan = resolved.airSystems.some((system) =>
      system.serves.some((served) => served.space === space.id),
    );
    if (
      space.kind !== null &&
      sunkenKinds.has(space.kind) &&
      !hasFan &&
      (changes ?? 0) > limits.sunkenChangesPerHour
    ) {
      find(
        'airy-low-room',
        'plausibility',
        `/venue/spaces/${String(index)}`,
        `${space.title}: more than one air change per hour without any fan. Low and closed rooms seldom have that.`,
      );
    }
    const people = resolved.groups
      .filter((group) => group.space === space.id)
      .reduce((sum, group) => sum + group.count, 0);
    if (people > 0 && space.volumeM3 / people > limits.roomyM3PerPerson) {
      find(
        'roomy',
        'plausibility',
        `/venue/spaces/${String(index)}`,
        `${space.title}: over 60 m3 of air for each person. Check the volume and the head count.`,
      );
    }
  });
}

function contentPlausibility(plan: PlanFile, resolved: ResolvedPlan, policy: Policy, find: Find) {
  resolved.stock.forEach((item, index) => {
    const path = `/stock/${String(index)}`;
    const stated = plan.stock?.[index];
    const gases = Object.keys(item.composition);
    if (
      item.form !== 'liquefied' &&
      stated?.pressurePa !== undefined &&
      gases.some((gas) => liquefiable.has(gas))
    ) {
      find(
        'liquefied-by-pressure',
        'danger',
        `${path}/pressurePa`,
        `${item.title}: this gas lies liquid in its cylinder, and the gauge says nothing about its content. Weigh it.`,
      );
    }
    const water = stated?.waterVolumeM3;
    const waterM3 = typeof water === 'object' ? water.value : water;
    if (
      waterM3 !== undefined &&
      gases.includes('He') &&
      (item.amountMol * referenceMolarVolumeM3) / waterM3 > limits.heliumFilling
    ) {
      find(
        'overfull-cylinder',
        'plausibility',
        path,
        `${item.title}: more helium than a cylinder of that size holds (2.7 m3 in 10 L). Check content and size.`,
      );
    }
    const each = item.amountMol * resolved.site.molarVolumeM3PerMol;
    if (item.form === 'balloon' && item.count >= limits.manyBalloons && each > limits.balloonM3) {
      find(
        'large-balloons',
        'plausibility',
        path,
        `${item.title}: over 15 L in each balloon. An ordinary one of 28 cm holds 12 to 15 L.`,
      );
    }
    if (item.form === 'cryogen') cryogenPlausibility(item, path, resolved, policy, find);
  });
  balloonGas(plan, resolved, find);
}

function cryogenPlausibility(
  item: ResolvedStock,
  path: string,
  resolved: ResolvedPlan,
  policy: Policy,
  find: Find,
): void {
  if (item.idleLossPerHour * 24 < limits.cryogenLossPerDay) {
    find(
      'cryogen-loss',
      'plausibility',
      `${path}/idleLossPerHour`,
      `${item.title}: loses under 0.3 % a day. An old vessel loses more; check its data sheet and double it.`,
    );
  }
  const room = resolved.spaces.find((space) => space.id === item.place);
  const liquidM3 =
    (item.massKg * item.count) / policyDefault(policy, 'nitrogenLiquidKgPerM3').value;
  // The heavier liquids are caught by their mass already.
  if (
    room &&
    room.volumeM3 < 2000 &&
    liquidM3 > limits.cryogenM3 &&
    item.massKg * item.count <= 50
  ) {
    find(
      'much-cold-stock',
      'caution',
      path,
      `${item.title}: more than 50 L of cold liquid in ${room.title}. Keep the surplus outdoors.`,
    );
  }
}

/** Gas drawn for balloons against the balloons that are listed, with what is lost in filling. */
function balloonGas(plan: PlanFile, resolved: ResolvedPlan, find: Find): void {
  plan.acts.forEach((act, index) => {
    if (act.catalogueId !== 'balloon-decor') return;
    const drawn = resolved.acts[index]?.planned.reduce((sum, one) => sum + one.amountMol, 0) ?? 0;
    const gases = new Set(act.releases.planned.flatMap(gasesOfRelease));
    const balloons = resolved.stock.filter(
      (item) =>
        item.form === 'balloon' && Object.keys(item.composition).some((gas) => gases.has(gas)),
    );
    const held = balloons.reduce((sum, item) => sum + item.amountMol * item.count, 0);
    if (balloons.length === 0 || drawn <= limits.balloonGasFactor * held) return;
    find(
      'balloon-gas',
      'plausibility',
      `/acts/${String(index)}`,
      `${act.title}: more gas than 1.3 times what the balloons hold. Check their number and size.`,
    );
  });
}

function amountPlausibility(resolved: ResolvedPlan, find: Find): void {
  for (const item of resolved.stock) {
    const users = resolved.acts.filter((act) => act.planned.some((one) => one.stock === item.id));
    const day = users.reduce(
      (total, act) =>
        total +
        act.startsS.length *
          act.planned.reduce((sum, one) => sum + (one.stock === item.id ? one.amountMol : 0), 0),
      0,
    );
    if (day > item.amountMol * item.count * 1.001) {
      find(
        'day-above-stock',
        'plausibility',
        `/stock/${String(resolved.stock.indexOf(item))}`,
        `${item.title}: the acts of the day let out more than is brought. Check the repeats, or list what is refilled.`,
      );
    }
  }
  resolved.acts.forEach((act, index) => {
    const largest = resolved.stock
      .filter((item) => item.open && item.place === act.space)
      .filter((item) => act.planned.some((one) => one.stock === item.id))
      .sort((one, other) => other.amountMol - one.amountMol)[0];
    const worst = Math.max(0, ...act.worstCredible.map((one) => one.amountMol));
    if (largest && act.worstCredible.length > 0 && worst < 0.999 * largest.amountMol) {
      find(
        'worst-below-container',
        'plausibility',
        `/acts/${String(index)}/releases/worstCredible`,
        `${act.title}: the worst case is less than ${largest.title} holds, which stands open there. The whole container is judged too.`,
      );
    }
  });
}

function peoplePlausibility(plan: PlanFile, resolved: ResolvedPlan, find: Find): void {
  plan.event.audience.forEach((group, index) => {
    const path = `/event/audience/${String(index)}`;
    if (resolved.groups[index]?.count === 0) {
      find(
        'nobody',
        'plausibility',
        `${path}/count`,
        `${group.title}: nobody is there. Leave the group out, or give its head count.`,
      );
    }
    if (group.kind === 'crew' && group.ageGroup !== 'adult') {
      find(
        'minors-as-crew',
        'danger',
        `${path}/kind`,
        `${group.title}: minors are held to the levels for crew only. Name them as public.`,
      );
    }
  });
  const meters = plan.meters ?? [];
  const released = new Set(
    plan.acts.flatMap((act) => act.releases.planned.flatMap(gasesOfRelease)),
  );
  const blind = [...released].filter(
    (gas) => fuels.has(gas) && !meters.some((meter) => meter.gas === gas),
  );
  if (blind.length > 0) {
    find(
      'no-fuel-meter',
      'caution',
      '/meters',
      `Fuel gas is let out (${blind.join(', ')}) and no meter for it is listed. Oxygen alone does not show it.`,
    );
  }
  meters.forEach((meter, index) => {
    if (meter.gas !== 'CO2' || meter.rangeFraction !== undefined) return;
    find(
      'meter-range',
      'caution',
      `/meters/${String(index)}/rangeFraction`,
      'The range of this carbon dioxide meter is not stated. Many end at 5000 or 10 000 ppm, and over-range is no reading.',
    );
  });
}

/** Statements of a plan that are possible and seldom true. */
export function plausibilityFindings(
  plan: PlanFile,
  resolved: ResolvedPlan,
  policy: Policy,
): readonly Finding[] {
  const findings: Finding[] = [];
  const find: Find = (code, kind, path, text) => findings.push({ code, kind, path, text });
  airPlausibility(plan, resolved, find);
  contentPlausibility(plan, resolved, policy, find);
  amountPlausibility(resolved, find);
  peoplePlausibility(plan, resolved, find);
  return findings;
}

/** Hold times that are longer than the shortest gap of the timetable. */
export function holdFindings(
  holds: readonly HoldTime[],
  { performances }: ResolvedPlan,
): readonly Finding[] {
  const shows = [...performances].sort((one, other) => one.startS - other.startS);
  const gaps = shows.flatMap((show, index) => {
    const next = shows[index + 1];
    return next ? [next.startS - show.endS] : [];
  });
  if (gaps.length === 0) return [];
  const gapS = Math.min(...gaps);
  return holds
    .filter((hold) => hold.time === null || hold.time.value > gapS)
    .map((hold) => ({
      code: 'hold-longer-than-gap',
      kind: 'plausibility',
      path: '/event/performances',
      text: `${hold.spaceTitle}: the wait until the next house may enter is longer than the shortest gap of ${String(Math.round(gapS / 60))} min between performances.`,
    }));
}
