import { createApp } from './app.module.js';
import { settingsFrom, type Settings } from './config.js';
import { DomainError, InvalidInput } from './errors.js';
import { FirstLinkService } from './people/first-link.service.js';
import { openDatabase } from './storage/database.js';

const say = (text: string): void => {
  process.stdout.write(`${text}\n`);
};

/** A refused start in words. Whatever is not a DomainError is a fault of ours and keeps its trace. */
function startFailure(error: unknown): string {
  if (!(error instanceof DomainError)) {
    return `Stillair met a fault of its own: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}`;
  }
  const places = error.details.map(({ path, problem }) => `  ${path.replace('/', '')} ${problem}`);
  return ['Stillair did not start.', error.message, ...places, error.hint].join('\n');
}

function listenFailure(error: unknown, { host, port }: Settings): unknown {
  const code = error instanceof Error && 'code' in error ? error.code : undefined;
  const place = `${host}:${String(port)}`;
  if (code === 'EADDRINUSE') {
    return new InvalidInput(
      `Another program already listens on ${place}.`,
      `Stop that program, or choose another port: PORT=${String(port === 65_535 ? 3000 : port + 1)} npm start`,
    );
  }
  if (code === 'EACCES') {
    return new InvalidInput(
      `This account may not listen on ${place}.`,
      'Choose a port from 1024 up: PORT=3000 npm start',
    );
  }
  if (code === 'EADDRNOTAVAIL' || code === 'ENOTFOUND') {
    return new InvalidInput(
      `This machine has no address ${host}.`,
      'Set HOST to 127.0.0.1, or to 0.0.0.0 for every address of this machine.',
    );
  }
  return error;
}

async function start(): Promise<void> {
  const settings = settingsFrom(process.env);
  const database = await openDatabase(settings.databaseFile);
  const { applied, copiedTo } = database.migrated;
  if (copiedTo !== undefined) {
    say(`The database was brought up to date (${String(applied.length)} changes).`);
    say(`As it was before: ${copiedTo}`);
  }

  const app = await createApp(settings, database);
  app.enableShutdownHooks(['SIGTERM', 'SIGINT'], { useProcessExit: true });
  try {
    await app.listen({ host: settings.host, port: settings.port });
  } catch (error) {
    await app.close();
    throw listenFailure(error, settings);
  }

  const address = settings.publicUrl ?? (await app.getUrl());
  const seconds = (performance.now() / 1000).toFixed(1);
  say(`Stillair listens on ${address} (ready ${seconds} s after the start).`);
  const firstLink = await app.get(FirstLinkService).renew();
  if (firstLink === undefined) {
    say(`Sign in at ${address}/sign-in`);
  } else {
    say(
      'There is no account yet. This link creates the administrator; it works once, for 24 hours:',
    );
    say(`  ${address}${firstLink}`);
  }
  say('Stop with Ctrl+C.');
}

try {
  await start();
} catch (error) {
  process.stderr.write(`${startFailure(error)}\n`);
  process.exit(1);
}
