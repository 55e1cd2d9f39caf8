import type { Figure, FigureUnit } from './assessment.js';

/** Which way the last printed digit may move: never towards the comfortable side. */
export type Rounding = 'nearest' | 'down' | 'up';

const noBreak = '\u00a0';
const minus = '\u2212';

// Stored results carry nine significant digits; what lies beyond is the noise of binary fractions,
// and rounding down must not turn a true 19.5 % into 19.4 %.
const settled = (value: number): number => Number(value.toPrecision(9));

function whole(value: number, rounding: Rounding): number {
  const near = settled(value);
  if (rounding === 'down') return Math.floor(near);
  return rounding === 'up' ? Math.ceil(near) : Math.round(near);
}

/** Digits in groups of three from five digits on, with a real minus sign. */
function grouped(digits: string): string {
  const [left = '', right] = digits.replace('-', '').split('.');
  const groups = left.length < 5 ? left : left.replaceAll(/\B(?=(\d{3})+$)/g, noBreak);
  const negative = digits.startsWith('-') && Number(digits) !== 0;
  return `${negative ? minus : ''}${groups}${right === undefined ? '' : `.${right}`}`;
}

function fixed(value: number, decimals: number, rounding: Rounding): string {
  const scale = 10 ** decimals;
  return grouped((whole(value * scale, rounding) / scale).toFixed(decimals));
}

function threeDigits(value: number, rounding: Rounding): string {
  if (value === 0) return '0';
  const decimals = Math.min(12, 2 - Math.floor(Math.log10(Math.abs(settled(value)))));
  const steps = whole(decimals < 0 ? value / 10 ** -decimals : value * 10 ** decimals, rounding);
  // 9.999 rounds to 10.0, which needs one decimal less than 9.99 did.
  const shown = Math.abs(steps) >= 1000 ? decimals - 1 : decimals;
  if (shown < 0) return grouped(String(steps * 10 ** -decimals));
  return grouped((steps / 10 ** decimals).toFixed(shown));
}

function fractionText(value: number, rounding: Rounding): string {
  const ppm = whole(value * 1e5, rounding) * 10;
  if (Math.abs(ppm) < 10_000) return `${grouped(String(ppm))}${noBreak}ppm`;
  return `${fixed(value * 100, 1, rounding)}${noBreak}%`;
}

function timeText(seconds: number, rounding: Rounding): string {
  if (seconds < 0) return `${minus}${timeText(-seconds, rounding)}`;
  const s = whole(seconds, rounding);
  if (s < 60) return `${String(s)}${noBreak}s`;
  if (s < 3600) {
    const rest = s % 60;
    const minutes = `${String(Math.floor(s / 60))}${noBreak}min`;
    return rest === 0 ? minutes : `${minutes} ${String(rest)}${noBreak}s`;
  }
  const minutes = whole(s / 60, rounding);
  const rest = minutes % 60;
  const hours = `${String(Math.floor(minutes / 60))}${noBreak}h`;
  return rest === 0 ? hours : `${hours} ${String(rest)}${noBreak}min`;
}

/** Volumes that a bag or a balloon holds read in litres, drops of gas in millilitres. */
function volumeText(value: number, rounding: Rounding): string {
  const size = Math.abs(value);
  if (size === 0 || size >= 0.1) return `${threeDigits(value, rounding)}${noBreak}m³`;
  return size < 1e-4
    ? `${threeDigits(value * 1e6, rounding)}${noBreak}mL`
    : `${threeDigits(value * 1000, rounding)}${noBreak}L`;
}

/** Air of rooms reads in litres per second, that of halls in cubic metres. */
function flowText(value: number, rounding: Rounding): string {
  return Math.abs(value) < 1
    ? `${threeDigits(value * 1000, rounding)}${noBreak}L/s`
    : `${threeDigits(value, rounding)}${noBreak}m³/s`;
}

interface UnitStyle {
  readonly rounding: Rounding;
  text(value: number, rounding: Rounding): string;
}

const plain = (symbol: string): UnitStyle => ({
  rounding: 'nearest',
  text: (value, rounding) => `${threeDigits(value, rounding)}${symbol && noBreak}${symbol}`,
});

const unitStyles = {
  oxygenFraction: {
    rounding: 'down',
    text: (value, rounding) => `${fixed(value * 100, 1, rounding)}${noBreak}%`,
  },
  gasFraction: { rounding: 'up', text: fractionText },
  s: { rounding: 'up', text: timeText },
  Pa: {
    rounding: 'nearest',
    text: (value, rounding) => `${fixed(value / 1000, 1, rounding)}${noBreak}kPa`,
  },
  Hz: {
    rounding: 'nearest',
    text: (value, rounding) => `${fixed(value, value < 1000 ? 1 : 0, rounding)}${noBreak}Hz`,
  },
  cents: {
    rounding: 'nearest',
    text: (value, rounding) => {
      const digits = fixed(value, 0, rounding);
      const sign = value > 0 && digits !== '0' ? '+' : '';
      return `${sign}${digits}${noBreak}cents`;
    },
  },
  ratio: plain(''),
  K: {
    rounding: 'nearest',
    text: (value, rounding) => `${fixed(value - 273.15, 1, rounding)}${noBreak}°C`,
  },
  people: {
    rounding: 'nearest',
    text: (value, rounding) => grouped(String(whole(value, rounding))),
  },
  kg: plain('kg'),
  mol: plain('mol'),
  m3: { rounding: 'nearest', text: volumeText },
  m: plain('m'),
  m2: plain('m²'),
  m3PerS: { rounding: 'nearest', text: flowText },
  perHour: plain('per hour'),
  mPerS: plain('m/s'),
  kgCO2e: plain('kg CO2e'),
} as const satisfies Record<FigureUnit, UnitStyle>;

/**
 * A number with its unit, as page, sheet and JSON-derived text all print it.
 *
 * Oxygen is rounded down, gas and times up; the rest to the nearest, unless told otherwise (a largest
 * permissible amount is rounded down).
 *
 * @param value in the SI unit of `unit`
 * @example quantityText(0.19496, 'oxygenFraction') // '19.4 %'
 */
export function quantityText(value: number, unit: FigureUnit, rounding?: Rounding): string {
  const style: UnitStyle = unitStyles[unit];
  return style.text(value, rounding ?? style.rounding);
}

/** The span of a figure as text, when it has one. */
export function spanText(figure: Pick<Figure, 'low' | 'high' | 'unit'>): string | undefined {
  const { low, high, unit } = figure;
  if (low !== undefined && high !== undefined) {
    return `${quantityText(low, unit)} to ${quantityText(high, unit)}`;
  }
  if (low !== undefined) return `at least ${quantityText(low, unit)}`;
  return high === undefined ? undefined : `at most ${quantityText(high, unit)}`;
}

/** The figure as text: its value, and its span in brackets when it has one. */
export function figureText(
  figure: Pick<Figure, 'value' | 'low' | 'high' | 'unit'>,
  rounding?: Rounding,
): string {
  const span = spanText(figure);
  const value = quantityText(figure.value, figure.unit, rounding);
  return span === undefined ? value : `${value} (${span})`;
}
