import { SAMPLED_INPUTS, type SampledInput } from '../science/room-air/input-distributions.js';
import type { DriverResult, Sampling } from './assessment.js';
import type { Evaluation } from './evaluation.js';

/** What each sampled input is, as a reader knows it. */
const inputTitles: Readonly<Record<SampledInput, string>> = {
  freshAirFactor: 'fresh air delivered, against its stated value',
  infiltrationFactor: 'air leaking in through gaps',
  mixingFactor: 'how well supplied air stirs the room',
  removalCoefficient: 'how freely air passes openings to outdoors',
  spreadCoefficient: 'how freely air passes openings between spaces',
  plumeConstant: 'room air drawn into a rising or sinking stream',
  releaseFactor: 'amount let out',
  durationFactor: 'how long the release takes',
  sourceDilution: 'dilution where the gas comes out',
  turbulenceVelocityMPerS: 'turbulence of the room air',
  fallEntrainment: 'room air drawn in where gas falls over an edge',
  smearHeightM: 'height of the smear above a layer',
  edgeEntrainment: 'mixing at the front of what spreads at once',
  freeVolumeFactor: 'free volume of the spaces',
  breathFactor: 'how much people breathe',
};

const isSampled = (name: string): name is SampledInput =>
  SAMPLED_INPUTS.some((input) => input === name);

/** Inputs named for each zone and quantity. */
const namedEach = 3;

/** What the band of the layered answer depends on, the strongest input of each zone first. */
export function driverResults({ dayResult, resolved }: Evaluation): readonly DriverResult[] {
  const drivers = dayResult.drivers ?? [];
  return resolved.groups.flatMap(({ id, title }) => {
    const own = drivers.filter(({ zone }) => zone === id);
    return [...new Set(own.map(({ quantity }) => quantity))].flatMap((quantity) =>
      own
        .filter((driver) => driver.quantity === quantity)
        .toSorted((a, b) => Math.abs(b.rankCorrelation) - Math.abs(a.rankCorrelation))
        .slice(0, namedEach)
        .map(({ input, rankCorrelation }) => ({
          zone: id,
          zoneTitle: title,
          quantity,
          input,
          inputTitle: isSampled(input) ? inputTitles[input] : input,
          rankCorrelation,
        })),
    );
  });
}

/** How the band was drawn, or null where nothing was sampled. */
export function samplingOf({ dayAir, dayResult }: Evaluation): Sampling | null {
  const { uncertainty } = dayAir.input;
  if (uncertainty === undefined || dayResult.drivers === undefined) return null;
  return { samples: uncertainty.samples, seed: uncertainty.seed };
}
