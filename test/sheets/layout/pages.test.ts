import { describe, expect, it } from 'vitest';
import type { Strip } from '../../../src/sheets/layout/marks.js';
import { laidPages } from '../../../src/sheets/layout/pages.js';

const line = (name: string) =>
  ({ kind: 'path', data: name, x: 0, y: 0, fill: null, stroke: null, thickness: 1 }) as const;
const strip = (name: string, height: number, more: Partial<Strip> = {}): Strip => ({
  height,
  before: 0,
  keepWithNext: false,
  pieces: [{ node: null, marks: [line(name)] }],
  ...more,
});
const names = (strips: readonly Strip[]): string[][] =>
  laidPages(strips, { top: 0, height: 100 }).map((page) =>
    page.pieces.flatMap((piece) =>
      piece.marks.map((mark) => (mark.kind === 'path' ? mark.data : '')),
    ),
  );

describe('laidPages', () => {
  it('moves a heading to the next page with the line it belongs to', () => {
    expect(
      names([strip('text', 70), strip('heading', 20, { keepWithNext: true }), strip('first', 20)]),
    ).toEqual([['text'], ['heading', 'first']]);
  });

  it('repeats the head of a table on every page that its rows reach', () => {
    const repeated = strip('head', 10);
    const rows = ['a', 'b', 'c'].map((name) => strip(name, 40, { repeated }));
    expect(names([strip('first head', 10, { keepWithNext: true }), ...rows])).toEqual([
      ['first head', 'a', 'b'],
      ['head', 'c'],
    ]);
  });

  it('lets a group go at the end of the page when it is higher than a page', () => {
    const rows = ['a', 'b', 'c', 'd'].map((name) => strip(name, 30, { keepWithNext: true }));
    expect(names(rows)).toEqual([['a', 'b', 'c'], ['d']]);
  });

  it('drops the space above a strip at the top of a page', () => {
    const [, second] = laidPages([strip('a', 100), strip('b', 10, { before: 20 })], {
      top: 5,
      height: 100,
    });
    expect(second?.pieces[0]?.marks[0]).toMatchObject({ data: 'b', y: 5 });
  });
});
