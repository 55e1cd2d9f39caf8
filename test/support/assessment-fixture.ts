import type {
  Assessment,
  CaseName,
  Reading,
  SectionMoment,
  ZoneQuantity,
  ZoneResult,
  ZoneSeries,
} from '../../src/assessment/assessment.js';
import { figure, longView, theatreView } from './section-fixture.js';

/**
 * An assessment made up for tests of sheets and drawings. Its figures are invented: no model
 * computed them, and no test may take them for a result.
 */

const hour = 3600;
const opening = 19.5 * hour;
const timesS = Array.from({ length: 121 }, (_, minute) => opening + minute * 60);

function dip(from: number, change: number, halfMinutes: number): number[] {
  return timesS.map((_, minute) => {
    if (minute <= 12) return from;
    if (minute <= 30) return from + (change * (minute - 12)) / 18;
    return from + change * Math.exp(-(minute - 30) / halfMinutes);
  });
}

function series(quantity: string, base: number, change: number, caseName: CaseName): ZoneSeries[] {
  const line = (answer: ZoneSeries['answer'], share: number): ZoneSeries => ({
    caseName,
    quantity,
    answer,
    timesS,
    values: dip(base, change * share, 40),
  });
  const low = change < 0;
  return [
    line('mixed', 0.35),
    line('layered', 0.8),
    line('layeredP50', 0.55),
    line('bound', 1),
    line('layeredP05', low ? 0.8 : 0.4),
    line('layeredP95', low ? 0.4 : 0.8),
  ];
}

/** The answers at the worst moment of the invented curves, and where the bound passes the limit. */
function readings(mixed: number, bound: number, passes: boolean): Reading[] {
  const layered = mixed + 0.6 * (bound - mixed);
  const layeredP50 = mixed + 0.3 * (bound - mixed);
  const at = (share: number): Reading['values'] => ({
    mixed: 0.209 + share * (mixed - 0.209),
    layered: 0.209 + share * (layered - 0.209),
    layeredP50: 0.209 + share * (layeredP50 - 0.209),
    bound: 0.209 + share * (bound - 0.209),
  });
  return [
    ...(passes
      ? [{ atS: 19.8 * hour, why: [{ answer: 'bound', what: 'limit' } as const], values: at(0.5) }]
      : []),
    {
      atS: 20 * hour,
      why: [
        { answer: 'mixed', what: 'worst' },
        { answer: 'layered', what: 'worst' },
        { answer: 'bound', what: 'worst' },
      ],
      values: at(1),
    },
  ];
}

function oxygen(
  caseName: CaseName,
  mixed: number,
  bound: number,
  standing: ZoneQuantity['standing'],
): ZoneQuantity {
  return {
    quantity: 'oxygen',
    quantityTitle: 'Oxygen',
    caseName,
    answers: {
      mixed: figure(mixed, 'oxygenFraction'),
      bound: figure(bound, 'oxygenFraction'),
    },
    partialPressure: figure(bound * 98_000, 'Pa'),
    levels: {
      aim: figure(0.2, 'oxygenFraction'),
      limit: figure(0.195, 'oxygenFraction'),
      never: figure(0.18, 'oxygenFraction'),
    },
    standing,
    crossings:
      standing === 'past never'
        ? [
            { level: 'limit', answer: 'bound', at: figure(19.8 * hour, 's') },
            { level: 'never', answer: 'bound', at: figure(19.95 * hour, 's') },
          ]
        : [],
    readings: readings(mixed, bound, standing === 'past never'),
  };
}

function carbonDioxide(
  caseName: CaseName,
  mixed: number,
  bound: number,
  standing: ZoneQuantity['standing'],
): ZoneQuantity {
  return {
    quantity: 'CO2',
    quantityTitle: 'Carbon dioxide',
    caseName,
    answers: { mixed: figure(mixed, 'gasFraction'), bound: figure(bound, 'gasFraction') },
    levels: {
      aim: figure(0.005, 'gasFraction'),
      limit: figure(0.015, 'gasFraction'),
      never: figure(0.03, 'gasFraction'),
    },
    standing,
    crossings: [],
    readings: [],
  };
}

