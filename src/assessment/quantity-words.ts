import type { Answer, Figure } from './assessment.js';
import type { JudgedLevel } from './levels.js';

/** Short words for a number inside a sentence of the assessment, with the rounding of the sheets. */
export function shortText(figure: Figure): string {
  const { value, unit } = figure;
  if (unit === 'oxygenFraction') return `${(Math.floor(value * 1000 + 1e-9) / 10).toFixed(1)} %`;
  if (unit === 'gasFraction') {
    if (value < 0.01) return `${String(Math.ceil(value * 1e5 - 1e-9) * 10)} ppm`;
    return `${(Math.ceil(value * 1000 - 1e-9) / 10).toFixed(1)} %`;
  }
  return `${String(Number(value.toPrecision(3)))} ${unit}`;
}

/** A number at which to stop, rounded to the side that stops earlier. */
export function stopText(figure: Figure): string {
  const { value, unit } = figure;
  if (unit === 'oxygenFraction') return `${(Math.ceil(value * 1000 - 1e-9) / 10).toFixed(1)} %`;
  if (unit === 'gasFraction') {
    if (value < 0.01) return `${String(Math.floor(value * 1e5 + 1e-9) * 10)} ppm`;
    return `${(Math.floor(value * 1000 + 1e-9) / 10).toFixed(1)} %`;
  }
  return shortText(figure);
}

export const answerWords = {
  mixed: 'well-mixed',
  layered: 'layered, upper end',
  layeredP50: 'layered, middle',
  bound: 'bound',
} as const satisfies Record<Answer, string>;

/** The quantity as people say it: oxygen, carbon dioxide, or the gas by name. */
export function quantityWords(level: JudgedLevel, nameOf: (gas: string) => string): string {
  if (level.quantity === 'oxygenFraction') return 'oxygen';
  if (level.quantity === 'oxygenEnrichment') return 'oxygen enrichment';
  if (level.quantity.startsWith('fuel:')) return `${nameOf(level.gas ?? '')} as fuel`;
  return nameOf(level.gas ?? level.quantity);
}
