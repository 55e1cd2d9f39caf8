import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { judgedLevels, type JudgedLevel } from '../../src/assessment/levels.js';
import { InvalidInput } from '../../src/errors.js';
import type { PlanFile } from '../../src/assessment/plan-file.js';
import { data } from '../support/plans.js';

type HouseRules = NonNullable<PlanFile['venue']['site']['houseRules']>;

function levels(
  rulePack: string,
  kind: 'public' | 'crew' = 'public',
  houseRules: HouseRules = [],
  gases: readonly string[] = ['CO2', 'SF6', 'O2', 'H2', 'He'],
): ReadonlyMap<string, JudgedLevel> {
  const pack = data.catalogue.rulePacks.find((one) => one.id === rulePack);
  if (!pack) throw new Error(`no pack ${rulePack}`);
  const { policy, commonRules: common } = data.catalogue;
  const found = judgedLevels(
    { policy, pack, common, houseRules, region: undefined },
    gases,
    kind,
    (gas) => gas in data.gases.species,
  );
  return new Map(found.map((level) => [level.quantity, level]));
}

const values = (level: JudgedLevel | undefined) => [
  level?.aim.value,
  level?.limit.value,
  level?.never.value,
];
const packs = data.catalogue.rulePacks.map((pack) => pack.id);

describe('the levels that judge', () => {
  it('are those of the policy for oxygen and carbon dioxide under the international pack', () => {
    const found = levels('international');
    expect(values(found.get('oxygenFraction'))).toEqual([0.2, 0.195, 0.18]);
    expect(values(found.get('CO2'))).toEqual([0.005, 0.015, 0.03]);
    expect(found.get('CO2')?.limit.statistic).toBe('mean15Min');
    expect(found.get('CO2')?.never.statistic).toBe('mean1Min');
    expect(found.get('CO2')?.aim.statistic).toBe('peak');
  });

  it('take the 8-hour value, the 15-minute value and ten times the 8-hour value for another gas', () => {
    expect(values(levels('gb').get('SF6'))).toEqual([0.001, 0.00125, 0.01]);
    // No 15-minute value in this pack: three times the 8-hour value.
    const [aim, limit, never] = values(levels('us').get('SF6'));
    expect(aim).toBe(0.001);
    expect(limit).toBeCloseTo(0.003, 12);
    expect(never).toBeCloseTo(0.01, 12);
  });

  it.each(packs)('are never looser than the policy under the pack %s', (pack) => {
    for (const level of levels(pack).values()) {
      const row = data.catalogue.policy.levels.find((one) => one.quantity === level.quantity);
      for (const name of ['aim', 'limit', 'never'] as const) {
        const own = row?.[name].value;
        if (own === undefined) continue;
        if (level.failsWhen === 'below') expect(level[name].value).toBeGreaterThanOrEqual(own);
        else expect(level[name].value).toBeLessThanOrEqual(own);
      }
    }
  });

  it.each(packs)('stand in order under the pack %s: aim before limit before never', (pack) => {
    for (const { failsWhen, aim, limit, never } of levels(pack).values()) {
      const sign = failsWhen === 'below' ? -1 : 1;
      expect(sign * aim.value).toBeLessThanOrEqual(sign * limit.value);
      expect(sign * limit.value).toBeLessThanOrEqual(sign * never.value);
    }
  });

  it('have the aim at the limit for crew', () => {
    for (const level of levels('gb', 'crew').values()) expect(level.aim).toEqual(level.limit);
  });

  it('are tightened and never loosened by any usable house rule', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...packs),
        fc.double({ min: 0.001, max: 0.2094, noNaN: true }),
        fc.double({ min: 0.0005, max: 1, noNaN: true }),
        (pack, oxygen, carbonDioxide) => {
          const rules: HouseRules = [
            { title: 'house oxygen', quantity: 'oxygenFraction', limit: oxygen },
            { title: 'house carbon dioxide', quantity: 'CO2', limit: carbonDioxide },
          ];
          const before = levels(pack);
          for (const [quantity, level] of levels(pack, 'public', rules)) {
            const known = before.get(quantity);
            for (const name of ['aim', 'limit', 'never'] as const) {
              const sign = level.failsWhen === 'below' ? -1 : 1;
              expect(sign * level[name].value).toBeLessThanOrEqual(
                sign * (known?.[name].value ?? Infinity),
              );
            }
          }
        },
      ),
      { numRuns: 30 },
    );
  });

  it('hold a gas that only the house limits', () => {
    const found = levels('gb', 'public', [{ title: 'no helium', quantity: 'He', limit: 0.01 }]);
    expect(values(found.get('He'))).toEqual([0.01, 0.01, 0.01]);
  });

  it.each([
    ['a limit in percent', 'oxygenFraction', 19.5],
    ['a limit that fresh air fails', 'oxygenFraction', 0.2095],
    ['a limit in ppm', 'CO2', 5000],
    ['a limit below outdoor air', 'CO2', 0.0004],
    ['a quantity that nothing is judged by', 'mood', 0.5],
  ])('refuse a house rule with %s, naming its place', (_, quantity, limit) => {
    let thrown: unknown;
    try {
      levels('gb', 'public', [{ title: 'odd', quantity, limit }]);
    } catch (caught) {
      thrown = caught;
    }
    expect(thrown).toBeInstanceOf(InvalidInput);
    const [detail] = (thrown as InvalidInput).details;
    expect(detail?.path).toMatch(/^\/venue\/site\/houseRules\/0\/(limit|quantity)$/);
  });
});
