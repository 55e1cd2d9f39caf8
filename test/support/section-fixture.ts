import type { Figure, FigureUnit, SectionView } from '../../src/assessment/assessment.js';

/** Invented figures and venues, for drawings and sheets. Nothing here was computed by a model. */

/** A made-up figure that carries everything a real one does. */
export const figure = (value: number, unit: FigureUnit, more: Partial<Figure> = {}): Figure => ({
  value,
  unit,
  method: 'fixture',
  formula: 'invented for a test',
  inputs: [],
  source: 'fixture',
  range: 'none: invented',
  ...more,
});

export const theatreView: SectionView = {
  spaces: [
    {
      id: 'stage',
      title: 'Stage',
      floorLevelM: 0.9,
      floorRiseM: 0,
      heightM: 7.1,
      lengthM: 9,
    },
    {
      id: 'hall',
      title: 'Hall',
      floorLevelM: 0,
      floorRiseM: 2.4,
      heightM: 6.3,
      lengthM: 18,
    },
    {
      id: 'pit',
      title: 'Orchestra pit',
      floorLevelM: -2.1,
      floorRiseM: 0,
      heightM: 2.1,
      lengthM: 4.5,
    },
    {
      id: 'understage',
      title: 'Under-stage',
      floorLevelM: -2.1,
      floorRiseM: 0,
      heightM: 2.6,
      lengthM: 8,
    },
  ],
  openings: [
    { from: 'stage', to: 'hall', kind: 'doorway', sillLevelM: 0.9, heightM: 5.5 },
    { from: 'pit', to: 'hall', kind: 'floorOpening', sillLevelM: 0, heightM: 3.5 },
    { from: 'understage', to: 'stage', kind: 'floorOpening', sillLevelM: 0.9, heightM: 1.2 },
    { from: 'hall', to: 'outside', kind: 'doorway', sillLevelM: 2.4, heightM: 2.1 },
  ],
  zones: [
    {
      id: 'presenter',
      title: 'Presenter',
      space: 'stage',
      levelM: 2.5,
      lowestOxygen: figure(0.2071, 'oxygenFraction'),
      highestGas: figure(0.0032, 'gasFraction'),
    },
    {
      id: 'front',
      title: 'Front row, seated on the floor',
      space: 'hall',
      levelM: 0.5,
      lowestOxygen: figure(0.2019, 'oxygenFraction'),
      highestGas: figure(0.0181, 'gasFraction'),
    },
    {
      id: 'seats',
      title: 'Seats',
      space: 'hall',
      levelM: 1.15,
      lowestOxygen: figure(0.206, 'oxygenFraction'),
      highestGas: figure(0.0061, 'gasFraction'),
    },
    {
      id: 'rear',
      title: 'Rear row',
      space: 'hall',
      levelM: 3.55,
      lowestOxygen: figure(0.2083, 'oxygenFraction'),
      highestGas: figure(0.0029, 'gasFraction'),
    },
    {
      id: 'players',
      title: 'Players',
      space: 'pit',
      levelM: -0.95,
      lowestOxygen: figure(0.17896, 'oxygenFraction'),
      highestGas: figure(0.1451, 'gasFraction'),
    },
    {
      id: 'trap',
      title: 'Trap crew',
      space: 'understage',
      levelM: -0.5,
      lowestOxygen: null,
      highestGas: null,
    },
  ],
  layers: [
    { space: 'pit', at: 'floor', depthM: 1.4, gasFraction: figure(0.1451, 'gasFraction') },
    { space: 'hall', at: 'whole', depthM: 6.3, gasFraction: figure(0.0061, 'gasFraction') },
    { space: 'stage', at: 'ceiling', depthM: 1.6, gasFraction: figure(0.012, 'gasFraction') },
  ],
  moment: 'Shown at 19:42, end of the bench fog.',
};

export const classroomView: SectionView = {
  spaces: [
    { id: 'room', title: 'Classroom', floorLevelM: 0, floorRiseM: 0, heightM: 2.7, lengthM: 9 },
  ],
  openings: [{ from: 'room', to: 'outside', kind: 'doorway', sillLevelM: 0, heightM: 2 }],
  zones: [
    {
      id: 'floor',
      title: 'Floor check',
      space: 'room',
      levelM: 0.2,
      lowestOxygen: figure(0.199, 'oxygenFraction'),
      highestGas: null,
    },
    {
      id: 'mats',
      title: 'Children on mats',
      space: 'room',
      levelM: 0.5,
      lowestOxygen: figure(0.2046, 'oxygenFraction'),
      highestGas: null,
    },
    {
      id: 'chairs',
      title: 'Pupils on chairs',
      space: 'room',
      levelM: 1.1,
      lowestOxygen: figure(0.2073, 'oxygenFraction'),
      highestGas: null,
    },
    {
      id: 'standing',
      title: 'Presenter standing',
      space: 'room',
      levelM: 1.6,
      lowestOxygen: figure(0.2076, 'oxygenFraction'),
      highestGas: null,
    },
  ],
  layers: [{ space: 'room', at: 'floor', depthM: 0.35, gasFraction: figure(0.031, 'gasFraction') }],
  moment: 'Shown at 10:12.',
};

export const vanView: SectionView = {
  spaces: [
    { id: 'cab', title: 'Cab', floorLevelM: 0.6, floorRiseM: 0, heightM: 1.3, lengthM: 1.4 },
    {
      id: 'load',
      title: 'Load space',
      floorLevelM: 0.6,
      floorRiseM: 0,
      heightM: 1.4,
      lengthM: 2.4,
    },
  ],
  openings: [],
  zones: [
    {
      id: 'driver',
      title: 'Driver',
      space: 'cab',
      levelM: 1.55,
      lowestOxygen: figure(0.2055, 'oxygenFraction'),
      highestGas: figure(0.015, 'gasFraction'),
    },
  ],
  layers: [{ space: 'load', at: 'whole', depthM: 1.4, gasFraction: figure(0.05, 'gasFraction') }],
  moment: 'Shown at the end of the journey.',
};

/** A view with many spaces, for the rows of the drawing. */
export const longView = (count: number): SectionView => ({
  spaces: Array.from({ length: count }, (_, index) => ({
    id: `s${String(index)}`,
    title: `Room ${String(index + 1)} of a long corridor`,
    floorLevelM: (index % 3) * 0.5,
    floorRiseM: 0,
    heightM: 2.5 + (index % 4),
    lengthM: 4 + (index % 5),
  })),
  openings: Array.from({ length: count - 1 }, (_, index) => ({
    from: `s${String(index)}`,
    to: `s${String(index + 1)}`,
    kind: 'doorway',
    sillLevelM: 1,
    heightM: 1.5,
  })),
  zones: Array.from({ length: count }, (_, index) => ({
    id: `z${String(index)}`,
    title: `People seated in room ${String(index + 1)}`,
    space: `s${String(index)}`,
    levelM: (index % 3) * 0.5 + 1.15,
    lowestOxygen: figure(0.205 - index * 0.0005, 'oxygenFraction'),
    highestGas: figure(0.002, 'gasFraction'),
  })),
  layers: [],
  moment: 'Shown at 20:00.',
});
