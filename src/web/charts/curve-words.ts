import type { ZoneSeries } from '../../assessment/assessment.js';

/** Words of the curve and of the text that says the same. */
export interface CurveWords {
  readonly answers: Record<ZoneSeries['answer'], string>;
  /** The same, short, at the end of a line. */
  readonly ends: Record<ZoneSeries['answer'], string>;
  readonly band: string;
  readonly show: string;
  readonly levels: Record<'aim' | 'limit' | 'never', string>;
  readonly empty: string;
}

export const curveWords: CurveWords = {
  answers: {
    mixed: 'well mixed',
    layered: 'layered',
    layeredP50: 'layered, median',
    bound: 'inventory bound',
    layeredP05: 'layered, 5 in 100',
    layeredP95: 'layered, 95 in 100',
  },
  ends: {
    mixed: 'well mixed',
    layered: 'layered',
    layeredP50: 'layered, median',
    bound: 'inventory bound',
    layeredP05: '',
    layeredP95: '',
  },
  band: 'shaded: 90 in 100 layered runs',
  show: 'show',
  levels: { aim: 'aim', limit: 'limit', never: 'never' },
  empty: 'No curve was computed for this zone.',
};
