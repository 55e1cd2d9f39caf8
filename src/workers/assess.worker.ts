import { assess, checkedPlan } from '../assessment/assess.js';
import type { Assessment } from '../assessment/assessment.js';
import { doorError, type DoorError } from '../assessment/calculators/door.js';
import { engineVersion } from '../assessment/engine-version.js';
import type { PlanFile } from '../assessment/plan-file.js';
import { loadCatalogue } from '../catalogue/catalogue.js';
import { loadGasLibrary } from '../catalogue/gas-library.js';

/** What a worker answers: errors lose their class on the way between threads, so they travel as data. */
export type WorkerAnswer =
  | { readonly assessment: Assessment; readonly failure: null; readonly fault: null }
  | {
      readonly assessment: null;
      readonly failure: DoorError['error'];
      readonly fault: string | null;
    };

const data = { gases: loadGasLibrary(), catalogue: loadCatalogue(), engineVersion };

/** Assesses one plan file in a thread of its own. */
export default function assessInWorker(plan: PlanFile): WorkerAnswer {
  try {
    return { assessment: assess(checkedPlan(plan, data), data), failure: null, fault: null };
  } catch (thrown) {
    const { error } = doorError(thrown);
    const fault =
      error.code === 'internal' && thrown instanceof Error
        ? (thrown.stack ?? thrown.message)
        : null;
    return { assessment: null, failure: error, fault };
  }
}
