import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { NestFastifyApplication } from '@nestjs/platform-fastify';
import { createApp } from '../../src/app.module.js';
import { settingsFrom } from '../../src/config.js';
import { FirstLinkService } from '../../src/people/first-link.service.js';
import { openDatabase, type Database } from '../../src/storage/database.js';
import { Visitor } from './visitor.js';

export const administrator = {
  name: 'Ada Example',
  email: 'ada@example.org',
  password: 'four unrelated words here',
} as const;

export interface TestServer {
  readonly app: NestFastifyApplication;
  readonly database: Database;
  readonly url: string;
  /** Every route that the server knows, as method and path with its placeholders. */
  readonly routes: readonly { readonly method: string; readonly path: string }[];
  /** A browser that has not been here before. */
  visitor(): Visitor;
  /** A browser with the administrator signed in, who is created on first use. */
  signedIn(): Promise<Visitor>;
  close(): Promise<void>;
}

/** The real application on a new database made by the migrations, on a free port. */
export async function startServer(
  environment: Readonly<Record<string, string>> = {},
): Promise<TestServer> {
  const folder = mkdtempSync(join(tmpdir(), 'stillair-'));
  const settings = settingsFrom({
    DATABASE_URL: `file:${join(folder, 'stillair.db')}`,
    PORT: '0',
    STILLAIR_EXAMPLES: 'off',
    // Pages come with their results, however busy the machine is.
    STILLAIR_PAGE_WAIT: '60',
    ...environment,
  });
  const database = await openDatabase(settings.databaseFile);
  const app = await createApp(settings, database, false);
  const routes: { method: string; path: string }[] = [];
  app
    .getHttpAdapter()
    .getInstance()
    .addHook('onRoute', ({ method, url }) => {
      for (const each of [method].flat()) routes.push({ method: each, path: url });
    });
  await app.listen({ host: settings.host, port: 0 });
  const url = await app.getUrl();
  let signedIn: Promise<Visitor> | undefined;

  async function createAdministrator(): Promise<Visitor> {
    const visitor = new Visitor(url);
    const link = await app.get(FirstLinkService).renew();
    if (link === undefined) throw new Error('There is an account already.');
    const { name, email, password } = administrator;
    const answer = await visitor.post(link, { name, email, password, passwordAgain: password });
    if (answer.status !== 303) throw new Error(`The first link answered ${String(answer.status)}.`);
    return visitor;
  }

  return {
    app,
    database,
    url,
    routes,
    visitor: () => new Visitor(url),
    signedIn: () => (signedIn ??= createAdministrator()),
    close: async () => {
      await app.close();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}
