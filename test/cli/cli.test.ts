import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Assessment } from '../../src/assessment/assessment.js';
import { figureText } from '../../src/assessment/figure-text.js';
import { fogAct, hall } from '../support/plans.js';

const root = fileURLToPath(new URL('../..', import.meta.url));
let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'cli-'));
});
afterAll(() => {
  rmSync(folder, { recursive: true, force: true });
});

interface Answer {
  readonly status: number | null;
  readonly stdout: string;
  readonly stderr: string;
}

function run(words: readonly string[], input = ''): Answer {
  const source = ['--import', './.scripts/run-source.mjs', 'src/cli.ts'];
  const { status, stdout, stderr } = spawnSync(process.execPath, [...source, ...words], {
    cwd: root,
    input,
    encoding: 'utf8',
    timeout: 120_000,
    maxBuffer: 1e9,
  });
  return { status, stdout, stderr };
}

interface ErrorBody {
  readonly error: {
    readonly code: string;
    readonly message: string;
    readonly hint: string;
    readonly details: readonly { readonly path: string; readonly problem: string }[];
  };
}
const body = (answer: Answer): unknown => JSON.parse(answer.stdout);
const errorOf = (answer: Answer) => (body(answer) as ErrorBody).error;

const helium = { composition: { He: 1 }, temperatureK: 293.15, pressurePa: 101_325 };

describe('the command line', () => {
  it('answers one document with one document, exit 0, and nothing else', () => {
    const answer = run(['gas'], JSON.stringify(helium));
    expect(answer.status).toBe(0);
    expect(answer.stderr).toBe('');
    // 1 atm, 20 degrees C: 4.0026 g/mol over 0.02406 m3/mol.
    expect((body(answer) as { densityKgPerM3: number }).densityKgPerM3).toBeCloseTo(0.1664, 3);
  });

  it('answers an array in its order and ends with the gravest status, 2 before 3 before 0', () => {
    const cold = { ...helium, temperatureK: 10 };
    const wrong = { ...helium, composition: { Unobtainium: 1 } };
    const both = run(['gas'], JSON.stringify([helium, cold]));
    expect(both.status).toBe(3);
    const three = run(['gas'], JSON.stringify([cold, wrong, helium]));
    expect(three.status).toBe(2);
    const rows = body(three) as readonly Partial<ErrorBody>[];
    expect(rows.map((row) => row.error?.code ?? 'result')).toEqual([
      'out-of-range',
      'invalid-input',
      'result',
    ]);
  });

  it('exits 3 for a value out of range and names the range', () => {
    const answer = run(['gas'], JSON.stringify({ ...helium, temperatureK: 10 }));
    expect(answer.status).toBe(3);
    expect(errorOf(answer).code).toBe('out-of-range');
    expect(errorOf(answer).details[0]?.problem).toContain('263.15');
  });

  it('exits 2 for what may not be breathed, with an alternative and no dose or time', () => {
    const answer = run(
      ['sound'],
      JSON.stringify({
        instrument: 'voice',
        speaker: 'man',
        vowel: 'a',
        composition: { He: 1 },
        temperatureK: 293.15,
        pressurePa: 101_325,
      }),
    );
    expect(answer.status).toBe(2);
    expect(errorOf(answer).code).toBe('not-allowed');
    expect(errorOf(answer).hint).toContain('recording');
    expect(answer.stdout).not.toMatch(/\b(second|minute|breaths?)\b/i);
  });

  it.each([
    ['broken JSON', ['gas'], '{"composition":', 'not valid JSON'],
    ['nothing at all', ['gas'], '', 'empty'],
    ['a missing field', ['gas'], '{"temperatureK":293.15,"pressurePa":101325}', 'is missing'],
    ['broken YAML', ['assess'], 'event: [1, 2', 'standard input'],
    ['no calculator of that name', ['weather'], '{}', 'no calculator weather'],
    ['an option without its value', ['gas', '--preview'], '{}', 'needs a value'],
    ['an unknown option', ['gas', '--loud'], '{}', 'no option --loud'],
    ['a file that is not there', ['gas', 'not-there.json'], '', 'not-there.json cannot be read'],
  ])('exits 2 for %s and says what is wrong, without a stack trace', (_, words, input, said) => {
    const answer = run(words, input);
    expect(answer.status).toBe(2);
    expect(`${errorOf(answer).message} ${JSON.stringify(errorOf(answer).details)}`).toContain(said);
    expect(errorOf(answer).hint.length).toBeGreaterThan(10);
    expect(answer.stdout).not.toMatch(/\n\s+at /);
  });

  it('prints input and output schema of a calculator', () => {
    const answer = run(['schema', 'assess']);
    expect(answer.status).toBe(0);
    const { input, output } = body(answer) as Record<'input' | 'output', { properties: object }>;
    expect(Object.keys(input.properties)).toContain('venue');
    expect(Object.keys(output.properties)).toContain('decision');
  });

  it('writes a risk sheet that carries the word and the governing number of the JSON', () => {
    const plan = join(folder, 'plan.json');
    writeFileSync(plan, JSON.stringify(hall({ acts: [fogAct('hall', 0.5, 5)] })));
    const answer = run(['assess', plan, '--sheets', folder]);
    expect(answer.status).toBe(0);
    const assessment = body(answer) as Assessment;
    const sheet = join(folder, 'risk-sheet.pdf');
    expect(readFileSync(sheet).subarray(0, 5).toString()).toBe('%PDF-');
    const flat = (text: string) => text.replaceAll(/[\s\u00a0]+/g, ' ');
    const text = flat(execFileSync('pdftotext', ['-layout', sheet, '-'], { encoding: 'utf8' }));
    const words = {
      go: 'Go',
      goWithConditions: 'Go with conditions',
      notEnoughKnown: 'Not enough known',
      noGo: 'No-go',
    };
    expect(text).toContain(words[assessment.decision.asFiled]);
    expect(assessment.governing).not.toBeNull();
    if (assessment.governing) expect(text).toContain(flat(figureText(assessment.governing.figure)));
  });
});
