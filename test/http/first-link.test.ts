import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { FirstLinkService } from '../../src/people/first-link.service.js';
import { administrator, startServer, type TestServer } from '../support/server.js';

let server: TestServer;
beforeEach(async () => {
  server = await startServer();
});
afterEach(() => server.close());

const { name, email, password } = administrator;
const form = { name, email, password, passwordAgain: password };

async function printedLink(): Promise<string> {
  const link = await server.app.get(FirstLinkService).renew();
  if (link === undefined) throw new Error('No link: there is an account.');
  return link;
}

describe('the link that the terminal prints', () => {
  it('creates the administrator, signs in, and is dead from then on', async () => {
    const link = await printedLink();
    const visitor = server.visitor();

    expect((await visitor.get(link)).text).toContain('Create the administrator');
    const created = await visitor.post(link, form);
    const home = await visitor.get('/');
    const again = await server.visitor().get(link);
    const secondTry = await server.visitor().post(link, { ...form, email: 'eve@example.org' });

    expect([created.status, created.location]).toEqual([303, '/?notice=welcome']);
    expect(home.status).toBe(200);
    expect(home.text).toContain(name);
    expect([again.status, secondTry.status]).toEqual([404, 404]);
    expect(await server.app.get(FirstLinkService).renew()).toBeUndefined();
    expect(await server.database.read((db) => db.account.count())).toBe(1);
  });

  it('is replaced at the next start, so an old print-out opens nothing', async () => {
    const old = await printedLink();
    const fresh = await printedLink();

    expect((await server.visitor().get(old)).status).toBe(404);
    expect((await server.visitor().get(fresh)).status).toBe(200);
  });

  it('is not guessed: the database keeps only its hash', async () => {
    const link = await printedLink();
    const [row] = await server.database.read((db) => db.setupLink.findMany());

    expect(link).toMatch(/^\/first\/[\w-]{43}$/);
    expect(link).not.toContain(row?.id ?? 'missing');
    expect((await server.visitor().get(`/first/${row?.id ?? ''}`)).status).toBe(404);
  });

  it.each([
    ['a short password', { password: 'nine char', passwordAgain: 'nine char' }, 'at least 10'],
    ['two different passwords', { passwordAgain: 'something else' }, 'The two passwords differ'],
    ['no name', { name: '   ' }, 'Enter your name'],
    ['no email', { email: 'ada' }, 'Enter an email'],
    ['a field that nobody asked for', { role: 'reviewer' }, 'role'],
  ])('gives the form back filled in, with 422, for %s', async (_, change, message) => {
    const link = await printedLink();
    const answer = await server.visitor().post(link, { ...form, ...change });

    expect(answer.status).toBe(422);
    expect(answer.text).toContain(message);
    expect(answer.text).toContain('Please correct the following');
    expect(answer.text).not.toContain(password);
    expect(await server.database.read((db) => db.account.count())).toBe(0);
    expect((await server.visitor().get(link)).status).toBe(200);
  });
});
