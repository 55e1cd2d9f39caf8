import type { SectionView } from '../../assessment/assessment.js';
import { figureText, quantityText } from '../../assessment/figure-text.js';
import { sentence } from '../../assessment/sentence.js';
import { lengthText, levelText } from './level-text.js';
import type { MomentView } from './moment-view.js';
import { roofLevel } from './placement.js';
import { sectionWords, type SectionWords } from './section-words.js';

/** What the section drawing shows, in sentences, for those who cannot see it. */
export function sectionText(
  view: SectionView | MomentView,
  words: SectionWords = sectionWords,
): string {
  if (view.spaces.length === 0) return words.empty;
  const titles = new Map(view.spaces.map((space) => [space.id, space.title]));
  const titleOf = (id: string): string => titles.get(id) ?? words.outside;
  const sentences = [`${words.title}. ${view.moment}`.trim().replace(/[^.]$/, '$&.')];
  for (const space of view.spaces) {
    const rake =
      space.floorRiseM > 0 ? `, rising to ${levelText(space.floorLevelM + space.floorRiseM)}` : '';
    sentences.push(
      `${space.title}: ${lengthText(space.lengthM)} long, floor at ${levelText(space.floorLevelM)}${rake}, ceiling at ${levelText(roofLevel(space))}.`,
    );
    for (const zone of view.zones.filter((entry) => entry.space === space.id)) {
      const { oxygen, gas } = spoken(view, zone, words);
      sentences.push(`${zone.title}, breathing at ${levelText(zone.levelM)}: ${oxygen}${gas}.`);
    }
    for (const meter of (view.meters ?? []).filter((entry) => entry.space === space.id)) {
      sentences.push(`${words.meter} ${meter.title} at ${levelText(meter.levelM)}.`);
    }
    for (const layer of view.layers.filter((entry) => entry.space === space.id)) {
      const depth = layer.at === 'whole' ? '' : `, ${lengthText(layer.depthM)} deep`;
      sentences.push(`${words.layers[layer.at]}${depth}: ${figureText(layer.gasFraction)}.`);
    }
  }
  for (const opening of view.openings) {
    sentences.push(
      `Opening from ${titleOf(opening.from)} to ${titleOf(opening.to)}, ${lengthText(opening.heightM)} high or long, sill at ${levelText(opening.sillLevelM)}.`,
    );
  }
  return sentences.map(sentence).join(' ');
}

/** What is said of a zone: the oxygen of the moment, or the extremes of the day. */
function spoken(
  view: SectionView | MomentView,
  zone: SectionView['zones'][number],
  words: SectionWords,
): { readonly oxygen: string; readonly gas: string } {
  if ('breathed' in view) {
    const breathed = view.breathed[zone.id];
    const oxygen = breathed === undefined ? words.noNumber : `${words.oxygen} ${breathed}`;
    return { oxygen, gas: '' };
  }
  const { lowestOxygen: lowest, highestGas } = zone;
  return {
    oxygen:
      lowest === null ? words.noNumber : `lowest oxygen ${quantityText(lowest.value, lowest.unit)}`,
    gas: highestGas === null ? '' : `, highest gas ${figureText(highestGas)}`,
  };
}
