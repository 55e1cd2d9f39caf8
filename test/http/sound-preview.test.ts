import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { PlanFile } from '../../src/assessment/plan-file.js';
import { hall } from '../support/plans.js';
import { startServer, type TestServer } from '../support/server.js';
import type { Visitor } from '../support/visitor.js';

let server: TestServer;
let ada: Visitor;
let plan: string;

const act: PlanFile['acts'][number] = {
  id: 'pipe',
  title: 'Pipe and voice',
  space: 'hall',
  minute: 5,
  releases: {
    planned: [{ gas: 'He', volumeM3: 0.02, durationS: 60, manner: 'gentle' }],
    worstCredible: [{ gas: 'He', volumeM3: 0.02, manner: 'burst' }],
  },
  sound: [
    { instrument: 'fluePipe', frequencyInAirHz: 315, gas: 'He', bagVolumeM3: 0.02 },
    { instrument: 'voice', composition: { He: 1 } },
  ],
};

beforeAll(async () => {
  server = await startServer();
  ada = await server.signedIn();
  const text = JSON.stringify(hall({ acts: [act] }));
  const { location } = await ada.post('/plans/import', { text });
  plan = /\/plans\/([^?]+)/.exec(location ?? '')?.[1] ?? '';
});
afterAll(() => server.close());

describe('the illustrations of a plan', () => {
  it('are a pair of different WAV files, kept by nobody else', async () => {
    const texts: string[] = [];
    for (const which of ['before', 'after']) {
      const answer = await ada.get(`/plans/${plan}/sound/0/${which}.wav`);
      expect(answer.status).toBe(200);
      expect(answer.headers.get('content-type')).toBe('audio/wav');
      expect(answer.headers.get('cache-control')).toContain('private');
      expect(answer.text.startsWith('RIFF')).toBe(true);
      texts.push(answer.text);
    }
    expect(texts[0]).not.toBe(texts[1]);
  });

  it.each(['1/before.wav', '1/after.wav', '2/after.wav', '0/other.wav', '-1/after.wav'])(
    'do not exist for a refused voice, a wrong number or a wrong name: %s',
    async (address) => {
      expect((await ada.get(`/plans/${plan}/sound/${address}`)).status).toBe(404);
    },
  );

  it('are for people who are signed in', async () => {
    const answer = await server.visitor().get(`/plans/${plan}/sound/0/after.wav`);
    expect(answer.status).toBe(303);
  });
});
