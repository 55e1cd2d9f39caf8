import type { AssessmentData } from '../assess.js';
import { airCalculator } from './air.js';
import { assessCalculator } from './assess.js';
import type { Calculator } from './calculator.js';
import { cylinderCalculator } from './cylinder.js';
import { decayCalculator } from './decay.js';
import { gasCalculator } from './gas.js';
import { purityCalculator } from './purity.js';
import { soundCalculator } from './sound.js';

/** Every calculator by the name under which the doors offer it. */
export function calculatorsOf(data: AssessmentData): ReadonlyMap<string, Calculator> {
  const all = [
    gasCalculator,
    cylinderCalculator,
    soundCalculator,
    purityCalculator,
    airCalculator,
    decayCalculator,
    assessCalculator(data),
  ] as unknown as readonly Calculator[];
  return new Map(all.map((calculator) => [calculator.name, calculator]));
}