function zone(
  id: string,
  title: string,
  space: [string, string],
  heightM: number,
  kind: ZoneResult['kind'],
  worst: number,
): ZoneResult {
  const mixed = 0.209 - (0.209 - worst) * 0.35;
  const standing =
    worst < 0.18
      ? 'past never'
      : worst < 0.195
        ? 'below limit'
        : worst < 0.2
          ? 'meets limit'
          : 'meets aim';
  const gas = (0.209 - worst) * 4.4;
  return {
    id,
    title,
    space: space[0],
    spaceTitle: space[1],
    heightM,
    floorLevelM: 0,
    kind,
    count: figure(12, 'people'),
    quantities: [
      oxygen('planned', mixed, worst, standing),
      carbonDioxide('planned', gas * 0.35, gas, standing),
      oxygen('worstCredible', mixed - 0.01, worst - 0.013, standing),
      carbonDioxide('worstCredible', gas * 0.6, gas * 1.6, standing),
    ],
    series: [
      ...series('oxygen', 0.209, worst - 0.209, 'planned'),
      ...series('oxygen', 0.209, worst - 0.222, 'worstCredible'),
      ...series('CO2', 0.0008, gas, 'planned'),
    ],
    notComputed: null,
  };
}

const moment = (
  atS: number,
  title: string,
  more: Partial<Pick<SectionMoment, 'kind' | 'caseName'>> & { readonly depthM: number },
): SectionMoment => ({
  atS,
  title,
  kind: more.kind ?? 'cue',
  caseName: more.caseName ?? 'planned',
  layers:
    more.depthM === 0
      ? []
      : [
          {
            space: 'pit',
            at: 'floor',
            depthM: more.depthM,
            gasFraction: figure(0.09, 'gasFraction'),
          },
        ],
  zones: theatreView.zones.map(({ id, lowestOxygen }, index) => ({
    id,
    oxygen: lowestOxygen === null ? null : figure(0.2085 - index * 0.0011, 'oxygenFraction'),
    oxygenBound: lowestOxygen,
    gas: figure(0.0011, 'gasFraction'),
    gasTitle: 'carbon dioxide',
  })),
});

/** Four moments of the invented evening, the worst of each case among them. */
export const momentsFixture: readonly SectionMoment[] = [
  moment(opening + 12 * 60, 'Bench fog begins', { depthM: 0 }),
  moment(opening + 30 * 60, 'when the planned day is at its worst', { kind: 'worst', depthM: 0.9 }),
  moment(opening + 50 * 60, 'Flue pipe begins', { depthM: 0.35 }),
  moment(opening + 31 * 60, 'the worst of: whole box into warm water', {
    kind: 'worst',
    caseName: 'worstCredible',
    depthM: 1.9,
  }),
];

