import { describe, expect, it } from 'vitest';
import type { PlanFile } from '../../src/assessment/plan-file.js';
import { Conflict, NotComputable } from '../../src/errors.js';
import { AssessmentsService } from '../../src/plans/assessments.service.js';
import type { WorkerAnswer } from '../../src/workers/assess.worker.js';
import type { AssessmentPool } from '../../src/workers/assessment-pool.js';
import { hall } from '../support/plans.js';

interface Asked {
  readonly plan: PlanFile;
  readonly signal: AbortSignal | undefined;
  answer(title: string): void;
  fail(error: unknown): void;
}

/** A pool whose answers come when the test says so; a dropped run fails as the real one does. */
function pool() {
  const asked: Asked[] = [];
  const stand = {
    answerTo: (plan: PlanFile, signal?: AbortSignal) =>
      new Promise<WorkerAnswer>((resolve, reject) => {
        signal?.addEventListener('abort', () => {
          reject(new Conflict('dropped', 'ask again'));
        });
        asked.push({
          plan,
          signal,
          answer: (title) => {
            resolve({ assessment: { title }, failure: null, fault: null } as WorkerAnswer);
          },
          fail: reject,
        });
      }),
  };
  return { asked, service: new AssessmentsService(stand as unknown as AssessmentPool) };
}

const first = hall();
const edited = hall({ revision: 'B' });

describe('assessments of a plan', () => {
  it('drops the older run when a newer state of the same plan is asked for', async () => {
    const { asked, service } = pool();
    const older = service.outcomeOf(first, { latestOf: 'plan' });
    const newer = service.outcomeOf(edited, { latestOf: 'plan' });
    expect(asked.map(({ signal }) => signal?.aborted)).toEqual([true, false]);
    expect((await older).failure).toMatchObject({ code: 'conflict' });
    asked[1]?.answer('newer');
    expect((await newer).assessment?.title).toBe('newer');
  });

  it('keeps the older run while somebody else waits for it', async () => {
    const { asked, service } = pool();
    const older = service.outcomeOf(first, { latestOf: 'plan ada' });
    const others = service.outcomeOf(first, { latestOf: 'plan bo' });
    void service.outcomeOf(edited, { latestOf: 'plan ada' });
    expect(asked[0]?.signal?.aborted).toBe(false);
    expect((await older).failure).toMatchObject({ code: 'conflict' });
    asked[0]?.answer('older');
    expect((await others).assessment?.title).toBe('older');
  });

  it('does not touch runs of other plans', () => {
    const { asked, service } = pool();
    void service.outcomeOf(first, { latestOf: 'one plan' });
    void service.outcomeOf(edited, { latestOf: 'another plan' });
    expect(asked.map(({ signal }) => signal?.aborted)).toEqual([false, false]);
  });

  it('drops a run when its last client has gone, and works it out again when asked again', async () => {
    const { asked, service } = pool();
    const page = new AbortController();
    const image = new AbortController();
    const one = service.outcomeOf(first, { signal: page.signal });
    void service.outcomeOf(first, { signal: image.signal });
    expect(asked).toHaveLength(1);
    page.abort();
    expect(asked[0]?.signal?.aborted).toBe(false);
    image.abort();
    expect(asked[0]?.signal?.aborted).toBe(true);
    expect((await one).failure).toMatchObject({ code: 'conflict' });
    const again = service.outcomeOf(first);
    expect(asked).toHaveLength(2);
    asked[1]?.answer('again');
    expect((await again).assessment?.title).toBe('again');
  });

  it('remembers an answer, but neither a busy server nor a thread that died', async () => {
    const { asked, service } = pool();
    const busy = service.outcomeOf(first);
    asked[0]?.fail(new NotComputable('busy', 'try again'));
    expect((await busy).failure).toMatchObject({ code: 'not-computable', message: 'busy' });
    const answered = service.outcomeOf(first);
    asked[1]?.answer('there');
    await answered;
    expect((await service.outcomeOf(first)).assessment?.title).toBe('there');
    expect(asked).toHaveLength(2);
  });
});
