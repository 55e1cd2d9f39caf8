import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startServer, type TestServer } from '../support/server.js';

let server: TestServer;
beforeAll(async () => {
  server = await startServer();
});
afterAll(() => server.close());

/** All that answers somebody who is not signed in. A new line here is a decision. */
const openRoutes = [
  'GET /first/:token',
  'GET /health',
  'GET /ready',
  'GET /sign-in',
  'GET /static/fonts/*',
  'GET /static/islands/*',
  'GET /static/styles/*',
  'POST /first/:token',
  'POST /sign-in',
];

describe('a stranger', () => {
  it('is refused by every route but sign-in, the first link, health and static files', async () => {
    const open: string[] = [];
    for (const { method, path } of server.routes) {
      const address = path.replaceAll(/:\w+/g, 'x').replace('*', 'x');
      const answer = await server.visitor().send(address, {
        method,
        ...(!['GET', 'HEAD'].includes(method) && {
          headers: { 'content-type': 'application/x-www-form-urlencoded', origin: server.url },
          body: 'name=x',
        }),
      });
      const isSentToSignIn =
        answer.status === 303 && (answer.location ?? '').startsWith('/sign-in');
      if (!isSentToSignIn && answer.status !== 403) open.push(`${method} ${path}`);
    }

    expect(server.routes.length).toBeGreaterThan(10);
    expect(open.sort()).toEqual(
      server.routes
        .filter(({ method, path }) =>
          openRoutes.includes(`${method.replace('HEAD', 'GET')} ${path}`),
        )
        .map(({ method, path }) => `${method} ${path}`)
        .sort(),
    );
  });

  it('is sent to sign-in by a page, and back to that page afterwards', async () => {
    const answer = await server.visitor().get('/account?tab=1');

    expect([answer.status, answer.location]).toEqual([303, '/sign-in?next=%2Faccount%3Ftab%3D1']);
    expect(answer.text).toBe('');
  });

  it('gets the error object from an API address, and nothing else', async () => {
    const answer = await server.visitor().get('/account', { accept: 'application/json' });

    expect(answer.status).toBe(403);
    expect(JSON.parse(answer.text)).toEqual({
      error: {
        code: 'not-allowed',
        message: 'You are not signed in.',
        hint: 'Sign in, then try again.',
        details: [],
      },
    });
  });

  it('is told nothing but "ok" by health, and nothing about accounts by readiness', async () => {
    expect((await server.visitor().get('/health')).text).toBe('{"status":"ok"}');
    expect((await server.visitor().get('/ready')).text).toBe('{"status":"ready"}');
  });

  it.each([
    '/static/styles/../fonts/../../package.json',
    '/static/styles/%2e%2e/%2e%2e/package.json',
    '/static/fonts/..%2f..%2fpackage.json',
    '/static/styles/....//package.json',
    '/static/fonts/%5c..%5c..%5cpackage.json',
    '/static/styles/stillair.css%00.txt',
  ])('gets no file from outside the static folders by %s', async (path) => {
    // fetch() would tidy the dots away before sending.
    const { request } = await import('node:http');
    const { status, text } = await new Promise<{ status: number; text: string }>(
      (resolve, reject) => {
        const { hostname, port } = new URL(server.url);
        request({ hostname, port, path, method: 'GET' }, (response) => {
          let text = '';
          response.on('data', (chunk: Buffer) => (text += chunk.toString()));
          response.on('end', () => {
            resolve({ status: response.statusCode ?? 0, text });
          });
        })
          .on('error', reject)
          .end();
      },
    );

    expect(status).toBeGreaterThanOrEqual(300);
    expect(status).toBeLessThan(500);
    expect(text).not.toContain('"dependencies"');
  });
});

describe('every answer', () => {
  it('forbids scripts, styles and frames from anywhere but the server itself', async () => {
    const { headers } = await server.visitor().get('/sign-in');
    const policy = headers.get('content-security-policy') ?? '';

    expect(policy).toContain("default-src 'none'");
    expect(policy).toContain("script-src 'self'");
    expect(policy).toContain("style-src 'self'");
    expect(policy).toContain("frame-ancestors 'none'");
    expect(policy).not.toContain('unsafe');
    expect(headers.get('x-content-type-options')).toBe('nosniff');
    expect(headers.get('cache-control')).toBe('no-store');
  });
});
