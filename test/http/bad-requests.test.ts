import Sqlite from 'better-sqlite3';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { administrator, startServer, type TestServer } from '../support/server.js';

let server: TestServer;
beforeAll(async () => {
  server = await startServer();
  await server.signedIn();
});
afterAll(() => server.close());

const big = 'x'.repeat(50_000_000);

describe('a request that cannot be served', () => {
  it('gets 413 and a page in words for a form of 50 MB', async () => {
    const answer = await server.visitor().send('/sign-in', {
      method: 'POST',
      headers: { 'content-type': 'application/x-www-form-urlencoded' },
      body: `email=${big}`,
    });

    expect(answer.status).toBe(413);
    expect(answer.text).toContain('larger than 1 MB');
    expect(answer.text).toContain('What to do next');
  });

  it('gets 413 and the error object for a JSON body of 50 MB', async () => {
    const answer = await server.visitor().postJson('/sign-in', big);

    expect(answer.status).toBe(413);
    expect(JSON.parse(answer.text)).toMatchObject({ error: { code: 'invalid-input' } });
  });

  it.each([
    ['cut off', '{"email": "a'],
    ['empty', ''],
    ['with a forbidden key', '{"__proto__": {"role": "administrator"}}'],
  ])('gets 400 and words for JSON that is %s', async (_, body) => {
    const answer = await server.visitor().send('/sign-in', {
      method: 'POST',
      headers: { 'content-type': 'application/json', accept: 'application/json' },
      body,
    });

    expect(answer.status).toBe(400);
    expect(JSON.parse(answer.text)).toMatchObject({
      error: { code: 'invalid-input', message: 'What was sent could not be read.' },
    });
  });

  it('gets 415 for a kind of content that is not taken', async () => {
    const answer = await server.visitor().send('/sign-in', {
      method: 'POST',
      headers: { 'content-type': 'application/x-yaml' },
      body: 'a: b',
    });

    expect(answer.status).toBe(415);
  });

  it('gets 404 and a way on for an address that does not exist, in page and JSON', async () => {
    const page = await (await server.signedIn()).get('/no-such-place');
    const json = await server.visitor().get('/api/no-such-place');

    expect(page.status).toBe(404);
    expect(page.text).toContain('There is no page at this address.');
    expect(json.status).toBe(404);
    expect(JSON.parse(json.text)).toMatchObject({ error: { code: 'not-found' } });
  });

  it('survives JSON that is nested a hundred thousand deep', async () => {
    const deep = `${'['.repeat(100_000)}${']'.repeat(100_000)}`;
    const answer = await server.visitor().send('/sign-in', {
      method: 'POST',
      headers: { 'content-type': 'application/json', accept: 'application/json' },
      body: deep,
    });

    expect(answer.status).toBeGreaterThanOrEqual(400);
    expect(answer.status).toBeLessThan(500);
    expect((await server.visitor().get('/health')).status).toBe(200);
  });
});

describe('a database that is locked by another program', () => {
  it('answers 503 with what to do, and works again afterwards', async () => {
    const { email, password } = administrator;
    const other = new Sqlite(server.database.file);
    other.exec('BEGIN EXCLUSIVE');
    const locked = await server.visitor().post('/sign-in', { email, password });
    other.close();
    const free = await server.visitor().post('/sign-in', { email, password });

    expect(locked.status).toBe(503);
    expect(locked.text).toContain('is locked by another program');
    expect(locked.headers.getSetCookie()).toEqual([]);
    expect(free.status).toBe(303);
  });
});

describe('a fault of ours', () => {
  it('answers 500 with a reference and without a trace', async () => {
    const broken = await startServer();
    await broken.database.write((db) => db.$executeRawUnsafe('DROP TABLE "SetupLink"'));

    const answer = await broken.visitor().get('/first/some-token');

    expect(answer.status).toBe(500);
    expect(answer.text).toMatch(/report it with this reference: [0-9a-f]{8}/);
    expect(answer.text).not.toMatch(/\bat .*\.ts|node_modules|SetupLink|prisma/i);
    await broken.close();
  });
});
