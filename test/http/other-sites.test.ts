import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { administrator, startServer, type TestServer } from '../support/server.js';
import type { Visitor } from '../support/visitor.js';

let server: TestServer;
let visitor: Visitor;
beforeAll(async () => {
  server = await startServer();
  visitor = await server.signedIn();
});
afterAll(() => server.close());

const stillSignedIn = async () => (await visitor.get('/')).status === 200;

describe('a form from another site', () => {
  it('is refused by its origin, even with the right token', async () => {
    const answer = await visitor.post('/sign-out', {}, { origin: 'https://elsewhere.example' });

    expect(answer.status).toBe(403);
    expect(answer.text).toContain('This came from another site, so nothing was done.');
    expect(await stillSignedIn()).toBe(true);
  });

  it.each(['cross-site', 'same-site'])('is refused when the browser calls it %s', async (site) => {
    const answer = await visitor.post('/sign-out', {}, { 'sec-fetch-site': site });

    expect(answer.status).toBe(403);
    expect(await stillSignedIn()).toBe(true);
  });

  it('is refused when its origin is hidden', async () => {
    expect((await visitor.post('/sign-out', {}, { origin: 'null' })).status).toBe(403);
    expect(await stillSignedIn()).toBe(true);
  });

  it.each([
    ['no token', ''],
    ['a made-up token', 'formToken=AAAA'],
    ['two tokens', 'formToken=a&formToken=b'],
  ])('is refused with %s, whatever else it says', async (_, body) => {
    const answer = await visitor.send('/sign-out', {
      method: 'POST',
      headers: { 'content-type': 'application/x-www-form-urlencoded', origin: server.url },
      body,
    });

    expect(answer.status).toBe(403);
    expect(await stillSignedIn()).toBe(true);
  });

  it('is refused with the token of another session of the same person', async () => {
    const other = server.visitor();
    await other.post('/sign-in', { email: administrator.email, password: administrator.password });
    const token = (await other.formToken()) ?? '';

    expect((await visitor.post('/sign-out', { formToken: token })).status).toBe(403);
    expect(await stillSignedIn()).toBe(true);
  });

  it('is refused as plain text that happens to be JSON', async () => {
    const answer = await visitor.send('/sign-out', {
      method: 'POST',
      headers: { 'content-type': 'text/plain' },
      body: '{}',
    });

    expect(answer.status).toBeGreaterThanOrEqual(400);
    expect(await stillSignedIn()).toBe(true);
  });

  it('cannot sign a visitor in under somebody else\u2019s name', async () => {
    const { email, password } = administrator;
    const answer = await server
      .visitor()
      .post('/sign-in', { email, password }, { 'sec-fetch-site': 'cross-site' });

    expect(answer.status).toBe(403);
    expect(answer.headers.getSetCookie()).toEqual([]);
  });
});
