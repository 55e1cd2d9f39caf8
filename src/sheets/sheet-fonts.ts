import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { Weight } from './text-runs.js';

/** The fonts of a sheet: one hyperlegible family, and behind it one that has the rest of the signs. */

const folder = new URL('../../templates/fonts/', import.meta.url);

const fontFiles = {
  regular: 'atkinson-hyperlegible-regular.ttf',
  strong: 'atkinson-hyperlegible-bold.ttf',
  'wide-regular': 'DejaVuSans.ttf',
  'wide-strong': 'DejaVuSans-Bold.ttf',
} as const;

export type FontKey = keyof typeof fontFiles;
export const fontKeys = Object.keys(fontFiles) as FontKey[];

const chains: Record<Weight, readonly FontKey[]> = {
  regular: ['regular', 'wide-regular'],
  strong: ['strong', 'wide-strong'],
};

/** Font keys to try in order. */
export const fontChain = (weight: Weight): readonly FontKey[] => chains[weight];

const read = new Map<FontKey, Buffer>();

/** The bytes of a font file, read once. */
export function fontBytes(key: FontKey): Buffer {
  const known = read.get(key);
  if (known !== undefined) return known;
  const bytes = readFileSync(fileURLToPath(new URL(fontFiles[key], folder)));
  read.set(key, bytes);
  return bytes;
}
