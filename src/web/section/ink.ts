/**
 * Colours of drawings and sheets, the same on page and paper. Meaning never rests on them alone. The
 * accent is that of the pages: `--accent` in templates/styles/stillair.css.
 */
export const ink = '#1a1a17';
export const softInk = '#55534c';
export const hairline = '#b9b5a8';
export const accent = '#7a2e1d';
