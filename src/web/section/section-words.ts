/** Words of the section drawing and of the text that says the same. */
export interface SectionWords {
  readonly title: string;
  readonly datum: string;
  readonly outside: string;
  readonly oxygen: string;
  readonly noNumber: string;
  readonly layers: Record<'floor' | 'ceiling' | 'whole', string>;
  readonly empty: string;
  /** Where gas lies, short, with its amount behind. */
  readonly places: Record<'floor' | 'ceiling' | 'whole', string>;
  readonly gas: string;
  readonly deep: string;
  readonly bound: string;
  readonly meter: string;
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
  places: { floor: 'floor gas', ceiling: 'ceiling gas', whole: 'mixed gas' },
  gas: 'gas',
  deep: 'deep',
  bound: 'bound',
  meter: 'Meter',
};
