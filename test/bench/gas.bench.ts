import { loadGasLibrary } from '../../src/catalogue/gas-library.js';
import { purityFromNote } from '../../src/science/acoustics/purity.js';
import type { Composition } from '../../src/science/gases/gas-library.js';
import { mixtureState } from '../../src/science/gases/mixture-state.js';
import { plainMixture } from './plain-mixture.js';
import { ratesOf, rateText } from './rates.js';

const p = 101_325;
const humidity = 0.5;
const helium = 0.3;
const temperatureAt = (index: number): number => 290 + (index % 1000) / 100;

/** Both contenders must give the same numbers, or the comparison means nothing. */
function requireSame(one: number, other: number, name: string): void {
  if (Math.abs(one / other - 1) < 1e-9) return;
  throw new Error(`${name}: ${String(one)} is not ${String(other)}`);
}

/** Lines of the bench: rates, ratio to the plain contender, heap. */
export function benchLines(): readonly string[] {
  const library = loadGasLibrary();
  const plain = plainMixture(library);
  const state = (T: number, composition: Composition) =>
    mixtureState(library, {
      composition,
      temperatureK: T,
      pressurePa: p,
      relativeHumidity: humidity,
    });
  const mixture = { He: helium, air: 1 - helium };
  for (const T of [270, 293.15, 315]) {
    const own = state(T, mixture);
    requireSame(own.speedOfSoundMPerS, plain.speed(T, p, humidity, helium), 'speed of sound');
    requireSame(own.densityKgPerM3, plain.also.densityKgPerM3, 'density');
    requireSame(own.densityRelativeToAir, plain.also.densityRelativeToAir, 'relative density');
    requireSame(own.oxygenFraction, plain.also.oxygenFraction, 'oxygen');
  }
  const humidAir = { air: 1 };
  const rates = ratesOf(
    {
      varied: (index) => state(temperatureAt(index), mixture).speedOfSoundMPerS,
      plain: (index) => plain.speed(temperatureAt(index), p, humidity, helium),
      fixed: (index) => {
        const share = (index % 1000) / 1000;
        return state(293.15, { He: share, air: 1 - share }).speedOfSoundMPerS;
      },
      air: (index) => state(temperatureAt(index), humidAir).speedOfSoundMPerS,
      purity: (index) => {
        const answer = purityFromNote(library, {
          gas: 'He',
          temperatureK: 293.15,
          pressurePa: p,
          relativeHumidity: humidity,
          frequencyInAirHz: 315,
          frequencyMeasuredHz: 500 + (index % 300),
        });
        return answer.possible ? answer.gasFraction : 0;
      },
    },
    { rounds: 7, seconds: 0.4 },
  );
  const ratio = (own: { median: number }) => (rates.plain.median / own.median).toFixed(2);
  return [
    rateText('helium in humid air, six species, a new temperature each call', rates.varied),
    rateText('humid air, five species, a new temperature each call', rates.air),
    rateText('helium in humid air, one temperature, a new share each call', rates.fixed),
    rateText('plain polynomials for six species, no checks, no cache', rates.plain),
    `plain over own: ${ratio(rates.varied)} for six species at new temperatures, ${ratio(rates.fixed)} at one`,
    rateText('purity from a note in helium', rates.purity),
  ];
}
