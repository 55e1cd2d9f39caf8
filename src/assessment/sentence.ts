/** The text with a capital at its start, for where it stands alone. */
export const sentence = (text: string): string =>
  `${text.slice(0, 1).toUpperCase()}${text.slice(1)}`;
