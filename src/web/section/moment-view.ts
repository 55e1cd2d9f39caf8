import type { SectionMoment, SectionOfDay, SectionView } from '../../assessment/assessment.js';
import { quantityText } from '../../assessment/figure-text.js';
import { clockText } from '../../assessment/clock-text.js';

/** The section with the air of one moment: its layers, and what is breathed then. */
export interface MomentView extends SectionView {
  /** By zone: what is breathed at the moment, and what no rearranging of the gas takes it below. */
  readonly breathed: Readonly<Record<string, string>>;
}

/** Name of a moment in an address, such as `planned-58500`. */
export const momentKey = ({ atS, caseName, kind }: SectionMoment): string =>
  `${caseName}-${String(atS)}${kind === 'worst' ? '-worst' : ''}`;

/** The moment of that name, else the worst of the planned day, else any. */
export function chosenMoment(section: SectionOfDay, key: unknown): SectionMoment | null {
  const { moments } = section;
  return (
    moments.find((one) => momentKey(one) === key) ??
    moments.find(({ kind, caseName }) => kind === 'worst' && caseName === 'planned') ??
    moments[0] ??
    null
  );
}

/** Time of day and what happens then. */
export const momentTitle = ({ atS, title }: SectionMoment): string => `${clockText(atS)}, ${title}`;

export function momentView(
  section: SectionView,
  moment: SectionMoment,
  words: { readonly bound: string },
): MomentView {
  const breathed = moment.zones.flatMap(({ id, oxygen, oxygenBound }) => {
    if (oxygen === null) return [];
    const value = quantityText(oxygen.value, oxygen.unit);
    const bound = oxygenBound && quantityText(oxygenBound.value, oxygenBound.unit);
    const more = bound === null || bound === value ? '' : ` (${words.bound}\u00a0${bound})`;
    return [[id, `${value}${more}`] as const];
  });
  return {
    ...section,
    layers: moment.layers,
    moment: momentTitle(moment),
    breathed: Object.fromEntries(breathed),
  };
}
