const minus = '\u2212';
const noBreak = '\u00a0';

/** A length of the drawing [m] with two decimals: `0.50 m`. */
export function lengthText(lengthM: number): string {
  const digits = Math.abs(lengthM).toFixed(2);
  const negative = lengthM < 0 && Number(digits) !== 0;
  return `${negative ? minus : ''}${digits}${noBreak}m`;
}

/** A level above or below the datum [m] with its sign: `+0.90 m`, `−2.00 m`, `0.00 m`. */
export function levelText(levelM: number): string {
  const plus = levelM > 0 && levelM.toFixed(2) !== '0.00' ? '+' : '';
  return `${plus}${lengthText(levelM)}`;
}
