import { Body, Controller, Header, Logger, Param, Post, Res } from '@nestjs/common';
import { answer, type DoorError } from '../assessment/calculators/door.js';
import type { Calculator } from '../assessment/calculators/calculator.js';
import { calculatorsOf } from '../assessment/calculators/registry.js';
import { CatalogueData } from '../catalogue/catalogue.module.js';
import { NotFound } from '../errors.js';
import { ClientSignal } from '../web/http/client-signal.js';
import type { PageReply } from '../web/http/exchange.js';
import { AssessmentPool } from '../workers/assessment-pool.js';

const isError = (body: unknown): body is DoorError =>
  typeof body === 'object' && body !== null && 'error' in body;

/** Calculators that may work for seconds: they get a thread, the others answer at once. */
const longRunning = new Set(['air', 'assess']);

/** The calculators for programs: the same bodies and errors as on the command line. */
@Controller('api/calculate')
export class CalculateController {
  readonly #log = new Logger('Faults');

  readonly #calculators: ReadonlyMap<string, Calculator>;

  constructor(
    private readonly data: CatalogueData,
    private readonly pool: AssessmentPool,
  ) {
    this.#calculators = calculatorsOf(data.forAssessment);
  }

  @Post(':calculator')
  @Header('cache-control', 'no-store')
  async calculate(
    @Param('calculator') name: string,
    @Body() document: unknown,
    @ClientSignal() signal: AbortSignal,
    @Res({ passthrough: true }) reply: PageReply,
  ): Promise<unknown> {
    const calculator = this.#calculators.get(name);
    if (calculator === undefined) {
      throw new NotFound(
        `There is no calculator named ${name.slice(0, 40)}.`,
        `Use one of ${[...this.#calculators.keys()].join(', ')}.`,
      );
    }
    // A list may be long whatever the calculator.
    const inThread = longRunning.has(name) || Array.isArray(document);
    const { body, faults } = inThread
      ? await this.pool.calculation(name, document, signal)
      : answer(calculator, document, this.data);
    for (const fault of faults) {
      this.#log.error(fault instanceof Error ? (fault.stack ?? fault.message) : String(fault));
    }
    // A list of documents is answered by a list, each with its own result or error.
    const status = !isError(body) ? 200 : body.error.code === 'internal' ? 500 : 422;
    void reply.status(status);
    return body;
  }
}
