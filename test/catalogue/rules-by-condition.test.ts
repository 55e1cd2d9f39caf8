import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { factKinds, facts, type Fact } from '../../src/assessment/catalogue-types.js';
import { conditionHolds, type FactValues } from '../../src/assessment/condition-holds.js';
import { loadCatalogue } from '../../src/catalogue/catalogue.js';

const { rulePacks, cautions, commonRules } = loadCatalogue();

/** Every fact settled, all quiet: nothing is released and nobody is there. */
const quiet: FactValues = Object.fromEntries(
  facts.map((fact): [Fact, boolean | number | string[]] => {
    const kind = factKinds[fact];
    if (kind === 'truth') return [fact, false];
    if (kind === 'list') return [fact, []];
    return [fact, fact === 'lowestOxygenFraction' ? 0.2095 : 0];
  }),
);

function rulesOf(packId: string, values: FactValues): string[] {
  const pack = rulePacks.find(({ id }) => id === packId);
  if (!pack) throw new Error(`no rule pack ${packId}`);
  return pack.rules.filter(({ when }) => conditionHolds(when, values)).map(({ id }) => id);
}

const heliumPipe: FactValues = {
  ...quiet,
  gasesReleased: ['He'],
  gasesPresent: ['He'],
  occupied: true,
  publicPresent: true,
  indoors: true,
  pressurised: true,
};

describe('rules apply by condition', () => {
  test('a helium pipe in a British hall cites cylinders and ventilation, not dry ice, cryogen or F-gas', () => {
    const cited = rulesOf('gb', heliumPipe);
    expect(cited).toContain('gb-cylinder-handling');
    expect(cited).toContain('gb-ventilation');
    expect(cited).toContain('gb-dsear-assess');
    for (const id of [
      'gb-dry-ice-vehicle',
      'gb-cryogen',
      'gb-sf6-no-deliberate-release',
      'gb-nitrous-oxide-control',
      'gb-coshh-assess',
      'gb-carriage',
    ]) {
      expect(cited).not.toContain(id);
    }
  });

  test('dry ice in a van adds the asphyxiation mark of ADR 5.5.3 in Great Britain and the EU', () => {
    const van = { ...heliumPipe, vehicle: true, cold: true, dryIce: true, gasesPresent: ['CO2'] };
    expect(rulesOf('gb', van)).toContain('gb-dry-ice-vehicle');
    expect(rulesOf('eu', van)).toContain('eu-dry-ice');
    expect(rulesOf('gb', { ...van, vehicle: false })).not.toContain('gb-dry-ice-vehicle');
  });

  test('letting out sulfur hexafluoride needs authority in Great Britain, the EU and California', () => {
    const values = { ...heliumPipe, gasesReleased: ['SF6'], gasesPresent: ['SF6'] };
    for (const [packId, region] of [
      ['gb', 'GB'],
      ['eu', 'IE'],
      ['us', 'US-CA'],
    ] as const) {
      const pack = rulePacks.find(({ id }) => id === packId);
      const needing = pack?.rules.filter(
        ({ when, needsAuthority }) =>
          needsAuthority === true && conditionHolds(when, { ...values, region: [region] }),
      );
      expect(needing?.length).toBeGreaterThan(0);
    }
  });

  test('German and French rules stay with their country, and both are cited where it is unknown', () => {
    const show = { ...heliumPipe, employer: true };
    const national = (values: FactValues) =>
      new Set(
        rulesOf('eu', values)
          .filter((id) => /^(de|fr)-/.test(id))
          .map((id) => id.slice(0, 2)),
      );
    expect([...national({ ...show, region: ['DE'] })]).toEqual(['de']);
    expect([...national({ ...show, region: ['FR'] })]).toEqual(['fr']);
    expect([...national({ ...show, region: ['IE'] })]).toEqual([]);
    const { region: _unsettled, ...unknown } = show;
    expect([...national(unknown)].sort()).toEqual(['de', 'fr']);
  });

  test('indoor carbon dioxide above 100 lb (45 kg) meets the US fire code, 40 kg above ground does not', () => {
    const values = { ...heliumPipe, gasesPresent: ['CO2'], gasesReleased: ['CO2'] };
    expect(rulesOf('us', { ...values, carbonDioxideKg: 46 })).toContain('us-fire-code-co2');
    expect(rulesOf('us', { ...values, carbonDioxideKg: 40 })).not.toContain('us-fire-code-co2');
    expect(rulesOf('us', { ...values, carbonDioxideKg: 40, belowGround: true })).toContain(
      'us-fire-code-co2',
    );
  });

  test('settling nothing cites every rule, sign and caution: the unknown leans towards the duty', () => {
    for (const pack of rulePacks) expect(rulesOf(pack.id, {})).toHaveLength(pack.rules.length);
    expect(cautions.filter(({ when }) => !conditionHolds(when, {}))).toEqual([]);
    expect(commonRules.signs.filter(({ when }) => !conditionHolds(when, {}))).toEqual([]);
  });

  test('forgetting a fact never drops a rule', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...rulePacks.map(({ id }) => id)),
        fc.constantFrom(...facts),
        fc.subarray(['He', 'CO2', 'SF6', 'H2', 'N2O', 'N2']),
        fc.subarray([...facts].filter((fact) => factKinds[fact] === 'truth')),
        (packId, forgotten, gases, trueFacts) => {
          const settled: FactValues = {
            ...quiet,
            gasesReleased: gases,
            gasesPresent: gases,
            ...Object.fromEntries(trueFacts.map((fact) => [fact, true])),
          };
          const rest = Object.fromEntries(
            Object.entries(settled).filter(([fact]) => fact !== forgotten),
          );
          const withoutIt = rulesOf(packId, rest);
          expect(rulesOf(packId, settled).filter((id) => !withoutIt.includes(id))).toEqual([]);
        },
      ),
      { seed: 20_250_101, numRuns: 200 },
    );
  });
});

describe('cautions print with what they warn of', () => {
  const printed = (values: FactValues) =>
    cautions.filter(({ when }) => conditionHolds(when, values)).map(({ id }) => id);

  test('the twelve standard cautions stand on every sheet', () => {
    const standard = cautions.filter(({ group }) => group === 'standard').map(({ id }) => id);
    expect(standard).toHaveLength(12);
    expect(printed(quiet)).toEqual(expect.arrayContaining(standard));
  });

  test('carbon dioxide brings the ppm caution, helium the capillary-cell caution, and not each other’s', () => {
    const ice = printed({ ...quiet, gasesPresent: ['CO2'], cold: true, dryIce: true });
    expect(ice).toEqual(expect.arrayContaining(['carbon-dioxide-poison', 'dry-ice-idle']));
    expect(ice).not.toContain('meter-capillary');
    const light = printed(heliumPipe);
    expect(light).toEqual(expect.arrayContaining(['helium-pure', 'meter-capillary']));
    expect(light).not.toContain('carbon-dioxide-poison');
  });

  test('a caution about recordings prints only when recordings are played', () => {
    expect(printed(quiet)).not.toContain('recording-not-copied');
    expect(printed({ ...quiet, demonstrations: ['recorded-voices'] })).toContain(
      'recording-not-copied',
    );
  });
});
