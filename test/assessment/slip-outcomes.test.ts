import { describe, expect, it } from 'vitest';
import { assess } from '../../src/assessment/assess.js';
import type { PlanFile } from '../../src/assessment/plan-file.js';
import { data, fogAct, hall } from '../support/plans.js';

/** What a slip is blamed for, and what an amount is limited by. Common practice, no source. */

const measured = (value: number) => ({ value, origin: 'measured' as const });

/** A hall, and a shut store beside it whose box of dry ice gives off gas where two people work. */
function hallAndStore(acts: PlanFile['acts']): PlanFile {
  const base = hall({ acts });
  return {
    ...base,
    event: {
      ...base.event,
      audience: [
        ...base.event.audience,
        {
          id: 'fillers',
          title: 'Fillers',
          count: 2,
          ageGroup: 'adult',
          kind: 'crew',
          zone: { space: 'store', heightM: 1.5 },
        },
      ],
    },
    venue: {
      ...base.venue,
      spaces: [
        ...base.venue.spaces,
        { id: 'store', title: 'Store', floorAreaM2: measured(12), heightM: measured(2.5) },
      ],
      infiltration: [
        ...(base.venue.infiltration ?? []),
        { space: 'store', airChangesPerHour: measured(0.2) },
      ],
    },
    stock: [
      {
        id: 'box',
        title: 'Box of dry ice',
        gas: 'CO2',
        form: 'dryIce',
        massKg: 20,
        idleLossPerHour: measured(0.02),
        place: 'store',
        open: false,
        fromS: 36_000,
      },
    ],
  };
}

describe('a slip', () => {
  const result = assess(hallAndStore([fogAct('hall', 0.5, 0.5)]), data);

  it('is not blamed for a room that its gas cannot reach', () => {
    expect(result.decision.asFiled).toBe('noGo');
    expect(result.spaces.map(({ id, decision }) => [id, decision.asFiled])).toEqual([
      ['hall', 'go'],
      ['store', 'noGo'],
    ]);
    expect(result.acts[0]?.decision.asFiled).toBe('go');
  });
});

describe('the largest amount', () => {
  it('names the outcome that is worst against its level, not the first in the list', () => {
    // 200 kg displace a tenth of the hall: oxygen falls below its aim, and carbon dioxide is twenty
    // times past its own.
    const small = { ...fogAct('hall', 0.1, 0.1), id: 'small', minute: 40 };
    const result = assess(hall({ acts: [fogAct('hall', 200, 200), small] }), data);
    const failed = result.zones[0]?.quantities.filter(
      ({ caseName, standing }) => caseName === 'planned' && standing !== 'meets aim',
    );
    expect(failed?.map(({ quantity }) => quantity)).toEqual(['oxygenFraction', 'CO2']);
    expect(result.largestAmounts[1]?.limitedBy).toMatch(/^carbon dioxide.*without this act/i);
  });
});
