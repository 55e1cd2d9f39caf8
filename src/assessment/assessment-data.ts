import type { GasLibrary } from '../science/gases/gas-library.js';
import type { Catalogue } from './catalogue-types.js';

/** Everything an assessment draws on besides the plan: checked, frozen data and the engine's name. */
export interface AssessmentData {
  readonly gases: GasLibrary;
  readonly catalogue: Catalogue;
  readonly engineVersion: string;
}
