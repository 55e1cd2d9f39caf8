import { alarmTime, type MeterTraits } from '../science/room-air/meter-alarm.js';
import { firstAlarm } from '../science/room-air/meter-place.js';
import type { Finding } from './assessment.js';
import type { Policy } from './catalogue-types.js';
import { durationWords } from './duration-words.js';
import type { Evaluation, WorstCase } from './evaluation.js';
import type { PhysicalFigure, PlanFile } from './plan-file.js';
import { quantityWords } from './quantity-words.js';
import { stopReading } from './stop-reading.js';
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

const judging = (outcome: ZoneOutcome) => outcome.answers.layered ?? outcome.answers.mixed;

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

const seriesAt = (outcome: ZoneOutcome) => ({
  timesS: outcome.timesS,
  values: (judging(outcome)?.series ?? []).map((value) => value * outcome.level.scale),
});

/** When the limit is first passed where people are, in a space and for a gas [s after midnight]. */
function limitPassed(outcomes: readonly ZoneOutcome[]): number | undefined {
  const times = outcomes.flatMap((outcome) =>
    outcome.judgedFully ? (judging(outcome)?.firstPast.limit ?? []) : [],
  );
  return times.length > 0 ? Math.min(...times) : undefined;
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
): readonly Finding[] {
  const { heightM } = meter;
  const inSpace = worst.outcomes.filter(
    (outcome) =>
      outcome.group.space === meter.space && gasOf(outcome) === meter.gas && judging(outcome),
  );
  // Oxygen has two sides; a slip passes one of them.
  const passing = inSpace.find((outcome) => limitPassed([outcome]) !== undefined);
  const seen = inSpace.filter(({ level }) => level.quantity === passing?.level.quantity);
  if (heightM === undefined || seen.length === 0) return [];
  const passedS = limitPassed(seen);
  const [nearest] = [...seen].sort(
    (a, b) => Math.abs(a.heightM - heightM) - Math.abs(b.heightM - heightM),
  );
  if (passedS === undefined || !nearest) return [];
  const traits = traitsAt(nearest, meter, evaluation, policy);
  const { timesS, values } = seriesAt(nearest);
  const alarmS = traits ? alarmTime(timesS, values, traits) : undefined;
  const told = (kind: Finding['kind'], text: string): readonly Finding[] => [
    {
      code: 'meter-alarm',
      kind,
      path: `/meters/${String(index)}`,
      text: `${worst.title}: the ${quantityWords(nearest.level, nameOf)} meter ${text}`,
    },
  ];
  if (alarmS === undefined) {
    return told(
      'danger',
      'does not alarm where it hangs, though people pass the limit. Hang another.',
    );
  }
  const after = durationWords(Math.max(0, alarmS - worst.startS));
  const ahead = passedS - alarmS;
  return ahead >= 0
    ? told(
        'note',
        `alarms ${after} after it begins, ${durationWords(ahead)} before people pass the limit.`,
      )
    : told(
        'danger',
        `alarms ${after} after it begins, ${durationWords(-ahead)} too late: people have passed the limit.`,
      );
}

/** Where a meter alarms first after a slip in which people pass the limit. */
function bestPlace(
  worst: WorstCase,
  { evaluation, policy, nameOf }: MeterContext,
): readonly Finding[] {
  const quantities = [...new Set(worst.outcomes.map(({ level }) => level.quantity))];
  return quantities.flatMap((quantity): Finding[] => {
    const seen = worst.outcomes.filter(
      (outcome) => outcome.level.quantity === quantity && judging(outcome),
    );
    const passedS = limitPassed(seen);
    const [sample] = seen;
    if (passedS === undefined || !sample) return [];
    const traits = traitsAt(sample, undefined, evaluation, policy);
    const first = traits ? firstAlarm(seen.map(seriesAt), traits) : undefined;
    const place = first && seen[first.index];
    if (!first || !place) return [];
    const ahead = passedS - first.atS;
    const margin =
      ahead >= 0
        ? `${durationWords(ahead)} before people pass the limit`
        : `but ${durationWords(-ahead)} after people have passed the limit: do not rely on a meter here`;
    return [
      {
        code: 'meter-place',
        kind: ahead >= 0 ? 'note' : 'caution',
        path: '/meters',
        text: `${worst.title}: hung ${placeOf(place)}, the ${quantityWords(sample.level, nameOf)} meter alarms first, ${durationWords(Math.max(0, first.atS - worst.startS))} after it begins, ${margin}.`,
      },
    ];
  });
}

/** Where to hang the meters, and when they alarm given their response time. */
export function meterFindings(
  evaluation: Evaluation,
  policy: Policy,
  nameOf: (gas: string) => string,
): readonly Finding[] {
  const context = { evaluation, policy, nameOf };
  const meters = evaluation.plan.meters ?? [];
  return evaluation.worst.flatMap((worst) => [
    ...bestPlace(worst, context),
    ...meters.flatMap((meter, index) => hungMeter(meter, index, worst, context)),
  ]);
}
