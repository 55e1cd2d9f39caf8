import type { Answers } from './air-mixed-answers.js';

/** Records answered by the two-layer model. */
export const layerAnswers: Answers = {};
