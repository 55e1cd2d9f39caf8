import { Module, type DynamicModule, type OnApplicationShutdown } from '@nestjs/common';
import { Database } from './database.js';
import { PeopleRepository } from './people.repository.js';
import { PlansRepository } from './plans.repository.js';
import { SessionsRepository } from './sessions.repository.js';
import { VenuesRepository } from './venues.repository.js';

const repositories = [PeopleRepository, PlansRepository, SessionsRepository, VenuesRepository];

/** The repositories, on one open database, for every room. */
@Module({})
export class StorageModule implements OnApplicationShutdown {
  constructor(private readonly database: Database) {}

  static of(database: Database): DynamicModule {
    return {
      module: StorageModule,
      global: true,
      providers: [{ provide: Database, useValue: database }, ...repositories],
      exports: [Database, ...repositories],
    };
  }

  async onApplicationShutdown(): Promise<void> {
    await this.database.close();
  }
}
