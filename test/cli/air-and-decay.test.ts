import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { airResultSchema } from '../../src/assessment/calculators/air.js';
import { schemaProblems } from '../../src/assessment/schema-check.js';
import type { AirResult } from '../../src/science/room-air/air-result.js';
import {
  DEFAULT_DISTRIBUTIONS,
  SAMPLED_INPUTS,
} from '../../src/science/room-air/input-distributions.js';
import { startServer, type TestServer } from '../support/server.js';
import type { Visitor } from '../support/visitor.js';

const root = fileURLToPath(new URL('../..', import.meta.url));
let server: TestServer;
let ada: Visitor;
beforeAll(async () => {
  server = await startServer();
  ada = await server.signedIn();
});
afterAll(() => server.close());

/** The built command, as a person runs it. */
function run(words: readonly string[], document: unknown) {
  const { status, stdout, stderr } = spawnSync(process.execPath, ['dist/cli.js', ...words], {
    cwd: root,
    input: JSON.stringify(document),
    encoding: 'utf8',
    timeout: 120_000,
    maxBuffer: 1e9,
  });
  return { status, stderr, body: JSON.parse(stdout) as unknown };
}

/** Fog of dry ice poured on a stage that opens to a pit below it, with people in both. */
const stage = (uncertainty?: object) => ({
  ambient: { temperatureK: 293.15, pressurePa: 101_325, relativeHumidity: 0.5 },
  durationS: 1800,
  outputIntervalS: 60,
  thresholds: [{ quantity: 'CO2', value: 0.005 }],
  spaces: [
    { id: 'stage', floorAreaM2: 80, heightM: 6 },
    { id: 'pit', floorAreaM2: 30, heightM: 2.5, floorLevelM: -2.5 },
  ],
  openings: [
    { from: 'stage', to: 'pit', kind: 'floorOpening', widthM: 2, heightM: 1, sillLevelM: 0 },
  ],
  airSystems: [{ space: 'stage', drive: 'extract', freshAirM3PerS: 0.3, extractLevel: 'high' }],
  infiltration: [{ space: 'pit', airChangesPerHour: 0.3 }],
  releases: [{ space: 'stage', gas: 'CO2', massKg: 4, startS: 300, durationS: 300, manner: 'fog' }],
  occupants: [{ space: 'stage', count: 6, metabolicRateMet: 1.4 }],
  zones: [
    { id: 'players', space: 'stage', heightM: 1.5 },
    { id: 'musicians', space: 'pit', heightM: 1.2 },
  ],
  ...(uncertainty && { uncertainty }),
});
const samples = { samples: 8, seed: 7 };

/** A fall at 2.4 air changes per hour from 1420 to 420 ppm. */
const log = (rate = 2.4) => ({
  timesS: Array.from({ length: 11 }, (_, i) => i * 180),
  readingsPpm: Array.from({ length: 11 }, (_, i) => 420 + 1000 * Math.exp((-rate * i) / 20)),
  backgroundPpm: 420,
  volumeM3: 150,
});

