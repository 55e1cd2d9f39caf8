import { describe, expect, it } from 'vitest';
import { chartSvg } from '../../../src/web/charts/chart-svg.js';
import { curveOption } from '../../../src/web/charts/curve-option.js';
import { curveSizes, timeAxis, valueAxis } from '../../../src/web/charts/curve-scale.js';
import { clockText } from '../../../src/assessment/clock-text.js';
import { zoneCurve, zoneCurveText } from '../../../src/web/charts/zone-curve.js';
import { markPlace } from '../../../src/web/islands/moments.js';
import { assessmentFixture } from '../../support/assessment-fixture.js';

const [players] = assessmentFixture.zones;
if (players === undefined) throw new Error('the fixture has lost its zone');
const { events } = assessmentFixture;

function curve(quantity: string) {
  const found = players === undefined ? null : zoneCurve(players, quantity, 'planned', events);
  if (found === null) throw new Error(`no curve for ${quantity}`);
  return found;
}

describe('zoneCurve', () => {
  it('is null where no series was computed', () => {
    expect(zoneCurve(players, 'oxygen', 'fansOff', events)).toBeNull();
  });

  it('leaves out cues that end before the curve starts', () => {
    const early = { atS: 0, untilS: 60, title: 'Load-in', act: null };
    const found = zoneCurve(players, 'oxygen', 'planned', [early, ...events]);
    expect(found?.events.map((event) => event.title)).toEqual(['Bench fog', 'Flue pipe']);
    expect(found?.cues.map(({ number, title }) => [number, title])).toEqual([
      [1, 'Bench fog'],
      [2, 'Flue pipe'],
    ]);
  });
});

describe('zoneCurveText', () => {
  it('says the worst of each answer with its time, the levels and the cues', () => {
    const text = zoneCurveText(curve('oxygen')).replaceAll('\u00a0', ' ');
    expect(text).toContain('Oxygen, Players: well mixed lowest 19.8 % at 20:00');
    expect(text).toContain('inventory bound lowest 17.8 % at 20:00');
    expect(text).toContain('Lines at aim 20.0 %, limit 19.5 %, never 18.0 %');
    expect(text).toContain('Bench fog from 19:42');
  });
});

describe('chartSvg', () => {
  it('draws levels with their names, answers at the ends of their lines and numbered cues', () => {
    const svg = chartSvg(curveOption(curve('oxygen'), curveSizes.wide), 600, 250).replaceAll(
      '\u00a0',
      ' ',
    );
    for (const text of [
      'aim 20.0 %',
      'limit 19.5 %',
      'never 18.0 %',
      'well mixed',
      'inventory bound',
    ]) {
      expect(svg).toContain(text);
    }
    expect(svg).toMatch(/>1<\/text>/);
  });

  it('tells the answers apart by dash as well as by colour', () => {
    const svg = chartSvg(curveOption(curve('oxygen'), curveSizes.wide), 600, 250);
    expect(svg).toMatch(/stroke-dasharray="9,4"/);
  });

  it('leaves no style attribute, style sheet or class for a content policy to refuse', () => {
    const svg = chartSvg(curveOption(curve('oxygen'), curveSizes.wide), 600, 250);
    expect(svg).not.toMatch(/<style|style=|class=/);
    expect(svg).toContain('font-family="Atkinson Hyperlegible, sans-serif"');
  });

  it('gives the same text for the same option, however often it was drawn before', () => {
    const draw = (): string => chartSvg(curveOption(curve('CO2'), curveSizes.wide), 600, 250);
    expect(draw()).toBe(draw());
  });
});

describe('clockText', () => {
  it('counts on past midnight', () => {
    expect([clockText(19.5 * 3600), clockText(25 * 3600)]).toEqual(['19:30', '01:00']);
  });
});

describe('a curve with a band', () => {
  it('draws the median with its band as a filled area, and no line on top of its edge', () => {
    const found = curve('oxygen');
    expect(found.series.map(({ answer }) => answer)).not.toContain('layered');
    const svg = chartSvg(curveOption(found, curveSizes.wide), 600, 290);
    expect(svg).toContain('layered, median');
    expect(svg).toMatch(/fill-opacity="0\.45"/);
  });

  it('draws the layered answer itself where nothing was sampled', () => {
    const series = players.series.filter(({ answer }) => !/P05|P95/.test(answer));
    const found = zoneCurve({ ...players, series }, 'oxygen', 'planned', events);
    expect(found?.series.map(({ answer }) => answer)).toContain('layered');
  });

  it('keeps every number of every line inside the axes, in both sizes', () => {
    for (const quantity of ['oxygen', 'CO2']) {
      const found = curve(quantity);
      const { from, to, factor } = valueAxis(found);
      for (const value of found.series.flatMap(({ values }) => values)) {
        expect(value * factor).toBeGreaterThanOrEqual(from);
        expect(value * factor).toBeLessThanOrEqual(to);
      }
    }
  });

  it('has the worst credible case as a curve of its own', () => {
    const planned = curve('oxygen');
    const worst = zoneCurve(players, 'oxygen', 'worstCredible', events);
    const lowest = (one: typeof planned | null) =>
      Math.min(...(one?.series.flatMap(({ values }) => values) ?? []));
    expect(lowest(worst)).toBeLessThan(lowest(planned));
  });
});

describe('markPlace', () => {
  const frame = { fromS: 1000, toS: 3000, left: 46, right: 472 };

  it('is the left edge at the first time, the right edge at the last and linear between', () => {
    expect(markPlace(1000, frame)).toBe(46);
    expect(markPlace(3000, frame)).toBe(472);
    expect(markPlace(2000, frame)).toBe(259);
  });

  it('is nowhere outside the times of the curve', () => {
    expect(markPlace(999, frame)).toBeNull();
    expect(markPlace(3001, frame)).toBeNull();
  });

  it('stands where the chart draws a cue of that time', () => {
    const found = curve('oxygen');
    const size = curveSizes.wide;
    const { from, to } = timeAxis(found, size);
    const [cue] = found.cues;
    const atS = cue?.events[0]?.atS ?? 0;
    const place = markPlace(atS, {
      fromS: from,
      toS: to,
      left: size.left,
      right: size.width - size.right,
    });
    const svg = chartSvg(curveOption(found, size), size.width, size.height);
    const lines = [...svg.matchAll(/d="M([\d.]+) [\d.]+L([\d.]+) [\d.]+"/g)];
    const upright = lines.filter(([, x1, x2]) => x1 === x2).map(([, x]) => Number(x));
    expect(Math.min(...upright.map((x) => Math.abs(x - (place ?? 0))))).toBeLessThanOrEqual(1);
  });
});
