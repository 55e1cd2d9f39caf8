import { readFileSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { VenuesRepository } from '../../src/storage/venues.repository.js';
import { startServer, type TestServer } from '../support/server.js';
import type { Visitor } from '../support/visitor.js';

let server: TestServer;
let ada: Visitor;
let hall = '';

const venue = {
  title: 'Annexe',
  'spaces.0.row': 'on',
  'spaces.0.id': 'S1',
  'spaces.0.title': 'Workshop',
  'spaces.0.floorAreaM2': '46',
  'spaces.0.heightM': '2.5',
  'spaces.0.volumeM3': '100',
  'spaces.1.row': 'on',
  'spaces.1.id': 'S2',
  'spaces.1.title': 'Store',
  'spaces.1.floorAreaM2': '8',
  'spaces.1.heightM': '2.5',
  'infiltration.0.row': 'on',
  'infiltration.0.space': 'S1',
  'infiltration.0.airChangesPerHour': '0.5',
  'airSystems.0.row': 'on',
  'airSystems.0.id': 'A1',
  'airSystems.0.title': 'Roof fan',
  'airSystems.0.drive': 'extract',
  'airSystems.0.serves.0.space': 'S1',
  'airSystems.0.serves.0.share': '80',
  'airSystems.0.serves.1.space': 'S2',
  'airSystems.0.serves.1.share': '20',
  'airSystems.0.freshAirM3PerS': '90',
  do: 'save',
};

async function saved(fields: Readonly<Record<string, string>> = venue): Promise<string> {
  const answer = await ada.post('/venues', fields);
  expect(answer.status).toBe(303);
  return /\/venues\/([^?]+)/.exec(answer.location ?? '')?.[1] ?? '';
}
beforeAll(async () => {
  server = await startServer();
  ada = await server.signedIn();
  hall = await saved();
});
afterAll(() => server.close());

const stored = (id: string) => server.app.get(VenuesRepository, { strict: false }).get(id);

/** A fall at 3 air changes per hour from 1400 to an outdoor 420 ppm, with two ppm of noise. */
const fall = (rate = 3) =>
  Array.from({ length: 13 }, (_, i) => {
    const noise = i % 2 === 0 ? 2 : -2;
    return `${String(i * 2)};${(420 + 980 * Math.exp((-rate * i) / 30) + noise).toFixed(1).replace('.', ',')}`;
  });
const sheet = ['min;CO2', ...fall()].join('\n');
const entry = {
  version: '1',
  space: 'S1',
  text: sheet,
  timesIn: 'asWritten',
  backgroundPpm: '420',
  do: 'work',
};
const plain = (html: string) =>
  html
    .replaceAll(/<[^>]+>/g, ' ')
    .replaceAll('&quot;', '"')
    .replaceAll(/[\s\u00a0]+/g, ' ');

describe('the page about a log', () => {
  it('is linked from the venue and opens with its spaces', async () => {
    expect((await ada.get(`/venues/${hall}`)).text).toContain(`/venues/${hall}/air-log`);
    const { status, text } = await ada.get(`/venues/${hall}/air-log`);
    expect(status).toBe(200);
    expect(text).toContain('Workshop');
    expect((await server.visitor().get(`/venues/${hall}/air-log`)).status).toBe(303);
    expect((await ada.get('/venues/none/air-log')).status).toBe(404);
  });

  it('shows rate, flow and interval of the published decay record, and draws it', async () => {
    const { checks } = JSON.parse(
      readFileSync(new URL('../reference/air-checks.json', import.meta.url), 'utf8'),
    ) as {
      checks: {
        id: string;
        inputs: { times_s: number[]; co2_ppm: number[]; background_ppm: number };
        expected: Record<string, number>;
      }[];
    };
    const record = checks.find(({ id }) => id === 'AC-T01');
    expect(record).toBeDefined();
    if (!record) return;
    const { times_s: times, co2_ppm: readings, background_ppm: background } = record.inputs;
    const lines = times.map((t, i) => `${String(t)},${String(readings[i])}`);
    const { status, text } = await ada.post(`/venues/${hall}/air-log`, {
      ...entry,
      text: ['time s,ppm', ...lines].join('\n'),
      backgroundPpm: String(background),
    });
    expect(status).toBe(200);
    const rate = record.expected.air_change_per_h ?? NaN;
    expect(plain(text)).toContain(`Air changes ${rate.toPrecision(3)} per hour`);
    // Three digits shown, small flows in litres; the volume of this space is 100 m3.
    expect(plain(text)).toContain(`Fresh air ${((rate * 100_000) / 3600).toPrecision(3)} L/s`);
    expect(text).toContain('<svg');
    expect(text).toContain('Readings as dots');
  });

  it('stores nothing until it is told to', async () => {
    const before = await stored(hall);
    await ada.post(`/venues/${hall}/air-log`, entry);
    expect((await stored(hall)).version).toBe(before.version);
  });

  it('keeps log and entries when something is wrong, and names the line', async () => {
    const answer = await ada.post(`/venues/${hall}/air-log`, {
      ...entry,
      text: sheet.replace('8;', '8;x'),
      note: 'Doors shut',
      volumeM3: '97,5',
    });
    expect(answer.status).toBe(422);
    expect(plain(answer.text)).toContain('Line 6: the reading "x1078,9" is not a number');
    expect(answer.text).toContain('10;');
    expect(answer.text).toContain('value="97,5"');
    expect(answer.text).toContain('href="#field-text"');
  });

  it.each([
    ['a log that rises', { text: 'min,ppm\n0,500\n5,600\n10,700\n15,800' }, /do not fall/],
    ['readings at the background', { backgroundPpm: '900' }, /Reading \d+ is not above/],
    ['a space of another venue', { space: 'S9' }, /Choose a space of this venue/],
    ['words for a volume', { volumeM3: 'large' }, /Free air volume: is no number/],
    ['a cut that leaves nothing', { fromMin: '23' }, /Fewer than four readings are left/],
    ['no log at all', { text: '' }, /The log is empty/],
    ['a unit that is none', { timesIn: 'days' }, /Please correct/],
    ['a damaged version', { version: 'x' }, /Please correct/],
  ])('refuses %s in words', async (_, change, message) => {
    const answer = await ada.post(`/venues/${hall}/air-log`, { ...entry, ...change });
    expect(answer.status).toBe(422);
    expect(plain(answer.text)).toMatch(message);
  });

  it('takes a file, and keeps its lines in the page', async () => {
    const form = new FormData();
    const token = await ada.formToken();
    for (const [name, value] of Object.entries({ ...entry, text: '', formToken: token ?? '' })) {
      form.set(name, value);
    }
    form.set('file', new Blob([sheet], { type: 'text/csv' }), 'log.csv');
    const sent = new Response(form);
    const answer = await ada.send(`/venues/${hall}/air-log`, {
      method: 'POST',
      headers: { origin: ada.url, 'content-type': sent.headers.get('content-type') ?? '' },
      body: await sent.text(),
    });
    expect(answer.status).toBe(200);
    expect(plain(answer.text)).toContain('Air changes 3.00 per hour');
    expect(answer.text).toContain('0;1402,0');
  });

  it('warns of people, a short log, unmixed air and a rise', async () => {
    const two = sheet
      .split('\n')
      .map((line, i) => {
        const high = Number((line.split(';')[1] ?? '').replace(',', '.')) - 200;
        return i === 0 ? 'min;CO2 low;CO2 high' : `${line};${high.toFixed(1).replace('.', ',')}`;
      })
      .slice(0, 7)
      .join('\n');
    const { text } = await ada.post(`/venues/${hall}/air-log`, {
      ...entry,
      text: two,
      people: '2',
    });
    const words = plain(text);
    expect(words).toContain('People were in the room');
    expect(words).toContain('Shorter than one time constant');
    expect(words).toContain('the air is not mixed');
    expect(words).toContain('clear at different rates');
    expect(words).toContain('Low in the room');
    const rising = ['min;ppm', '0;1000', '1;1200', '2;1390', ...fall().slice(2)].join('\n');
    const late = await ada.post(`/venues/${hall}/air-log`, { ...entry, text: rising });
    expect(plain(late.text)).toContain('still rise up to number 3');
  });
});

describe('using the measured value', () => {
  const use = { ...entry, do: 'use', part: 'system:0', on: '2026-11-30', by: 'House technician' };

  it('asks what was running and when, with the result still on the page', async () => {
    const answer = await ada.post(`/venues/${hall}/air-log`, { ...use, part: '', on: '' });
    expect(answer.status).toBe(422);
    expect(plain(answer.text)).toContain('Choose what was running during the log');
    expect(plain(answer.text)).toContain('Write the date of the log');
    expect(plain(answer.text)).toContain('Air changes 3.00 per hour');
  });

  it('writes value, interval, origin, date and note of the system, its leakage taken off', async () => {
    const id = await saved();
    const answer = await ada.post(`/venues/${id}/air-log`, { ...use, note: 'Fan at half' });
    expect(answer.status).toBe(303);
    const figure = (await stored(id)).airSystems[0]?.data.freshAirM3PerS as {
      value: number;
      low: number;
      high: number;
      note: string;
    };
    expect(figure).toMatchObject({ origin: 'measured', on: '2026-11-30', by: 'House technician' });
    // 3 per hour in 100 m3, half an air change of leakage off, over the share of 0.8 served here.
    expect(figure.value).toBeCloseTo((2.5 * 100) / 3600 / 0.8, 3);
    expect(figure.low).toBeLessThan(figure.value * 0.95);
    expect(figure.high).toBeGreaterThan(figure.value * 1.05);
    expect(figure.note).toContain('13 readings in 24 min');
    expect(figure.note).toContain('Fan at half');
    // The venue page shows it, and saves it again unharmed.
    expect((await ada.get(`/venues/${id}`)).text).toContain('Fan at half');
  });

  it('writes leakage as air changes per hour', async () => {
    const id = await saved();
    await ada.post(`/venues/${id}/air-log`, { ...use, part: 'leakage' });
    const rows = (await stored(id)).infiltrations;
    expect(rows).toHaveLength(1);
    const figure = rows[0]?.data.airChangesPerHour as { value: number };
    expect(figure.value).toBeCloseTo(3, 2);
  });

  it('adds a system where none was entered', async () => {
    const id = await saved();
    await ada.post(`/venues/${id}/air-log`, { ...use, part: 'newSystem' });
    const { airSystems } = await stored(id);
    expect(airSystems).toHaveLength(2);
    expect(airSystems[1]?.data).toMatchObject({
      drive: 'supply',
      serves: [{ space: 'S1', share: 1 }],
    });
  });

  it('refuses a system that moved no more than the leakage already counted', async () => {
    const slow = { ...use, text: ['min;CO2', ...fall(0.4)].join('\n') };
    const answer = await ada.post(`/venues/${hall}/air-log`, slow);
    expect(answer.status).toBe(422);
    expect(plain(answer.text)).toContain('no more air than the leakage');
  });

  it('loses nothing when somebody saved the venue meanwhile, and succeeds the second time', async () => {
    const id = await saved();
    await ada.post(`/venues/${id}`, { ...venue, version: '1', 'spaces.0.heightM': '2.6' });
    const late = await ada.post(`/venues/${id}/air-log`, use);
    expect(late.status).toBe(409);
    expect(plain(late.text)).toContain('Somebody saved this venue meanwhile');
    expect(late.text).toContain('value="House technician"');
    const version = /name="version" value="(\d+)"/.exec(late.text)?.[1] ?? '';
    expect(version).toBe('2');
    const again = await ada.post(`/venues/${id}/air-log`, { ...use, version });
    expect(again.status).toBe(303);
    expect((await stored(id)).spaces[0]?.data.heightM).toBe(2.6);
  });
});
