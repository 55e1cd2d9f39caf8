import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { InvalidInput, NotFound } from '../../src/errors.js';
import type { Block, Heading, Table, Words } from '../../src/sheets/document-tree.js';
import { filledText } from '../../src/sheets/filled-text.js';
import { riskSheet } from '../../src/sheets/risk-sheet.js';
import { riskSheetTexts, riskTextsFrom } from '../../src/sheets/sheet-texts.js';
import { assessmentFixture, emptyAssessment } from '../support/assessment-fixture.js';

const texts = riskSheetTexts();
const facts = { printedOn: '2026-12-01', status: 'draft' } as const;
const tree = riskSheet(assessmentFixture, texts, facts);
const plain = (words: Words): string =>
  (typeof words === 'string' ? words : words.map((span) => span.text).join('')).replaceAll(
    '\u00a0',
    ' ',
  );
const headings = (blocks: readonly Block[]): Heading[] =>
  blocks.filter((block) => block.kind === 'heading');

/** The blocks between a heading and the next of its level. */
function partOf(blocks: readonly Block[], title: string): Block[] {
  const start = blocks.findIndex((block) => block.kind === 'heading' && block.words === title);
  const rest = blocks.slice(start + 1);
  const end = rest.findIndex((block) => block.kind === 'heading' && block.level === 2);
  return end === -1 ? rest : rest.slice(0, end);
}
function tablesOf(blocks: readonly Block[], title: string): Table[] {
  return partOf(blocks, title).filter((block) => block.kind === 'table');
}
const cellsOf = (table: Table | undefined): string[][] =>
  (table?.rows ?? []).map((row) => row.cells.map(plain));

