import { InvalidInput } from '../errors.js';
import type { AirGasTable } from '../science/room-air/air-gases.js';
import type { AirInput } from '../science/room-air/air-input.js';
import type { AirResult } from '../science/room-air/air-result.js';
import { airRun } from '../science/room-air/air-run.js';

/**
 * Which answers are wanted: `full` has the exact mixed, layered and bound answers, the layered one
 * with the band of its draws where the input asks for it and else with the runs without any mixing;
 * `quick` leaves both out; `straight` is the mixed answer by straight displacement; `mixed` the exact
 * mixed answer and the bound alone.
 */
export type AirForm = 'full' | 'quick' | 'straight' | 'mixed';

/** The air model as an assessment asks it: the same question is worked out once. */
export type AirAnswers = (input: AirInput, form: AirForm) => AirResult;

const optionsOf = {
  full: {},
  quick: { adverse: false },
  straight: { displacement: 'straight' },
  mixed: { layered: false },
} as const;

/** What the air model refuses, told with the place in the plan. */
function toldOfVenue(thrown: unknown): unknown {
  if (!(thrown instanceof InvalidInput)) return thrown;
  const details = thrown.details.map(({ path, problem }) => ({ path: `/venue${path}`, problem }));
  const [first] = details;
  return new InvalidInput(
    first ? `The venue does not hold together at ${first.path}: ${first.problem}.` : thrown.message,
    thrown.hint,
    details,
  );
}

/**
 * The air model with a memory of its own, for the length of one assessment: a plan as filed and with
 * controls, at its worst and at its best, asks many questions twice.
 */
export function airAnswers(gases: AirGasTable): AirAnswers {
  const known = new Map<string, AirResult>();
  return (input, form) => {
    const question = `${form} ${JSON.stringify(input)}`;
    const before = known.get(question);
    if (before) return before;
    try {
      const answer = airRun(input, gases, optionsOf[form]);
      known.set(question, answer);
      return answer;
    } catch (thrown) {
      throw toldOfVenue(thrown);
    }
  };
}
