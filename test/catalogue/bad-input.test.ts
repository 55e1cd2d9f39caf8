import { cpSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, describe, expect, test } from 'vitest';
import { loadCatalogue } from '../../src/catalogue/catalogue.js';
import { cautionsIn } from '../../src/catalogue/cautions.js';
import { readDataFile } from '../../src/catalogue/data-file.js';
import { demonstrationsOf } from '../../src/catalogue/demonstrations.js';
import { checklistsOf, controlsOf, policyOf } from '../../src/catalogue/policy.js';
import { rulePackOf } from '../../src/catalogue/rule-packs.js';
import { InvalidInput } from '../../src/errors.js';

const templates = fileURLToPath(new URL('../../templates', import.meta.url));
const folder = mkdtempSync(join(tmpdir(), 'catalogue-'));
afterAll(() => {
  rmSync(folder, { recursive: true });
});

const catalogue = loadCatalogue();
const gases = new Set(['He', 'N2', 'Ar', 'CO2', 'SF6', 'N2O', 'H2', 'CH4', 'C3H8', 'O2', 'Ne']);
for (const gas of ['Kr', 'Xe', 'R134a', 'R152a', 'R1234yf', 'R1234zeE']) gases.add(gas);
const ids = (rows: readonly { readonly id: string }[]) => new Set(rows.map(({ id }) => id));
const names = { gases, demonstrations: ids(catalogue.demonstrations) };
const known = {
  ...names,
  controls: ids(catalogue.controls),
  cautions: ids(catalogue.cautions),
  slots: ids(catalogue.checklists.slots),
  breathingHeights: ids(catalogue.policy.breathingHeights),
};

/** A file of templates/ with one passage replaced, and the line on which the passage stood. */
function spoiled(name: string, from: string, to: string): { path: string; line: number } {
  const text = readFileSync(join(templates, name), 'utf8');
  const at = text.indexOf(from);
  if (at < 0) throw new Error(`${name} has no passage "${from}"`);
  const [room = '', file = ''] = name.split('/');
  mkdirSync(join(folder, room), { recursive: true });
  const path = join(folder, room, file);
  writeFileSync(path, text.slice(0, at) + to + text.slice(at + from.length));
  return { path, line: text.slice(0, at).split('\n').length };
}

function refusalOf(load: () => unknown): InvalidInput {
  try {
    load();
  } catch (error) {
    if (error instanceof InvalidInput) return error;
    throw error;
  }
  throw new Error('nothing was refused');
}

/** Message with file and line, a hint, and details that repeat the place. */
function expectPlace(refusal: InvalidInput, file: string, line: number, problem: RegExp): void {
  expect(refusal.message).toContain(`${file} line ${String(line)}:`);
  expect(refusal.message).toMatch(problem);
  expect(refusal.hint.length).toBeGreaterThan(10);
  expect(refusal.details[0]?.problem).toContain(`${file} line ${String(line)}`);
}

const pack = (path: string) => () => rulePackOf(path, { ...names, policy: catalogue.policy });
const demonstration = (path: string) => () => demonstrationsOf([path], known);