describe('riskSheet', () => {
  it('opens with the title, the facts and the decision with the number that decides', () => {
    const kinds = tree.blocks.slice(0, 4).map((block) => block.kind);
    expect(kinds).toEqual(['heading', 'facts', 'heading', 'decision']);
    const decision = tree.blocks[3];
    if (decision?.kind !== 'decision') throw new Error('no decision box');
    expect(decision.words.map((entry) => [entry.label, entry.word])).toEqual([
      ['As filed', 'No-go'],
      ['With the chosen controls', 'Go with conditions'],
    ]);
    expect(plain(decision.number?.value ?? '')).toBe('17.8 %');
    expect(plain(decision.number?.against ?? '')).toBe(
      'inventory bound, planned; judged against 18.0 %',
    );
    expect(decision.lines.map(plain)[0]).toContain('Row 4 of the decision table');
    expect(decision.lines.map(plain).join(' ')).toContain('licensed practice decide');
  });

  it('has one heading of the first level and numbers its parts in the order of the wording file', () => {
    const found = headings(tree.blocks);
    expect(found.filter((heading) => heading.level === 1)).toHaveLength(1);
    const parts = found.filter((heading) => heading.level === 2);
    expect(parts.map((heading) => heading.words)).toEqual(
      texts.order.map((name) => texts.parts[name].heading),
    );
    expect(parts.map((heading) => heading.number)).toEqual(
      texts.order.map((_, index) => String(index + 1)),
    );
  });

  it('prints planned and worst credible quantities of every act', () => {
    const [released] = tablesOf(tree.blocks, 'Acts and quantities');
    expect(cellsOf(released).map((cells) => cells.slice(1, 5))).toEqual([
      ['planned', 'dry ice into warm water, two jugs', 'CO2', '3.00 kg'],
      ['worst credible', 'whole box into warm water', 'CO2', '10.0 kg'],
      ['planned', 'bag of 20 L, opened', 'Ar', '0.0332 kg'],
      [
        'worst credible',
        'cylinder outside, line torn off',
        'Ar',
        '0.410 kg\n(0.300 kg\nto 0.600 kg)',
      ],
    ]);
  });

  it('prints oxygen rounded down and gas rounded up, with the pressure beside it', () => {
    const [planned] = tablesOf(tree.blocks, 'What people breathe');
    expect(planned?.columns.map((column) => column.title)).toEqual([
      'Zone and height',
      'Quantity',
      'Well mixed',
      'Inventory bound',
      'Oxygen pressure',
      'Stands',
    ]);
    const [oxygen, gas] = cellsOf(planned);
    // 0.17896 is 17.896 %: down to 17.8; (0.209 - 0.17896) * 4.4 = 13.2176 %: up to 13.3.
    expect(oxygen).toEqual([
      'Players\nOrchestra pit, 1.15 m above its floor',
      'Oxygen',
      '19.8 %',
      '17.8 %',
      '17.5 kPa',
      'past never',
    ]);
    expect(gas?.slice(1)).toEqual(['Carbon dioxide', '4.7 %', '13.3 %', '–', 'past never']);
  });

  it('says where no number is given instead of leaving the zone out', () => {
    const lists = partOf(tree.blocks, 'What people breathe').filter(
      (block) => block.kind === 'list',
    );
    expect(lists.flatMap((list) => list.items).map(plain)).toEqual([
      'Face over the tub: not computed: keep faces out.',
    ]);
  });

  it('names the layered answer in a column of its own as soon as there is one', () => {
    const [players] = assessmentFixture.zones;
    const [oxygen] = players?.quantities ?? [];
    if (players === undefined || oxygen === undefined) throw new Error('the fixture has no zone');
    const layered = {
      ...oxygen,
      answers: { ...oxygen.answers, layered: { ...oxygen.levels.aim, ...oxygen.answers.mixed } },
    } as typeof oxygen;
    const withLayers = riskSheet(
      { ...assessmentFixture, zones: [{ ...players, quantities: [layered] }] },
      texts,
      facts,
    );
    const [table] = tablesOf(withLayers.blocks, 'What people breathe');
    expect(table?.columns.map((column) => column.title)).toContain('Layered, 95 in 100');
  });

  it('numbers the conditions and ties each to act, zone, row and checklist line', () => {
    const numbered = partOf(tree.blocks, 'Conditions').find((block) => block.kind === 'numbered');
    const [first] = numbered?.items ?? [];
    expect(first?.number).toBe('1');
    expect(plain(first?.words ?? '')).toContain('The day does not start without it.');
    expect(first?.detail).toContain('On the day: Pit empty and locked');
    expect(first?.detail).toContain('Act: Bench fog. Zone: Players. Row 4 of the decision table.');
  });

  it('earns no credit for a control that the model cannot express', () => {
    const [controls] = tablesOf(tree.blocks, 'Controls');
    const signs = cellsOf(controls).find((cells) => cells[0] === 'Signs at the pit doors');
    expect(signs?.slice(4, 6)).toEqual(['–', 'no credit']);
  });

  it('asks for confirmation of every rule that was not read first-hand, and of no other', () => {
    const [rules] = tablesOf(tree.blocks, 'Rules cited');
    expect(cellsOf(rules).map((cells) => cells[4])).toEqual([
      'read in full',
      'from a summary\nconfirm against the current text',
    ]);
  });

  it('rounds a largest permissible amount down', () => {
    const [largest] = tablesOf(tree.blocks, 'Largest amounts and hold times');
    // 2.1467 kg and 1.1887 m3 in the fixture.
    expect(cellsOf(largest)[0]?.slice(4)).toEqual(['2.14 kg', '1.18 m³', '3.00 kg']);
  });

  it('ends with four signatures and the hash of the input', () => {
    const end = partOf(tree.blocks, 'Sign-off');
    const signOff = end.find((block) => block.kind === 'signOff');
    expect(signOff?.rows.map((row) => row.role)).toEqual([
      'coordinator',
      'gas handler',
      'presenter',
      'venue safety officer',
    ]);
    const last = end.at(-1);
    if (last?.kind !== 'paragraph') throw new Error('no closing line');
    expect(plain(last.words)).toContain(assessmentFixture.inputHash);
  });

  it('is marked across the page unless it is approved', () => {
    expect(tree.mark).toBe('DRAFT');
    expect(riskSheet(assessmentFixture, texts, { ...facts, status: 'approved' }).mark).toBeNull();
    const old = riskSheet(assessmentFixture, texts, { ...facts, status: 'superseded' });
    expect(old.mark).toBe('SUPERSEDED');
  });

  it('says of every empty part that it is empty', () => {
    const empty = riskSheet(emptyAssessment, texts, facts);
    for (const heading of headings(empty.blocks).filter((entry) => entry.level === 2)) {
      expect(partOf(empty.blocks, heading.words).length, heading.words).toBeGreaterThan(0);
    }
  });

  it('follows the order of the wording file', () => {
    const turned = riskSheet(
      assessmentFixture,
      { ...texts, order: ['signOff', 'decision'] },
      facts,
    );
    expect(headings(turned.blocks).map((heading) => heading.words)).toEqual([
      assessmentFixture.title,
      'Sign-off',
      'Decision',
    ]);
  });
});

describe('riskSheetTexts', () => {
  const file = readFileSync(
    new URL('../../templates/sheets/risk-sheet.en.yaml', import.meta.url),
    'utf8',
  );

  it('refuses a language that has no file, naming the file to add', () => {
    expect(() => riskSheetTexts('xx')).toThrow(NotFound);
    expect(() => riskSheetTexts('../../etc')).toThrow(NotFound);
  });

  it('refuses a file that lacks a word, naming the place', () => {
    const lacking = file.replace(/^ {4}asFiled:.*\n/m, '');
    expect(() => riskTextsFrom(lacking, 'test.yaml')).toThrow(/parts\/decision\/asFiled/);
  });

  it('refuses a file that is not YAML, with its line', () => {
    expect(() => riskTextsFrom('a: [1', 'test.yaml')).toThrow(/not valid YAML.*line 1/);
  });
});

describe('filledText', () => {
  it('refuses a slot that nothing fills, so that no sheet is printed with a hole', () => {
    expect(() => filledText('until {day}', { date: 'x' })).toThrow(InvalidInput);
  });
});
