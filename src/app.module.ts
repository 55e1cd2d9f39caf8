import 'reflect-metadata';
import { Module, type DynamicModule, type LogLevel } from '@nestjs/common';
import { NestFactory } from '@nestjs/core';
import { FastifyAdapter, type NestFastifyApplication } from '@nestjs/platform-fastify';
import { CatalogueModule } from './catalogue/catalogue.module.js';
import { Settings } from './config.js';
import { PeopleModule } from './people/people.module.js';
import { PlansModule } from './plans/plans.module.js';
import { SheetsModule } from './sheets/sheets.module.js';
import type { Database } from './storage/database.js';
import { StorageModule } from './storage/storage.module.js';
import { VenuesModule } from './venues/venues.module.js';
import { bodyLimitBytes, installWeb } from './web/http/install.js';
import { WebModule } from './web/web.module.js';

/** Settings, for every room that asks for them. */
@Module({})
class SettingsModule {
  static of(settings: Settings): DynamicModule {
    return {
      module: SettingsModule,
      global: true,
      providers: [{ provide: Settings, useValue: settings }],
      exports: [Settings],
    };
  }
}

/** The whole house. Only this file knows every room. */
@Module({})
export class AppModule {
  static of(settings: Settings, database: Database): DynamicModule {
    return {
      module: AppModule,
      imports: [
        SettingsModule.of(settings),
        StorageModule.of(database),
        CatalogueModule,
        WebModule,
        PeopleModule,
        VenuesModule,
        PlansModule,
        SheetsModule,
      ],
    };
  }
}

/** The application on an open database, ready to listen. Closing it closes the database. */
export async function createApp(
  settings: Settings,
  database: Database,
  logger: LogLevel[] | false = ['error', 'warn'],
): Promise<NestFastifyApplication> {
  const app = await NestFactory.create<NestFastifyApplication>(
    AppModule.of(settings, database),
    new FastifyAdapter({
      bodyLimit: bodyLimitBytes,
      // Behind a proxy on this machine the proxy says who is calling; nobody else is believed.
      trustProxy: settings.publicUrl === undefined ? false : 'loopback',
      forceCloseConnections: 'idle',
      routerOptions: { maxParamLength: 200 },
    }),
    // A refused start is told by whoever asked for it, in words; the framework would print a trace.
    // The options are a class by declaration and a plain object by documentation.
    // eslint-disable-next-line @typescript-eslint/no-unsafe-class-instance-assignment
    { logger: false, abortOnError: false },
  );
  app.useLogger(logger);
  await installWeb(app, settings);
  return app;
}
