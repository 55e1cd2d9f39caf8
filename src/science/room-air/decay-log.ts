import { InvalidInput, NotComputable, type ErrorDetail } from '../../errors.js';
import { straightLine } from '../numerics/straight-line.js';
import { studentQuantile } from '../numerics/student-t.js';

export interface DecayLog {
  readonly timesS: readonly number[];
  readonly readingsPpm: readonly number[];
  /** Reading of the incoming air, or null: fitted with the decay. */
  readonly backgroundPpm: number | null;
  readonly volumeM3: number;
}

export interface DecayResult {
  readonly airChangesPerHour: number;
  readonly standardUncertainty: number;
  readonly interval95: readonly [number, number];
  readonly freshAirM3PerS: number;
  readonly freshAirInterval95: readonly [number, number];
  readonly rSquared: number;
  /** Reading of the incoming air as given, or as fitted [ppm]. */
  readonly backgroundPpm: number;
  /** Excess of the fitted curve over it at the first time [ppm]. */
  readonly firstExcessPpm: number;
  readonly warnings: readonly string[];
}

interface Fit {
  readonly ratePerS: number;
  readonly standardError: number;
  readonly freedom: number;
  readonly rSquared: number;
  readonly residuals: readonly number[];
  readonly serialCorrelation: number;
  readonly background: number;
  readonly firstExcess: number;
}

const HOUR = 3600;
/** Fewest readings of a log worth judging. */
const FEWEST_READINGS = 8;
const LEAST_R_SQUARED = 0.98;
/** Highest reading this late: the log does not begin with the decay. */
const LATE_HIGHEST = 2;

/**
 * Air change rate of a space from a tracer or carbon dioxide log [1/h], with its 95 % interval.
 *
 *   ln(C - Cb) = a - N t, least squares; N +- t(0.975, n - 2) se
 *   background unknown: C = Cb + A exp(-N t), least squares in C; n - 3
 *
 * Where the residuals follow each other more than chance allows, the standard error grows by
 * sqrt(n/n_eff), n_eff = n (1 - r1)/(1 + r1).
 *
 * @param log times [s], readings [ppm], background [ppm] or null, volume [m3]
 * @returns rate [1/h], fresh air [m3/s], intervals, r squared, fitted curve [ppm], warnings
 * @throws {InvalidInput} too few readings, times not rising, readings at or below the background
 * @throws {NotComputable} when the log does not fall
 * Source: astm-e741. Assumes: one mixed space, constant flow, no source. Accuracy: the interval;
 * add 5 to 10 % for volume and mixing.
 */
export function decayRate(log: DecayLog): DecayResult {
  const problems = logProblems(log);
  if (problems.length > 0) {
    throw new InvalidInput(
      `The log cannot be used: ${problems[0]?.problem ?? ''}.`,
      'Give rising times and readings above the background, at least four of them.',
      problems,
    );
  }
  const fit = log.backgroundPpm === null ? fittedBackground(log) : knownBackground(log);
  if (!(fit.ratePerS > 0)) {
    throw new NotComputable(
      'The readings do not fall: no air change follows from them.',
      'Stop every source, empty the room, and log again.',
      [{ path: '/readingsPpm', problem: 'do not fall with time' }],
    );
  }
  const n = log.timesS.length;
  const r1 = fit.serialCorrelation;
  const follows = r1 > 2 / Math.sqrt(n);
  const widening = follows ? Math.sqrt((1 + r1) / (1 - Math.min(r1, 0.95))) : 1;
  const se = fit.standardError * widening;
  const t = studentQuantile(0.975, fit.freedom);
  const low = Math.max(0, fit.ratePerS - t * se);
  const high = fit.ratePerS + t * se;
  return {
    airChangesPerHour: fit.ratePerS * HOUR,
    standardUncertainty: se * HOUR,
    interval95: [low * HOUR, high * HOUR],
    freshAirM3PerS: fit.ratePerS * log.volumeM3,
    freshAirInterval95: [low * log.volumeM3, high * log.volumeM3],
    rSquared: fit.rSquared,
    backgroundPpm: fit.background,
    firstExcessPpm: fit.firstExcess,
    warnings: logWarnings(log, fit, follows),
  };
}

function logProblems(log: DecayLog): readonly ErrorDetail[] {
  const found: ErrorDetail[] = [];
  if (log.timesS.length !== log.readingsPpm.length) {
    found.push({ path: '/readingsPpm', problem: 'not as many readings as times' });
  }
  if (log.timesS.length < 4) found.push({ path: '/timesS', problem: 'fewer than four readings' });
  const rising = log.timesS.every((t, i) => i === 0 || t > (log.timesS[i - 1] ?? Infinity));
  if (!rising) found.push({ path: '/timesS', problem: 'times do not rise' });
  if (!(log.volumeM3 > 0)) found.push({ path: '/volumeM3', problem: 'is not above 0' });
  const background = log.backgroundPpm;
  if (background !== null) {
    for (const [i, reading] of log.readingsPpm.entries()) {
      if (reading <= background) {
        found.push({
          path: `/readingsPpm/${String(i)}`,
          problem: 'is not above the background; leave it out or let the background be fitted',
        });
      }
    }
  }
  return found;
}

