import { Injectable, type OnApplicationShutdown } from '@nestjs/common';
import { availableParallelism } from 'node:os';
import { fileURLToPath } from 'node:url';
import { Piscina } from 'piscina';
import type { PlanFile } from '../assessment/plan-file.js';
import { CatalogueData } from '../catalogue/catalogue.module.js';
import { Conflict, NotComputable } from '../errors.js';
import type { WorkerAnswer, WorkerCalculation, WorkerTask } from './assess.worker.js';

/** Threads read compiled code: under the test runner this file is a source, its worker is in dist. */
const workerFile = fileURLToPath(
  new URL(
    import.meta.url.endsWith('.ts') ? '../../dist/workers/assess.worker.js' : './assess.worker.js',
    import.meta.url,
  ),
);

/** Idle threads are kept this long before they end [ms]. */
const idleMs = 300_000;
/** No more threads than this, however many cores: each holds memory of its own. */
const mostThreads = 4;
/** Tasks that may wait for a thread; beyond them a caller is told to come back. */
const mostWaiting = 64;
/** Longest run of one task [ms]. */
const longestRunMs = 600_000;
/** Memory of one thread [MB]: a run that needs more ends itself, not the server. */
const threadMemoryMb = 1024;

const codeOf = (error: unknown): unknown =>
  typeof error === 'object' && error !== null && 'code' in error ? error.code : undefined;

/** Threads in which plans and samples are worked out, so that the server answers meanwhile. */
@Injectable()
export class AssessmentPool implements OnApplicationShutdown {
  readonly #pool: Piscina<WorkerTask, unknown>;

  constructor(data: CatalogueData) {
    this.#pool = new Piscina({
      filename: workerFile,
      minThreads: 0,
      maxThreads: Math.min(availableParallelism(), mostThreads),
      maxQueue: mostWaiting,
      idleTimeout: idleMs,
      resourceLimits: { maxOldGenerationSizeMb: threadMemoryMb },
      workerData: data.forAssessment,
    });
  }

  /**
   * The assessment of a plan, or what is wrong with it.
   *
   * @param signal drops the run, also one that has begun, when nobody waits for it any more
   * @throws {Conflict} when it was dropped; {NotComputable} when the thread could not finish it
   */
  async answerTo(plan: PlanFile, signal?: AbortSignal): Promise<WorkerAnswer> {
    return (await this.#answer({ kind: 'assess', plan }, signal)) as WorkerAnswer;
  }

  /**
   * What a calculator answers to a document, or to each of a list of documents.
   *
   * @throws {Conflict} when it was dropped; {NotComputable} when the thread could not finish it
   */
  async calculation(
    calculator: string,
    document: unknown,
    signal?: AbortSignal,
  ): Promise<WorkerCalculation> {
    const task: WorkerTask = { kind: 'calculate', calculator, document };
    return (await this.#answer(task, signal)) as WorkerCalculation;
  }

  async onApplicationShutdown(): Promise<void> {
    await this.#pool.destroy();
  }

  async #answer(task: WorkerTask, signal: AbortSignal | undefined): Promise<unknown> {
    const tooLong = AbortSignal.timeout(longestRunMs);
    const either = signal === undefined ? tooLong : AbortSignal.any([signal, tooLong]);
    try {
      return await this.#pool.run(task, { signal: either });
    } catch (error) {
      if (signal?.aborted === true) {
        throw new Conflict(
          'This calculation was dropped: nobody waits for it any more.',
          'Ask again to have it worked out.',
        );
      }
      if (tooLong.aborted) {
        throw new NotComputable(
          'The calculation took longer than ten minutes and was stopped.',
          'Ask for fewer samples or a shorter time.',
        );
      }
      if (codeOf(error) === 'ERR_WORKER_OUT_OF_MEMORY') {
        throw new NotComputable(
          'The calculation needs more memory than the server gives to one.',
          'Ask for fewer samples, a shorter time or a longer output interval.',
        );
      }
      if (this.#pool.queueSize >= mostWaiting) {
        throw new NotComputable(
          'The server is busy: too many calculations are waiting.',
          'Try again in a minute. Nothing that you entered is lost.',
        );
      }
      throw error;
    }
  }
}