describe('a rule pack is refused with file, line and hint', () => {
  test('when a rule has no source', () => {
    const source =
      '    source: official or primary text, read\n    checked: first-hand\n  - id: gb-dsear-zones';
    const { path } = spoiled(
      'rules/gb.yaml',
      source,
      '    checked: first-hand\n  - id: gb-dsear-zones',
    );
    const text = readFileSync(path, 'utf8');
    const start = text.slice(0, text.indexOf('  - id: gb-dsear-assess')).split('\n').length;
    expectPlace(refusalOf(pack(path)), 'rules/gb.yaml', start, /source is missing/);
  });

  test('when a condition asks for a fact nobody knows', () => {
    const { path, line } = spoiled(
      'rules/gb.yaml',
      '{ fact: minorHelps, is: true }',
      '{ fact: fullMoon, is: true }',
    );
    expectPlace(refusalOf(pack(path)), 'rules/gb.yaml', line, /fact must be one of .*minorHelps/);
  });

  test('when a test does not suit its fact', () => {
    const { path, line } = spoiled(
      'rules/gb.yaml',
      '{ fact: minorHelps, is: true }',
      '{ fact: minorHelps, above: 3 }',
    );
    const refusal = refusalOf(pack(path));
    expectPlace(refusal, 'rules/gb.yaml', line, /minorHelps takes exactly one of is/);
  });

  test('when a condition mixes two forms', () => {
    const { path, line } = spoiled(
      'rules/gb.yaml',
      '{ fact: minorHelps, is: true }',
      '{ always: true, fact: minorHelps, is: true }',
    );
    expectPlace(refusalOf(pack(path)), 'rules/gb.yaml', line, /exactly one of always, fact/);
  });

  test('when a limit is given in another unit', () => {
    const { path, line } = spoiled('rules/gb.yaml', 'unit: ppm', 'unit: mg/m3');
    expectPlace(refusalOf(pack(path)), 'rules/gb.yaml', line, /unit must be one of ppm/);
  });

  test('when a ppm limit is written as a fraction', () => {
    const { path, line } = spoiled('rules/gb.yaml', 'value: 15000', 'value: 0.015');
    expectPlace(refusalOf(pack(path)), 'rules/gb.yaml', line, /looks like another unit/);
  });

  test('when an oxygen percentage is written as a fraction', () => {
    const { path, line } = spoiled('rules/gb.yaml', 'value: 19.5', 'value: 0.195');
    expectPlace(refusalOf(pack(path)), 'rules/gb.yaml', line, /not a percentage of oxygen/);
  });

  test('when a judging row is one that fresh air fails', () => {
    const { path } = spoiled('rules/eu.yaml', 'role: note', 'role: judge');
    const text = readFileSync(path, 'utf8');
    const after = text.indexOf('role: judge', text.indexOf('- id: de-o2-any-drop'));
    const line = text.slice(0, after).split('\n').length;
    expectPlace(refusalOf(pack(path)), 'rules/eu.yaml', line, /fresh humid air or any gas plan/);
  });

  test('when fresh air already exceeds a judging gas limit', () => {
    const { path } = spoiled(
      'rules/gb.yaml',
      'value: 5000\n    unit: ppm',
      'value: 400\n    unit: ppm',
    );
    expect(refusalOf(pack(path)).message).toMatch(/fresh air holds 420 ppm/);
  });

  test('when an oxygen pressure is to judge', () => {
    const { path } = spoiled(
      'rules/international.yaml',
      'unit: kPa\n    level: never',
      'unit: kPa\n    level: never',
    );
    const text = readFileSync(path, 'utf8');
    const start = text.indexOf('- id: int-o2-pp-lab');
    writeFileSync(
      path,
      text.slice(0, start) + text.slice(start).replace('role: show', 'role: judge'),
    );
    expect(refusalOf(pack(path)).message).toMatch(/fresh air at altitude would fail it/);
  });

  test('when a judging row loosens the policy', () => {
    const { path, line } = spoiled('rules/gb.yaml', 'value: 15000', 'value: 30000');
    const refusal = refusalOf(pack(path));
    expectPlace(refusal, 'rules/gb.yaml', line, /loosens the policy, which allows 15000 ppm/);
    const oxygen = spoiled('rules/gb.yaml', 'value: 19.5', 'value: 17.0');
    expectPlace(refusalOf(pack(oxygen.path)), 'rules/gb.yaml', oxygen.line, /loosens the limit/);
  });

  test('when it names a gas that is not in the library', () => {
    const { path, line } = spoiled('rules/gb.yaml', 'gas: N2O', 'gas: Unobtainium');
    expect(refusalOf(pack(path)).hint.length).toBeGreaterThan(0);
    expectPlace(refusalOf(pack(path)), 'rules/gb.yaml', line, /gas/);
    const other = spoiled('rules/gb.yaml', 'gas: N2O', 'gas: Rn');
    expectPlace(refusalOf(pack(other.path)), 'rules/gb.yaml', other.line, /unknown gas "Rn"/);
  });

  test('when it claims to be fully read and is not', () => {
    const { path, line } = spoiled('rules/gb.yaml', 'fullyRead: false', 'fullyRead: true');
    expectPlace(refusalOf(pack(path)), 'rules/gb.yaml', line, /not every row was read/);
  });

  test('when a field is misspelt', () => {
    const { path } = spoiled('rules/gb.yaml', '    duty:', '    dutty:');
    expect(
      refusalOf(pack(path))
        .details.map(({ problem }) => problem)
        .join('\n'),
    ).toMatch(/rules\/gb\.yaml line \d+: is not a known field/);
  });
});

