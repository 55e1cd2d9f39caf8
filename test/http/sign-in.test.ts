import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { administrator, startServer, type TestServer } from '../support/server.js';

let server: TestServer;
beforeAll(async () => {
  server = await startServer();
  await server.signedIn();
});
afterAll(() => server.close());

const { email, password } = administrator;

describe('signing in', () => {
  it('opens a session under a cookie that scripts and other sites do not get', async () => {
    const visitor = server.visitor();
    const answer = await visitor.post('/sign-in', { email, password });
    const [cookie = ''] = answer.headers.getSetCookie();

    expect([answer.status, answer.location]).toEqual([303, '/']);
    expect(cookie).toMatch(/^stillair=[\w-]{43};/);
    expect(cookie).toContain('HttpOnly');
    expect(cookie).toContain('SameSite=Lax');
    expect((await visitor.get('/')).status).toBe(200);
  });

  it('never continues a session that the browser brought along', async () => {
    const visitor = server.visitor();
    const planted = 'A'.repeat(43);
    visitor.cookies.set('stillair', planted);
    await visitor.send('/sign-in', {
      method: 'POST',
      headers: { 'content-type': 'application/x-www-form-urlencoded', origin: server.url },
      body: new URLSearchParams({ email, password }).toString(),
    });
    const fresh = visitor.cookies.get('stillair');

    const attacker = server.visitor();
    attacker.cookies.set('stillair', planted);
    expect(fresh).not.toBe(planted);
    expect((await attacker.get('/')).status).toBe(303);
  });

  it('closes the session that it replaces', async () => {
    const visitor = server.visitor();
    await visitor.post('/sign-in', { email, password });
    const earlier = visitor.cookies.get('stillair') ?? '';
    await visitor.post('/sign-in', { email, password });

    const other = server.visitor();
    other.cookies.set('stillair', earlier);
    expect((await other.get('/')).status).toBe(303);
    expect((await visitor.get('/')).status).toBe(200);
  });

  it('keeps only a hash of the cookie, which does not work as a cookie', async () => {
    const sessions = await server.database.read((db) => db.session.findMany());
    const thief = server.visitor();
    thief.cookies.set('stillair', sessions[0]?.id ?? '');

    expect(sessions.length).toBeGreaterThan(0);
    expect((await thief.get('/')).status).toBe(303);
  });

  it('goes on to the page that was asked for, when it is one of ours', async () => {
    const to = async (next: string) =>
      (await server.visitor().post('/sign-in', { email, password, next })).location;

    expect(await to('/account?tab=1')).toBe('/account?tab=1');
    expect(await to('https://elsewhere.example')).toBe('/');
    expect(await to('//elsewhere.example')).toBe('/');
    expect(await to('/\\elsewhere.example')).toBe('/');
    expect(await to('/account\r\nset-cookie: a=b')).toBe('/');
  });

  it('says the same for a wrong password and for an unknown person, and keeps the email typed', async () => {
    const wrong = await server.visitor().post('/sign-in', { email, password: 'not this one' });
    const unknown = await server
      .visitor()
      .post('/sign-in', { email: 'nobody@example.org', password: 'not this one' });

    expect([wrong.status, unknown.status]).toEqual([422, 422]);
    expect(wrong.text).toContain('The email or the password is not right.');
    expect(unknown.text.replaceAll('nobody@example.org', email)).toBe(wrong.text);
    expect(wrong.text).toContain(`value="${email}"`);
    expect(wrong.text).not.toContain('not this one');
  });

  it('shows typed markup as text', async () => {
    const { text } = await server
      .visitor()
      .post('/sign-in', { email: '"><script>alert(1)</script>', password: 'x' });

    expect(text).not.toContain('<script>');
  });
});

describe('signing out', () => {
  it('ends the session in the database, so that the old cookie is worthless', async () => {
    const visitor = server.visitor();
    await visitor.post('/sign-in', { email, password });
    const cookie = visitor.cookies.get('stillair') ?? '';
    const answer = await visitor.post('/sign-out', {});

    expect([answer.status, answer.location]).toEqual([303, '/sign-in?notice=signedOut']);
    visitor.cookies.set('stillair', cookie);
    expect((await visitor.get('/')).status).toBe(303);
  });
});

describe('an expired session', () => {
  it('lets nobody in', async () => {
    const visitor = server.visitor();
    await visitor.post('/sign-in', { email, password });
    await server.database.write((db) =>
      db.session.updateMany({ data: { expiresAt: new Date(Date.now() - 1000) } }),
    );

    expect((await visitor.get('/')).status).toBe(303);
  });
});

describe('behind an encrypted address', () => {
  it('binds the cookie to encryption and to this host', async () => {
    const secure = await startServer({ STILLAIR_PUBLIC_URL: 'https://plans.example.org' });
    const visitor = await secure.signedIn();

    expect([...visitor.cookies.keys()]).toEqual(['__Host-stillair']);
    await secure.close();
  });
});

describe('guessing', () => {
  it('is stopped after twenty tries, for the right password too', async () => {
    const fresh = await startServer();
    await fresh.signedIn();
    const tries: number[] = [];
    for (let n = 0; n < 22; n += 1) {
      tries.push((await fresh.visitor().post('/sign-in', { email: 'x', password: 'x' })).status);
    }
    const right = await fresh.visitor().post('/sign-in', { email, password });

    expect(tries.filter((status) => status === 422)).toHaveLength(20);
    expect(tries.slice(-2)).toEqual([429, 429]);
    expect(right.status).toBe(429);
    expect(right.text).toContain('Too many tries in a short time.');
    await fresh.close();
  });

  it('is not made possible again by claiming to be somebody else', async () => {
    const fresh = await startServer();
    const statuses: number[] = [];
    for (let n = 0; n < 22; n += 1) {
      const headers = { 'x-forwarded-for': `10.0.0.${String(n)}` };
      statuses.push(
        (await fresh.visitor().post('/sign-in', { email: 'x', password: 'x' }, headers)).status,
      );
    }

    expect(statuses.at(-1)).toBe(429);
    await fresh.close();
  });
});
