import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { hall } from '../support/plans.js';
import { startServer, type TestServer } from '../support/server.js';
import type { Visitor } from '../support/visitor.js';

let server: TestServer;
let ada: Visitor;
let path = '';
beforeAll(async () => {
  server = await startServer({ STILLAIR_PAGE_WAIT: '0' });
  ada = await server.signedIn();
  const answer = await ada.post('/plans/import', { text: JSON.stringify(hall()) });
  path = answer.location?.replace(/\?.*/, '') ?? '';
});
afterAll(() => server.close());

describe('a plan that is still being worked out', () => {
  it('is shown at once without its results, which then come by themselves or on asking', async () => {
    const page = await ada.get(path);
    expect(page.status).toBe(200);
    expect(page.text).toContain('Being worked out');
    expect(page.text).toContain('name="event.title"');
    expect(page.text).not.toContain('decision-word');

    const results = await ada.get(`${path}/results`);
    expect(results.status).toBe(200);
    expect(results.text).toContain('decision-word');
    expect(results.text).not.toContain('<html');

    const asked = await ada.get(`${path}?wait`);
    expect(asked.text).toContain('decision-word');
    expect(asked.text).not.toContain('Being worked out');
  });

  it('gives its results to nobody who is not signed in', async () => {
    const answer = await server.visitor().get(`${path}/results`);
    expect(answer.status).not.toBe(200);
    expect(answer.text).not.toContain('decision-word');
  });
});
