/**
 * End correction of an unflanged open pipe end [m].
 *
 *   d = 0.6133 a
 *
 * @param a  inner radius [m]
 * @returns  length to add [m]
 * Source: levine-schwinger-1948. Assumes: k a below about 0.3, thin wall. Accuracy: 0.1 %.
 * @example unflangedEnd(0.015) // 0.0091995
 */
export function unflangedEnd(a: number): number {
  return 0.6133 * a;
}

/**
 * End correction of an open end in a large flat wall [m].
 *
 *   d = 0.8216 a
 *
 * @param a  inner radius [m]
 * @returns  length to add [m]
 * Source: flanged-end. Assumes: k a below about 0.3. Accuracy: 0.1 %.
 * @example flangedEnd(0.0095) // 0.0078052
 */
export function flangedEnd(a: number): number {
  return 0.8216 * a;
}

/**
 * End correction of the mouth of a flue pipe [m].
 *
 *   d = 0.73 S/sqrt(w h), S = pi a^2
 *
 * @param a  inner radius [m]
 * @param w  width of the mouth [m]
 * @param h  height of the mouth, its cut-up [m]
 * @returns  length to add [m]
 * Source: ising-1971. Assumes: no ears or beard. Accuracy: 10 %, which is 1 % to 2 % of the note.
 * @example mouthEnd(0.025, 0.0375, 0.012) // 0.0675688
 */
export function mouthEnd(a: number, w: number, h: number): number {
  return (0.73 * Math.PI * a * a) / Math.sqrt(w * h);
}

/**
 * End correction of the open top of a flue pipe [m].
 *
 *   d = 0.34 sqrt(S), S = pi a^2
 *
 * @param a  inner radius [m]
 * @returns  length to add [m]
 * Source: ising-1971. Assumes: unflanged top. Accuracy: a few percent of itself.
 * @example topEnd(0.025) // 0.0150659
 */
export function topEnd(a: number): number {
  return 0.34 * Math.sqrt(Math.PI) * a;
}
