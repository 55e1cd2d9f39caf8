/** Colours of drawings, the same on page and paper. Meaning never rests on them alone. */
export const ink = '#1a1a17';
export const softInk = '#55534c';
export const hairline = '#b9b5a8';
export const accent = '#1f4a5f';
