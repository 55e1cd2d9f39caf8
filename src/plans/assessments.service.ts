import { Injectable, Logger } from '@nestjs/common';
import type { Assessment } from '../assessment/assessment.js';
import type { PlanFile } from '../assessment/plan-file.js';
import { DomainError, NotComputable } from '../errors.js';
import { AssessmentPool } from '../workers/assessment-pool.js';

/** What came of assessing a plan: the assessment, or why there is none. */
export type Outcome =
  | { readonly assessment: Assessment; readonly failure?: undefined }
  | { readonly assessment?: undefined; readonly failure: DomainError };

/** Assessments are asked for by page, images and sheet in one go; so many are kept. */
const keptOutcomes = 40;

/** Assesses plans, and remembers the last ones: an assessment depends on nothing but its plan file. */
@Injectable()
export class AssessmentsService {
  readonly #log = new Logger('Faults');
  readonly #outcomes = new Map<string, Promise<Outcome>>();

  constructor(private readonly pool: AssessmentPool) {}

  outcomeOf(file: PlanFile): Promise<Outcome> {
    const key = JSON.stringify(file);
    const known = this.#outcomes.get(key);
    if (known !== undefined) return known;
    const outcome = this.#assessed(file);
    const [oldest] = this.#outcomes.keys();
    if (oldest !== undefined && this.#outcomes.size >= keptOutcomes) this.#outcomes.delete(oldest);
    this.#outcomes.set(key, outcome);
    // A thread that died has answered nothing: the next reader asks again.
    outcome.catch(() => this.#outcomes.delete(key));
    return outcome;
  }

  async #assessed(file: PlanFile): Promise<Outcome> {
    const answer = await this.pool.answerTo(file);
    if (answer.assessment !== null) return { assessment: answer.assessment };
    const { code, message, hint, details } = answer.failure;
    if (code !== 'internal') return { failure: new DomainError(code, message, hint, details) };
    // The entries must stay within reach even when the calculation has a fault.
    this.#log.error(answer.fault ?? message);
    return {
      failure: new NotComputable(
        'Stillair met a fault of its own while working this plan out. Your entries are safe.',
        'Change the last entry back, and report the fault with the exported plan file.',
      ),
    };
  }
}
