import { describe, expect, it } from 'vitest';
import type { AirInput } from '../../../src/science/room-air/air-input.js';
import { airRun } from '../../../src/science/room-air/air-run.js';
import { exactDoorwayExchange } from '../../../src/science/room-air/doorway.js';
import { rectangularFloorExchange } from '../../../src/science/room-air/floor-opening.js';
import { checkGases, checkInput } from '../../support/air-fixture.js';
import { generalSolution } from '../../support/general-solver.js';

/*
 * The balances below are written out anew, one room at a time, and handed to a general-purpose
 * package (Hairer's extrapolation code, Hairer, Norsett and Wanner 1993, II.9) at 1e-11. Only the two
 * opening formulas are the project's own; their values are checked elsewhere.
 */

const AIR = 0.02896;
const outdoorAir = { gas: 0, carbonDioxide: 420e-6, oxygen: 0.2095 };
const FINE = { relative: 1e-11, absolute: 1e-14 };
/** The run keeps 1e-6 of an amount per step; over some tens of steps this much can add up. */
const AGREES = 5e-6;
/**
 * Where two rooms swap which is the denser, the root in the law of the doorway has no slope: a step
 * over that moment misses more.
 */
const AGREES_ACROSS = 5e-5;

type Gas = 'He' | 'SF6' | 'CO2' | 'Ar';

/** Molar mass of what a room holds [kg/mol]: density up to a factor common to both sides. */
function molar(gas: Gas, share: number, carbonDioxide: number): number {
  const excess = (id: Gas) => (checkGases[id]?.molarMassKgPerMol ?? Number.NaN) - AIR;
  return AIR + share * excess(gas) + carbonDioxide * excess('CO2');
}

/** Released gas and oxygen of each room at each output time, as the run answers them. */
function answered(input: AirInput, gas: Gas) {
  const { timesS, spaces } = airRun(input, checkGases, { layered: false });
  return { timesS, rooms: ids(input).map((id) => read(spaces[id]?.mixed, gas)) };
}
const ids = (input: AirInput) => input.spaces.map((space) => space.id);
const read = (
  series:
    | {
        readonly oxygenFraction: readonly number[];
        readonly gasFraction: Readonly<Record<string, readonly number[]>>;
      }
    | undefined,
  gas: Gas,
) => ({ gas: series?.gasFraction[gas] ?? [], oxygen: series?.oxygenFraction ?? [] });

/** Largest difference of the run from the package over all rooms and output times, of the largest. */
function disagreement(
  input: AirInput,
  gas: Gas,
  start: readonly number[],
  balance: (t: number, y: readonly number[]) => number[],
): number {
  const { timesS, rooms } = answered(input, gas);
  let y = start;
  let worst = 0;
  for (const [i, t] of timesS.entries()) {
    const from = timesS[i - 1];
    if (from !== undefined) y = generalSolution(balance, y, from, t, FINE).y;
    for (const [r, room] of rooms.entries()) {
      const most = Math.max(...room.gas);
      expect(most).toBeGreaterThan(1e-3);
      worst = Math.max(worst, Math.abs((room.gas[i] ?? NaN) - (y[3 * r] ?? NaN)) / most);
      worst = Math.max(worst, Math.abs((room.oxygen[i] ?? NaN) - (y[3 * r + 2] ?? NaN)) / 0.2095);
    }
  }
  return worst;
}

/** Released gas, carbon dioxide of the air and oxygen of a room, in this order. */
const room = (share: number, oxygen: number) => [share, outdoorAir.carbonDioxide, oxygen];

/** What an exchange between two rooms does to both. */
function exchanged(y: readonly number[], flow: number, volumes: readonly [number, number]) {
  return y.map((value, i) => {
    const isFirst = i < 3;
    const other = y[isFirst ? i + 3 : i - 3] ?? NaN;
    return (flow * (other - value)) / (isFirst ? volumes[0] : volumes[1]);
  });
}

const pair = { a: 60, b: 90 } as const;
const rooms = (initial: Readonly<Record<string, number>>, upperFloorM = 0): AirInput['spaces'] => [
  { id: 'a', floorAreaM2: pair.a / 3, heightM: 3, floorLevelM: upperFloorM, initial },
  { id: 'b', floorAreaM2: pair.b / 3, heightM: 3, floorLevelM: 0 },
];

