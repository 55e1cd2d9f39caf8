/** Words of the section drawing and of the text that says the same. */
export interface SectionWords {
  readonly title: string;
  readonly datum: string;
  readonly outside: string;
  readonly oxygen: string;
  readonly noNumber: string;
  readonly layers: Record<'floor' | 'ceiling' | 'whole', string>;
  readonly empty: string;
}

export const sectionWords: SectionWords = {
  title: 'Section through the venue, to scale',
  datum: 'datum',
  outside: 'outside',
  oxygen: 'oxygen',
  noNumber: 'no number',
  layers: {
    floor: 'gas along the floor',
    ceiling: 'gas under the ceiling',
    whole: 'gas mixed through the space',
  },
  empty: 'No spaces have been entered yet.',
};