describe('air with uncertainty', () => {
  it('answers the same document alike on the command line and over HTTP', async () => {
    const document = stage(samples);
    const command = run(['air'], document);
    expect(command.status).toBe(0);
    expect(command.stderr).toBe('');
    const http = await ada.postJson('/api/calculate/air', document);
    expect(http.status).toBe(200);
    expect(JSON.parse(http.text)).toEqual(command.body);
    expect(schemaProblems(airResultSchema, command.body)).toEqual([]);
  });

  it('gives the band in order, the drivers within -1 and 1, and a closed balance', () => {
    const { body } = run(['air'], stage(samples));
    const { zones, drivers, balance, timesS, warnings } = body as AirResult & {
      readonly warnings?: readonly string[];
    };
    expect(warnings).toBeUndefined();
    const layered = zones.musicians?.layered;
    const { p05, p50, p95 } = layered ?? {};
    expect(p95?.gasFraction.CO2).toHaveLength(timesS.length);
    p50?.gasFraction.CO2?.forEach((middle, i) => {
      expect(p05?.gasFraction.CO2?.[i] ?? NaN).toBeLessThanOrEqual(middle);
      expect(p95?.gasFraction.CO2?.[i] ?? NaN).toBeGreaterThanOrEqual(middle);
    });
    expect(drivers?.length).toBeGreaterThan(0);
    for (const { input, rankCorrelation, zone } of drivers ?? []) {
      expect(SAMPLED_INPUTS).toContain(input);
      expect(['players', 'musicians']).toContain(zone);
      expect(Math.abs(rankCorrelation)).toBeLessThanOrEqual(1);
    }
    // Issue: gas conserved to 1e-6 on every run that is reported.
    expect(Math.abs(balance.CO2?.relativeError ?? NaN)).toBeLessThan(1e-6);
  });

  it('repeats itself with the same seed, and narrows where every input is fixed', () => {
    const fixed = Object.fromEntries(
      SAMPLED_INPUTS.map((name) => {
        const one = DEFAULT_DISTRIBUTIONS[name];
        const value =
          one.kind === 'lognormal' ? one.median : one.kind === 'normal' ? one.mean : undefined;
        const low = 'low' in one ? one.low : 0;
        const middle = one.kind === 'triangular' ? one.mode : low;
        return [name, { kind: 'fixed', value: value ?? middle }];
      }),
    );
    const width = (body: unknown): number => {
      const { p05, p95 } = (body as AirResult).zones.players?.layered ?? {};
      return Math.max(
        ...(p95?.gasFraction.CO2 ?? []).map((high, i) => high - (p05?.gasFraction.CO2?.[i] ?? 0)),
      );
    };
    const first = run(['air'], [stage(samples), stage({ ...samples, distributions: fixed })]);
    const [free, held] = first.body as readonly unknown[];
    expect(width(free)).toBeGreaterThan(1e-5);
    // Single precision of the stored draws.
    expect(width(held)).toBeLessThan(1e-6);
    expect(run(['air'], stage(samples)).body).toEqual(free);
  });

  it.each([
    ['an unknown input', { luck: { kind: 'fixed', value: 1 } }, '/uncertainty/distributions'],
    [
      'ends the wrong way round',
      { mixingFactor: { kind: 'uniform', low: 1, high: 0.3 } },
      '/uncertainty/distributions/mixingFactor',
    ],
    [
      'a mode outside',
      { mixingFactor: { kind: 'triangular', low: 0.3, mode: 2, high: 1 } },
      '/uncertainty/distributions/mixingFactor',
    ],
  ])('refuses %s among the distributions, by exit status and place', async (_, changed, path) => {
    const document = stage({ ...samples, distributions: changed });
    const { status, body } = run(['air'], document);
    expect(status).toBe(2);
    const { error } = body as { error: { code: string; details: { path: string }[] } };
    expect(error.code).toBe('invalid-input');
    expect(error.details.some((one) => one.path.startsWith(path))).toBe(true);
    const http = await ada.postJson('/api/calculate/air', document);
    expect(http.status).toBe(422);
    expect(JSON.parse(http.text)).toEqual(body);
  });

  it('answers a list in order, each a result or an error, with the gravest exit status', async () => {
    const list = [stage(), { ...stage(), spaces: [] }];
    const { status, body } = run(['air'], list);
    expect(status).toBe(2);
    expect(body).toMatchObject([{ zones: {} }, { error: { code: 'invalid-input' } }]);
    const http = await ada.postJson('/api/calculate/air', list);
    expect(JSON.parse(http.text)).toEqual(body);
  });

  it('prints the whole schema, with each distribution and its default, and the drivers', () => {
    const { status, body } = run(['schema', 'air'], null);
    expect(status).toBe(0);
    const { input, output } = body as Record<
      'input' | 'output',
      { properties: Record<string, { properties?: Record<string, unknown>; items?: unknown }> }
    >;
    const uncertainty = input.properties.uncertainty?.properties as
      Record<string, { properties: Record<string, { default: unknown }> }> | undefined;
    expect(Object.keys(uncertainty ?? {})).toEqual(
      expect.arrayContaining(['samples', 'seed', 'distributions']),
    );
    const defaults = uncertainty?.distributions?.properties ?? {};
    expect(Object.fromEntries(Object.entries(defaults).map(([k, v]) => [k, v.default]))).toEqual(
      DEFAULT_DISTRIBUTIONS,
    );
    expect(output.properties).toHaveProperty('drivers.items.properties.rankCorrelation');
    expect(output.properties).toHaveProperty('balance');
    expect(output.properties).toHaveProperty('crossings');
  });
});

describe('decay', () => {
  it('answers the keys of the contract, alike on the command line and over HTTP', async () => {
    const { status, body } = run(['decay'], log());
    expect(status).toBe(0);
    expect(Object.keys(body as object).sort()).toEqual([
      'airChangesPerHour',
      'freshAirInterval95',
      'freshAirM3PerS',
      'interval95',
      'rSquared',
      'standardUncertainty',
      'warnings',
    ]);
    const { airChangesPerHour, freshAirM3PerS } = body as Record<string, number>;
    // Exact exponential: the rate that made it.
    expect(airChangesPerHour).toBeCloseTo(2.4, 9);
    expect(freshAirM3PerS).toBeCloseTo((2.4 * 150) / 3600, 9);
    expect(JSON.parse((await ada.postJson('/api/calculate/decay', log())).text)).toEqual(body);
  });

  it('fits the background where it is null', () => {
    const { body } = run(['decay'], { ...log(), backgroundPpm: null });
    expect((body as Record<string, number>).airChangesPerHour).toBeCloseTo(2.4, 4);
  });

  it('ends with 1 where nothing follows, 2 where the log is wrong, and lists both in order', async () => {
    const list = [log(), log(-1), { ...log(), timesS: [0, 1] }];
    const { status, body } = run(['decay'], list);
    expect(status).toBe(1);
    const codes = (body as { error?: { code: string } }[]).map(({ error }) => error?.code ?? 'ok');
    expect(codes).toEqual(['ok', 'not-computable', 'invalid-input']);
    expect(run(['decay'], [log(), { ...log(), timesS: [0, 1] }]).status).toBe(2);
    expect(JSON.parse((await ada.postJson('/api/calculate/decay', list)).text)).toEqual(body);
  });
});
