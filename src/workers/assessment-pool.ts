import { Injectable, type OnApplicationShutdown } from '@nestjs/common';
import { fileURLToPath } from 'node:url';
import { Piscina } from 'piscina';
import type { PlanFile } from '../assessment/plan-file.js';
import type { WorkerAnswer } from './assess.worker.js';

/** Threads read compiled code: under the test runner this file is a source, its worker is in dist. */
const workerFile = fileURLToPath(
  new URL(
    import.meta.url.endsWith('.ts') ? '../../dist/workers/assess.worker.js' : './assess.worker.js',
    import.meta.url,
  ),
);

/** Idle threads are kept this long before they end [ms]. */
const idleMs = 300_000;

/** Threads in which plans are assessed, so that the server answers while it calculates. */
@Injectable()
export class AssessmentPool implements OnApplicationShutdown {
  readonly #pool = new Piscina({
    filename: workerFile,
    minThreads: 0,
    maxThreads: 2,
    idleTimeout: idleMs,
  });

  /**
   * The assessment of a plan, or what is wrong with it.
   *
   * @param signal aborts the work when nobody waits for it any more
   */
  async answerTo(plan: PlanFile, signal?: AbortSignal): Promise<WorkerAnswer> {
    const options = signal === undefined ? {} : { signal };
    return (await this.#pool.run(plan, options)) as WorkerAnswer;
  }

  async onApplicationShutdown(): Promise<void> {
    await this.#pool.destroy();
  }
}
