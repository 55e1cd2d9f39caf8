import { loadGasLibrary } from '../../src/catalogue/gas-library.js';
import { purityFromNote } from '../../src/science/acoustics/purity.js';
import { mixtureState } from '../../src/science/gases/mixture-state.js';
import { knownGas } from '../../src/science/gases/known-gas.js';

const library = loadGasLibrary();

interface Rate {
  readonly perSecond: number;
  readonly heapGrowthBytes: number;
}

/** Calls per second of one core, after warming up, and what stays on the heap. */
function rateOf(call: (index: number) => number, seconds: number): Rate {
  let sink = 0;
  for (let index = 0; index < 2000; index += 1) sink += call(index);
  const heapBefore = process.memoryUsage().heapUsed;
  const start = performance.now();
  let count = 0;
  while (performance.now() - start < seconds * 1000) {
    for (let index = 0; index < 500; index += 1) sink += call(count + index);
    count += 500;
  }
  const elapsed = (performance.now() - start) / 1000;
  if (Number.isNaN(sink)) throw new Error('the bench computed nothing');
  return {
    perSecond: count / elapsed,
    heapGrowthBytes: process.memoryUsage().heapUsed - heapBefore,
  };
}

/** Dry-mixture shares of 30 % helium in humid air: the same six components for both contenders. */
const composition = { He: 0.3, air: 0.7 };
const components = ['N2', 'O2', 'Ar', 'CO2', 'H2O', 'He'].map((id) => knownGas(library, id, ''));
const shares = [0.540_2, 0.144_9, 0.006_5, 0.000_3, 0.008_1, 0.3];
const temperatureAt = (index: number) => 290 + (index % 1000) / 100;

/**
 * The plain contender: heat capacities, pure virials and the same number of cross polynomials
 * (0, 1, 2, 3 and 8th inverse power), written out with no abstraction and no checks.
 */
function plainSpeed(T: number, p: number): number {
  let M = 0;
  let cp = 0;
  let B = 0;
  let tb1 = 0;
  let t2b2 = 0;
  const th = 300 / T;
  for (let i = 0; i < components.length; i += 1) {
    const gas = components[i];
    const x = shares[i] ?? 0;
    if (gas === undefined) continue;
    const a = gas.heatCapacity.coefficients;
    const b = gas.secondVirial.coefficientsM3PerMol;
    M += x * gas.molarMass.molarMassKgPerMol;
    cp +=
      x *
      ((a[0] ?? 0) / (T * T) +
        (a[1] ?? 0) / T +
        (a[2] ?? 0) +
        T * ((a[3] ?? 0) + T * ((a[4] ?? 0) + T * ((a[5] ?? 0) + T * (a[6] ?? 0)))));
    const [b0 = 0, b1 = 0, b2 = 0, b3 = 0, b4 = 0] = b;
    B += x * x * (b0 + th * (b1 + th * (b2 + th * (b3 + th * b4))));
    tb1 -= x * x * th * (b1 + th * (2 * b2 + th * (3 * b3 + th * 4 * b4)));
    t2b2 += x * x * th * (2 * b1 + th * (6 * b2 + th * (12 * b3 + th * 20 * b4)));
    for (let j = i + 1; j < components.length; j += 1) {
      const r = 140 / T;
      const r2 = r * r;
      const r8 = r2 * r2 * r2 * r2;
      const weight = 2 * x * (shares[j] ?? 0) * 9e-5;
      B += weight * (0.1445 - 0.33 * r - 0.1385 * r2 - 0.0121 * r2 * r - 0.000607 * r8);
      tb1 += weight * (0.33 * r + 0.277 * r2 + 0.0363 * r2 * r + 0.004856 * r8);
      t2b2 -= weight * (0.66 * r + 0.831 * r2 + 0.1452 * r2 * r + 0.043704 * r8);
    }
  }
  const RT = 8.314462618 * T;
  const rho = (2 * p) / RT / (1 + Math.sqrt(1 + (4 * B * p) / RT));
  const slope = 1 + (B + tb1) * rho;
  const cv = cp - 1 - rho * (2 * tb1 + t2b2);
  const water = Math.exp(
    -2836.5744 / (T * T) -
      6028.076559 / T +
      19.54263612 -
      0.02737830188 * T +
      2.7150305 * Math.log(T),
  );
  return Math.sqrt((RT / M) * (1 + 2 * B * rho + (slope * slope) / cv)) + 0 * water;
}

/** Lines of the bench: rates, ratio to the plain contender, heap. */
export function benchGas(seconds = 1): readonly string[] {
  const at = (T: number) =>
    mixtureState(library, {
      composition,
      temperatureK: T,
      pressurePa: 101_325,
      relativeHumidity: 0.5,
    }).speedOfSoundMPerS;
  const varied = rateOf((index) => at(temperatureAt(index)), seconds);
  const fixed = rateOf(() => at(293.15), seconds);
  const plain = rateOf((index) => plainSpeed(temperatureAt(index), 101_325), seconds);
  const purity = rateOf((index) => {
    const answer = purityFromNote(library, {
      gas: 'He',
      temperatureK: 293.15,
      pressurePa: 101_325,
      relativeHumidity: 0.5,
      frequencyInAirHz: 315,
      frequencyMeasuredHz: 500 + (index % 300),
    });
    return answer.possible ? answer.gasFraction : 0;
  }, seconds);
  const thousands = ({ perSecond }: Rate) => `${(perSecond / 1000).toFixed(1)} thousand/s`;
  const heap = ({ heapGrowthBytes }: Rate) => `heap ${(heapGrowthBytes / 1e6).toFixed(1)} MB`;
  return [
    `mixture of six components, humid, new temperature each call: ${thousands(varied)}, ${heap(varied)}`,
    `the same at one temperature: ${thousands(fixed)}, ${heap(fixed)}`,
    `plain polynomials without checks: ${thousands(plain)}, ratio ${(plain.perSecond / varied.perSecond).toFixed(2)} to new temperatures, ${(plain.perSecond / fixed.perSecond).toFixed(2)} to one`,
    `purity inversions: ${thousands(purity)}, ${heap(purity)}`,
  ];
}