function knownBackground(log: DecayLog): Fit {
  const background = log.backgroundPpm ?? 0;
  const line = straightLine(
    log.timesS,
    log.readingsPpm.map((reading) => Math.log(reading - background)),
  );
  return {
    ratePerS: -line.slope,
    standardError: line.slopeStandardError,
    freedom: log.timesS.length - 2,
    rSquared: line.rSquared,
    residuals: line.residuals,
    serialCorrelation: line.serialCorrelation,
    background,
    firstExcess: Math.exp(line.intercept + line.slope * (log.timesS[0] ?? 0)),
  };
}

/** For a given rate the reading is a straight line in exp(-N t); the best rate is searched. */
function fittedBackground(log: DecayLog): Fit {
  const start = log.timesS[0] ?? 0;
  const times = log.timesS.map((t) => t - start);
  const span = times.at(-1) ?? 1;
  const lineAt = (rate: number) =>
    straightLine(
      times.map((t) => Math.exp(-rate * t)),
      log.readingsPpm,
    );
  const misfit = (logRate: number): number =>
    lineAt(Math.exp(logRate)).residuals.reduce((sum, r) => sum + r * r, 0);
  let best = Math.log(0.05 / span);
  for (let i = 0; i <= 60; i++) {
    const candidate = Math.log(0.05 / span) + (i / 60) * Math.log(40 / 0.05);
    if (misfit(candidate) < misfit(best)) best = candidate;
  }
  const width = Math.log(40 / 0.05) / 60;
  let low = best - width;
  let high = best + width;
  const golden = (Math.sqrt(5) - 1) / 2;
  while (high - low > 1e-10) {
    const a = high - golden * (high - low);
    const b = low + golden * (high - low);
    if (misfit(a) < misfit(b)) high = b;
    else low = a;
  }
  const rate = Math.exp(0.5 * (low + high));
  const line = lineAt(rate);
  const n = times.length;
  // What of -A t exp(-N t) is left once constant and exponential have taken their share.
  const sensitivity = times.map((t) => -line.slope * t * Math.exp(-rate * t));
  const own = straightLine(
    times.map((t) => Math.exp(-rate * t)),
    sensitivity,
  ).residuals.reduce((sum, r) => sum + r * r, 0);
  const squares = line.residuals.reduce((sum, r) => sum + r * r, 0);
  return {
    ratePerS: line.slope > 0 ? rate : 0,
    standardError: Math.sqrt(squares / Math.max(1, n - 3) / own),
    freedom: Math.max(1, n - 3),
    rSquared: line.rSquared,
    residuals: line.residuals,
    serialCorrelation: line.serialCorrelation,
    background: line.intercept,
    firstExcess: line.slope,
  };
}

function logWarnings(log: DecayLog, fit: Fit, follows: boolean): readonly string[] {
  const warnings: string[] = [];
  const first = log.readingsPpm[0] ?? 0;
  const last = log.readingsPpm.at(-1) ?? 0;
  const span = (log.timesS.at(-1) ?? 0) - (log.timesS[0] ?? 0);
  if (log.timesS.length < FEWEST_READINGS) {
    warnings.push('Fewer than eight readings: take one every 1 to 5 minutes.');
  }
  if (span * fit.ratePerS < 1) {
    warnings.push('Shorter than one time constant: the slope is poorly known. Log for longer.');
  }
  if (last - fit.background < 0.1 * (first - fit.background)) {
    warnings.push(
      'The last readings are below a tenth of the first excess: background and sensor noise weigh on them.',
    );
  }
  if (fit.rSquared < LEAST_R_SQUARED) {
    warnings.push(
      'The readings scatter widely about one exponential: not mixed, people present, or a changing flow.',
    );
  }
  if (follows) {
    warnings.push(
      'Neighbouring residuals follow each other: several zones or a changing flow. The interval is widened.',
    );
  }
  const highest = log.readingsPpm.indexOf(Math.max(...log.readingsPpm));
  if (highest >= LATE_HIGHEST) {
    warnings.push(
      `The readings still rise up to number ${String(highest + 1)}: a source runs or the room is not mixed. Begin the log there.`,
    );
  }
  const rises = (reading: number, i: number): boolean =>
    i > highest && reading > (log.readingsPpm[i - 1] ?? 0);
  if (log.readingsPpm.some(rises)) {
    warnings.push('A reading rises: people present, a door opened, or the room not mixed.');
  }
  if (log.backgroundPpm === null) {
    warnings.push(
      `Background fitted at ${fit.background.toFixed(0)} ppm: compare it with a reading outdoors.`,
    );
    if (fit.background < 300 || fit.background > 700) {
      warnings.push(
        'The fitted background is not that of outdoor air: people present, air from other rooms, or too short a log. Log for longer or measure it.',
      );
    }
  }
  warnings.push(
    'Holds for the doors, fans, wind and temperatures of that day; plan with the lower limit.',
  );
  return warnings;
}