describe('a demonstration is refused with file, line and hint', () => {
  test('when a release lets out an unknown gas', () => {
    const { path, line } = spoiled(
      'demonstrations/bench-fog.yaml',
      '      gas: CO2',
      '      gas: CO3',
    );
    expectPlace(
      refusalOf(demonstration(path)),
      'demonstrations/bench-fog.yaml',
      line,
      /unknown gas "CO3"/,
    );
  });

  test.each([
    ['control', 'control: low-extract', 'control: magic-extract'],
    ['caution', '- fog-is-water', '- fog-is-tea'],
    ['slot', '{portionKg} kg enters', '{portion} kg enters'],
    ['breathing height', 'breathingHeight: floor-child', 'breathingHeight: giraffe'],
    ['demonstration', 'demonstration: floating-bubbles', 'demonstration: sinking-bubbles'],
  ])('when it refers to an unknown %s', (kind, from, to) => {
    const { path, line } = spoiled('demonstrations/bench-fog.yaml', from, to);
    expectPlace(
      refusalOf(demonstration(path)),
      'demonstrations/bench-fog.yaml',
      line,
      new RegExp(`unknown ${kind}`),
    );
  });

  test('when its id is not the name of its file', () => {
    const { path, line } = spoiled('demonstrations/bench-fog.yaml', 'id: bench-fog', 'id: fog');
    expectPlace(
      refusalOf(demonstration(path)),
      'demonstrations/bench-fog.yaml',
      line,
      /not the name of the file/,
    );
  });

  test('when it has no worst credible release', () => {
    const { path } = spoiled(
      'demonstrations/bench-fog.yaml',
      'worstCredible:',
      'worstCredible: []\nrest:',
    );
    expect(() => demonstration(path)()).toThrow(InvalidInput);
    expect(refusalOf(demonstration(path)).message).toMatch(
      /demonstrations\/bench-fog\.yaml line \d+/,
    );
  });

  test('when a fault belongs to a planned release that is not there', () => {
    const { path, line } = spoiled(
      'demonstrations/stage-fog.yaml',
      'onlyWith: liquid-nitrogen-cue',
      'onlyWith: liquid-argon-cue',
    );
    expectPlace(
      refusalOf(demonstration(path)),
      'demonstrations/stage-fog.yaml',
      line,
      /unknown planned release "liquid-argon-cue"/,
    );
  });

  test('when low, typical and high are not in order', () => {
    const { path, line } = spoiled(
      'demonstrations/bench-fog.yaml',
      '{ low: 0.5, typical: 1.5, high: 3 }',
      '{ low: 2, typical: 1.5, high: 3 }',
    );
    expectPlace(
      refusalOf(demonstration(path)),
      'demonstrations/bench-fog.yaml',
      line,
      /not in order/,
    );
  });
});

describe('a policy file is refused with file, line and hint', () => {
  test('when a default has no source', () => {
    const { path } = spoiled('policy/default.yaml', '    source: common practice, no source\n', '');
    expect(refusalOf(() => policyOf(path, names)).message).toMatch(
      /policy\/default\.yaml line \d+: .*source is missing/,
    );
  });

  test('when a default is left out', () => {
    const { path } = spoiled('policy/default.yaml', 'name: balloonM3', 'name: balloonOverfilledM3');
    const refusal = refusalOf(() => policyOf(path, names));
    expect(refusal.details.map(({ problem }) => problem).join('\n')).toMatch(
      /balloonM3 is missing/,
    );
  });

  test('when never is looser than the limit', () => {
    const { path } = spoiled('policy/default.yaml', 'value: 0.180', 'value: 0.199');
    expect(refusalOf(() => policyOf(path, names)).message).toMatch(/aim, limit and never/);
  });

  test('when a control is out of hierarchy order or a condition claims credit', () => {
    const order = spoiled('policy/controls.yaml', 'level: eliminate', 'level: protect');
    expect(refusalOf(() => controlsOf(order.path, catalogue.checklists)).message).toMatch(
      /policy\/controls\.yaml line \d+: .*stands after protect/,
    );
    const credit = spoiled('policy/controls.yaml', 'effect: sourceRemoved', 'effect: condition');
    expect(refusalOf(() => controlsOf(credit.path, catalogue.checklists)).message).toMatch(
      /earns no credit/,
    );
  });

  test('when a control claims credit and a reason for none, or gives neither', () => {
    const both = spoiled(
      'policy/controls.yaml',
      'effect: condition\n    credit: false',
      'effect: holdTime\n    credit: true',
    );
    expect(refusalOf(() => controlsOf(both.path, catalogue.checklists)).message).toMatch(
      /policy\/controls\.yaml line \d+: .*has no reason for none/,
    );
    const neither = spoiled('policy/controls.yaml', 'credit: true', 'credit: false');
    expect(refusalOf(() => controlsOf(neither.path, catalogue.checklists)).message).toMatch(
      /must say why/,
    );
  });

  test('when a step or a line of a control has a slot that is no parameter of it', () => {
    const step = spoiled(
      'policy/controls.yaml',
      '{amountShare} of the planned',
      '{share} of the planned',
    );
    expect(refusalOf(() => controlsOf(step.path, catalogue.checklists)).message).toMatch(
      /policy\/controls\.yaml line \d+: .*share/,
    );
  });

  test('when a checklist line fills a slot nobody defined', () => {
    const { path, line } = spoiled('policy/checklists.yaml', '{validUntil}.', '{validTill}.');
    expectPlace(
      refusalOf(() => checklistsOf(path, names)),
      'policy/checklists.yaml',
      line,
      /unknown slot "validTill"/,
    );
  });
});

