import { describe, expect, it } from 'vitest';
import { loadGasLibrary } from '../../../src/catalogue/gas-library.js';
import { airGasTable } from '../../../src/science/room-air/air-gases.js';
import type { AirInput } from '../../../src/science/room-air/air-input.js';
import { airModel } from '../../../src/science/room-air/air-model.js';
import { layerCase } from '../../../src/science/room-air/layer-case.js';
import { usualLayers } from '../../../src/science/room-air/layer-parameters.js';
import { FINE, type LayerAccuracy } from '../../../src/science/room-air/layer-extrapolation.js';
import { layeredTrack } from '../../../src/science/room-air/layered-track.js';
import { rakedHallWithPit } from '../../bench/air-scenario.js';
import { layerContest } from '../../bench/general-layers.js';

const gases = airGasTable(loadGasLibrary());
const ambient = { temperatureK: 293.15, pressurePa: 101_325, relativeHumidity: 0 };

/** Two rooms with a door to a third that has none of its own air: dry ice fog runs in from the first. */
const closedRoom: AirInput = {
  ambient,
  durationS: 3600,
  outputIntervalS: 60,
  spaces: [
    { id: 'stage', floorAreaM2: 60, heightM: 5 },
    { id: 'store', floorAreaM2: 20, heightM: 2.6, floorLevelM: -0.6 },
  ],
  openings: [
    { from: 'stage', to: 'store', kind: 'doorway', widthM: 0.9, heightM: 2, sillLevelM: 0 },
  ],
  infiltration: [{ space: 'stage', airChangesPerHour: 1 }],
  releases: [{ space: 'stage', gas: 'CO2', massKg: 5, durationS: 300, manner: 'fog' }],
  zones: [{ id: 'store', space: 'store', heightM: 1.1 }],
};

/** Helium under a ceiling with a vent to outdoors just below it. */
const ventedHelium: AirInput = {
  ambient,
  durationS: 3600,
  outputIntervalS: 60,
  spaces: [{ id: 'hall', floorAreaM2: 80, heightM: 6 }],
  openings: [
    { from: 'hall', to: 'outside', kind: 'vent', widthM: 1, heightM: 0.5, sillLevelM: 5.5 },
    { from: 'hall', to: 'outside', kind: 'vent', widthM: 1, heightM: 0.5, sillLevelM: 0 },
  ],
  releases: [{ space: 'hall', gas: 'He', volumeM3: 5, durationS: 300, heightM: 1.5 }],
  zones: [{ id: 'gallery', space: 'hall', heightM: 5 }],
};

const EXACT: LayerAccuracy = { relative: 1e-5, order: 4 };
/** What a layer holds beyond the air above it may differ by so much of the most it ever holds. */
const TOLERANCE = 0.01;

/** Gas in each layer beyond the air above it [m3], time by time: fraction and depth together. */
function heldByLayers(input: AirInput, accuracy: LayerAccuracy): readonly (readonly number[])[] {
  const { network } = layerCase(airModel(input, gases), gases);
  const times = Array.from({ length: input.durationS / 60 + 1 }, (_, i) => 60 * i);
  const { nodes, layout } = layeredTrack(network, usualLayers(), times, accuracy);
  return network.layers.map(({ group }, l) =>
    nodes.map(({ volumes, fractions }) => {
      const column = network.components.findIndex(({ isReleased }) => isReleased);
      const upper = layout.layers + group;
      const x = (zone: number): number => fractions[zone * layout.k + column] ?? NaN;
      return (volumes[l] ?? NaN) * (x(l) - x(upper));
    }),
  );
}

/** Largest difference of two runs over the most that any layer holds [-]. */
function worstDifference(input: AirInput): number {
  const usual = heldByLayers(input, FINE);
  const exact = heldByLayers(input, EXACT);
  const most = Math.max(...exact.flat());
  expect(most).toBeGreaterThan(0.01);
  return Math.max(
    ...usual.flatMap((layer, l) =>
      layer.map((value, i) => Math.abs(value - (exact[l]?.[i] ?? NaN)) / most),
    ),
  );
}

describe('steps of the layers against a hundredfold finer error and one order more', () => {
  it.each([
    ['a rake that drains into a pit with low extract', { ...rakedHallWithPit, durationS: 1800 }],
    ['fog that cascades through a door into a closed, lower room', closedRoom],
    ['helium under a ceiling with a high and a low vent', ventedHelium],
  ])('changes what the layers hold by no more than 1 % of the most: %s', (_, input) => {
    expect(worstDifference(input)).toBeLessThan(TOLERANCE);
  });
});

describe('a general integrator on the derivative of the layers', () => {
  const { own, general, difference } = layerContest(rakedHallWithPit, gases);
  const exact = general(1e-8);

  it('agrees with the steps of single runs within 2 % of a layer on a rake that drains into a pit', () => {
    expect(difference(own(FINE), exact)).toBeLessThan(0.02);
  });

  it('agrees with hundredfold finer steps within 0.1 % of a layer there', () => {
    expect(difference(own(EXACT), exact)).toBeLessThan(0.001);
  });
});
