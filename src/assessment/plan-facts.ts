import type { FactValues } from './condition-holds.js';
import type { PlanFile } from './plan-file.js';
import type { ResolvedPlan } from './resolved-plan.js';

const fuels = new Set(['H2', 'CH4', 'C3H8']);
const atmosphericPa = 101_325;

export const gasesOfRelease = (item: {
  gas?: string;
  composition?: Record<string, number>;
}): readonly string[] => Object.keys(item.composition ?? { [item.gas ?? 'air']: 1 });

/** Gases a plan can let out, planned or by a fault, air left out. */
export function releasableGases(plan: PlanFile): readonly string[] {
  const releases = plan.acts.flatMap((act) => [
    ...act.releases.planned,
    ...act.releases.worstCredible,
  ]);
  const gases = new Set([...releases, ...(plan.stock ?? [])].flatMap(gasesOfRelease));
  gases.delete('air');
  return [...gases].sort();
}

/** The same facts narrowed to one act: what it lets out, and what that makes of it. */
export function actFacts(facts: FactValues, act: PlanFile['acts'][number]): FactValues {
  const gases = [...new Set(act.releases.planned.flatMap(gasesOfRelease))];
  return {
    ...facts,
    gasesReleased: gases,
    gasesPresent: gases,
    demonstrations: act.catalogueId === undefined ? [] : [act.catalogueId],
    fuelGas: gases.some((gas) => fuels.has(gas)),
    oxidiser: gases.some((gas) => gas === 'O2' || gas === 'N2O'),
    flame: act.releases.planned.some((release) => release.burned === true),
    inhalation: (act.inhaled ?? []).length > 0,
  };
}

/** The facts of a plan that its rule pack and cautions may ask for. */
export function planFacts(plan: PlanFile, resolved: ResolvedPlan): FactValues {
  const stock = plan.stock ?? [];
  const released = new Set(
    plan.acts.flatMap((act) =>
      [...act.releases.planned, ...act.releases.worstCredible].flatMap(gasesOfRelease),
    ),
  );
  released.delete('air');
  const present = releasableGases(plan);
  const dryIce = stock.some((item) => item.form === 'dryIce');
  const cryogen = stock.some((item) => item.form === 'cryogen');
  const pressurised = stock.some((item) => item.form === 'compressed' || item.form === 'liquefied');
  const transport = plan.transport ?? [];
  const groups = plan.event.audience;
  const levels = resolved.spaces.map((space) => space.floorLevelM);
  const fuelKg = resolved.stock
    .filter((item) => Object.keys(item.composition).some((gas) => fuels.has(gas)))
    .reduce((sum, item) => sum + item.massKg * item.count, 0);
  const carbonDioxideKg = resolved.stock
    .filter((item) => 'CO2' in item.composition)
    .reduce((sum, item) => sum + item.massKg * item.count, 0);
  return {
    gasesReleased: [...released],
    gasesPresent: present,
    occupied: true,
    publicPresent: groups.some((group) => group.kind === 'public'),
    demonstrations: plan.acts.flatMap((act) => act.catalogueId ?? []),
    ...(plan.venue.site.region === undefined ? {} : { region: [plan.venue.site.region] }),
    minorsPresent: groups.some((group) => group.ageGroup !== 'adult'),
    floorSeated: groups.some((group) => group.zone.heightM <= 0.7),
    indoors: true,
    belowGround: levels.some((level) => level < -0.5),
    workAtHeight: groups.some((group) => group.zone.heightM > 2),
    vehicle: transport.some((leg) => leg.kind === 'car' || leg.kind === 'van'),
    lift: transport.some((leg) => leg.kind === 'lift'),
    store: stock.some((item) => item.open === false),
    flame: plan.acts.some((act) => act.releases.planned.some((release) => release.burned === true)),
    fuelGas: present.some((gas) => fuels.has(gas)),
    oxidiser: present.some((gas) => gas === 'O2' || gas === 'N2O'),
    cold: dryIce || cryogen,
    dryIce,
    cryogen,
    pressurised,
    inhalation: plan.acts.some((act) => (act.inhaled ?? []).length > 0),
    mechanicalVentilation: resolved.airSystems.length > 0,
    recirculation: resolved.airSystems.some((system) => system.recirculatedM3PerS > 0),
    largeReleaseCredible: stock.some((item) => item.open !== false),
    altitudeM: resolved.site.altitudeM,
    carbonDioxideKg,
    fuelGasKg: fuelKg,
    pressureGaugePa: pressurised ? 2e7 - atmosphericPa : 0,
  };
}
