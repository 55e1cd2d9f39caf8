import type { Assessment, Figure } from '../../assessment/assessment.js';
import { quantityText, spanText, type Rounding } from '../../assessment/figure-text.js';

/** The figure for a cell: the value, and its span on lines of its own. */
export function figureWords(figure: Figure, rounding?: Rounding): string {
  const span = spanText(figure);
  const value = quantityText(figure.value, figure.unit, rounding);
  return span === undefined ? value : `${value}\n(${span.replace(' to ', '\nto\u00a0')})`;
}

/** The figure with its span after it, for a cell that has the width or the lines. */
export const figureOnLine = (figure: Figure, rounding?: Rounding): string =>
  figureWords(figure, rounding).replaceAll('\n', ' ');

/** The figure, or a dash where there is none to show. */
export const figureOrDash = (figure: Figure | null | undefined, rounding?: Rounding): string =>
  figure === null || figure === undefined ? '–' : figureWords(figure, rounding);

/** A level as it is set, not rounded to a safe side. */
export const levelWords = (figure: Figure): string =>
  quantityText(figure.value, figure.unit, 'nearest');

/** Titles of acts by id; an id without an act stays as it is. */
export function actTitle(assessment: Assessment, id: string): string {
  return assessment.acts.find((act) => act.id === id)?.title ?? id;
}

/** Titles of zones by id; an id without a zone stays as it is. */
export function zoneTitle(assessment: Assessment, id: string): string {
  return assessment.zones.find((zone) => zone.id === id)?.title ?? id;
}
