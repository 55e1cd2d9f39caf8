import { spawn } from 'node:child_process';
import { existsSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { chromium, type Browser } from 'playwright-core';

const root = fileURLToPath(new URL('../..', import.meta.url));

/** Where the browser is, if there is one. */
export const browserPath = [
  process.env.CHROMIUM,
  '/usr/bin/chromium',
  '/usr/bin/chromium-browser',
].find((path) => path !== undefined && existsSync(path));

/** Said in place of the tests that need a browser. */
export const noBrowser =
  'Skipped the tests in a real browser: no Chromium found. Install it (Debian: apt-get install chromium) or name one in the variable CHROMIUM.';

export function openBrowser(): Promise<Browser> {
  if (browserPath === undefined) throw new Error(noBrowser);
  return chromium.launch({
    executablePath: browserPath,
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  });
}

export interface StartedProgram {
  /** All that it has printed so far. */
  printed(): string;
  /** Ends it as a service manager would; its exit code. */
  stop(): Promise<number | null>;
  /** Waits for a printed line that fits, and gives its match. */
  line(pattern: RegExp): Promise<RegExpExecArray>;
  readonly ended: Promise<number | null>;
}

/** Stillair as `npm start` runs it, from the sources as they stand, on a database of its own. */
export function startProgram(environment: Readonly<Record<string, string>> = {}): StartedProgram {
  const folder = mkdtempSync(join(tmpdir(), 'stillair-'));
  const child = spawn(process.execPath, ['--import', './.scripts/run-source.mjs', 'src/main.ts'], {
    cwd: root,
    env: {
      ...process.env,
      PORT: '0',
      DATABASE_URL: `file:${join(folder, 'stillair.db')}`,
      ...environment,
    },
  });
  let text = '';
  const waiting = new Set<() => void>();
  const heard = (chunk: Buffer): void => {
    text += chunk.toString();
    for (const look of waiting) look();
  };
  child.stdout.on('data', heard);
  child.stderr.on('data', heard);
  const ended = new Promise<number | null>((resolve) => {
    child.on('close', (code) => {
      rmSync(folder, { recursive: true, force: true });
      resolve(code);
    });
  });

  return {
    printed: () => text,
    ended,
    stop: () => {
      child.kill('SIGTERM');
      return ended;
    },
    line: (pattern) =>
      new Promise((resolve, reject) => {
        const look = (): void => {
          const match = pattern.exec(text);
          if (match === null) return;
          waiting.delete(look);
          resolve(match);
        };
        waiting.add(look);
        void ended.then(() => {
          reject(new Error(`It ended without printing ${String(pattern)}:\n${text}`));
        });
        look();
      }),
  };
}
