import type { Answer, Figure } from './assessment.js';
import { quantityText, type Rounding } from './figure-text.js';
import type { JudgedLevel } from './levels.js';

/** A number inside a sentence of the assessment, as page and sheet print it, with plain spaces. */
export function shortText(figure: Figure, rounding?: Rounding): string {
  return quantityText(figure.value, figure.unit, rounding).replaceAll('\u00a0', ' ');
}

/** A number at which to stop, rounded to the side that stops earlier. */
export function stopText(figure: Figure): string {
  if (figure.unit === 'oxygenFraction') return shortText(figure, 'up');
  return shortText(figure, figure.unit === 'gasFraction' ? 'down' : undefined);
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
