import { createServer } from 'node:net';
import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { freshFolder } from '../support/database.js';
import { startProgram } from '../support/browser.js';

describe('starting', () => {
  it('prints the address, the one-time link and the time taken, and stops cleanly when told to', async () => {
    const program = startProgram();
    const [, address = ''] = await program.line(/listens on (http:\S+) \(ready \d+\.\d s/);
    const [, link = ''] = await program.line(/(http:\S+\/first\/[\w-]{43})/);

    expect(link.startsWith(address)).toBe(true);
    expect((await fetch(`${address}/ready`)).status).toBe(200);
    expect(await program.stop()).toBe(0);
    expect(program.printed()).not.toMatch(/error/i);
  });

  it('refuses a busy port in words, with exit code 1 and no trace', async () => {
    const other = createServer();
    const port = await new Promise<number>((resolve) => {
      other.listen(0, '127.0.0.1', () => {
        const address = other.address();
        resolve(typeof address === 'object' && address ? address.port : 0);
      });
    });
    const program = startProgram({ PORT: String(port) });

    expect(await program.ended).toBe(1);
    other.close();
    expect(program.printed()).toContain(
      `Another program already listens on 127.0.0.1:${String(port)}.`,
    );
    expect(program.printed()).toContain(`PORT=${String(port + 1)} npm start`);
    expect(program.printed()).not.toMatch(/\n\s+at /);
  });

  it('refuses a damaged database in words, with exit code 1 and no trace', async () => {
    const file = join(freshFolder(), 'stillair.db');
    writeFileSync(file, 'not a database '.repeat(1000));
    const program = startProgram({ DATABASE_URL: `file:${file}` });

    expect(await program.ended).toBe(1);
    expect(program.printed()).toContain('is damaged or is not a database');
    expect(program.printed()).not.toMatch(/\n\s+at /);
  });

  it('names every setting that it cannot use at once', async () => {
    const program = startProgram({ PORT: '99999', STILLAIR_EXAMPLES: 'maybe', HOST: 'a b' });

    expect(await program.ended).toBe(1);
    expect(program.printed()).toContain('3 settings in the environment cannot be used.');
    for (const name of ['PORT', 'STILLAIR_EXAMPLES', 'HOST']) {
      expect(program.printed()).toContain(`  ${name} is `);
    }
  });
});
