import { setTimeout as pause } from 'node:timers/promises';
import { Injectable, Logger } from '@nestjs/common';
import type { Assessment } from '../assessment/assessment.js';
import type { PlanFile } from '../assessment/plan-file.js';
import { Conflict, DomainError, NotComputable } from '../errors.js';
import { AssessmentPool } from '../workers/assessment-pool.js';

/** What came of assessing a plan: the assessment, or why there is none. */
export type Outcome =
  | { readonly assessment: Assessment; readonly failure?: undefined }
  | { readonly assessment?: undefined; readonly failure: DomainError };

/** Who waits for an assessment. Without either, the wait lasts until the answer is there. */
export interface Waiting {
  /** Fires when the one who asked has gone. */
  readonly signal?: AbortSignal | undefined;
  /**
   * What the plan file is the latest state of, such as the id of a plan, or of a plan and the person
   * who edits it. Asking for a newer state ends the wait for older ones.
   */
  readonly latestOf?: string | undefined;
}

interface Waiter {
  readonly latestOf: string | undefined;
  leave(why: DomainError): void;
}

interface Run {
  readonly outcome: Promise<Outcome>;
  readonly waiters: Set<Waiter>;
  readonly dropped: AbortController;
  isDone: boolean;
}

/** Assessments are asked for by page, images and sheet in one go; so many are kept. */
const keptOutcomes = 40;

/** After a page was sent without its results, the run goes on this long for the next question [ms]. */
const lingerMs = 20_000;

const gone = (): DomainError =>
  new Conflict('Nobody waits for this assessment any more.', 'Open the plan again.');
const overtaken = (): DomainError =>
  new Conflict(
    'A newer state of this plan is being worked out in its place.',
    'Reload the page to see it.',
  );
const ownFault = (): DomainError =>
  new NotComputable(
    'Stillair met a fault of its own while working this plan out. Your entries are safe.',
    'Change the last entry back, and report the fault with the exported plan file.',
  );

/**
 * Assesses plans, and remembers the last ones: an assessment depends on nothing but its plan file. A
 * run that nobody waits for any more is dropped, whether it waits for a thread or has one.
 */
@Injectable()
export class AssessmentsService {
  readonly #log = new Logger('Faults');
  readonly #runs = new Map<string, Run>();

  constructor(private readonly pool: AssessmentPool) {}

  outcomeOf(file: PlanFile, waiting: Waiting = {}): Promise<Outcome> {
    const key = JSON.stringify(file);
    const { latestOf } = waiting;
    const run = this.#runs.get(key) ?? this.#begun(key, file);
    if (latestOf !== undefined) this.#overtake(latestOf, run);
    return run.isDone ? run.outcome : this.#waited(key, run, waiting);
  }

  /** What came of assessing a plan, or null when that takes longer than the patience. */
  async outcomeWithin(
    file: PlanFile,
    latestOf: string,
    patienceMs: number,
  ): Promise<Outcome | null> {
    const signal = AbortSignal.timeout(patienceMs + lingerMs);
    const outcome = this.outcomeOf(file, { signal, latestOf });
    const isOver = new AbortController();
    const patience = pause(patienceMs, null, { signal: isOver.signal }).catch(() => null);
    try {
      return await Promise.race([outcome, patience]);
    } finally {
      isOver.abort();
    }
  }

  #begun(key: string, file: PlanFile): Run {
    const dropped = new AbortController();
    const run: Run = {
      outcome: this.#assessed(file, dropped.signal).catch((thrown: unknown): Outcome => {
        // What depends on the hour and not on the plan is not remembered: the next reader asks again.
        if (this.#runs.get(key) === run) this.#runs.delete(key);
        return { failure: this.#told(thrown) };
      }),
      waiters: new Set(),
      dropped,
      isDone: false,
    };
    this.#forgetOldest();
    this.#runs.set(key, run);
    void run.outcome.then(() => {
      run.isDone = true;
    });
    return run;
  }

  #forgetOldest(): void {
    if (this.#runs.size < keptOutcomes) return;
    const done = [...this.#runs].find(([, { isDone }]) => isDone);
    if (done) this.#runs.delete(done[0]);
  }

  #overtake(latestOf: string, by: Run): void {
    for (const run of [...this.#runs.values()]) {
      if (run === by || run.isDone) continue;
      for (const waiter of [...run.waiters]) {
        if (waiter.latestOf === latestOf) waiter.leave(overtaken());
      }
    }
  }

  #waited(key: string, run: Run, { signal, latestOf }: Waiting): Promise<Outcome> {
    return new Promise((resolve) => {
      const leave = (why: DomainError): void => {
        run.waiters.delete(waiter);
        resolve({ failure: why });
        if (run.waiters.size > 0 || run.isDone) return;
        if (this.#runs.get(key) === run) this.#runs.delete(key);
        run.dropped.abort();
      };
      const waiter: Waiter = { latestOf, leave };
      const left = (): void => {
        leave(gone());
      };
      run.waiters.add(waiter);
      if (signal?.aborted === true) {
        left();
        return;
      }
      signal?.addEventListener('abort', left, { once: true });
      void run.outcome.then((outcome) => {
        signal?.removeEventListener('abort', left);
        resolve(outcome);
      });
    });
  }

  async #assessed(file: PlanFile, signal: AbortSignal): Promise<Outcome> {
    const answer = await this.pool.answerTo(file, signal);
    if (answer.assessment !== null) return { assessment: answer.assessment };
    const { code, message, hint, details } = answer.failure;
    if (code !== 'internal') return { failure: new DomainError(code, message, hint, details) };
    this.#log.error(answer.fault ?? message);
    return { failure: ownFault() };
  }

  /** In words, because the entries must stay within reach even when the calculation has a fault. */
  #told(thrown: unknown): DomainError {
    if (thrown instanceof DomainError) return thrown;
    this.#log.error(thrown instanceof Error ? (thrown.stack ?? thrown.message) : String(thrown));
    return ownFault();
  }
}
