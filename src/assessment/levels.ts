import { InvalidInput } from '../errors.js';
import type {
  CommonRules,
  ExposureLimit,
  Policy,
  PolicyLevel,
  PolicyLevelValue,
  RulePack,
} from './catalogue-types.js';
import type { PlanFile } from './plan-file.js';

export type Statistic = PolicyLevelValue['statistic'];
export type LevelName = 'aim' | 'limit' | 'never';

/** A number that a result is held against, and where it comes from. */
export interface LevelValue {
  readonly value: number;
  readonly statistic: Statistic;
  readonly source: string;
  readonly checked: string;
}

/** The three levels of one quantity for one kind of people. */
export interface JudgedLevel {
  /** `oxygenFraction`, `oxygenEnrichment`, a gas id, or `fuel:` and a gas id. */
  readonly quantity: string;
  readonly title: string;
  readonly gas: string | null;
  readonly failsWhen: 'below' | 'above';
  /** What one unit of the level is as a mole fraction (flammable: the lower limit; else 1). */
  readonly scale: number;
  readonly aim: LevelValue;
  readonly limit: LevelValue;
  readonly never: LevelValue;
}

/** Dry fresh air, against which a house rule has to make sense. */
const freshAir = { oxygen: 0.2095, carbonDioxide: 420e-6 } as const;

interface Context {
  readonly policy: Policy;
  readonly pack: RulePack;
  readonly common: CommonRules;
  readonly houseRules: PlanFile['venue']['site']['houseRules'];
  readonly region: string | undefined;
}

/** Rows of a pack that hold where the venue is; where it is not said, every row is taken. */
const holdsIn = (region: string | undefined) => (row: { regions?: readonly string[] }) =>
  row.regions === undefined ||
  region === undefined ||
  row.regions.some((one) => one === region || region.startsWith(`${one}-`));

const stricter = (
  failsWhen: 'below' | 'above',
  current: LevelValue,
  other: LevelValue | null,
): LevelValue => {
  if (!other) return current;
  const tighter = failsWhen === 'below' ? other.value > current.value : other.value < current.value;
  return tighter ? { ...other, statistic: current.statistic } : current;
};

const ownValue = (row: PolicyLevelValue, value: number): LevelValue => ({
  value,
  statistic: row.statistic,
  source: row.source,
  checked: row.checked,
});

const judging = ({ pack, region }: Context, gas: string, period: ExposureLimit['period']) =>
  pack.exposureLimits
    .filter(holdsIn(region))
    .filter((row) => row.role === 'judge' && row.gas === gas && row.period === period)
    .sort((a, b) => a.value - b.value)[0] ?? null;

const packValue = (row: ExposureLimit | null): LevelValue | null =>
  row && {
    value: row.value / 1e6,
    statistic: 'peak',
    source: `${row.instrument}, ${row.edition}`,
    checked: row.checked,
  };

const periodOf = {
  aim: 'eightHour',
  limit: 'fifteenMinute',
  never: 'ceiling',
} as const satisfies Record<LevelName, ExposureLimit['period']>;

function levelOf(policy: Policy, quantity: PolicyLevel['quantity']): PolicyLevel | null {
  return policy.levels.find((level) => level.quantity === quantity) ?? null;
}

/** Policy row with every stricter judging row of the pack taken in. */
function tightened(
  level: PolicyLevel,
  name: LevelName,
  candidates: readonly (LevelValue | null)[],
): LevelValue {
  const row = level[name];
  const ofPack = row.stricterOfPack ? candidates.filter((one) => one !== null) : [];
  const own = ownValue(row, row.value ?? row.whenMissing ?? 0);
  // Where the pack is silent the value for a missing row stands, if it is the stricter one.
  const silent =
    row.stricterOfPack && ofPack.length === 0 && row.whenMissing !== undefined
      ? ownValue(row, row.whenMissing)
      : null;
  return [silent, ...ofPack].reduce<LevelValue>(
    (value, candidate) => stricter(level.failsWhen, value, candidate),
    own,
  );
}

/** Nobody aims past a limit, and no limit lies past never: a level takes the stricter of those behind it. */
function ordered(level: JudgedLevel): JudgedLevel {
  const limit = stricter(level.failsWhen, level.limit, level.never);
  return { ...level, limit, aim: stricter(level.failsWhen, level.aim, limit) };
}

