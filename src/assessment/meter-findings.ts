import { alarmTime, type MeterTraits } from '../science/room-air/meter-alarm.js';
import { firstAlarm, type MeterPlace } from '../science/room-air/meter-place.js';
import type { Finding } from './assessment.js';
import type { Policy } from './catalogue-types.js';
import { durationWords } from './duration-words.js';
import type { Evaluation, WorstCase } from './evaluation.js';
import type { PhysicalFigure, PlanFile } from './plan-file.js';
import { quantityWords } from './quantity-words.js';
import { stopReading } from './stop-reading.js';
import { judgingAnswer, passedAfter, slipOutcomes } from './slip-outcomes.js';
import type { ZoneOutcome } from './zone-outcomes.js';

type Meter = NonNullable<PlanFile['meters']>[number];

interface MeterContext {
  readonly evaluation: Evaluation;
  readonly policy: Policy;
  readonly nameOf: (gas: string) => string;
}

/** Time to 90 % where neither plan nor policy says it [s]. */
const usualResponseS = 60;

const gasOf = ({ level }: ZoneOutcome): string => level.gas ?? 'O2';

/** The cautious end of what a plan says of a meter. */
const slowest = (figure: PhysicalFigure | undefined): number | undefined =>
  typeof figure === 'object' ? (figure.high ?? figure.value) : figure;

/** What a meter does at the place of an outcome; null where no number would come in time. */
function traitsAt(
  outcome: ZoneOutcome,
  meter: Meter | undefined,
  evaluation: Evaluation,
  policy: Policy,
): MeterTraits | null {
  const { plan, facts, resolved } = evaluation;
  const stop = stopReading(plan, outcome, policy, facts, resolved.site).value;
  if (stop === null) return null;
  const rows = policy.meters.filter((row) => row.gas === gasOf(outcome));
  const usual = Math.max(...rows.map((row) => row.responseTimeS ?? 0), 0) || usualResponseS;
  return {
    responseTimeS: slowest(meter?.responseTimeS) ?? usual,
    alarmLevel: stop,
    side: outcome.level.failsWhen,
  };
}

/** True readings at the place of an outcome from a slip on: an alarm before it is not its alarm. */
function seriesFrom(outcome: ZoneOutcome, startS: number): MeterPlace {
  const { timesS, level } = outcome;
  const series = judgingAnswer(outcome)?.series ?? [];
  const first = Math.max(
    0,
    timesS.findLastIndex((t) => t <= startS),
  );
  return {
    timesS: timesS.slice(first).map((t) => Math.max(t, startS)),
    values: series.slice(first).map((value) => value * level.scale),
  };
}

function alarmAfter(outcome: ZoneOutcome, traits: MeterTraits, startS: number): number | undefined {
  const { timesS, values } = seriesFrom(outcome, startS);
  return alarmTime(timesS, values, traits);
}

/** When people first pass the limit after a slip, in these zones [s after midnight]. */
function limitPassed(outcomes: readonly ZoneOutcome[], startS: number): number | undefined {
  const times = outcomes.flatMap((outcome) =>
    outcome.judgedFully ? (passedAfter(outcome, 'limit', startS) ?? []) : [],
  );
  return times.length > 0 ? Math.min(...times) : undefined;
}

/** A finding with how long before people pass the limit the meter alarms [s]; the least is told. */
interface Margin {
  readonly aheadS: number;
  readonly finding: Finding;
}

function leastMargin(margins: readonly Margin[]): readonly Finding[] {
  const least = margins.reduce<Margin | null>(
    (least, one) => (least === null || one.aheadS < least.aheadS ? one : least),
    null,
  );
  return least === null ? [] : [least.finding];
}

const placeOf = (outcome: ZoneOutcome): string =>
  outcome.floorCheck
    ? `0.2 m above the floor at ${outcome.group.title}`
    : `${String(Number(outcome.heightM.toPrecision(3)))} m above the floor at ${outcome.group.title}`;

