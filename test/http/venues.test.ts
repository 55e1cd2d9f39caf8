import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { VenuesRepository } from '../../src/storage/venues.repository.js';
import { startServer, type TestServer } from '../support/server.js';
import type { Visitor } from '../support/visitor.js';

let server: TestServer;
let ada: Visitor;

beforeAll(async () => {
  server = await startServer();
  ada = await server.signedIn();
});
afterAll(() => server.close());

const room = {
  title: 'Annexe',
  'spaces.0.row': 'on',
  'spaces.0.id': 'S1',
  'spaces.0.title': 'Workshop',
  'spaces.0.floorAreaM2': '60',
  'spaces.0.floorAreaM2-origin': 'measured',
  'spaces.0.floorAreaM2-on': '2027-01-20',
  'spaces.0.heightM': '2.7',
  do: 'save',
};

const stored = () => server.app.get(VenuesRepository, { strict: false });

async function saved(fields: Readonly<Record<string, string>> = room): Promise<string> {
  const answer = await ada.post('/venues', fields);
  expect(answer.status).toBe(303);
  return /\/venues\/([^?]+)/.exec(answer.location ?? '')?.[1] ?? '';
}

describe('the register', () => {
  test('says what to do when it is empty, and lists a venue once there is one', async () => {
    expect((await ada.get('/venues')).text).toContain('There is no venue yet');
    await saved();
    const { text } = await ada.get('/venues');
    expect(text).toContain('Annexe');
  });

  test('answers no stranger', async () => {
    const answer = await server.visitor().get('/venues');
    expect(answer.status).toBe(303);
    expect(answer.location).toContain('/sign-in');
  });
});

describe('saving a venue', () => {
  test('keeps value, origin and date of a figure, in SI units', async () => {
    const venue = await stored().get(await saved());
    expect(venue.spaces[0]?.data.floorAreaM2).toEqual({
      value: 60,
      origin: 'measured',
      on: '2027-01-20',
    });
    expect(venue.spaces[0]?.data.heightM).toBe(2.7);
  });

  test('leaves a blank figure out: it never becomes zero', async () => {
    const id = await saved({
      ...room,
      'spaces.0.volumeM3': '   ',
      'spaces.0.floorLevelM': '',
      'site.altitudeM': '',
      'site.temperatureK': '',
    });
    const venue = await stored().get(id);
    expect(venue.spaces[0]?.data).not.toHaveProperty('volumeM3');
    expect(venue.spaces[0]?.data).not.toHaveProperty('floorLevelM');
    expect(venue.site).toEqual({});
  });

  test('keeps "don\u2019t know" as a figure without a value', async () => {
    const id = await saved({
      ...room,
      'airSystems.0.row': 'on',
      'airSystems.0.id': 'A1',
      'airSystems.0.drive': 'supply',
      'airSystems.0.serves.0.space': 'S1',
      'airSystems.0.serves.0.share': '100',
      'airSystems.0.freshAirM3PerS-origin': 'unknown',
    });
    const venue = await stored().get(id);
    expect(venue.airSystems[0]?.data).toEqual({
      drive: 'supply',
      serves: [{ space: 'S1', share: 1 }],
      freshAirM3PerS: { origin: 'unknown' },
    });
  });

  test('reads litres per second and degrees Celsius, and shows them again as typed', async () => {
    const id = await saved({
      ...room,
      'site.temperatureK': '21.5',
      'airSystems.0.row': 'on',
      'airSystems.0.id': 'A1',
      'airSystems.0.drive': 'supply',
      'airSystems.0.serves.0.space': 'S1',
      'airSystems.0.serves.0.share': '100',
      'airSystems.0.freshAirM3PerS': '72',
    });
    const venue = await stored().get(id);
    expect(venue.airSystems[0]?.data.freshAirM3PerS).toBe(0.072);
    expect(venue.site.temperatureK).toBe(294.65);
    const { text } = await ada.get(`/venues/${id}`);
    expect(text).toContain('name="airSystems.0.freshAirM3PerS" type="text" value="72"');
    expect(text).toContain('value="21.5"');
  });
});

