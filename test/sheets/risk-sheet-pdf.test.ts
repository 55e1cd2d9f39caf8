import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { getDocument, type PDFDocumentProxy } from 'pdfjs-dist/legacy/build/pdf.mjs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Assessment, Figure } from '../../src/assessment/assessment.js';
import { InvalidInput, NotComputable } from '../../src/errors.js';
import { papers } from '../../src/sheets/layout/look.js';
import { renderPdf } from '../../src/sheets/render-pdf.js';
import { renderRiskSheet } from '../../src/sheets/risk-sheet-pdf.js';
import { riskSheet } from '../../src/sheets/risk-sheet.js';
import { riskSheetTexts } from '../../src/sheets/sheet-texts.js';
import { quantityText } from '../../src/assessment/figure-text.js';
import {
  assessmentFixture,
  emptyAssessment,
  largeAssessment,
} from '../support/assessment-fixture.js';

const draft = { printedOn: '2026-12-01', status: 'draft' } as const;

/** An element of the structure as the reader hands it over. */
interface Tag {
  readonly role?: string;
  readonly alt?: string;
  readonly type?: string;
  readonly id?: string;
  readonly children?: readonly Tag[];
}

const opened: PDFDocumentProxy[] = [];

async function open(bytes: Uint8Array): Promise<PDFDocumentProxy> {
  const document = await getDocument({ data: bytes.slice(), verbosity: 0 }).promise;
  opened.push(document);
  return document;
}

afterAll(async () => {
  await Promise.all(opened.map((document) => document.destroy()));
});

async function tagsOf(document: PDFDocumentProxy): Promise<Tag[]> {
  const tags: Tag[] = [];
  for (let number = 1; number <= document.numPages; number += 1) {
    const tree = (await (await document.getPage(number)).getStructTree()) as Tag | null;
    const walk = (tag: Tag): void => {
      tags.push(tag);
      tag.children?.forEach(walk);
    };
    if (tree !== null) walk(tree);
  }
  return tags;
}

interface Placed {
  readonly page: number;
  readonly text: string;
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly turned: boolean;
}

async function textsOf(document: PDFDocumentProxy): Promise<Placed[]> {
  const texts: Placed[] = [];
  for (let number = 1; number <= document.numPages; number += 1) {
    const content = await (await document.getPage(number)).getTextContent();
    for (const item of content.items) {
      if (!('str' in item) || item.str.trim() === '') continue;
      const [, b = 0, , , x = 0, y = 0] = item.transform as number[];
      texts.push({ page: number, text: item.str, x, y, width: item.width, turned: b !== 0 });
    }
  }
  return texts;
}

function isInstalled(tool: string): boolean {
  return spawnSync(tool, ['--version']).error === undefined;
}

function run(tool: string, ...args: string[]): string {
  const result = spawnSync(tool, args, { encoding: 'utf8' });
  return `${result.stdout}${result.stderr}`;
}

