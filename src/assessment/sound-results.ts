import { sourceTypes } from '../science/acoustics/source-types.js';
import type { SoundResult } from './assessment.js';
import type { PlanFile } from './plan-file.js';
import { letIn, silentResult, type SoundCase, type SoundContext } from './sound-context.js';
import { noteResult } from './sound-note.js';
import { voiceResult } from './sound-voice.js';

const recording = 'A recording shows the same effect without any gas.';

function resultOf(one: SoundCase): SoundResult {
  const { sound } = one;
  const mixture = letIn(sound);
  if (mixture === null) {
    return silentResult(
      one,
      'No gas is named inside the instrument, so nothing changes its sound.',
      recording,
    );
  }
  switch (sound.instrument) {
    case 'voice':
      // The share of air counts for breathing: the composition is judged as it stands.
      return voiceResult(one, sound.composition ?? mixture);
    case 'coupledReed':
    case 'freeReed':
    case 'edgeTone':
    case 'lipWhistle':
    case 'solidSource': {
      const type = sourceTypes.find(({ id }) => id === sound.instrument);
      return silentResult(one, type?.expectation ?? '', recording);
    }
    case 'openPipe':
    case 'stoppedPipe':
    case 'fluePipe':
    case 'helmholtz':
    case 'tube':
      return noteResult(one, mixture);
  }
}

/** What the audience hears, act by act. */
export function soundResults(plan: PlanFile, context: SoundContext): readonly SoundResult[] {
  return plan.acts.flatMap((act, actIndex) =>
    (act.sound ?? []).map((sound, index) =>
      resultOf({
        ...context,
        act,
        sound,
        path: `/acts/${String(actIndex)}/sound/${String(index)}`,
      }),
    ),
  );
}
