import { Injectable, Logger } from '@nestjs/common';
import { assess, checkedPlan } from '../assessment/assess.js';
import type { Assessment } from '../assessment/assessment.js';
import type { PlanFile } from '../assessment/plan-file.js';
import { CatalogueData } from '../catalogue/catalogue.module.js';
import { DomainError, NotComputable } from '../errors.js';

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
  readonly #outcomes = new Map<string, Outcome>();

  constructor(private readonly data: CatalogueData) {}

  outcomeOf(file: PlanFile): Outcome {
    const key = JSON.stringify(file);
    const known = this.#outcomes.get(key);
    if (known !== undefined) return known;
    const outcome = this.#assessed(file);
    const [oldest] = this.#outcomes.keys();
    if (oldest !== undefined && this.#outcomes.size >= keptOutcomes) this.#outcomes.delete(oldest);
    this.#outcomes.set(key, outcome);
    return outcome;
  }

  #assessed(file: PlanFile): Outcome {
    const data = this.data.forAssessment;
    try {
      return { assessment: assess(checkedPlan(file, data), data) };
    } catch (error) {
      if (error instanceof DomainError) return { failure: error };
      // The entries must stay within reach even when the calculation has a fault.
      this.#log.error(error instanceof Error ? (error.stack ?? error.message) : String(error));
      return {
        failure: new NotComputable(
          'Stillair met a fault of its own while working this plan out. Your entries are safe.',
          'Change the last entry back, and report the fault with the exported plan file.',
        ),
      };
    }
  }
}
