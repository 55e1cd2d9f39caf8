import type { ZoneSeries } from '../../assessment/assessment.js';

/** Words of the curve and of the text that says the same. */
export interface CurveWords {
  readonly answers: Record<ZoneSeries['answer'], string>;
  readonly band: string;
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
  band: 'layered, 90 in 100 lie here',
  levels: { aim: 'aim', limit: 'limit', never: 'never' },
  empty: 'No curve was computed for this zone.',
};