export const assessmentFixture: Assessment = {
  title: 'Three gases and a pipe & a bench of fog',
  date: '2026-12-05',
  venueTitle: 'Alder Street Playhouse (invented)',
  revision: 'B',
  preparedBy: 'Outreach coordinator',
  decision: { asFiled: 'noGo', withControls: 'goWithConditions' },
  governing: {
    zone: 'players',
    zoneTitle: 'Players',
    quantity: 'Oxygen',
    answer: 'bound',
    caseName: 'planned',
    figure: figure(0.17896, 'oxygenFraction'),
    limit: figure(0.18, 'oxygenFraction'),
    row: 4,
    reason:
      'if all the CO2 of the bench fog runs into the open pit, players breathe less oxygen than the level that is never allowed.',
  },
  acts: [
    {
      id: 'fog',
      title: 'Bench fog',
      space: 'stage',
      spaceTitle: 'Stage',
      decision: { asFiled: 'noGo', withControls: 'goWithConditions' },
      planned: [
        {
          title: 'dry ice into warm water, two jugs',
          gas: 'CO2',
          mass: figure(3, 'kg'),
          volume: figure(1.6612, 'm3'),
          durationS: 480,
        },
      ],
      worstCredible: [
        {
          title: 'whole box into warm water',
          gas: 'CO2',
          mass: figure(10, 'kg'),
          volume: figure(5.5373, 'm3'),
          durationS: 900,
        },
      ],
      cautions: ['Keep faces out of the tub.'],
    },
    {
      id: 'pipe',
      title: 'Flue pipe in a gas bag',
      space: 'stage',
      spaceTitle: 'Stage',
      decision: { asFiled: 'go', withControls: 'go' },
      planned: [
        {
          title: 'bag of 20 L, opened',
          gas: 'Ar',
          mass: figure(0.0332, 'kg'),
          volume: figure(0.02, 'm3'),
          durationS: 0,
        },
      ],
      worstCredible: [
        {
          title: 'cylinder outside, line torn off',
          gas: 'Ar',
          mass: figure(0.41, 'kg', { low: 0.3, high: 0.6 }),
          volume: figure(0.247, 'm3', { low: 0.18, high: 0.36 }),
          durationS: 60,
        },
      ],
      cautions: [],
    },
  ],
  spaces: [
    {
      id: 'stage',
      title: 'Stage',
      decision: { asFiled: 'go', withControls: 'go' },
      volume: figure(640, 'm3'),
      freshAir: figure(0.25, 'm3PerS', { low: 0.1, high: 0.4 }),
    },
    {
      id: 'pit',
      title: 'Orchestra pit',
      decision: { asFiled: 'noGo', withControls: 'goWithConditions' },
      volume: figure(94.5, 'm3'),
      freshAir: figure(0, 'm3PerS'),
    },
  ],
  conditions: [
    {
      number: 1,
      row: 4,
      act: 'fog',
      zone: 'players',
      text: 'The pit is cleared of players before the bench fog and stays empty until it reads clear.',
      checklistLine:
        'Pit empty and locked; oxygen at 1.15 m at least 20.0 % before anyone returns.',
      blocksStart: true,
    },
    {
      number: 2,
      row: 8,
      act: 'pipe',
      zone: null,
      text: 'The argon cylinder stands outside, chained, with a restrictor in the line.',
      checklistLine: 'Restrictor fitted, flow tested.',
      blocksStart: false,
    },
    {
      number: 3,
      row: 5,
      act: 'fog',
      zone: 'front',
      text: 'The run-out of the fog is kept clear; a spotter watches the lowest heads; nobody sits or lies there.',
      checklistLine: 'Spotter named and in place.',
      blocksStart: false,
    },
  ],
  findings: [
    {
      code: 'pit-low',
      kind: 'danger',
      text: 'The pit is the lowest space and has no extract: cold CO2 collects there.',
      path: '/venue/spaces/2',
    },
    {
      code: 'flow-design',
      kind: 'caution',
      text: 'The outdoor air of the stage is a design value; 70 % of it was counted.',
      path: '/venue/airSystems/0',
    },
  ],
  refusals: [
    {
      act: 'fog',
      reason: 'A volunteer was to lean into the fog: faces are kept out.',
      alternative: 'The volunteer blows the fog away from arm’s length with a fan.',
    },
  ],
  zones: [
    zone('players', 'Players', ['pit', 'Orchestra pit'], 1.15, 'crew', 0.17896),
    zone('front', 'Front row, seated on the floor', ['hall', 'Hall'], 0.5, 'public', 0.2019),
    zone('seats', 'Seats', ['hall', 'Hall'], 1.15, 'public', 0.206),
    zone('presenter', 'Presenter', ['stage', 'Stage'], 1.6, 'crew', 0.2071),
    {
      ...zone('tub', 'Face over the tub', ['stage', 'Stage'], 1, 'crew', 0.2),
      quantities: [],
      series: [],
      notComputed: 'not computed: keep faces out.',
    },
  ],
  sound: [
    {
      act: 'pipe',
      title: 'Flue pipe in a gas bag',
      instrument: 'flue pipe, stopped, 0.27 m',
      follows: true,
      words:
        'Sounds lower as argon fills the pipe; the ends still see air, so the note is a range.',
      frequencyInAir: figure(315.2, 'Hz'),
      frequency: figure(289.6, 'Hz', { low: 288.9, high: 296.4 }),
      cents: figure(-147, 'cents'),
      note: { name: 'D4', centsOff: -24 },
      noteInAir: { name: 'D♯4', centsOff: 23 },
      isStopped: true,
      jet: [],
      voice: null,
      amount: figure(0.02, 'm3'),
      amountByFlushing: figure(0.06, 'm3'),
      smallestAudible: [
        {
          words: 'heard by everyone',
          cents: 25,
          formantChange: null,
          gasFraction: figure(0.18, 'gasFraction'),
          amount: figure(0.0036, 'm3'),
          amountByFlushing: figure(0.004, 'm3'),
        },
      ],
      remarks: ['The level may differ.'],
      refusal: null,
      saferWay: 'a recording of both notes, played one after the other.',
    },
  ],
  largestAmounts: [
    {
      act: 'fog',
      gas: 'CO2',
      zone: 'players',
      limitedBy: 'oxygen, inventory bound, never',
      mass: figure(2.1467, 'kg'),
      volume: figure(1.1887, 'm3'),
      planned: figure(3, 'kg'),
    },
  ],
  holdTimes: [
    {
      space: 'pit',
      spaceTitle: 'Orchestra pit',
      quantity: 'Carbon dioxide',
      toLevel: figure(0.005, 'gasFraction'),
      time: figure(2461, 's'),
      words: 'With the pit extract on. Released by a reading, not by the clock.',
    },
    {
      space: 'stage',
      spaceTitle: 'Stage',
      quantity: 'Oxygen',
      toLevel: figure(0.2, 'oxygenFraction'),
      time: null,
      words: 'The level is never passed.',
    },
  ],
  questionsThatDecide: [
    {
      path: '/venue/airSystems/0/freshAirM3PerS',
      question: 'How much outdoor air does the stage system deliver in show mode?',
      wordAtBest: 'goWithConditions',
      wordAtWorst: 'noGo',
      suffices: figure(0.22, 'm3PerS'),
    },
  ],
  controls: [
    {
      id: 'c1',
      title: 'Pit cleared during the act',
      level: 'organise',
      act: 'fog',
      chosen: true,
      credited: true,
      words: 'The zone is judged only after the hold time.',
      before: figure(0.17896, 'oxygenFraction'),
      after: figure(0.2053, 'oxygenFraction'),
      terms: 'Locked, key with the stage manager.',
      burden: 2,
      rank: null,
      wordAlone: null,
      steps: ['Orchestra pit empty and locked.'],
      checklistLine: 'Orchestra pit empty and locked',
      choice: { control: 'c1', act: 'fog' },
    },
    {
      id: 'c2',
      title: 'Signs at the pit doors',
      level: 'organise',
      act: null,
      chosen: true,
      credited: false,
      words: 'Recorded.',
      before: null,
      after: null,
      terms: 'Signs change no air.',
      burden: 2,
      rank: null,
      wordAlone: null,
      steps: ['Signs hung.'],
      checklistLine: 'Signs hung',
      choice: { control: 'c2' },
    },
    {
      id: 'c3',
      title: 'Smaller portion',
      level: 'eliminate',
      act: 'fog',
      chosen: false,
      credited: true,
      words: 'One jug instead of two.',
      before: figure(0.17896, 'oxygenFraction'),
      after: figure(0.1934, 'oxygenFraction'),
      terms: 'The portion is weighed.',
      burden: 2,
      rank: 1,
      wordAlone: null,
      steps: ['One jug.'],
      checklistLine: 'One jug',
      choice: { control: 'c3', act: 'fog' },
    },
  ],
  leastControls: [
    {
      act: 'fog',
      space: 'stage',
      title: 'Low fog',
      isReached: true,
      wordAsFiled: 'noGo',
      word: 'goWithConditions',
      burden: 2,
      controls: [
        {
          title: 'Pit cleared during the act',
          burden: 2,
          steps: ['Clear the pit.'],
          checklistLine: 'Orchestra pit empty and locked',
          choice: { control: 'c1', act: 'fog' },
        },
      ],
      numbers: [],
    },
  ],
  sensitivity: [
    {
      id: 'halfAir',
      title: 'half the ventilation',
      word: 'noGo',
      zoneTitle: 'Players in the pit',
      quantity: 'oxygen',
      figure: figure(0.17, 'oxygenFraction'),
      limit: figure(0.2, 'oxygenFraction'),
    },
  ],
  rulesCited: [
    {
      id: 'r1',
      instrument: 'Workplace code (invented)',
      section: 'part 4',
      edition: '2020',
      duty: 'Keep oxygen at 19.5 % or above where people work.',
      why: 'Crew on stage and in the pit.',
      checked: 'read in full',
      confirm: false,
    },
    {
      id: 'r2',
      instrument: 'Theatre fire rules (invented)',
      section: '§ 12',
      edition: 'edition not known',
      duty: 'Tell the venue before gas cylinders are brought in.',
      why: 'A cylinder of argon is connected.',
      checked: 'from a summary',
      confirm: true,
    },
  ],
  cautions: [
    {
      id: 'k1',
      text: 'Cold CO2 runs downhill: pits, traps and the space under the stage fill first.',
    },
    { id: 'k2', text: 'Argon gives no warning: nobody smells, sees or feels the lack of oxygen.' },
  ],
  assumptions: [
    {
      path: '/venue/spaces/1/infiltration',
      text: 'Air leaking through the closed hall',
      figure: figure(0.2, 'perHour'),
      origin: 'assumed',
      source: 'policy: closed hall',
    },
    {
      path: '/venue/spaces/0/heightM',
      text: 'Clear height of the stage',
      figure: figure(7.1, 'm'),
      origin: 'drawing',
      source: 'section drawing of the house',
    },
    {
      path: '/venue/spaces/3/freshAir',
      text: 'Outdoor air under the stage',
      figure: null,
      origin: 'unknown',
      source: 'asked, no answer yet',
    },
  ],
  events: [
    { atS: opening + 12 * 60, untilS: opening + 30 * 60, title: 'Bench fog', act: 'fog' },
    { atS: opening + 50 * 60, untilS: opening + 52 * 60, title: 'Flue pipe', act: 'pipe' },
  ],
  section: {
    ...theatreView,
    meters: [
      { id: 'm1', title: 'Pit oxygen', space: 'pit', levelM: -1.8 },
      { id: 'm2', title: 'Stage oxygen', space: 'stage', levelM: 2.4 },
    ],
    moments: momentsFixture,
  },
  drivers: [
    {
      zone: 'players',
      zoneTitle: 'Players',
      quantity: 'oxygen',
      input: 'sourceDilution',
      inputTitle: 'dilution where the gas comes out',
      rankCorrelation: 0.81,
    },
    {
      zone: 'players',
      zoneTitle: 'Players',
      quantity: 'oxygen',
      input: 'releaseFactor',
      inputTitle: 'amount let out',
      rankCorrelation: -0.22,
    },
  ],
  sampling: { samples: 64, seed: 7 },
  site: {
    pressure: figure(99_800, 'Pa'),
    temperature: figure(293.15, 'K'),
    altitude: figure(130, 'm'),
    freshAirOxygenPressure: figure(20_600, 'Pa'),
  },
  carriage: null,
  climate: null,
  decisionTable: [],
  engineVersion: '0.1.0-fixture',
  inputHash: 'f1c7'.repeat(16),
};

