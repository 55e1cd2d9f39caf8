import type { Typesetter } from '../../src/sheets/layout/lines.js';

/** A typesetter without fonts: every letter is half as wide as it is high. */
export const ruler: Typesetter = {
  chain: () => ['near', 'far'],
  has: (font, codePoint) => (font === 'near' ? codePoint < 0x250 : codePoint < 0x3000),
  width: (text, _font, size) => Array.from(text).length * size * 0.5,
};
