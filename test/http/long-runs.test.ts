import { availableParallelism } from 'node:os';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startServer, type TestServer } from '../support/server.js';
import type { Visitor } from '../support/visitor.js';

let server: TestServer;
let ada: Visitor;
beforeAll(async () => {
  server = await startServer();
  ada = await server.signedIn();
});
afterAll(() => server.close());

/** A room with people in it; with many samples this keeps a thread busy for a long time. */
const room = (samples: number) => ({
  ambient: { temperatureK: 293.15, pressurePa: 101_325 },
  durationS: 3600,
  outputIntervalS: 60,
  spaces: [
    { id: 'hall', floorAreaM2: 100, heightM: 4 },
    { id: 'foyer', floorAreaM2: 40, heightM: 3 },
  ],
  openings: [{ from: 'hall', to: 'foyer', kind: 'doorway', widthM: 1, heightM: 2 }],
  infiltration: [{ space: 'foyer', airChangesPerHour: 1 }],
  occupants: [{ space: 'hall', count: 40, carbonDioxideM3PerS: 5e-6 }],
  zones: [{ id: 'seats', space: 'hall', heightM: 1.2 }],
  uncertainty: { samples, seed: 1 },
});

/** The answer of a long run, or what became of it, and a way to walk off. */
function asked(visitor: Visitor, document: unknown) {
  const client = new AbortController();
  const cookie = [...visitor.cookies].map(([name, value]) => `${name}=${value}`).join('; ');
  const state = { isAnswered: false };
  const end = fetch(`${visitor.url}/api/calculate/air`, {
    method: 'POST',
    headers: {
      cookie,
      origin: visitor.url,
      'content-type': 'application/json',
      accept: 'application/json',
    },
    body: JSON.stringify(document),
    signal: client.signal,
  }).then(
    () => {
      state.isAnswered = true;
    },
    () => undefined,
  );
  return {
    state,
    leave: async () => {
      client.abort();
      await end;
    },
  };
}

describe('a long run in the pool', () => {
  it('leaves the server answering, and frees its thread when its client goes away', async () => {
    const runs = Array.from({ length: Math.min(availableParallelism(), 4) }, () =>
      asked(ada, room(65_536)),
    );
    // Three answers while every thread is taken: a health check, a page and a refusal.
    expect((await ada.get('/health')).status).toBe(200);
    expect((await ada.get('/venues')).status).toBe(200);
    expect((await ada.postJson('/api/calculate/gas', {})).status).toBe(422);
    expect(runs.map(({ state }) => state.isAnswered)).not.toContain(true);

    await Promise.all(runs.map(({ leave }) => leave()));
    // Every thread was taken: this is answered only because the dropped runs gave theirs back.
    const small = await ada.postJson('/api/calculate/air', room(4));
    expect(small.status).toBe(200);
    expect(JSON.parse(small.text)).toHaveProperty('zones.seats.mixed.oxygenFraction');
    expect(runs.map(({ state }) => state.isAnswered)).not.toContain(true);
  });

  it('answers a list of documents in order, each with its result or error', async () => {
    const { status, text } = await ada.postJson('/api/calculate/air', [
      room(2),
      { ...room(2), spaces: [] },
    ]);
    expect(status).toBe(200);
    expect(JSON.parse(text)).toMatchObject([
      { zones: { seats: {} } },
      { error: { code: 'invalid-input', details: [{ path: '/spaces' }] } },
    ]);
  });
});
