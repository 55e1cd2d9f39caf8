/**
 * Names the models and the table behind a result. Raised whenever a number or a word of any
 * assessment can come out differently; stored with every result and part of its hash.
 */
export const engineVersion = '0.5.0';