describe('renderRiskSheet', () => {
  let bytes: Uint8Array;
  let document: PDFDocumentProxy;
  let folder: string;
  let file: string;
  let workingsFile: string;
  beforeAll(async () => {
    bytes = await renderRiskSheet(assessmentFixture, draft);
    document = await open(bytes);
    folder = mkdtempSync(join(tmpdir(), 'sheet-'));
    file = join(folder, 'sheet.pdf');
    writeFileSync(file, bytes);
    workingsFile = join(folder, 'workings.pdf');
    writeFileSync(
      workingsFile,
      await renderRiskSheet(assessmentFixture, { ...draft, kind: 'workings' }),
    );
  });
  afterAll(() => {
    rmSync(folder, { recursive: true });
  });

  it('gives the same bytes for the same input and other bytes for another day', async () => {
    const again = await renderRiskSheet(assessmentFixture, draft);
    expect(Buffer.compare(Buffer.from(bytes), Buffer.from(again))).toBe(0);
    const later = await renderRiskSheet(assessmentFixture, { ...draft, printedOn: '2026-12-02' });
    expect(Buffer.compare(Buffer.from(bytes), Buffer.from(later))).not.toBe(0);
  });

  it('is tagged, has a language, shows its title, and claims PDF/UA with the title escaped in XML', async () => {
    expect(await document.getMarkInfo()).toMatchObject({ Marked: true });
    const { info, metadata } = await document.getMetadata();
    expect(info).toMatchObject({
      Title: 'Risk sheet: Three gases and a pipe & a bench of fog',
      Language: 'en',
    });
    expect(await document.getViewerPreferences()).toMatchObject({ DisplayDocTitle: true });
    const xml = Buffer.from(bytes).toString('latin1');
    expect(xml).toContain('<pdfuaid:part>1</pdfuaid:part>');
    expect(xml).toContain('a pipe &amp; a bench of fog</rdf:li>');
    expect(metadata.get('dc:title')).toBe('Risk sheet: Three gases and a pipe & a bench of fog');
  });

  it('has headings in order, one of the first level, none skipped', async () => {
    const levels = (await tagsOf(document))
      .map((tag) => /^H([1-6])$/.exec(tag.role ?? '')?.[1])
      .filter((level) => level !== undefined)
      .map(Number);
    expect(levels.filter((level) => level === 1)).toHaveLength(1);
    expect(levels[0]).toBe(1);
    levels.forEach((level, index) => {
      if (index > 0) expect(level).toBeLessThanOrEqual((levels[index - 1] ?? 0) + 1);
    });
    const outline = await document.getOutline();
    expect(outline.map((entry) => entry.title)).toContain('1  Decision');
  });

  it('gives every table header cells with a scope for columns and rows', async () => {
    const tags = await tagsOf(document);
    const tables = tags.filter((tag) => tag.role === 'Table');
    expect(tables.length).toBeGreaterThan(8);
    // The reader used above leaves scopes out: they stand in the file as plain attributes.
    const raw = Buffer.from(bytes).toString('latin1');
    const heads = tags.filter((tag) => tag.role === 'TH').length;
    expect(heads).toBeGreaterThan(20);
    const scoped = [...raw.matchAll(/\/O \/Table\s+\/Scope \/(Column|Row)/g)].length;
    const cells = [...raw.matchAll(/\/S \/TH\b/g)].length;
    expect(scoped).toBe(cells);
  });

  it('says what each figure shows, numbers included', async () => {
    const altsOf = async (sheet: PDFDocumentProxy): Promise<string[]> =>
      (await tagsOf(sheet))
        .filter((tag) => tag.role === 'Figure')
        .map((figure) => (figure.alt ?? '').replaceAll('\u00a0', ' '));
    const signed = await altsOf(document);
    const workings = await altsOf(
      await open(await renderRiskSheet(assessmentFixture, { ...draft, kind: 'workings' })),
    );
    // The sheet that is signed shows the case that decides, the workings show both.
    expect(signed).toHaveLength(2);
    expect(workings).toHaveLength(2);
    const [curve] = signed;
    const [planned, worst] = workings;
    expect(signed[1]).toBe(planned);
    expect(curve).toContain('inventory bound lowest 17.8 % at 20:00');
    expect(curve).toContain('layered, 95 in 100');
    expect(planned).toContain('20:00, when the planned day is at its worst.');
    expect(planned).toContain('Players, breathing at −0.95 m: oxygen 20.4 % (bound 17.8 %)');
    expect(planned).toContain('Gas along the floor, 0.90 m deep: 9.0 %.');
    expect(planned).toContain('Meter Pit oxygen at −1.80 m.');
    expect(worst).toContain('20:01, the worst of: whole box into warm water.');
    expect(worst).toContain('Gas along the floor, 1.90 m deep');
  });

  it('leaves no drawn text outside the margins of the page', async () => {
    const { left, right, width, height } = papers.a4;
    for (const placed of await textsOf(document)) {
      if (placed.turned) continue;
      expect(placed.x, placed.text).toBeGreaterThanOrEqual(left - 0.5);
      expect(placed.x + placed.width, placed.text).toBeLessThanOrEqual(width - right + 0.6);
      expect(placed.y, placed.text).toBeGreaterThan(24);
      expect(placed.y, placed.text).toBeLessThan(height - 24);
    }
  });

  it('carries revision and page x of y on every page and the hash on the last', async () => {
    const texts = await textsOf(document);
    for (let page = 1; page <= document.numPages; page += 1) {
      const words = texts.filter((placed) => placed.page === page).map((placed) => placed.text);
      expect(words).toContain(`page ${String(page)} of ${String(document.numPages)}`);
      expect(words.join(' ')).toContain('revision B, draft');
      expect(words).toContain('DRAFT');
    }
    const last = texts.filter((placed) => placed.page === document.numPages);
    expect(last.map((placed) => placed.text).join('')).toContain(assessmentFixture.inputHash);
  });

  it('keeps the mark and the running lines out of the structure', async () => {
    const page = await document.getPage(1);
    const content = await page.getTextContent({ includeMarkedContent: true });
    const open: string[] = [];
    const outside: string[] = [];
    for (const item of content.items) {
      if ('str' in item) {
        if (open.includes('Artifact') && item.str.trim() !== '') outside.push(item.str);
      } else if (item.type === 'endMarkedContent') open.pop();
      else open.push((item as { tag?: string }).tag ?? '');
    }
    expect(outside).toContain('DRAFT');
    expect(outside.join(' ')).toContain('page 1 of');
    expect(outside.join(' ')).not.toContain('No-go');
  });

  it.skipIf(!isInstalled('qpdf'))('passes qpdf --check without a complaint', () => {
    for (const path of [file, workingsFile]) {
      expect(run('qpdf', '--check', path)).toContain('No syntax or stream encoding errors found');
    }
  });

  it.skipIf(!isInstalled('pdfinfo'))(
    'is called tagged by pdfinfo, on A4, with rows that span',
    () => {
      const info = run('pdfinfo', file);
      expect(info).toMatch(/Tagged:\s+yes/);
      expect(info).toMatch(/Page size:\s+595\.28 x 841\.89 pts \(A4\)/);
      const structure = run('pdfinfo', '-struct', file);
      expect(structure).toContain('/RowSpan 2');
    },
  );

  it.skipIf(!isInstalled('pdftotext'))(
    'prints every figure that it shows exactly as the formatter writes it',
    () => {
      // The sound stands in the workings, the rest in the sheet that is signed.
      const text = [file, workingsFile]
        .map((path) => run('pdftotext', '-layout', path, '-'))
        .join('\n')
        .replaceAll('\u00a0', ' ');
      const shown = shownFigures(assessmentFixture);
      expect(shown.length).toBeGreaterThan(50);
      for (const figure of shown) {
        const written = quantityText(figure.value, figure.unit).replaceAll('\u00a0', ' ');
        expect(text).toContain(written);
      }
    },
  );
});