/** When a meter of the plan alarms after a slip, against the limit where people are. */
function hungMeter(
  meter: Meter,
  index: number,
  worst: WorstCase,
  { evaluation, policy, nameOf }: MeterContext,
): readonly Margin[] {
  const { heightM } = meter;
  const { startS } = worst;
  const inSpace = slipOutcomes(worst, evaluation).filter(
    (outcome) => outcome.group.space === meter.space && gasOf(outcome) === meter.gas,
  );
  // Oxygen has two sides; a slip passes one of them.
  const passing = inSpace.find((outcome) => limitPassed([outcome], startS) !== undefined);
  const seen = inSpace.filter(({ level }) => level.quantity === passing?.level.quantity);
  const passedS = limitPassed(seen, startS);
  if (heightM === undefined || passedS === undefined) return [];
  const [nearest] = [...seen].sort(
    (a, b) => Math.abs(a.heightM - heightM) - Math.abs(b.heightM - heightM),
  );
  if (!nearest) return [];
  const traits = traitsAt(nearest, meter, evaluation, policy);
  const alarmS = traits ? alarmAfter(nearest, traits, startS) : undefined;
  const told = (aheadS: number, kind: Finding['kind'], text: string): readonly Margin[] => [
    {
      aheadS,
      finding: {
        code: 'meter-alarm',
        kind,
        path: `/meters/${String(index)}`,
        text: `${worst.title}: the ${quantityWords(nearest.level, nameOf)} meter ${text}`,
      },
    },
  ];
  if (alarmS === undefined) {
    const words = 'does not alarm where it hangs, though people pass the limit. Hang another.';
    return told(-Infinity, 'danger', words);
  }
  const after = durationWords(alarmS - startS);
  const ahead = passedS - alarmS;
  return ahead >= 0
    ? told(
        ahead,
        'note',
        `alarms ${after} after it begins, ${durationWords(ahead)} before people pass the limit.`,
      )
    : told(
        ahead,
        'danger',
        `alarms ${after} after it begins, ${durationWords(-ahead)} too late: people have passed the limit.`,
      );
}

/** Where a meter alarms first after a slip in which people pass the limit, quantity by quantity. */
function bestPlaces(
  worst: WorstCase,
  { evaluation, policy, nameOf }: MeterContext,
): readonly (Margin & { readonly quantity: string })[] {
  const { startS } = worst;
  const caused = slipOutcomes(worst, evaluation);
  const quantities = [...new Set(caused.map(({ level }) => level.quantity))];
  return quantities.flatMap((quantity) => {
    const seen = caused.filter((outcome) => outcome.level.quantity === quantity);
    const passedS = limitPassed(seen, startS);
    const [sample] = seen;
    if (passedS === undefined || !sample) return [];
    const traits = traitsAt(sample, undefined, evaluation, policy);
    const first = traits
      ? firstAlarm(
          seen.map((one) => seriesFrom(one, startS)),
          traits,
        )
      : undefined;
    const place = first && seen[first.index];
    if (!first || !place) return [];
    const ahead = passedS - first.atS;
    const margin =
      ahead >= 0
        ? `${durationWords(ahead)} before people pass the limit`
        : `but ${durationWords(-ahead)} after people have passed the limit: do not rely on a meter here`;
    return [
      {
        quantity,
        aheadS: ahead,
        finding: {
          code: 'meter-place',
          kind: ahead >= 0 ? ('note' as const) : ('caution' as const),
          path: '/meters',
          text: `${worst.title}: hung ${placeOf(place)}, the ${quantityWords(sample.level, nameOf)} meter alarms first, ${durationWords(first.atS - startS)} after it begins, ${margin}.`,
        },
      },
    ];
  });
}

/**
 * Where to hang the meters, and when they alarm given their response time: of all slips the one that
 * leaves least time.
 */
export function meterFindings(
  evaluation: Evaluation,
  policy: Policy,
  nameOf: (gas: string) => string,
): readonly Finding[] {
  const context = { evaluation, policy, nameOf };
  const places = evaluation.worst.flatMap((worst) => bestPlaces(worst, context));
  const quantities = [...new Set(places.map(({ quantity }) => quantity))];
  return [
    ...quantities.flatMap((quantity) =>
      leastMargin(places.filter((place) => place.quantity === quantity)),
    ),
    ...(evaluation.plan.meters ?? []).flatMap((meter, index) =>
      leastMargin(evaluation.worst.flatMap((worst) => hungMeter(meter, index, worst, context))),
    ),
  ];
}
