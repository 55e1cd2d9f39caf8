import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { loadCatalogue } from '../../src/catalogue/catalogue.js';

const { rulePacks, commonRules, policy } = loadCatalogue();

interface Check {
  readonly id: string;
  readonly inputs: Record<string, unknown>;
  readonly expected: Record<string, unknown>;
}
const { records } = JSON.parse(
  readFileSync(new URL('../reference/rule-pack-checks.json', import.meta.url), 'utf8'),
) as { readonly records: readonly Check[] };

function check(id: string): Check {
  const found = records.find((record) => record.id === id);
  if (!found) throw new Error(`no reference record ${id}`);
  return found;
}
function pack(id: string) {
  const found = rulePacks.find((candidate) => candidate.id === id);
  if (!found) throw new Error(`no rule pack ${id}`);
  return found;
}
function row<T extends { readonly id: string }>(rows: readonly T[], id: string): T {
  const found = rows.find((candidate) => candidate.id === id);
  if (!found) throw new Error(`no row ${id}`);
  return found;
}
const numbers = (value: unknown) => value as number[];

describe('limits against published values', () => {
  test('5000 ppm over 8 h and 15 000 ppm over 15 min are the British carbon dioxide limits (EH40/2005)', () => {
    const { exposureLimits } = pack('gb');
    expect(row(exposureLimits, 'gb-co2-8h').value).toBe(5000);
    expect(row(exposureLimits, 'gb-co2-15min').value).toBe(15000);
  });

  test('the German 15-minute value is twice the 8-hour value, excess factor 2(II) (TRGS 900)', () => {
    const { exposureLimits } = pack('eu');
    expect(row(exposureLimits, 'eu-co2-de-15min').value).toBe(
      2 * row(exposureLimits, 'eu-co2-de-8h').value,
    );
  });

  test('every pack limits sulfur hexafluoride to 1000 ppm, 5970 mg/m3 at 25 degrees C (record sf6-ppm-to-mass)', () => {
    const { inputs, expected } = check('sf6-ppm-to-mass');
    const judged = rulePacks.map(({ exposureLimits }) =>
      exposureLimits.find(
        ({ gas, period, role }) => gas === 'SF6' && period === 'eightHour' && role === 'judge',
      ),
    );
    expect(judged.map((limit) => limit?.value)).toEqual(rulePacks.map(() => inputs.sf6_ppm));
    const mass = (1000 * Number(inputs.molarMass_gPerMol)) / 24.45;
    // tolerance of the record: 0.5 %
    expect(Math.abs(mass / (numbers(expected.mass_mgPerM3)[0] ?? 0) - 1)).toBeLessThan(0.005);
  });

  test('the strictest nitrous oxide limit is 25 ppm (record n2o-ppm-to-mass)', () => {
    const lowest = Math.min(
      ...rulePacks.flatMap(({ exposureLimits }) =>
        exposureLimits.filter(({ gas }) => gas === 'N2O').map(({ value }) => value),
      ),
    );
    expect(lowest).toBe(check('n2o-ppm-to-mass').inputs.n2o_ppm);
  });

  test('10 % of the propane limit of 2.1 % is the US danger value (record propane-idlh-from-lfl)', () => {
    const { expected } = check('propane-idlh-from-lfl');
    const danger = row(pack('us').exposureLimits, 'us-c3h8-danger');
    expect(danger.value).toBe(expected.idlh_ppm);
    expect(danger.role).toBe('show');
  });

  test('US fuel-gas rows give 0.5 and 0.25 % methane at a 5 % limit (record methane-ten-percent-lfl)', () => {
    const { inputs, expected } = check('methane-ten-percent-lfl');
    const { flammableThresholds } = pack('us');
    const share = (id: string) =>
      (row(flammableThresholds, id).value / 100) * Number(inputs.lfl_volPct);
    expect(share('us-lfl-10')).toBeCloseTo(Number(expected.tenPct_volPct), 9);
    expect(share('us-lfl-5')).toBeCloseTo(Number(expected.halfOfThat_volPct), 9);
  });

  test('enrichment flags of US, Canada and the British leaflet fall as published (record oxygen-enriched-flags)', () => {
    const { inputs, expected } = check('oxygen-enriched-flags');
    const flags = (packId: string, id: string) =>
      numbers(inputs.oxygen_volPct).map(
        (reading) => reading > row(pack(packId).oxygenThresholds, id).value,
      );
    expect(flags('us', 'us-o2-enriched')).toEqual(expected.us);
    expect(flags('ca', 'ca-fed-o2-high')).toEqual(expected.canada);
    expect(flags('gb', 'gb-o2-enriched-hse')).toEqual(expected.britishLeafletDanger);
  });

  test.each(['altitude-table-lookup-1', 'altitude-table-lookup-3'])(
    'the US respirator table gives the published minimum at each altitude (record %s)',
    (id) => {
      const { inputs, expected } = check(id);
      const rows = pack('us').oxygenThresholds.filter(({ altitudeToM }) => altitudeToM);
      const found = numbers(inputs.altitude_ft).map((feet) => {
        const metres = feet * 0.3048;
        return rows.find(
          ({ altitudeFromM = 0, altitudeToM = 0 }) =>
            metres >= altitudeFromM && metres < altitudeToM,
        );
      });
      expect(found.map((threshold) => threshold?.value)).toEqual(expected.oxygenMin_volPct);
      expect(found.map((threshold) => threshold?.role)).toEqual(found.map(() => 'workersOnly'));
    },
  );

  test('fire-code alarms sound at 5000 and 30 000 ppm (record fire-code-co2-alarms)', () => {
    const { inputs } = check('fire-code-co2-alarms');
    const { alarms } = pack('us');
    expect(row(alarms, 'us-co2-alarm-low').value).toBe(inputs.supervisory_ppm);
    expect(row(alarms, 'us-co2-alarm-high').value).toBe(inputs.room_ppm);
  });

  test('sulfur hexafluoride counts 22 800, 23 500 or 24 300 by the instrument of the pack (IPCC AR4, AR5, AR6)', () => {
    const potential = (id: string) =>
      pack(id).warmingPotentials.find(({ gas }) => gas === 'SF6')?.kgCo2ePerKg;
    expect(potential('gb')).toBe(22800);
    expect(potential('eu')).toBe(24300);
    expect(['us', 'au', 'ca'].map(potential)).toEqual([23500, 23500, 23500]);
  });
});