/** Figures that stand on the sheet with their usual rounding. */
function shownFigures(assessment: Assessment): Figure[] {
  const releases = assessment.acts.flatMap((act) => [...act.planned, ...act.worstCredible]);
  return [
    ...releases.flatMap((line) => [line.mass, line.volume]),
    ...assessment.zones.flatMap((zone) =>
      zone.quantities.flatMap((entry) => Object.values(entry.answers)),
    ),
    ...assessment.spaces.flatMap((space) => [space.volume, space.freshAir]),
    ...assessment.holdTimes.flatMap((hold) => hold.time ?? []),
    ...assessment.sound.flatMap((entry) => [
      entry.frequency ?? [],
      entry.frequencyInAir ?? [],
      entry.cents ?? [],
    ]),
    ...assessment.assumptions.flatMap((entry) => entry.figure ?? []),
    ...assessment.controls.flatMap((entry) => [entry.before ?? [], entry.after ?? []]),
    assessment.site.pressure,
    assessment.site.temperature,
    ...(assessment.governing === null ? [] : [assessment.governing.figure]),
  ].flat();
}

describe('renderRiskSheet at the edges', () => {
  it('prints 40 acts, 25 spaces and long names in three alphabets inside the margins', async () => {
    const document = await open(await renderRiskSheet(largeAssessment(40, 25), draft));
    const texts = await textsOf(document);
    const { left, right, width } = papers.a4;
    for (const placed of texts) {
      if (placed.turned) continue;
      expect(placed.x, placed.text).toBeGreaterThanOrEqual(left - 0.5);
      expect(placed.x + placed.width, placed.text).toBeLessThanOrEqual(width - right + 0.6);
      expect(placed.y, placed.text).toBeGreaterThan(24);
    }
    const all = texts.map((placed) => placed.text).join(' ');
    // A word without an end is divided; the figures beside it stay whole.
    expect(all.replaceAll('\u00a0', ' ')).toContain('10.0 kg');
    expect(all).toContain('Carbon dioxide');
    expect(all).toContain('αμφιθέατρο');
    expect(all).toContain('тумана');
    expect(all).toContain('Żółta');
    for (let act = 1; act <= 40; act += 1) expect(all).toContain(`${String(act)}. `);
    const figures = (await tagsOf(document)).filter((tag) => tag.role === 'Figure');
    expect(figures.length).toBeGreaterThan(2);
  });

  it('prints a plan with nothing in it, saying of each part that it is empty', async () => {
    const document = await open(await renderRiskSheet(emptyAssessment, draft));
    const all = (await textsOf(document)).map((placed) => placed.text).join(' ');
    expect(all).toContain('Not enough known');
    expect(all).toContain('No release is planned.');
    expect(all).toContain('No spaces have been entered yet.');
  });

  it('prints on US Letter when asked', async () => {
    const document = await open(
      await renderRiskSheet(assessmentFixture, { ...draft, size: 'letter' }),
    );
    const page = await document.getPage(1);
    expect(page.view).toEqual([0, 0, 612, 792]);
  });

  it('has no mark on an approved sheet', async () => {
    const document = await open(
      await renderRiskSheet(assessmentFixture, { ...draft, status: 'approved' }),
    );
    expect((await textsOf(document)).some((placed) => placed.turned)).toBe(false);
  });

  it('refuses right-to-left text instead of printing it in the wrong order', async () => {
    const title = 'מופע גזים';
    await expect(renderRiskSheet({ ...assessmentFixture, title }, draft)).rejects.toThrow(
      InvalidInput,
    );
  });

  it('gives up with a message when drawing takes longer than it may', async () => {
    let time = 0;
    const tree = riskSheet(assessmentFixture, riskSheetTexts(), draft);
    const slow = renderPdf(tree, {
      size: 'a4',
      date: new Date(0),
      timeoutMs: 1000,
      now: () => (time += 700),
    });
    await expect(slow).rejects.toThrow(NotComputable);
  });
});