describe('nonlinear mixed cases against a general-purpose solver, within 5e-6 unless said', () => {
  it('agrees on a doorway between a room with 30 % SF6 and a room with air', () => {
    const input = checkInput({
      durationS: 1800,
      outputIntervalS: 60,
      spaces: rooms({ SF6: 0.3 }),
      openings: [{ from: 'a', to: 'b', kind: 'doorway', widthM: 0.9, heightM: 2.1, sillLevelM: 0 }],
    });
    const balance = (_: number, y: readonly number[]): number[] => {
      const a = molar('SF6', y[0] ?? NaN, y[1] ?? NaN);
      const b = molar('SF6', y[3] ?? NaN, y[4] ?? NaN);
      const flow = exactDoorwayExchange(0.9, 2.1, Math.max(a, b), Math.min(a, b), 0.75);
      return exchanged(y, flow, [pair.a, pair.b]);
    };
    const start = [...room(0.3, 0.2095 * 0.7), ...room(0, 0.2095)];
    expect(disagreement(input, 'SF6', start, balance)).toBeLessThan(AGREES);
  });

  it('agrees on a floor opening under a room with 25 % argon', () => {
    const input = checkInput({
      durationS: 3600,
      outputIntervalS: 120,
      spaces: rooms({ Ar: 0.25 }, 3),
      openings: [
        { from: 'a', to: 'b', kind: 'floorOpening', widthM: 1.2, heightM: 2, sillLevelM: 3 },
      ],
    });
    const balance = (_: number, y: readonly number[]): number[] => {
      const above = molar('Ar', y[0] ?? NaN, y[1] ?? NaN);
      const below = molar('Ar', y[3] ?? NaN, y[4] ?? NaN);
      const gPrime = (2 * 9.81 * (above - below)) / (above + below);
      const flow = rectangularFloorExchange(1.2, 2, Math.max(0, gPrime));
      return exchanged(y, flow, [pair.a, pair.b]);
    };
    const start = [...room(0.25, 0.2095 * 0.75), ...room(0, 0.2095)];
    expect(disagreement(input, 'Ar', start, balance)).toBeLessThan(AGREES);
  });

  it('agrees on helium that flows into a room with one high vent and pushes through it', () => {
    const release = 0.004;
    const volume = 48;
    const vent = { widthM: 0.6, heightM: 0.4, dischargeCoefficient: 0.45 } as const;
    const input = checkInput({
      durationS: 2400,
      outputIntervalS: 60,
      spaces: [{ id: 'a', floorAreaM2: volume / 3, heightM: 3 }],
      openings: [{ from: 'a', to: 'outside', kind: 'vent', sillLevelM: 2.4, ...vent }],
      releases: [{ space: 'a', gas: 'He', volumeM3: release * 2400, durationS: 2400 }],
    });
    const outside = molar('He', 0, outdoorAir.carbonDioxide);
    const balance = (_: number, y: readonly number[]): number[] => {
      const inside = molar('He', y[0] ?? NaN, y[1] ?? NaN);
      // Out above the neutral level, in below it: out less in is what is let out (Newton's second
      // law along a streamline on each side), found by halving.
      const speed = (upstream: number, span: number) =>
        (2 / 3) *
        vent.dischargeCoefficient *
        vent.widthM *
        Math.sqrt((2 * 9.81 * Math.max(0, outside - inside)) / upstream) *
        span ** 1.5;
      let low = 0;
      let high: number = vent.heightM;
      for (let i = 0; i < 100; i++) {
        const below = 0.5 * (low + high);
        const net = speed(inside, vent.heightM - below) - speed(outside, below);
        if (net > release) low = below;
        else high = below;
      }
      const inflow = Math.max(0, speed(outside, low));
      const isOneWay = speed(inside, vent.heightM) <= release;
      const into = isOneWay ? 0 : inflow;
      const out = into + release;
      return [
        (release - out * (y[0] ?? NaN)) / volume,
        (into * outdoorAir.carbonDioxide - out * (y[1] ?? NaN)) / volume,
        (into * outdoorAir.oxygen - out * (y[2] ?? NaN)) / volume,
      ];
    };
    expect(disagreement(input, 'He', room(0, 0.2095), balance)).toBeLessThan(AGREES);
  });

  it('agrees to 5e-5 on a decaying source in a ventilated room beside another behind a doorway', () => {
    const [amount, duration, tau, fresh] = [6, 900, 240, 0.15] as const;
    const input = checkInput({
      durationS: 900,
      outputIntervalS: 30,
      spaces: rooms({}),
      openings: [{ from: 'a', to: 'b', kind: 'doorway', widthM: 0.8, heightM: 2, sillLevelM: 0 }],
      airSystems: [{ space: 'a', drive: 'supply', freshAirM3PerS: fresh }],
      releases: [
        {
          space: 'a',
          gas: 'He',
          volumeM3: amount,
          durationS: duration,
          profile: 'decaying',
          timeConstantS: tau,
        },
      ],
    });
    const first = amount / (tau * (1 - Math.exp(-duration / tau)));
    const balance = (t: number, y: readonly number[]): number[] => {
      const a = molar('He', y[0] ?? NaN, y[1] ?? NaN);
      const b = molar('He', y[3] ?? NaN, y[4] ?? NaN);
      const flow = a === b ? 0 : exactDoorwayExchange(0.8, 2, Math.max(a, b), Math.min(a, b), 0.75);
      const release = first * Math.exp(-t / tau);
      const out = fresh + release;
      const between = exchanged(y, flow, [pair.a, pair.b]);
      const into = [release, fresh * outdoorAir.carbonDioxide, fresh * outdoorAir.oxygen];
      return between.map((value, i) =>
        i < 3 ? value + ((into[i] ?? NaN) - out * (y[i] ?? NaN)) / pair.a : value,
      );
    };
    const start = [...room(0, 0.2095), ...room(0, 0.2095)];
    expect(disagreement(input, 'He', start, balance)).toBeLessThan(AGREES_ACROSS);
  });
});
