import { assess, checkedPlan, type AssessmentData } from '../assess.js';
import { assessmentSchema } from '../assessment-schema.js';
import { planFileSchema } from '../plan-file.js';
import type { Calculator } from './calculator.js';

/** The assessment of a plan file as a calculator: it draws on the whole catalogue. */
export function assessCalculator(
  data: AssessmentData,
): Calculator<typeof planFileSchema, typeof assessmentSchema> {
  return {
    name: 'assess',
    input: planFileSchema,
    output: assessmentSchema,
    run: (plan) => assess(checkedPlan(plan, data), data),
  };
}
