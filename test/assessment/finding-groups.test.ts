import { describe, expect, it } from 'vitest';
import type { Finding } from '../../src/assessment/assessment.js';
import { findingGroups } from '../../src/assessment/finding-groups.js';

const finding = (text: string, changes: Partial<Finding> = {}): Finding => ({
  code: 'wait',
  kind: 'caution',
  path: '/event',
  text,
  ...changes,
});

describe('findings for reading', () => {
  it('stand with the gravest first', () => {
    const groups = findingGroups({
      findings: [finding('A note.', { kind: 'note' }), finding('A danger.', { kind: 'danger' })],
    });
    expect(groups.map(({ kind }) => kind)).toEqual(['danger', 'note']);
  });

  it('say a repeated finding once', () => {
    const [group] = findingGroups({ findings: [finding('Wait.'), finding('Wait.')] });
    expect(group).toMatchObject({ items: [{ text: 'Wait.' }], shared: '' });
  });

  it('say what they end in once, and keep what differs with its place', () => {
    const [group] = findingGroups({
      findings: [
        finding('Stage: 2.0 % is met. Keep away.', { path: '/a' }),
        finding('Hall: 1.0 % is met. Keep away.', { path: '/b' }),
      ],
    });
    expect(group).toEqual({
      kind: 'caution',
      code: 'wait',
      items: [
        { text: 'Stage: 2.0 % is met.', path: '/a' },
        { text: 'Hall: 1.0 % is met.', path: '/b' },
      ],
      shared: 'Keep away.',
    });
  });

  it('name only the subjects of findings that say the same of each', () => {
    const [group] = findingGroups({
      findings: [finding('Stage: the wait is long.'), finding('Hall: the wait is long.')],
    });
    expect(group?.shared).toBe('The wait is long.');
    expect(group?.items.map(({ text }) => text)).toEqual(['Stage', 'Hall']);
  });
});
