import { latinHypercube } from '../numerics/latin-hypercube.js';
import type { AirInput, AirOpening, AirSystem, AirUncertainty } from './air-input.js';
import {
  DEFAULT_DISTRIBUTIONS,
  distributionValue,
  SAMPLED_INPUTS,
  type SampledInput,
} from './input-distributions.js';
import { usualLayers, type LayerParameters } from './layer-parameters.js';

/** One draw of everything that is uncertain. */
export type Draw = Readonly<Record<SampledInput, number>>;

/** The draws of a run: the same seed gives the same draws. */
export function uncertaintyDraws(uncertainty: AirUncertainty): readonly Draw[] {
  const distributions = { ...DEFAULT_DISTRIBUTIONS, ...uncertainty.distributions };
  return latinHypercube(uncertainty.samples, SAMPLED_INPUTS.length, uncertainty.seed).map(
    (row) =>
      Object.fromEntries(
        SAMPLED_INPUTS.map((name, axis) => [
          name,
          distributionValue(distributions[name], row[axis] ?? 0.5),
        ]),
      ) as Record<SampledInput, number>,
  );
}

function scaledSystem(system: AirSystem, draw: Draw): AirSystem {
  const factor = Math.max(0, draw.freshAirFactor);
  return {
    ...system,
    ...(system.freshAirM3PerS === undefined
      ? {}
      : { freshAirM3PerS: system.freshAirM3PerS * factor }),
    ...(system.supplyM3PerS === undefined ? {} : { supplyM3PerS: system.supplyM3PerS * factor }),
    ...(system.extractM3PerS === undefined ? {} : { extractM3PerS: system.extractM3PerS * factor }),
    effectiveness: system.effectiveness ?? draw.mixingFactor,
  };
}

function scaledOpening(opening: AirOpening, draw: Draw): AirOpening {
  if (opening.dischargeCoefficient !== undefined) return opening;
  const isOutward = opening.from === 'outside' || opening.to === 'outside';
  return {
    ...opening,
    dischargeCoefficient: isOutward ? draw.removalCoefficient : draw.spreadCoefficient,
  };
}

/** The input as one draw has it. */
export function sampledInput(input: AirInput, draw: Draw): AirInput {
  const amount = Math.max(0, draw.releaseFactor);
  return {
    ...input,
    airSystems: (input.airSystems ?? []).map((system) => scaledSystem(system, draw)),
    openings: (input.openings ?? []).map((opening) => scaledOpening(opening, draw)),
    infiltration: (input.infiltration ?? []).map((one) => ({
      ...one,
      airChangesPerHour: one.airChangesPerHour * draw.infiltrationFactor,
    })),
    releases: (input.releases ?? []).map((release) => ({
      ...release,
      ...(release.amountMol === undefined ? {} : { amountMol: release.amountMol * amount }),
      ...(release.massKg === undefined ? {} : { massKg: release.massKg * amount }),
      ...(release.volumeM3 === undefined ? {} : { volumeM3: release.volumeM3 * amount }),
      ...(release.durationS === undefined
        ? {}
        : { durationS: release.durationS * draw.durationFactor }),
    })),
    occupants: (input.occupants ?? []).map((one) => {
      if (one.carbonDioxideM3PerS === undefined) {
        return { ...one, count: one.count * draw.breathFactor };
      }
      return { ...one, carbonDioxideM3PerS: one.carbonDioxideM3PerS * draw.breathFactor };
    }),
  };
}

/** The layer parameters of one draw; what the input fixes stays fixed. */
export function sampledLayers(input: AirInput, draw: Draw): LayerParameters {
  const overrides = input.layers ?? {};
  const usual = usualLayers(overrides);
  return {
    ...usual,
    sourceDilution: overrides.sourceDilution ?? draw.sourceDilution,
    turbulenceMPerS: overrides.turbulenceVelocityMPerS ?? draw.turbulenceVelocityMPerS,
    fallEntrainment: overrides.fallEntrainment ?? draw.fallEntrainment,
    smearM: overrides.smearHeightM ?? draw.smearHeightM,
    plumeConstant: draw.plumeConstant,
  };
}
