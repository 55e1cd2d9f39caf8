import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { settingsFrom } from '../src/config.js';
import { DomainError } from '../src/errors.js';

const root = fileURLToPath(new URL('..', import.meta.url));

describe('settings', () => {
  it('have defaults that keep the server to this machine', () => {
    expect(settingsFrom({})).toMatchObject({
      host: '127.0.0.1',
      port: 3000,
      databaseFile: join(root, 'data', 'stillair.db'),
      examples: true,
      publicUrl: undefined,
      sessionHours: 12,
      pageWaitS: 2,
    });
  });

  it('find a relative database from the project, not from where the program was started', () => {
    const here = process.cwd();
    process.chdir('/');
    try {
      expect(settingsFrom({ DATABASE_URL: 'file:./other.db' }).databaseFile).toBe(
        join(root, 'other.db'),
      );
    } finally {
      process.chdir(here);
    }
    expect(settingsFrom({ DATABASE_URL: 'file:/srv/a.db' }).databaseFile).toBe('/srv/a.db');
  });

  it('take a blank variable as one that is not set', () => {
    expect(settingsFrom({ PORT: ' ', STILLAIR_PUBLIC_URL: '' })).toMatchObject({
      port: 3000,
      publicUrl: undefined,
    });
  });

  it('cannot be changed afterwards', () => {
    expect(Object.isFrozen(settingsFrom({}))).toBe(true);
  });

  it('report every fault together', () => {
    const environment = {
      HOST: 'a b',
      PORT: '3000.5',
      DATABASE_URL: 'postgresql://somewhere/db',
      STILLAIR_EXAMPLES: 'yes',
      STILLAIR_SESSION_HOURS: '0',
      STILLAIR_PUBLIC_URL: 'https://example.org/path',
    };
    try {
      settingsFrom(environment);
      expect.unreachable();
    } catch (error) {
      const paths = error instanceof DomainError ? error.details.map(({ path }) => path) : [];
      expect(paths).toEqual(Object.keys(environment).map((name) => `/${name}`));
    }
  });

  it.each(['-1', '65536', '3e3', '0x50', ' '.repeat(2) + 'x'])('refuse the port "%s"', (PORT) => {
    expect(() => settingsFrom({ PORT })).toThrow(/cannot be used/);
  });
});
