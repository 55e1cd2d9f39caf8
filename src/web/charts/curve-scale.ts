import type { FigureUnit } from '../../assessment/assessment.js';
import type { ZoneCurve } from './zone-curve.js';

/** A size in which a curve is drawn, with the room for the names at its right end. */
export interface CurveSize {
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
  /** Most labels along the time axis. */
  readonly mostTimes: number;
}

/** Beside the text, in a phone's width, and on paper. */
export const curveSizes = {
  wide: { width: 600, height: 290, left: 46, right: 128, top: 46, bottom: 44, mostTimes: 7 },
  narrow: { width: 340, height: 280, left: 40, right: 104, top: 46, bottom: 44, mostTimes: 3 },
  paper: { width: 600, height: 200, left: 46, right: 128, top: 42, bottom: 38, mostTimes: 9 },
} as const satisfies Record<string, CurveSize>;

const stepsS = [60, 120, 300, 600, 900, 1800, 3600, 7200, 14_400, 21_600];

/** The time axis of a curve [s after midnight]. */
export interface TimeAxis {
  readonly from: number;
  readonly to: number;
  readonly step: number;
}

export function timeAxis(curve: ZoneCurve, size: CurveSize): TimeAxis {
  const first = Math.min(...curve.series.map((series) => series.timesS[0] ?? 0));
  const to = Math.max(...curve.series.map((series) => series.timesS.at(-1) ?? 0));
  const step = stepsS.find((seconds) => (to - first) / seconds <= size.mostTimes) ?? 43_200;
  return { from: first, to, step };
}

/** The axis of values in the unit shown, which is `factor` times that of the curve. */
export interface ValueAxis {
  readonly factor: number;
  readonly unit: string;
  readonly from: number;
  readonly to: number;
  readonly step: number;
}

/** Percent for oxygen and for much gas, ppm for little. */
function shownUnit(unit: FigureUnit, greatest: number): { factor: number; unit: string } {
  if (unit === 'oxygenFraction') return { factor: 100, unit: '%' };
  if (unit !== 'gasFraction') return { factor: 1, unit: '' };
  return greatest < 0.01 ? { factor: 1e6, unit: 'ppm' } : { factor: 100, unit: '%' };
}

const nearSteps = [1, 2, 2.5, 5, 10];

/** A round step of which about four fit into the span. */
function roundStep(span: number): number {
  const decade = 10 ** Math.floor(Math.log10(span / 4));
  return decade * (nearSteps.find((step) => step * decade >= span / 4) ?? 10);
}

/** A level far beyond the curve would flatten it: it is told in the text instead. */
export function levelsDrawn(curve: ZoneCurve): ZoneCurve['levels'] {
  if (curve.unit === 'oxygenFraction') return curve.levels;
  const greatest = Math.max(...curve.series.flatMap((series) => series.values));
  return curve.levels.filter((level) => level.figure.value <= greatest * 2.5);
}

export function valueAxis(curve: ZoneCurve): ValueAxis {
  const values = curve.series.flatMap((series) => series.values);
  const shown = shownUnit(curve.unit, Math.max(...values));
  const all = [...values, ...levelsDrawn(curve).map(({ figure }) => figure.value)];
  const [least, most] = [Math.min(...all) * shown.factor, Math.max(...all) * shown.factor];
  if (curve.unit === 'oxygenFraction') {
    const step = roundStep(Math.max(0.4, 21 - least));
    const from = Math.max(0, Math.floor((least - step * 0.15) / step) * step);
    return { ...shown, from: Number(from.toFixed(6)), to: Math.max(21, Math.ceil(most)), step };
  }
  const step = roundStep(Math.max(most, 1e-6));
  const ceiling = shown.unit === '%' ? 100 : 1e6;
  const to = Math.min(ceiling, Math.ceil((most * 1.02) / step) * step);
  return { ...shown, from: 0, to: Number(to.toFixed(6)), step };
}