/** Oxygen too low or oxygen too rich: the same rows of the pack, read from either side. */
function oxygenLevelOn(
  context: Context,
  side: 'below' | 'above',
  from: PolicyLevel['quantity'],
  quantity: string,
): JudgedLevel | null {
  const level = levelOf(context.policy, from);
  if (!level) return null;
  const rows = (name: LevelName) =>
    context.pack.oxygenThresholds
      .filter(holdsIn(context.region))
      .filter(
        (row) =>
          row.role === 'judge' &&
          row.sense === side &&
          row.unit === 'percent' &&
          row.level === name,
      )
      .map((row) => ({
        value: row.value / 100,
        statistic: side === 'below' ? ('minimum' as const) : ('peak' as const),
        source: `${row.instrument}, ${row.edition}`,
        checked: row.checked,
      }));
  return {
    quantity,
    title: level.title,
    gas: null,
    failsWhen: side,
    scale: 1,
    aim: tightened(level, 'aim', []),
    limit: tightened(level, 'limit', rows('limit')),
    never: tightened(level, 'never', rows('never')),
  };
}

const oxygenLevel = (context: Context) =>
  oxygenLevelOn(context, 'below', 'oxygenFraction', 'oxygenFraction');

const enrichmentLevel = (context: Context) =>
  oxygenLevelOn(context, 'above', 'oxygenEnrichmentFraction', 'oxygenEnrichment');

function carbonDioxideLevel(context: Context): JudgedLevel | null {
  const level = levelOf(context.policy, 'carbonDioxideFraction');
  if (!level) return null;
  const value = (name: LevelName) =>
    tightened(level, name, [packValue(judging(context, 'CO2', periodOf[name]))]);
  return {
    quantity: 'CO2',
    title: level.title,
    gas: 'CO2',
    failsWhen: 'above',
    scale: 1,
    aim: value('aim'),
    limit: value('limit'),
    never: value('never'),
  };
}

function limitedGasLevel(context: Context, gas: string): JudgedLevel | null {
  const level = levelOf(context.policy, 'limitedGasFraction');
  const eightHour = packValue(judging(context, gas, 'eightHour'));
  if (!level || !eightHour) return null;
  const times = (name: LevelName): LevelValue => {
    const row = level[name];
    const multiple = row.timesEightHour ?? row.whenMissingTimesEightHour ?? 1;
    const own: LevelValue = {
      value: eightHour.value * multiple,
      statistic: row.statistic,
      source: multiple === 1 ? eightHour.source : `${row.source}; on ${eightHour.source}`,
      checked: row.checked,
    };
    return stricter('above', own, packValue(judging(context, gas, periodOf[name])));
  };
  return {
    quantity: gas,
    title: `${gas} where people breathe`,
    gas,
    failsWhen: 'above',
    scale: 1,
    aim: times('aim'),
    limit: times('limit'),
    never: times('never'),
  };
}

function fuelLevel(context: Context, gas: string): JudgedLevel | null {
  const level = levelOf(context.policy, 'flammableShareOfLowerLimit');
  const limits = context.common.flammableLimits.find((row) => row.gas === gas);
  if (!level || !limits) return null;
  const rows = (name: LevelName) =>
    context.pack.flammableThresholds
      .filter(holdsIn(context.region))
      .filter((row) => row.role === 'judge' && row.level === name)
      .map((row) => ({
        value: row.value / 100,
        statistic: 'peak' as const,
        source: `${row.instrument}, ${row.edition}`,
        checked: row.checked,
      }));
  return {
    quantity: `fuel:${gas}`,
    title: `${gas}, share of its lower flammable limit`,
    gas,
    failsWhen: 'above',
    scale: limits.lowerFraction,
    aim: tightened(level, 'aim', []),
    limit: tightened(level, 'limit', rows('limit')),
    never: tightened(level, 'never', rows('never')),
  };
}

type HouseRule = NonNullable<Context['houseRules']>[number];