describe('carriage against published rules', () => {
  const multiplier = (category: number) =>
    commonRules.carriagePoints.multipliers.find(
      ({ transportCategory }) => transportCategory === category,
    )?.multiplier ?? Number.NaN;

  test('four 20 L argon and two 9 L oxygen cylinders count 98 points (record adr-points-inert-and-oxygen)', () => {
    const { inputs, expected } = check('adr-points-inert-and-oxygen');
    const load = inputs.cylinders as {
      gas: string;
      count: number;
      waterCapacity_litre: number;
      category: number;
    }[];
    const categoryOf = (name: string) =>
      commonRules.unNumbers.find((entry) => entry.name === `${name}, compressed`)
        ?.transportCategory ?? -1;
    const points = load.reduce((sum, { gas, count, waterCapacity_litre, category }) => {
      expect(categoryOf(gas)).toBe(category);
      return sum + count * waterCapacity_litre * multiplier(category);
    }, 0);
    expect(points).toBe(expected.points);
    expect(points <= commonRules.carriagePoints.maxPoints).toBe(expected.underLimit);
  });

  test('333 kg of category 2 is within 1000 points, 334 kg is not (record adr-category-2-limit)', () => {
    const { inputs, expected } = check('adr-category-2-limit');
    const points = numbers(inputs.netMass_kg).map((mass) => mass * multiplier(2));
    expect(points).toEqual(expected.points);
    expect(points.map((value) => value <= commonRules.carriagePoints.maxPoints)).toEqual(
      expected.underLimit,
    );
  });

  function withinMass(packId: string, id: string, load: readonly number[]): boolean {
    const { maxEachKg = Infinity, maxTotalKg = 0 } = row(pack(packId).carriageLimits, id);
    const total = load.reduce((sum, mass) => sum + mass, 0);
    return total <= maxTotalKg && load.every((mass) => mass <= maxEachKg);
  }

  test('US materials of trade admit 95, 60 and 40 kg, not 105 kg nor five of 45 kg (49 CFR 173.6)', () => {
    const fits = check('materials-of-trade-ok');
    expect(withinMass('us', 'us-materials-of-trade', numbers(fits.inputs.cylinderGross_kg))).toBe(
      fits.expected.within,
    );
    const { inputs, expected } = check('materials-of-trade-not-ok');
    expect(
      (inputs.loads_kg as number[][]).map((load) =>
        withinMass('us', 'us-materials-of-trade', load),
      ),
    ).toEqual(expected.within);
  });

  test('four containers of 29 kg fit the Canadian 150 kg exemption (record tdg-150-kg)', () => {
    const { inputs, expected } = check('tdg-150-kg');
    expect(withinMass('ca', 'ca-gross-150', numbers(inputs.containerGross_kg))).toBe(
      expected.within,
    );
  });

  test('an airline passenger may carry 2.4 kg of dry ice but not 2.6 kg (record dry-ice-passenger-limit)', () => {
    const { inputs, expected } = check('dry-ice-passenger-limit');
    const { maxTotalKg = 0 } = row(pack('us').carriageLimits, 'us-passenger-dry-ice');
    expect(numbers(inputs.dryIce_kg).map((mass) => mass <= maxTotalKg)).toEqual(expected.within);
  });
});

