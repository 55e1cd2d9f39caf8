import { Controller, Get } from '@nestjs/common';
import { PeopleRepository } from '../../storage/people.repository.js';
import { OpenToStrangers } from '../session/viewer.js';

/** For whatever watches the process. Says nothing about the content. */
@Controller()
export class HealthController {
  constructor(private readonly people: PeopleRepository) {}

  /** The process answers. */
  @Get('health')
  @OpenToStrangers()
  health(): { readonly status: 'ok' } {
    return { status: 'ok' };
  }

  /** The database answers as well. */
  @Get('ready')
  @OpenToStrangers()
  async ready(): Promise<{ readonly status: 'ready' }> {
    await this.people.count();
    return { status: 'ready' };
  }
}
