import { gasByFlushing, gasBySqueezing } from '../science/acoustics/smallest-amount.js';
import type { Figure } from './assessment.js';
import { plainFigure } from './figures.js';
import { planRanges } from './plan-ranges.js';
import { soundFigure, type SoundCase } from './sound-context.js';

/** Volume of the bag, where the plan gives one that can be filled. */
export function bagVolume(one: SoundCase): number | null {
  const bag = soundFigure(one, 'bagVolumeM3', planRanges.gasVolumeM3)?.value ?? 0;
  return bag >= 1e-6 && bag <= 1000 ? bag : null;
}

/** From here on flushing needs so much gas that it is no way to fill a bag. */
const mostByFlushing = 0.9999;

/** Gas to bring a bag to a share: pressed flat first, and flushed while it mixes. */
export function bagAmounts(
  bagM3: number | null,
  share: number,
): { readonly amount: Figure | null; readonly amountByFlushing: Figure | null } {
  if (bagM3 === null) return { amount: null, amountByFlushing: null };
  const inputs = [
    { name: 'bag volume', value: bagM3, unit: 'm3' },
    { name: 'share of gas', value: share, unit: 'mol/mol' },
  ];
  const words = { source: 'well-mixed-dilution', inputs };
  return {
    amount: plainFigure(gasBySqueezing(bagM3, share), 'm3', {
      ...words,
      method: 'gas for a bag pressed flat first',
      formula: 'gas = x V',
      range: 'no air left in the flat bag, nothing lost while filling',
    }),
    amountByFlushing:
      share > mostByFlushing
        ? null
        : plainFigure(gasByFlushing(bagM3, share), 'm3', {
            ...words,
            method: 'gas for a bag flushed while it mixes',
            formula: 'gas = V ln(1/(1 - x))',
            range: 'instant mixing, as much leaves as enters; a real bag takes more',
          }),
  };
}
