import { Worker } from 'node:worker_threads';
import { airRun } from '../../src/science/room-air/air-run.js';
import { FINE } from '../../src/science/room-air/layer-extrapolation.js';
import type { DrawnValues } from '../../src/science/room-air/layered-draws.js';
import { rakedHallWithPit, roomRow, wholeDay } from './air-scenario.js';
import { layerContest } from './general-layers.js';
import { bandOfDay, drawnDay, sampledDay, type SampledDay } from './sampled-day.js';
import { clockTimesOf, growthExponent, timesOf, timesText } from './times.js';

const options = { layered: true } as const;
const ANSWERS = 'mixed, layered and bound';
const SAMPLES = 512;

type Day = ReturnType<typeof wholeDay>;

function dayLines({ planned, worst, gases }: Day): readonly string[] {
  const straight = { displacement: 'straight' } as const;
  const one = (input: Day['planned']): void => {
    airRun(input, gases, straight);
    airRun(input, gases, options);
  };
  const rounds = 7;
  return [
    timesText(
      `(a) whole day, planned and worst, ${ANSWERS}, and M`,
      timesOf(
        () => {
          one(planned);
          one(worst);
        },
        rounds,
        2,
      ),
    ),
    timesText(
      '    planned, M alone',
      timesOf(() => airRun(planned, gases, straight), rounds),
    ),
    timesText(
      `    planned, ${ANSWERS}`,
      timesOf(() => airRun(planned, gases, options), rounds),
    ),
    timesText(
      '    the same without the runs that leave all mixing out',
      timesOf(() => airRun(planned, gases, { ...options, adverse: false }), rounds),
    ),
  ];
}

/** A thread that has compiled what it needs and waits to be told to start. */
async function readyWorker(share: SampledDay): Promise<Worker> {
  const worker = new Worker(new URL('./air-worker.ts', import.meta.url), {
    workerData: share,
    execArgv: ['--import', new URL('../../.scripts/run-source.mjs', import.meta.url).href],
  });
  await answerOf(worker);
  return worker;
}

const answerOf = (worker: Worker): Promise<unknown> =>
  new Promise((resolve, reject) => {
    worker.once('message', resolve);
    worker.once('error', reject);
  });

async function sampleLines({ planned, gases }: Day): Promise<readonly string[]> {
  const day = sampledDay(planned, gases, SAMPLES);
  const lines = [
    timesText(
      `(b) band of ${String(SAMPLES)} draws of the planned day, one core`,
      timesOf(() => bandOfDay(day, [drawnDay(day)]), 3),
    ),
    timesText(
      '    of which the quantiles',
      ((parts) => timesOf(() => bandOfDay(day, parts), 3))([drawnDay(day)]),
    ),
  ];
  const clock: number[] = [];
  for (const threads of [1, 2]) {
    const count = SAMPLES / threads;
    const workers = await Promise.all(
      Array.from({ length: threads }, (_, i) =>
        readyWorker({ ...day, draws: day.draws.slice(i * count, (i + 1) * count) }),
      ),
    );
    const times = await clockTimesOf(async () => {
      const parts = await Promise.all(
        workers.map((worker) => {
          const answer = answerOf(worker);
          worker.postMessage('start');
          return answer;
        }),
      );
      return bandOfDay(day, parts as DrawnValues[]);
    }, 3);
    clock.push(times.median);
    lines.push(timesText(`    by the clock on ${String(threads)} worker(s)`, times));
    await Promise.all(workers.map((worker) => worker.terminate()));
  }
  const [one = NaN, two = NaN] = clock;
  return [...lines, `    two workers over one: ${(one / two).toFixed(2)} times faster`];
}

function growthLines({ gases }: Day): readonly string[] {
  const run = (spaces: number, days: number): number => {
    const input = roomRow(spaces, days);
    const rounds = spaces * days > 100 ? 3 : 7;
    return timesOf(() => airRun(input, gases, options), rounds).median;
  };
  const bySpaces = [5, 20, 80].map((spaces) => [spaces, run(spaces, 1)] as const);
  const byDays = [1, 7, 30].map((days) => [days, run(5, days)] as const);
  const text = (points: typeof byDays): string =>
    points.map(([size, ms]) => `${String(size)}: ${ms.toPrecision(3)} ms`).join(', ');
  return [
    `(c) spaces, one day each (${text(bySpaces)}), exponent ${growthExponent(bySpaces).toFixed(2)}`,
    `    days, five spaces each (${text(byDays)}), exponent ${growthExponent(byDays).toFixed(2)}`,
  ];
}

/** Looser and looser tolerances for the package, until it is no closer than the project's own run. */
const TOLERANCES = [1e-3, 1e-4, 1e-5, 1e-6, 1e-7] as const;

function contestLines({ gases }: Day): readonly string[] {
  const { own, general, difference } = layerContest(rakedHallWithPit, gases);
  const exact = general(1e-9);
  const ownError = difference(own(FINE), exact);
  const errors = TOLERANCES.map(
    (relative) => [relative, difference(general(relative), exact)] as const,
  );
  const enough = errors.find(([, error]) => error <= ownError) ?? errors.at(-1);
  const [relative = NaN, error = NaN] = enough ?? [];
  const mine = timesOf(() => own(FINE), 7);
  const theirs = timesOf(() => general(relative), 3);
  return [
    timesText(
      `(d) thin layer on a rake over a pit with low extract, own steps, off by ${ownError.toExponential(1)}`,
      mine,
    ),
    timesText(
      `    the same equations by odex at ${relative.toExponential(0)}, off by ${error.toExponential(1)}`,
      theirs,
    ),
    `    odex over own: ${(theirs.median / mine.median).toFixed(1)}`,
  ];
}

/** Lines of the bench: a day, its draws, growth, a second solver, memory. */
export async function benchLines(): Promise<readonly string[]> {
  const day = wholeDay();
  const lines = [...dayLines(day)];
  lines.push(...(await sampleLines(day)), ...growthLines(day), ...contestLines(day));
  // The kernel counts in kilobytes, and counts the threads of (b) too.
  const peakMB = process.resourceUsage().maxRSS / 1000;
  return [...lines, `peak memory ${peakMB.toFixed(0)} MB`];
}
