import { workerData } from 'piscina';
import { assess, checkedPlan, type AssessmentData } from '../assessment/assess.js';
import type { Assessment } from '../assessment/assessment.js';
import { answer, doorError, type DoorError } from '../assessment/calculators/door.js';
import { calculatorsOf } from '../assessment/calculators/registry.js';
import type { PlanFile } from '../assessment/plan-file.js';

/** What a thread is asked for. */
export type WorkerTask =
  | { readonly kind: 'assess'; readonly plan: PlanFile }
  | { readonly kind: 'calculate'; readonly calculator: string; readonly document: unknown };

/** An assessment: errors lose their class on the way between threads, so they travel as data. */
export type WorkerAnswer =
  | { readonly assessment: Assessment; readonly failure: null; readonly fault: null }
  | {
      readonly assessment: null;
      readonly failure: DoorError['error'];
      readonly fault: string | null;
    };

/** What a calculator answers, its faults as text for the log. */
export interface WorkerCalculation {
  readonly body: unknown;
  readonly faults: readonly string[];
}

// Handed over by the server, which has read and checked it: reading it again takes over a second,
// and a thread is replaced whenever a run is dropped.
const data = workerData as AssessmentData;
const calculators = calculatorsOf(data);

const faultText = (thrown: unknown): string =>
  thrown instanceof Error ? (thrown.stack ?? thrown.message) : String(thrown);

function assessed(plan: PlanFile): WorkerAnswer {
  try {
    return { assessment: assess(checkedPlan(plan, data), data), failure: null, fault: null };
  } catch (thrown) {
    const { error } = doorError(thrown);
    const fault = error.code === 'internal' ? faultText(thrown) : null;
    return { assessment: null, failure: error, fault };
  }
}

function calculated(name: string, document: unknown): WorkerCalculation {
  const calculator = calculators.get(name);
  if (calculator === undefined) throw new Error(`No calculator ${name} in the thread.`);
  const { body, faults } = answer(calculator, document, data);
  return { body, faults: faults.map(faultText) };
}

/** Works out one task in a thread of its own. */
export default function workedOut(task: WorkerTask): WorkerAnswer | WorkerCalculation {
  return task.kind === 'assess' ? assessed(task.plan) : calculated(task.calculator, task.document);
}
