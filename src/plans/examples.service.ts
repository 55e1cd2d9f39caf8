import {
  Injectable,
  Logger,
  type CallHandler,
  type ExecutionContext,
  type NestInterceptor,
} from '@nestjs/common';
import type { Observable } from 'rxjs';
import { loadExamples } from '../catalogue/examples.js';
import { DomainError } from '../errors.js';
import { Settings } from '../config.js';
import type { PageRequest } from '../web/http/exchange.js';
import { VenuesService } from '../venues/venues.service.js';
import { PlansService } from './plans.service.js';

/**
 * Fills an empty database with the invented example venues and plans, when the settings ask for it.
 * A plan belongs to whoever made it, so this waits for the first person who signs in.
 */
@Injectable()
export class ExamplesService implements NestInterceptor {
  readonly #log = new Logger('Examples');
  #filled: Promise<void> | undefined;

  constructor(
    private readonly settings: Settings,
    private readonly venues: VenuesService,
    private readonly plans: PlansService,
  ) {}

  async intercept(context: ExecutionContext, next: CallHandler): Promise<Observable<unknown>> {
    const { viewer } = context.switchToHttp().getRequest<PageRequest>();
    if (this.settings.examples && viewer !== undefined) {
      await (this.#filled ??= this.#fill(viewer.id));
    }
    return next.handle();
  }

  async #fill(accountId: string): Promise<void> {
    if ((await this.venues.count()) > 0 || (await this.plans.list()).length > 0) return;
    try {
      for (const file of loadExamples()) await this.plans.bringIn(file, accountId);
    } catch (error) {
      // A broken example must not keep anybody from their own plans.
      if (!(error instanceof DomainError)) throw error;
      this.#log.error(`The examples were not loaded. ${error.message} ${error.hint}`);
    }
  }
}
