import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { InvalidInput, NotFound } from '../../src/errors.js';
import type { Block, Heading, Table, Words } from '../../src/sheets/document-tree.js';
import { filledText } from '../../src/sheets/filled-text.js';
import { riskSheet, workingsSheet } from '../../src/sheets/risk-sheet.js';
import { riskSheetTexts, riskTextsFrom } from '../../src/sheets/sheet-texts.js';
import { assessmentFixture, emptyAssessment } from '../support/assessment-fixture.js';
import { figure } from '../support/section-fixture.js';

const texts = riskSheetTexts();
const facts = { printedOn: '2026-12-01', status: 'draft' } as const;
const tree = riskSheet(assessmentFixture, texts, facts);
const workings = workingsSheet(assessmentFixture, texts, facts);
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
    const [fog, pipe] = cellsOf(released).map((cells) => cells.slice(1));
    expect(fog?.[0]).toContain('dry ice into warm water, two jugs: CO2, 3.00 kg, ');
    expect(fog?.[1]).toContain('whole box into warm water: CO2, 10.0 kg, ');
    expect(pipe?.[0]).toContain('bag of 20 L, opened: Ar, 0.0332 kg, ');
    expect(pipe?.[1]).toContain(
      'cylinder outside, line torn off: Ar, 0.410 kg (0.300 kg to 0.600 kg), ',
    );
  });

  it('prints oxygen rounded down and gas rounded up, both cases side by side, with the pressure', () => {
    const [table] = tablesOf(tree.blocks, 'What people breathe');
    expect(table?.columns.map((column) => column.title)).toEqual([
      'Zone and height',
      'Quantity',
      'Planned, mixed',
      'Planned, bound',
      'Worst, mixed',
      'Worst, bound',
      'Planned stands',
      'Worst stands',
    ]);
    const [oxygen, gas] = cellsOf(table);
    // 0.17896 is 17.896 %: down to 17.8; (0.209 - 0.17896) * 4.4 = 13.2176 %: up to 13.3.
    expect(oxygen).toEqual([
      'Players\nOrchestra pit, 1.15 m above its floor',
      'Oxygen',
      '19.8 %\n17.5 kPa',
      '17.8 %',
      '18.8 %\n16.2 kPa',
      '16.5 %',
      'past never',
      'past never',
    ]);
    expect(gas?.slice(1)).toEqual([
      'Carbon dioxide',
      '4.7 %',
      '13.3 %',
      '8.0 %',
      '21.2 %',
      'past never',
      'past never',
    ]);
  });

  it('tells zones of one space and height with equal numbers once, and others apart', () => {
    const [players] = assessmentFixture.zones;
    if (players === undefined) throw new Error('the fixture has no zone');
    const titles = (zones: (typeof players)[]): string[] =>
      cellsOf(
        tablesOf(
          riskSheet({ ...assessmentFixture, zones }, texts, facts).blocks,
          'What people breathe',
        )[0],
      ).flatMap(([title]) =>
        title === '' || title === undefined ? [] : [title.split('\n')[0] ?? ''],
      );
    const turner = { ...players, id: 'turner', title: 'Page turner' };
    expect(titles([players, turner])).toEqual(['Players; Page turner']);
    expect(titles([players, { ...turner, heightM: 1.6 }])).toEqual(['Players', 'Page turner']);
  });

  it('takes the worst of all checks 0.20 m above a floor for each space', () => {
    const [players] = assessmentFixture.zones;
    const [oxygen] = players?.quantities ?? [];
    if (players === undefined || oxygen === undefined) throw new Error('the fixture has no zone');
    const check = (id: string, mixed: number, bound: number) => ({
      ...players,
      id,
      kind: 'floorLevelCheck' as const,
      heightM: 0.2,
      quantities: [
        {
          ...oxygen,
          answers: {
            mixed: figure(mixed, 'oxygenFraction'),
            bound: figure(bound, 'oxygenFraction'),
          },
        },
      ],
    });
    const assessment = {
      ...assessmentFixture,
      zones: [players, check('a', 0.2, 0.17), check('b', 0.195, 0.19)],
    };
    const [, floor] = tablesOf(
      workingsSheet(assessment, texts, facts).blocks,
      'Fans off, and near the floor',
    );
    const notes = partOf(riskSheet(assessment, texts, facts).blocks, 'What people breathe').flatMap(
      (block) => (block.kind === 'list' ? block.items.map(plain) : []),
    );
    expect(notes.join(' ')).toContain('the worst of each space: Orchestra pit past never.');
    expect(cellsOf(floor).map((cells) => cells.slice(0, 4))).toEqual([
      ['Orchestra pit', 'Oxygen', '19.5 %\n17.5 kPa', '17.0 %'],
    ]);
  });

  it('leaves out a quantity only while every answer meets its aim, and says so with its highest', () => {
    const [players] = assessmentFixture.zones;
    const [oxygen, gas] = players?.quantities ?? [];
    if (players === undefined || oxygen === undefined || gas === undefined) {
      throw new Error('the fixture has no zone');
    }
    const sheetOf = (highest: number) =>
      partOf(
        riskSheet(
          {
            ...assessmentFixture,
            zones: [
              {
                ...players,
                quantities: [
                  oxygen,
                  {
                    ...gas,
                    answers: {
                      mixed: figure(0.001, 'gasFraction'),
                      bound: figure(highest, 'gasFraction'),
                    },
                    standing: 'meets aim',
                  },
                ],
              },
            ],
          },
          texts,
          facts,
        ).blocks,
        'What people breathe',
      );
    const said = (blocks: Block[]): string[] =>
      blocks.flatMap((block) => (block.kind === 'list' ? block.items.map(plain) : []));
    // The aim of the fixture is 5000 ppm.
    expect(said(sheetOf(0.0042))[0]).toContain('Carbon dioxide, highest there 4200 ppm (Players)');
    expect(said(sheetOf(0.0051))).toEqual([]);
  });

  it('gives the first passing of Limit and Never in the worst credible case, to the second', () => {
    const passed = tablesOf(tree.blocks, 'What people breathe').at(-1);
    // 19.8 h and 19.95 h after midnight in the fixture.
    expect(cellsOf(passed)[0]).toEqual([
      'Players',
      '19:48:00',
      'Oxygen, inventory bound',
      '19:57:00',
      'Oxygen, inventory bound',
    ]);
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
    expect(table?.columns.map((column) => column.title)).toEqual(
      expect.arrayContaining(['Planned, layered', 'Worst, layered']),
    );
  });

  it('numbers the conditions and ties each to act, row and checklist line', () => {
    const numbered = partOf(tree.blocks, 'Conditions').find((block) => block.kind === 'numbered');
    const [first] = numbered?.items ?? [];
    expect(first?.number).toBe('1');
    expect(plain(first?.words ?? '')).toContain('Blocks the start.');
    expect(first?.detail).toContain('On the day: Pit empty and locked');
    expect(first?.detail).toContain('For: Bench fog. Plan number 1, row 4.');
  });

  it('tells conditions alike of several zones and acts once, with every zone, act and number', () => {
    const [one] = assessmentFixture.conditions;
    if (one === undefined) throw new Error('the fixture has no condition');
    const alike = (number: number, zone: string, title: string, act: string) => ({
      ...one,
      number,
      zone,
      act,
      text: `${title}: container chained; leave at oxygen 19.${String(number)} %.`,
      checklistLine: `${title}: chain tried, leave at oxygen 19.${String(number)} %`,
    });
    const conditions = [
      alike(1, 'players', 'Players', 'fog'),
      alike(2, 'seats', 'Seats', 'fog'),
      alike(3, 'seats', 'Seats', 'pipe'),
    ];
    const sheet = riskSheet({ ...assessmentFixture, conditions }, texts, facts);
    const [block] = partOf(sheet.blocks, 'Conditions').filter((entry) => entry.kind === 'numbered');
    expect(block?.items).toHaveLength(1);
    expect(plain(block?.items[0]?.words ?? '')).toBe(
      'Container chained. Blocks the start.\nPlayers: leave at oxygen 19.1 % (Bench fog).\nSeats: leave at oxygen 19.2 % (Bench fog); leave at oxygen 19.3 % (Flue pipe in a gas bag).',
    );
    expect(block?.items[0]?.detail).toBe('On the day: Chain tried. Plan numbers 1–3, row 4.');
  });

  it('lists the controls that were offered and not chosen by title, under their act', () => {
    const offered = partOf(workings.blocks, 'Controls offered and not chosen').find(
      (block) => block.kind === 'list',
    );
    expect(offered?.items.map(plain)).toEqual(['Bench fog: Smaller portion.']);
  });

  it('earns no credit for a control that the model cannot express', () => {
    const [controls] = tablesOf(tree.blocks, 'Controls');
    const signs = cellsOf(controls).find((cells) => cells[0] === 'Signs at the pit doors');
    expect(signs?.slice(3, 5)).toEqual(['–', 'no credit']);
  });

  it('asks for confirmation of every rule that was not read first-hand, and of no other', () => {
    const said = partOf(tree.blocks, 'Rules cited').flatMap((block) => {
      if (block.kind === 'numbered') return block.items.map(({ number }) => number);
      return block.kind === 'paragraph' && block.look === 'note' ? [plain(block.words)] : [];
    });
    expect(said).toEqual(['Read in full.', '1', 'From a summary: confirm.', '2']);
  });

  it('rounds a largest permissible amount down', () => {
    const [largest] = tablesOf(tree.blocks, 'Largest amounts and hold times');
    // 2.1467 kg and 1.1887 m3 in the fixture.
    expect(cellsOf(largest)[0]?.[0]).toContain('(3.00 kg planned)');
    expect(cellsOf(largest)[0]?.slice(3)).toEqual(['2.14 kg', '1.18 m³']);
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
    const [signed] = end;
    if (signed?.kind !== 'paragraph') throw new Error('nothing says what is signed');
    expect(plain(signed.words)).toContain(assessmentFixture.inputHash);
    expect(plain(signed.words)).toContain('revision B, decided as filed: No-go; with the chosen');
    // Decision, revision, hash and signatures stay on one page.
    expect(signed.keepWithNext).toBe(true);
  });

  it('gives the number that decides with its formula and inputs in the workings, to be redone', () => {
    const [number] = tablesOf(workings.blocks, 'The number that decides');
    const said = new Map(cellsOf(number).map(([name = '', value = '']) => [name, value]));
    const { governing } = assessmentFixture;
    expect(said.get('Formula')).toBe(governing?.figure.formula);
    for (const input of governing?.figure.inputs ?? []) {
      expect(said.get(input.name)).toContain(String(input.value));
    }
    expect(cellsOf(tablesOf(workings.blocks, 'Decision table')[0])).toHaveLength(
      assessmentFixture.decisionTable.length,
    );
    expect(workings.title).toBe(`Workings: ${assessmentFixture.title}`);
  });

  it('is marked across the page unless it is approved', () => {
    expect(tree.mark).toBe('DRAFT');
    expect(riskSheet(assessmentFixture, texts, { ...facts, status: 'approved' }).mark).toBeNull();
    const old = riskSheet(assessmentFixture, texts, { ...facts, status: 'superseded' });
    expect(old.mark).toBe('SUPERSEDED');
  });

  it('says of every empty part that it is empty', () => {
    for (const sheet of [riskSheet, workingsSheet]) {
      const empty = sheet(emptyAssessment, texts, facts);
      for (const heading of headings(empty.blocks).filter((entry) => entry.level === 2)) {
        expect(partOf(empty.blocks, heading.words).length, heading.words).toBeGreaterThan(0);
      }
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