describe('roles of limit rows', () => {
  const judgingOxygen = rulePacks.flatMap(({ oxygenThresholds }) =>
    oxygenThresholds.filter(({ role }) => role === 'judge'),
  );

  test('fresh air of 20.7 % wet and 20.95 % dry passes every judging oxygen row', () => {
    const failed = judgingOxygen.filter(({ sense, value }) =>
      sense === 'below' ? 20.7 < value : 20.95 > value,
    );
    expect(failed).toEqual([]);
  });

  test('no oxygen pressure judges, since fresh air above 601 m fails 19.76 kPa (record legal-limit-equals-610-m)', () => {
    // P = 101.325 (1 - 2.25577e-5 h)^5.25588 kPa; record: 610 m within 25 m.
    const freshKpa = (metres: number) => 0.2095 * 101.325 * (1 - 2.25577e-5 * metres) ** 5.25588;
    expect(freshKpa(610)).toBeLessThan(0.195 * 101.325);
    expect(freshKpa(585)).toBeGreaterThan(0.195 * 101.325);
    expect(judgingOxygen.filter(({ unit }) => unit !== 'percent')).toEqual([]);
  });

  test('18.0 kPa of oxygen is 17.8 % at sea level, not the 18 % one source prints', () => {
    const { value, unit, meaning } = row(pack('international').oxygenThresholds, 'int-o2-pp-lab');
    expect(unit).toBe('kPa');
    // 1 atm = 101.325 kPa; one digit as printed.
    expect(((value / 101.325) * 100).toFixed(1)).toBe('17.8');
    expect(meaning).toContain('17.8 %');
  });

  test('the German "any drop" row and the ship-entry row of 21 % are notes, not judges', () => {
    expect(row(pack('eu').oxygenThresholds, 'de-o2-any-drop').role).toBe('note');
    expect(row(pack('eu').oxygenThresholds, 'de-o2-excess').role).toBe('show');
    expect(row(pack('international').oxygenThresholds, 'int-o2-sea-entry').role).toBe('note');
  });

  test('worker figures of 17 % and the respirator table are kept from audiences', () => {
    expect(row(pack('eu').oxygenThresholds, 'de-o2-inert-only').role).toBe('workersOnly');
  });

  test('no pack loosens carbon dioxide past 15 000 ppm over 15 min', () => {
    const loose = rulePacks.flatMap(({ exposureLimits }) =>
      exposureLimits.filter(
        ({ gas, period, role, value }) =>
          gas === 'CO2' && period === 'fifteenMinute' && role === 'judge' && value > 15000,
      ),
    );
    expect(loose).toEqual([]);
  });
});

describe('policy against published values', () => {
  const value = (name: string) => policy.defaults.find((entry) => entry.name === name)?.value ?? 0;

  test('10 kg of dry ice gives 5.4 m3 within 2 % (record dry-ice-ten-kilogram)', () => {
    const gas = 10 * value('dryIceGasM3PerKg');
    expect(Math.abs(gas / Number(check('dry-ice-ten-kilogram').expected.gas_m3) - 1)).toBeLessThan(
      0.02,
    );
  });

  test('25 L of liquid nitrogen gives 17.4 m3 within 1 % (record cryogen-gas-volume-ln2)', () => {
    const gas = 25 * value('nitrogenGasM3PerLitre');
    expect(
      Math.abs(gas / Number(check('cryogen-gas-volume-ln2').expected.gas_m3) - 1),
    ).toBeLessThan(0.01);
  });

  test('hazard classes begin at 1e-7, 1e-5, 1e-3 and 1e-1 per hour (record odh-class-lookup)', () => {
    const { inputs, expected } = check('odh-class-lookup');
    const classOf = (rate: number) =>
      policy.deficiencyMethod.classes.find(
        ({ belowPerHour }) => belowPerHour === null || rate < belowPerHour,
      )?.class;
    expect(numbers(inputs.fatalityRate_perHour).map(classOf)).toEqual(expected.odhClass);
  });

  test('the factor runs between 65 and 135 mmHg of oxygen (record odh-factor-anchors)', () => {
    const mmHg = 133.322;
    const [upper = 0, lower = 0] = numbers(check('odh-factor-anchors').inputs.pO2_mmHg);
    expect(policy.deficiencyMethod.noEffectPressurePa / mmHg).toBeCloseTo(upper, 1);
    expect(policy.deficiencyMethod.certainPressurePa / mmHg).toBeCloseTo(lower, 1);
  });
});