/** Fresh air itself would fail such a rule, so it says nothing about a plan. */
function requireUsableRule(rule: HouseRule, index: number, level: JudgedLevel | null): void {
  const fresh =
    rule.quantity === 'oxygenFraction' || rule.quantity === 'oxygenEnrichment'
      ? freshAir.oxygen
      : rule.quantity === 'CO2'
        ? freshAir.carbonDioxide
        : 0;
  const isBelow = rule.quantity === 'oxygenFraction';
  const usable = isBelow
    ? rule.limit > 0 && rule.limit < fresh
    : rule.limit > fresh && rule.limit <= 1;
  if (usable && level) return;
  const path = `/venue/site/houseRules/${String(index)}`;
  throw new InvalidInput(
    `The house rule ${rule.title} cannot be used.`,
    'Name oxygenFraction, oxygenEnrichment, a gas id, or fuel: and a gas id; give the limit as a mole fraction (fuel: share of the lower flammable limit) that fresh air meets.',
    [
      level
        ? { path: `${path}/limit`, problem: 'is not a fraction that fresh air meets' }
        : { path: `${path}/quantity`, problem: 'is not a quantity that a plan is judged by' },
    ],
  );
}

const houseValue = (rule: HouseRule, statistic: Statistic): LevelValue => ({
  value: rule.limit,
  statistic,
  source: `house rule: ${rule.title}`,
  checked: 'first-hand',
});

/** A house rule takes the place of the limit, and of the aim behind it, only where it is stricter. */
function withHouseRules(level: JudgedLevel, houseRules: readonly HouseRule[]): JudgedLevel {
  return houseRules
    .filter((rule) => rule.quantity === level.quantity)
    .reduce(
      (current, rule) => ({
        ...current,
        aim: stricter(current.failsWhen, current.aim, houseValue(rule, current.aim.statistic)),
        limit: stricter(
          current.failsWhen,
          current.limit,
          houseValue(rule, current.limit.statistic),
        ),
      }),
      level,
    );
}

/** A gas that only the house limits: its rule is every level, held at every moment. */
function houseGasLevel(rule: HouseRule): JudgedLevel {
  const value = houseValue(rule, 'peak');
  return {
    quantity: rule.quantity,
    title: `${rule.quantity} where people breathe`,
    gas: rule.quantity,
    failsWhen: 'above',
    scale: 1,
    aim: value,
    limit: value,
    never: value,
  };
}

/**
 * The levels that judge a plan: the policy, tightened by the judging rows of the rule pack and by
 * house rules, never loosened. For crew the aim is the limit.
 *
 * @param gases the gases that the plan can let out
 * @param knowsGas whether an id is in the gas data
 * @throws {InvalidInput} for a house rule that names nothing, or that fresh air would fail
 */
export function judgedLevels(
  context: Context,
  gases: readonly string[],
  kind: 'public' | 'crew',
  knowsGas: (gas: string) => boolean,
): readonly JudgedLevel[] {
  const ofPolicy = (gas: string): readonly (JudgedLevel | null)[] => [
    ...(gas === 'O2' ? [enrichmentLevel(context)] : []),
    ...(gas !== 'CO2' && gas !== 'O2' ? [limitedGasLevel(context, gas)] : []),
    fuelLevel(context, gas),
  ];
  const present = (level: JudgedLevel | null): level is JudgedLevel => level !== null;
  const found = [
    oxygenLevel(context),
    carbonDioxideLevel(context),
    ...gases.flatMap(ofPolicy),
  ].filter(present);
  const houseRules = context.houseRules ?? [];
  houseRules.forEach((rule, index) => {
    const known = found.find((level) => level.quantity === rule.quantity);
    const gas = rule.quantity.replace(/^fuel:/, '');
    const couldBe =
      known ??
      [enrichmentLevel(context), ...(knowsGas(gas) ? ofPolicy(gas) : [])]
        .filter(present)
        .find((level) => level.quantity === rule.quantity) ??
      (knowsGas(rule.quantity) ? houseGasLevel(rule) : null);
    requireUsableRule(rule, index, couldBe);
    if (!known && couldBe && gases.includes(rule.quantity)) found.push(couldBe);
  });
  return found
    .map((level) => ordered(withHouseRules(level, houseRules)))
    .map((level) => (kind === 'crew' ? { ...level, aim: { ...level.limit } } : level));
}

/** Whether a value is on the wrong side of a level. */
export function fails(level: JudgedLevel, name: LevelName, value: number): boolean {
  return level.failsWhen === 'below' ? value < level[name].value : value > level[name].value;
}