/** The fixture blown up: many acts, many spaces and zones, long names in three alphabets. */
export function largeAssessment(acts: number, spaces: number): Assessment {
  const [fog] = assessmentFixture.acts;
  if (fog === undefined) throw new Error('the fixture has lost its act');
  const names = [
    'Η παράσταση με τον ξηρό πάγο στο μεγάλο αμφιθέατρο',
    'Демонстрация плотного тумана и органной трубы',
    'Balloons of helium over the gallery, released one after the other by a very patient crew',
    'Żółta łódź na niewidzialnym jeziorze',
    'Unbreakable' + 'verylong'.repeat(14),
  ];
  const nameOf = (index: number): string => `${String(index + 1)}. ${names[index % 5] ?? ''}`;
  return {
    ...assessmentFixture,
    title: `${names[0] ?? ''} и ${names[2] ?? ''}`,
    acts: Array.from({ length: acts }, (_, index) => ({
      ...fog,
      id: `act${String(index)}`,
      title: nameOf(index),
    })),
    spaces: Array.from({ length: spaces }, (_, index) => ({
      id: `s${String(index)}`,
      title: nameOf(index),
      decision: { asFiled: 'go' as const, withControls: 'go' as const },
      volume: figure(100 + index, 'm3'),
      freshAir: figure(0.1, 'm3PerS'),
    })),
    zones: Array.from({ length: spaces }, (_, index) =>
      zone(
        `z${String(index)}`,
        nameOf(index),
        [`s${String(index)}`, nameOf(index)],
        1.15,
        'public',
        0.2,
      ),
    ),
    section: { ...longView(spaces), moments: [] },
  };
}

/** The fixture with every list empty: what a plan looks like on its first minute. */
export const emptyAssessment: Assessment = {
  ...assessmentFixture,
  title: 'A plan without anything in it',
  decision: { asFiled: 'notEnoughKnown', withControls: 'notEnoughKnown' },
  governing: null,
  date: null,
  acts: [],
  spaces: [],
  conditions: [],
  findings: [],
  refusals: [],
  zones: [],
  sound: [],
  largestAmounts: [],
  holdTimes: [],
  questionsThatDecide: [],
  controls: [],
  rulesCited: [],
  cautions: [],
  assumptions: [],
  events: [],
  section: { spaces: [], openings: [], zones: [], layers: [], moment: '', moments: [] },
  drivers: [],
  sampling: null,
};
