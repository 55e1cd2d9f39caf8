import { cpSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, describe, expect, it } from 'vitest';
import { loadGasLibrary } from '../../src/catalogue/gas-library.js';
import { InvalidInput } from '../../src/errors.js';

const folders: string[] = [];

/** A throw-away copy of the gas data in which one file is changed. */
function templatesWith(file: string, change: (text: string) => string): string {
  const dir = mkdtempSync(join(tmpdir(), 'gas-data-'));
  folders.push(dir);
  cpSync('templates/gases', join(dir, 'gases'), { recursive: true });
  const path = join(dir, 'gases', file);
  writeFileSync(path, change(readFileSync(path, 'utf8')));
  return dir;
}

function refusalOf(action: () => unknown): InvalidInput {
  try {
    action();
  } catch (error) {
    if (error instanceof InvalidInput) return error;
    throw error;
  }
  throw new Error('nothing was refused');
}

afterEach(() => {
  for (const dir of folders.splice(0)) rmSync(dir, { recursive: true });
});

describe('the gas library', () => {
  it('holds the eighteen species, each datum with a source and a status', () => {
    const library = loadGasLibrary();
    expect(Object.keys(library.species).sort()).toEqual(
      [
        'Ar',
        'C3H8',
        'CH4',
        'CO2',
        'H2',
        'H2O',
        'He',
        'Kr',
        'N2',
        'N2O',
        'Ne',
        'O2',
        'R1234yf',
        'R1234zeE',
        'R134a',
        'R152a',
        'SF6',
        'Xe',
      ].sort(),
    );
    const withoutSource: string[] = [];
    for (const gas of Object.values(library.species)) {
      for (const [name, datum] of Object.entries(gas)) {
        if (typeof datum === 'string') continue;
        if (!('source' in datum && 'status' in datum)) withoutSource.push(`${gas.id}.${name}`);
      }
    }
    expect(withoutSource).toEqual([]);
  });

  it('is frozen to the last number', () => {
    const library = loadGasLibrary();
    expect(Object.isFrozen(library.species.He?.secondVirial.coefficientsM3PerMol)).toBe(true);
    expect(() => {
      (library.dryAir.molarMass as { molarMassKgPerMol: number }).molarMassKgPerMol = 1;
    }).toThrow(TypeError);
  });

  it('refuses a datum without a source and names file, place and remedy', () => {
    const dir = templatesWith('He.json', (text) => text.replace('"source"', '"origin"'));
    const refusal = refusalOf(() => loadGasLibrary(dir));
    expect(refusal.message).toContain('He.json');
    expect(refusal.details.map(({ path }) => path)).toContainEqual(
      expect.stringMatching(/He\.json#\/identity\/source$/),
    );
    expect(refusal.hint).toContain('source');
  });

  it('refuses broken JSON and names the file', () => {
    const dir = templatesWith('SF6.json', (text) => text.slice(0, 200));
    expect(refusalOf(() => loadGasLibrary(dir)).message).toContain('SF6.json');
  });

  it('refuses a file whose name and id disagree', () => {
    const dir = templatesWith('Ne.json', (text) => text.replace('"id": "Ne"', '"id": "He"'));
    expect(refusalOf(() => loadGasLibrary(dir)).message).toContain('describes He');
  });

  it('refuses shared models that name a gas without a file', () => {
    const dir = templatesWith('shared-models.json', (text) => text.replace('"SF6"', '"SF7"'));
    expect(refusalOf(() => loadGasLibrary(dir)).message).toContain('SF7');
  });

  it('refuses a folder that is not there', () => {
    expect(refusalOf(() => loadGasLibrary('nowhere')).hint).toContain('templates/gases');
  });
});
