import { describe, expect, it } from 'vitest';
import { planWithOnly } from '../../src/assessment/controlled-plan.js';
import { evaluation } from '../../src/assessment/evaluation.js';
import { leastControls } from '../../src/assessment/least-controls.js';
import { loadExamples } from '../../src/catalogue/examples.js';
import { standing } from '../../src/assessment/standing.js';
import { suggestedControls } from '../../src/assessment/suggested-controls.js';
import { worstWord } from '../../src/assessment/decision-table.js';
import { contextFor, hallWithPit, sources } from '../support/controls.js';

/** The least set of controls that brings an act from No-go to Go with conditions. Common practice, no source. */

const lanternfold = loadExamples().find(({ venue }) => venue.title === 'Lanternfold');
if (!lanternfold) throw new Error('the example is there');

describe('6 kg of fog above an open pit with players in it', () => {
  const fog = { act: 'fog', space: 'AS1' } as const;
  const full = contextFor(lanternfold, 'full');
  const found = suggestedControls(
    lanternfold,
    fog,
    { otherGases: [], enoughShare: 0 },
    full,
    sources,
  );
  if (!found) throw new Error('a number decides the fog');
  const least = leastControls(lanternfold, found, full, sources);
  const choices = least.chosen.map(({ choice }) => choice);

  it('are No-go as filed', () => {
    expect(found.asFiled.word).toBe('noGo');
  });

  it('go with conditions by a set that leaves the cue, the house and the day as they are', () => {
    expect(least.isReached).toBe(true);
    expect(least.standing.word).toBe('goWithConditions');
    expect(Math.max(...least.chosen.map(({ control }) => control.burden))).toBeLessThanOrEqual(3);
    const set = planWithOnly(lanternfold, choices, sources);
    expect(set.acts.find(({ id }) => id === 'fog')?.releases.planned).toEqual(
      lanternfold.acts.find(({ id }) => id === 'fog')?.releases.planned,
    );
  });

  it('take what a stage manager would name first: the pit cleared and drained, no box on stage', () => {
    const ids = choices.map(({ control }) => control);
    expect(ids).toEqual(expect.arrayContaining(['nobody-below', 'pit-extract', 'cap-what-enters']));
  });

  it('stay No-go when any one control of the set is left out', () => {
    const quickly = contextFor(lanternfold, 'quick');
    for (const one of choices) {
      const without = planWithOnly(
        lanternfold,
        choices.filter((other) => other !== one),
        sources,
      );
      // A meter stands for the upper end of the band, which only the draws know.
      const how = one.control === 'fixed-monitor' ? full : quickly;
      const words = [standing(without, fog, how).word];
      if (words[0] !== 'noGo') words.push(standing(without, fog, full).word);
      expect([one.control, ...words]).toContain('noGo');
    }
  });

  it('go with conditions in the whole plan too, not only in the part of it that was searched', () => {
    const { hits } = evaluation(planWithOnly(lanternfold, choices, sources), full, () => 'worst');
    const own = hits.filter(({ acts }) => acts.includes('fog'));
    expect(worstWord(own.map(({ word }) => word))).toBe('goWithConditions');
  });
});

describe('a plan that no control of the air saves', () => {
  it('is told as such, with the set that comes closest', () => {
    // A tonne of dry ice: a tenth of it fills the hall to a twentieth.
    const plan = hallWithPit(1000, 1000);
    const context = contextFor(plan, 'quick');
    const found = suggestedControls(
      plan,
      { act: 'fog', space: 'hall' },
      { otherGases: [], enoughShare: 0 },
      context,
      sources,
    );
    if (!found) throw new Error('a number decides the fog');
    const least = leastControls(plan, found, context, sources);
    expect(least.isReached).toBe(false);
    expect(least.standing.word).toBe('noGo');
  });
});
