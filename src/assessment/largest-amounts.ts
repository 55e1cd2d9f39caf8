import type { AirGasTable } from '../science/room-air/air-gases.js';
import { airRun } from '../science/room-air/air-run.js';
import { airCase, plannedReleases, type PlacedRelease } from './air-case.js';
import type { LargestAmount } from './assessment.js';
import type { Evaluation } from './evaluation.js';
import { plainFigure } from './figures.js';
import { zoneOutcomes, type ZoneOutcome } from './zone-outcomes.js';

/** An act is never scaled up beyond this many times what is planned. */
const largestFactor = 100;
/** Bisection stops at this relative width. */
const width = 0.01;

const passes = (outcomes: readonly ZoneOutcome[]): ZoneOutcome | null =>
  outcomes.find(
    (outcome) =>
      !outcome.floorCheck &&
      ((outcome.answers.mixed?.fails.aim ?? false) ||
        (outcome.answers.layered?.fails.limit ?? false) ||
        (outcome.answers.layeredP50?.fails.aim ?? false)),
  ) ?? null;

function scaled(
  releases: readonly PlacedRelease[],
  act: string,
  factor: number,
): readonly PlacedRelease[] {
  return releases.map((placed) =>
    placed.release.act === act
      ? { ...placed, release: { ...placed.release, amountMol: placed.release.amountMol * factor } }
      : placed,
  );
}

/**
 * The largest amount of each act that still passes row 2 of the table, the other acts as planned.
 *
 * The factor is found by halving between what passes and what fails; gas added never helps, so the
 * first failure bounds all larger amounts.
 */
export function largestAmounts(
  evaluation: Evaluation,
  gases: AirGasTable,
): readonly LargestAmount[] {
  const { resolved, dayAir, levelsOf } = evaluation;
  const releases = plannedReleases(resolved);
  const failureAt = (act: string, factor: number): ZoneOutcome | null => {
    const air = airCase(resolved, scaled(releases, act, factor), dayAir.window, false);
    const straight = airRun(air.input, gases, { displacement: 'straight' });
    const exact = airRun(air.input, gases);
    return passes(zoneOutcomes(air, exact, straight, 'planned', resolved.groups, levelsOf));
  };
  return resolved.acts
    .filter((act) => act.planned.some((release) => !release.burned && release.amountMol > 0))
    .map((act): LargestAmount => {
      let low = 0;
      let high = 1;
      let blocker = failureAt(act.id, high);
      while (!blocker && high < largestFactor) {
        low = high;
        high = Math.min(largestFactor, high * 4);
        blocker = failureAt(act.id, high);
      }
      const withoutAct = blocker ? failureAt(act.id, 0) : null;
      if (withoutAct) {
        blocker = withoutAct;
        high = 0;
      }
      while (blocker && high - low > width * high) {
        const middle = (low + high) / 2;
        const failed = failureAt(act.id, middle);
        if (failed) {
          high = middle;
          blocker = failed;
        } else low = middle;
      }
      const factor = blocker ? low : high;
      const massKg = act.planned.reduce((sum, release) => sum + release.massKg, 0);
      const mol = act.planned.reduce((sum, release) => sum + release.amountMol, 0);
      const words = {
        method: 'largest amount that passes row 2, other acts as planned',
        formula: 'planned amount times the largest factor that meets aim and limit',
        source: 'own-derivation',
        range: blocker
          ? 'for this room, these people and this air only'
          : 'no failure found up to 100 times the planned amount',
        inputs: [{ name: 'factor on the planned amount', value: factor, unit: '' }],
      };
      const gasNames = new Set(act.planned.flatMap((release) => Object.keys(release.composition)));
      return {
        act: act.id,
        gas: [...gasNames].join(', '),
        zone: blocker?.group.title ?? '',
        limitedBy: blocker
          ? withoutAct
            ? `${blocker.level.title}: fails without this act already`
            : blocker.level.title
          : 'no level reached',
        mass: plainFigure(massKg * factor, 'kg', words),
        volume: plainFigure(mol * factor * resolved.site.molarVolumeM3PerMol, 'm3', words),
        planned: plainFigure(massKg, 'kg', {
          method: 'as planned for one showing',
          formula: 'sum of the planned releases of the act',
          source: 'plan',
        }),
      };
    });
}