describe('a broken data file is refused with file, line and hint', () => {
  function written(text: string): string {
    const path = join(folder, 'cautions', 'broken.yaml');
    rmSync(join(folder, 'cautions'), { recursive: true, force: true });
    mkdirSync(join(folder, 'cautions'));
    writeFileSync(path, text);
    return path;
  }

  test('when its YAML cannot be parsed', () => {
    const path = written("cautions:\n  - id: one\n    text: 'no end\n");
    expect(refusalOf(() => readDataFile(path)).message).toMatch(
      /cautions\/broken\.yaml line [2-4]:/,
    );
    expect(refusalOf(() => readDataFile(path)).hint).toContain('indentation');
  });

  test('when a key stands twice', () => {
    const path = written('cautions: []\ncautions: []\n');
    expectPlace(
      refusalOf(() => readDataFile(path)),
      'cautions/broken.yaml',
      2,
      /unique/i,
    );
  });

  test('when aliases would unfold it', () => {
    const bomb = [
      'a: &a [x, x, x, x, x, x, x, x, x]',
      'b: &b [*a, *a, *a, *a, *a, *a, *a, *a, *a]',
      'c: &c [*b, *b, *b, *b, *b, *b, *b, *b, *b]',
      'cautions: *c',
    ].join('\n');
    const started = process.memoryUsage().heapUsed;
    expectPlace(
      refusalOf(() => readDataFile(written(bomb))),
      'cautions/broken.yaml',
      2,
      /not accepted/,
    );
    expect(process.memoryUsage().heapUsed - started).toBeLessThan(50_000_000);
  });

  test('when it is larger than a megabyte', () => {
    const path = written(`cautions: []\n${'# padding\n'.repeat(110_000)}`);
    expectPlace(
      refusalOf(() => readDataFile(path)),
      'cautions/broken.yaml',
      1,
      /larger than/,
    );
  });

  test('when it is not there', () => {
    const path = join(folder, 'cautions', 'nowhere.yaml');
    expectPlace(
      refusalOf(() => readDataFile(path)),
      'cautions/nowhere.yaml',
      1,
      /missing/,
    );
  });

  test('when a whole folder is missing', () => {
    const refusal = refusalOf(() => loadCatalogue(join(folder, 'nowhere')));
    expect(refusal.message).toContain('gases is missing');
    expect(refusal.hint).toContain('templates');
  });

  test('when the same caution stands in two files', () => {
    rmSync(join(folder, 'cautions'), { recursive: true, force: true });
    cpSync(join(templates, 'cautions'), join(folder, 'cautions'), { recursive: true });
    cpSync(join(templates, 'cautions', 'gases.yaml'), join(folder, 'cautions', 'more.yaml'));
    expect(refusalOf(() => cautionsIn(join(folder, 'cautions'), names)).message).toMatch(
      /cautions\/more\.yaml line 3: .*stands in another file/,
    );
  });

  test('JSON data are read by the same reader, with lines', () => {
    const path = join(folder, 'rows.json');
    writeFileSync(path, '{\n  "rows": [\n    1,\n    { "id": "two" }\n  ]\n}\n');
    const file = readDataFile(path);
    expect(file.value).toEqual({ rows: [1, { id: 'two' }] });
    expect(file.lineOf('/rows/1/id')).toBe(4);
    expect(file.lineOf('/rows/1/missing')).toBe(4);
  });
});
