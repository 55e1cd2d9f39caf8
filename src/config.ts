import { isAbsolute, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { InvalidInput, type ErrorDetail } from './errors.js';

/** The folder of the project, wherever the program was started from. */
const projectRoot = fileURLToPath(new URL('..', import.meta.url));

/** What the surroundings decide, read once at the start. Also the token under which Nest hands it out. */
export class Settings {
  /** Address that the server listens on. */
  readonly host: string;
  /** 0 lets the system choose. */
  readonly port: number;
  readonly databaseFile: string;
  /** Whether an empty database is filled with the invented example venues and plans. */
  readonly examples: boolean;
  /** Where people reach the server when a proxy stands before it; no slash at the end. */
  readonly publicUrl: string | undefined;
  readonly sessionHours: number;
  /** How long the page of a plan waits for its results before it is sent without them [s]. */
  readonly pageWaitS: number;

  constructor(values: { readonly [K in keyof Settings]: Settings[K] }) {
    this.host = values.host;
    this.port = values.port;
    this.databaseFile = values.databaseFile;
    this.examples = values.examples;
    this.publicUrl = values.publicUrl;
    this.sessionHours = values.sessionHours;
    this.pageWaitS = values.pageWaitS;
    Object.freeze(this);
  }
}

type Environment = Readonly<Record<string, string | undefined>>;

/** The text of a variable; blank counts as missing. */
function textOf(environment: Environment, name: string): string | undefined {
  const text = environment[name]?.trim();
  return text === '' ? undefined : text;
}

function wholeNumber(text: string, min: number, max: number): number | undefined {
  const value = Number(text);
  return /^\d{1,9}$/.test(text) && value >= min && value <= max ? value : undefined;
}

function databasePath(url: string): string | undefined {
  const match = /^file:(?!\/\/)([^?]+)$/.exec(url);
  const path = match?.[1];
  if (path === undefined || path.endsWith('/') || path.includes('\0')) return undefined;
  return isAbsolute(path) ? path : join(projectRoot, path);
}

function origin(text: string): string | undefined {
  if (!URL.canParse(text)) return undefined;
  const url = new URL(text);
  const bare = url.pathname === '/' && url.search === '' && url.hash === '' && url.username === '';
  return bare && /^https?:$/.test(url.protocol) ? url.origin : undefined;
}

/**
 * The settings that the environment asks for, with defaults where it is silent.
 *
 * @throws {InvalidInput} naming every variable that cannot be used, all at once
 */
export function settingsFrom(environment: Environment): Settings {
  const faults: ErrorDetail[] = [];
  const parsed = <T>(
    name: string,
    fallback: string,
    parse: (text: string) => T | undefined,
    wanted: string,
  ): T | undefined => {
    const text = textOf(environment, name) ?? fallback;
    const value = parse(text);
    if (value === undefined) {
      faults.push({ path: `/${name}`, problem: `is "${text}"; give ${wanted}` });
    }
    return value;
  };

  const host = parsed(
    'HOST',
    '127.0.0.1',
    (text) => (/^[A-Za-z0-9.:_-]+$/.test(text) ? text : undefined),
    'a host name or address, such as 127.0.0.1, or 0.0.0.0 for every address of this machine',
  );
  const port = parsed(
    'PORT',
    '3000',
    (text) => wholeNumber(text, 0, 65_535),
    'a whole number from 0 to 65535',
  );
  const databaseFile = parsed(
    'DATABASE_URL',
    'file:./data/stillair.db',
    databasePath,
    'a file such as file:./data/stillair.db, or file:/srv/stillair/stillair.db',
  );
  const examples = parsed(
    'STILLAIR_EXAMPLES',
    'on',
    (text) => (text === 'on' || text === 'off' ? text : undefined),
    'on or off',
  );
  const sessionHours = parsed(
    'STILLAIR_SESSION_HOURS',
    '12',
    (text) => wholeNumber(text, 1, 720),
    'a whole number of hours from 1 to 720',
  );
  const pageWaitS = parsed(
    'STILLAIR_PAGE_WAIT',
    '2',
    (text) => wholeNumber(text, 0, 60),
    'a whole number of seconds from 0 to 60',
  );
  const publicUrl =
    textOf(environment, 'STILLAIR_PUBLIC_URL') === undefined
      ? undefined
      : parsed(
          'STILLAIR_PUBLIC_URL',
          '',
          origin,
          'an address without a path, such as https://stillair.example.org',
        );

  if (
    faults.length > 0 ||
    host === undefined ||
    port === undefined ||
    databaseFile === undefined ||
    examples === undefined ||
    sessionHours === undefined ||
    pageWaitS === undefined
  ) {
    throw new InvalidInput(
      faults.length === 1
        ? 'A setting in the environment cannot be used.'
        : `${String(faults.length)} settings in the environment cannot be used.`,
      'Correct the variables listed here, or unset them to get the default, then start again.',
      faults,
    );
  }
  return new Settings({
    host,
    port,
    databaseFile,
    examples: examples === 'on',
    publicUrl,
    sessionHours,
    pageWaitS,
  });
}
