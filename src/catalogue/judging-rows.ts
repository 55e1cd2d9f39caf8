import type {
  ExposureLimit,
  FlammableThreshold,
  OxygenThreshold,
  Policy,
  PolicyLevel,
  RulePack,
} from '../assessment/catalogue-types.js';
import type { Fault } from './data-file.js';

/**
 * Why a row of a pack may not judge. A judging row tightens the levels of the policy: it may not be
 * looser than they are, and it may not be one that fresh air or any gas plan at all would fail.
 */

/** Oxygen readings of clean, humid outdoor air fall to about 20.7 %, of dry air to 20.95 %. */
const FRESH_AIR_LOWEST_LIMIT_PERCENT = 20.9;
const FRESH_AIR_HIGHEST_PERCENT = 21.0;

const toShow = 'Set role to show (printed beside the result) or correct the value.';

function levelOf(policy: Policy, quantity: PolicyLevel['quantity']): PolicyLevel | undefined {
  return policy.levels.find((level) => level.quantity === quantity);
}

/** Faults of one oxygen threshold. */
export function oxygenFaults(row: OxygenThreshold, policy: Policy, path: string): readonly Fault[] {
  const at = `${path}/value`;
  if (row.unit === 'percent' && (row.value < 1 || row.value > 100)) {
    const hint = 'Write 19.5 for 19.5 %, or change the unit.';
    return [{ path: at, problem: `${String(row.value)} is not a percentage of oxygen`, hint }];
  }
  if (row.role !== 'judge') return [];
  if (row.unit !== 'percent') {
    const problem = 'an oxygen pressure cannot judge: fresh air at altitude would fail it';
    return [{ path: `${path}/role`, problem, hint: toShow }];
  }
  if (row.sense === 'below' && row.value >= FRESH_AIR_LOWEST_LIMIT_PERCENT) {
    const problem = 'cannot judge: fresh humid air or any gas plan at all would fail it';
    return [{ path: `${path}/role`, problem, hint: toShow }];
  }
  if (row.sense === 'above' && row.value <= FRESH_AIR_HIGHEST_PERCENT) {
    const problem = 'cannot judge: fresh air would fail it';
    return [{ path: `${path}/role`, problem, hint: toShow }];
  }
  const level = levelOf(
    policy,
    row.sense === 'below' ? 'oxygenFraction' : 'oxygenEnrichmentFraction',
  )?.[row.level].value;
  const looser =
    level !== undefined &&
    (row.sense === 'below' ? row.value / 100 < level : row.value / 100 > level);
  if (!looser) return [];
  const problem = `loosens the ${row.level} of the policy, ${String(level * 100)} %`;
  return [{ path: at, problem, hint: toShow }];
}

/** Faults of one exposure limit. */
export function exposureFaults(
  row: ExposureLimit,
  pack: RulePack,
  policy: Policy,
  path: string,
): readonly Fault[] {
  const at = `${path}/value`;
  if (row.value < 1) {
    const hint = 'Limits are written in ppm by volume: 5000, not 0.005 or 0.5.';
    return [{ path: at, problem: `${String(row.value)} ppm looks like another unit`, hint }];
  }
  if (row.role !== 'judge') return [];
  if (row.period === 'immediateDanger') {
    const problem = 'an escape figure is no exposure limit and cannot judge';
    return [{ path: `${path}/role`, problem, hint: toShow }];
  }
  const fresh = policy.freshAir.find(({ gas }) => gas === row.gas)?.fraction ?? 0;
  if (row.value * 1e-6 <= fresh) {
    const problem = `cannot judge: fresh air holds ${String(Math.round(fresh * 1e6))} ppm`;
    return [{ path: `${path}/role`, problem, hint: toShow }];
  }
  const highest = highestPpm(row, pack, policy);
  if (highest === undefined || row.value <= highest) return [];
  const problem = `loosens the policy, which allows ${String(Math.round(highest))} ppm`;
  return [{ path: at, problem, hint: toShow }];
}

function highestPpm(row: ExposureLimit, pack: RulePack, policy: Policy): number | undefined {
  const periodLevel = { eightHour: 'aim', fifteenMinute: 'limit', ceiling: 'never' } as const;
  if (row.period === 'immediateDanger') return undefined;
  const name = periodLevel[row.period];
  if (row.gas === 'CO2') {
    const value = levelOf(policy, 'carbonDioxideFraction')?.[name].value;
    // 0.015 * 1e6 is not exact in binary; a millionth of slack.
    return value === undefined ? undefined : value * 1e6 * (1 + 1e-6);
  }
  if (row.period === 'eightHour') return undefined;
  const times = levelOf(policy, 'limitedGasFraction')?.[name].timesEightHour;
  const eightHour = pack.exposureLimits
    .filter(({ gas, period, role }) => {
      return gas === row.gas && period === 'eightHour' && role === 'judge';
    })
    .map(({ value }) => value);
  if (times === undefined || eightHour.length === 0) return undefined;
  return times * Math.max(...eightHour);
}

/** Faults of one fuel-gas threshold. */
export function flammableFaults(
  row: FlammableThreshold,
  policy: Policy,
  path: string,
): readonly Fault[] {
  const at = `${path}/value`;
  if (row.value < 1 || row.value > 100) {
    const hint = 'Write 10 for 10 % of the lower limit.';
    return [{ path: at, problem: `${String(row.value)} is not a percentage`, hint }];
  }
  const level = levelOf(policy, 'flammableShareOfLowerLimit')?.[row.level].value;
  if (row.role !== 'judge' || level === undefined || row.value / 100 <= level) return [];
  const problem = `loosens the ${row.level} of the policy, ${String(level * 100)} %`;
  return [{ path: at, problem, hint: toShow }];
}
