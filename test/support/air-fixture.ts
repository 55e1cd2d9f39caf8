import type { AirGasTable } from '../../src/science/room-air/air-gases.js';
import type { AirInput } from '../../src/science/room-air/air-input.js';

/** Molar masses as the air checks state them. */
export const checkGases: AirGasTable = {
  air: { molarMassKgPerMol: 0.02896 },
  He: { molarMassKgPerMol: 0.0040026 },
  N2: { molarMassKgPerMol: 0.0280134 },
  O2: { molarMassKgPerMol: 0.0319988 },
  Ar: { molarMassKgPerMol: 0.039948 },
  CO2: { molarMassKgPerMol: 0.0440095 },
  SF6: { molarMassKgPerMol: 0.146055 },
  Kr: { molarMassKgPerMol: 0.083798 },
};

/** The state of the air checks: 293.15 K, 101 325 Pa, dry. */
export const checkAmbient = {
  temperatureK: 293.15,
  pressurePa: 101325,
  relativeHumidity: 0,
} as const;

/** An input at the state of the checks. */
export function checkInput(
  parts: Omit<AirInput, 'ambient' | 'outputIntervalS'> & { readonly outputIntervalS?: number },
): AirInput {
  return { ambient: checkAmbient, outputIntervalS: parts.durationS, ...parts };
}
