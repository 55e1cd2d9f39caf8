import { describe, expect, it } from 'vitest';
import { chartSvg } from '../../../src/web/charts/chart-svg.js';
import { curveOption } from '../../../src/web/charts/curve-option.js';
import { clockText, zoneCurve, zoneCurveText } from '../../../src/web/charts/zone-curve.js';
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
    const svg = chartSvg(curveOption(curve('oxygen')), 600, 250).replaceAll('\u00a0', ' ');
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
    const svg = chartSvg(curveOption(curve('oxygen')), 600, 250);
    expect(svg).toMatch(/stroke-dasharray="9,4"/);
  });

  it('leaves no style attribute, style sheet or class for a content policy to refuse', () => {
    const svg = chartSvg(curveOption(curve('oxygen')), 600, 250);
    expect(svg).not.toMatch(/<style|style=|class=/);
    expect(svg).toContain('font-family="Atkinson Hyperlegible, sans-serif"');
  });

  it('gives the same text for the same option, however often it was drawn before', () => {
    const draw = (): string => chartSvg(curveOption(curve('CO2')), 600, 250);
    expect(draw()).toBe(draw());
  });
});

describe('clockText', () => {
  it('counts on past midnight', () => {
    expect([clockText(19.5 * 3600), clockText(25 * 3600)]).toEqual(['19:30', '01:00']);
  });
});