const refusals: readonly (readonly [string, Readonly<Record<string, string>>, RegExp])[] = [
  ['a negative height', { 'spaces.0.heightM': '-3' }, /Mean clear height: -3 is too small/],
  ['a height beyond any building', { 'spaces.0.heightM': '4000' }, /4000 is too large/],
  [
    'words for a number',
    { 'spaces.0.heightM': 'tall' },
    /\u201d?tall.* is not a number|"tall" is not/,
  ],
  [
    'a missing floor area',
    {
      'spaces.0.floorAreaM2': '',
      'spaces.0.floorAreaM2-origin': '',
      'spaces.0.floorAreaM2-on': '',
    },
    /Floor area: enter a number/,
  ],
  ['a missing name', { title: '' }, /Name of the venue: fill this in/],
  [
    'a lowest above the highest',
    { 'spaces.0.heightM-low': '3', 'spaces.0.heightM-high': '2' },
    /the lowest is above the highest/,
  ],
  [
    'a value beside "don\u2019t know"',
    { 'spaces.0.heightM-origin': 'unknown' },
    /remove the number/,
  ],
  [
    'a date that does not exist',
    { 'spaces.0.floorAreaM2-on': '2027-02-31' },
    /write the date as 2026-01-31/,
  ],
  [
    'a field that is not of the form',
    { 'spaces.0.colour': 'red' },
    /spaces\.0\.colour.*is not a field of this form/,
  ],
  [
    'a space that does not exist',
    {
      'infiltration.0.row': 'on',
      'infiltration.0.space': 'S9',
      'infiltration.0.airChangesPerHour': '1',
    },
    /no space S9/,
  ],
  [
    'a site whose pressure contradicts its altitude',
    { 'site.altitudeM': '0', 'site.pressurePa': '70' },
    /does not fit the altitude/,
  ],
  ['a damaged hidden field', { 'spaces.0.rest': '{' }, /damaged on its way/],
  ['a button that does not exist', { do: 'burn:spaces.0' }, /button does not exist/],
];

describe('a rejected venue', () => {
  test.each(refusals)(
    'names %s beside its field, and keeps what was typed',
    async (_, change, message) => {
      const before = await stored().count();
      const answer = await ada.post('/venues', {
        ...room,
        'spaces.0.title': 'Kept as typed',
        ...change,
      });
      expect(answer.status).toBe(422);
      expect(answer.text.replaceAll('&quot;', '"')).toMatch(message);
      expect(answer.text).toContain('value="Kept as typed"');
      expect(answer.text).toContain('role="alert"');
      expect(await stored().count()).toBe(before);
    },
  );

  test('ties the message to the field by its description', async () => {
    const { text } = await ada.post('/venues', { ...room, 'spaces.0.heightM': '-3' });
    expect(text).toContain('aria-describedby="field-spaces_0_heightM-error"');
    expect(text).toContain('href="#field-spaces_0_heightM"');
  });
});

describe('rows', () => {
  test('are added without saving, with everything typed kept', async () => {
    const before = await stored().count();
    const { status, text } = await ada.post('/venues', { ...room, do: 'add:openings' });
    expect(status).toBe(200);
    expect(text).toContain('name="openings.0.widthM"');
    expect(text).toContain('value="Workshop"');
    expect(text).toContain('Not saved yet');
    expect(await stored().count()).toBe(before);
  });

  test('are removed, and the later ones move up', async () => {
    const { text } = await ada.post('/venues', {
      ...room,
      'spaces.1.row': 'on',
      'spaces.1.id': 'S2',
      'spaces.1.title': 'Second',
      do: 'remove:spaces.0',
    });
    expect(text).toContain('name="spaces.0.title" type="text" value="Second"');
    expect(text).not.toContain('value="Workshop"');
  });
});

describe('two people at once', () => {
  test('the slower one is shown both versions, loses nothing, and can still save', async () => {
    const id = await saved();
    const first = await ada.post(`/venues/${id}`, {
      ...room,
      version: '1',
      'spaces.0.heightM': '3',
    });
    expect(first.status).toBe(303);
    const second = await ada.post(`/venues/${id}`, {
      ...room,
      version: '1',
      'spaces.0.heightM': '4',
    });
    expect(second.status).toBe(409);
    expect(second.text).toContain('Somebody else saved this venue first');
    expect(second.text).toMatch(
      /Mean clear height<\/th><td[^>]*>3\u00a0m<\/td><td[^>]*>4\u00a0m<\/td>/,
    );
    expect((await stored().get(id)).spaces[0]?.data.heightM).toBe(3);
    const third = await ada.post(`/venues/${id}`, {
      ...room,
      version: '2',
      'spaces.0.heightM': '4',
    });
    expect(third.status).toBe(303);
    expect((await stored().get(id)).spaces[0]?.data.heightM).toBe(4);
  });
});

describe('deleting a venue', () => {
  test('asks for a tick first, then deletes', async () => {
    const id = await saved();
    const refused = await ada.post(`/venues/${id}/delete`, { version: '1' });
    expect(refused.status).toBe(422);
    expect(refused.text).toContain('Tick the box');
    const done = await ada.post(`/venues/${id}/delete`, { version: '1', sure: 'on' });
    expect(done.status).toBe(303);
    expect((await ada.get(`/venues/${id}`)).status).toBe(404);
  });

  test('is refused while a plan uses it', async () => {
    const id = await saved();
    await ada.post('/plans', { title: 'There', venueId: id });
    const answer = await ada.post(`/venues/${id}/delete`, { version: '1', sure: 'on' });
    expect(answer.status).toBe(409);
    expect(answer.text).toContain('used by 1 plan');
  });
});
