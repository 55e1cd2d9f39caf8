import { describe, expect, it } from 'vitest';
import { airModel } from '../../../src/science/room-air/air-model.js';
import type { AirRelease } from '../../../src/science/room-air/air-input.js';
import { jetLength, volumeRichardson } from '../../../src/science/room-air/momentum.js';
import { RELEASE_MANNERS, startsAsLayer } from '../../../src/science/room-air/release-manner.js';
import { boundReleases } from '../../../src/science/room-air/zone-bound.js';
import { checkGases, checkInput } from '../../support/air-fixture.js';

/** Own derivation on mixed or stratified air; criterion of Cleaver, Marshall and Linden 1994. */
function layered(release: Omit<AirRelease, 'space'>): boolean | undefined {
  const input = checkInput({
    durationS: 600,
    spaces: [{ id: 'hall', floorAreaM2: 96, heightM: 4 }],
    releases: [{ space: 'hall', ...release }],
  });
  return boundReleases(airModel(input, checkGases))[0]?.startsLayered;
}

describe('mixed or stratified', () => {
  it('lets balloon bursts, leaking bags, open hoses, pours, fog and spills lie as a layer', () => {
    for (const manner of ['burst', 'gentle', 'pour', 'fog', 'spill'] as const) {
      expect(layered({ gas: 'He', volumeM3: 0.24, manner })).toBe(true);
    }
    // Nobody said how: it may lie as a layer.
    expect(layered({ gas: 'He', volumeM3: 0.24 })).toBe(true);
  });

  it('thins a burst at least tenfold before it lies there, a pour at most threefold', () => {
    expect(RELEASE_MANNERS.burst.dilutionLow).toBeGreaterThanOrEqual(10);
    expect(RELEASE_MANNERS.pour.dilutionHigh).toBeLessThanOrEqual(3);
    for (const { dilutionLow, dilution, dilutionHigh } of Object.values(RELEASE_MANNERS)) {
      expect(dilutionLow).toBeLessThan(dilution);
      expect(dilution).toBeLessThan(dilutionHigh);
    }
  });

  it('mixes the hiss of a valve whose bore nobody gave', () => {
    expect(layered({ gas: 'He', volumeM3: 1.2, durationS: 600, manner: 'jet' })).toBe(false);
  });

  it('tells a jet of known bore by Ri_v: 6856 from 100 mm is a layer, 0.089 from 6 mm is not', () => {
    // AC-L05: 0.002 m3/s of helium in 384 m3.
    const jet = { gas: 'He', volumeM3: 1.2, durationS: 600, manner: 'jet' } as const;
    expect(layered({ ...jet, outletDiameterM: 0.1 })).toBe(true);
    expect(layered({ ...jet, outletDiameterM: 0.006 })).toBe(false);
    // Above 10 mm the criterion alone decides: its turn lies where Ri_v is 1.
    const bore = 0.006 * (1 / 0.089) ** 0.25;
    expect(layered({ ...jet, outletDiameterM: 1.02 * bore })).toBe(true);
    expect(layered({ ...jet, outletDiameterM: 0.98 * bore })).toBe(false);
  });

  it('does not let a bore undo the manner of what is no jet', () => {
    expect(layered({ gas: 'He', volumeM3: 1.2, durationS: 600, outletDiameterM: 0.006 })).toBe(
      true,
    );
  });

  it('stirs a layer of metres with a hiss through less than 10 mm', () => {
    // 20 L of helium a minute, a brisk regulator, through 2 to 4 mm: momentum rules over metres,
    // or Ri_v says mixed.
    for (const diameterM of [0.002, 0.003, 0.004]) {
      const hiss = {
        flowM3PerS: 0.02 / 60,
        diameterM,
        gasDensityKgPerM3: 0.1664,
        airDensityKgPerM3: 1.2039,
      };
      expect(volumeRichardson(hiss, 300)).toBeLessThan(1);
      expect(startsAsLayer('jet', hiss, 300)).toBe(false);
    }
    // A full valve, 0.02 m3/s through 8 mm.
    const valve = {
      flowM3PerS: 0.02,
      diameterM: 0.008,
      gasDensityKgPerM3: 0.1664,
      airDensityKgPerM3: 1.2039,
    };
    expect(jetLength(valve)).toBeGreaterThan(2);
  });
});
