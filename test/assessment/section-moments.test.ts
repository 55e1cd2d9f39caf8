import { readFileSync } from 'node:fs';
import { parse } from 'yaml';
import { beforeAll, describe, expect, it } from 'vitest';
import { assess, checkedPlan } from '../../src/assessment/assess.js';
import type { Assessment } from '../../src/assessment/assessment.js';
import { engineVersion } from '../../src/assessment/engine-version.js';
import { loadCatalogue } from '../../src/catalogue/catalogue.js';
import { loadGasLibrary } from '../../src/catalogue/gas-library.js';

const data = { gases: loadGasLibrary(), catalogue: loadCatalogue(), engineVersion };
const example = new URL('../../templates/examples/brackenfell.yaml', import.meta.url);

describe('the moments of a planned day', () => {
  let judged: Assessment;
  beforeAll(() => {
    judged = assess(checkedPlan(parse(readFileSync(example, 'utf8')), data), data);
  });

  it('holds every begin of every act, in the order of time, and the worst of both cases', () => {
    const { moments } = judged.section;
    const planned = moments.filter(({ caseName }) => caseName === 'planned');
    const times = planned.map(({ atS }) => atS);
    expect(times).toEqual(times.toSorted((a, b) => a - b));
    for (const { atS, act, title } of judged.events) {
      if (act === null) continue;
      const moment = planned.find((one) => one.atS === atS && one.kind === 'cue');
      expect(moment?.title).toContain(`${title} begins`);
    }
    const worst = moments.filter(({ kind }) => kind === 'worst').map(({ caseName }) => caseName);
    expect(worst).toEqual(['planned', 'worstCredible']);
  });

  it('never lets the bound lie above what is breathed, and says both for every zone', () => {
    for (const { zones } of judged.section.moments) {
      expect(zones.map(({ id }) => id)).toEqual(judged.section.zones.map(({ id }) => id));
      for (const { oxygen, oxygenBound } of zones) {
        expect(oxygenBound?.value).toBeLessThanOrEqual((oxygen?.value ?? 0) + 1e-9);
      }
    }
  });

  it('repeats the section itself at its worst planned moment', () => {
    const { moments, layers, moment } = judged.section;
    const worst = moments.find(({ kind }) => kind === 'worst');
    expect(worst?.layers).toEqual(layers);
    expect(moment).toContain(worst?.title);
  });

  it('draws curves of the planned and the worst credible case that reach their worst value', () => {
    for (const zone of judged.zones) {
      for (const { quantity, caseName, answers, readings } of zone.quantities) {
        const worst = readings.filter(({ why }) => why.some(({ what }) => what === 'worst'));
        for (const reading of worst) {
          for (const { answer, what } of reading.why) {
            if (what === 'worst') expect(reading.values[answer]).toBe(answers[answer]?.value);
          }
        }
        if (caseName === 'fansOff' || zone.kind === 'floorLevelCheck') continue;
        const drawn = zone.series.filter(
          (one) => one.caseName === caseName && one.quantity === quantity,
        );
        expect(drawn.map(({ answer }) => answer)).toEqual(
          expect.arrayContaining(Object.keys(answers)),
        );
      }
    }
  });
});
