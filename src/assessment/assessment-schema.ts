import Type, { type TSchema } from 'typebox';
import { decisionOrder, type Assessment } from './assessment.js';
import { chosenControlSchema, originSchema } from './plan-file.js';

/** JSON Schema of an assessment, as every door answers it. Mirrors assessment.ts; a test holds both together. */

const closed = { additionalProperties: false } as const;
const text = Type.String();
const number = Type.Number();
const flag = Type.Boolean();
const object = <P extends Record<string, TSchema>>(properties: P) =>
  Type.Object(properties, closed);
const list = <S extends TSchema>(item: S) => Type.Array(item);
const orNull = <S extends TSchema>(schema: S) => Type.Union([schema, Type.Null()]);
const optional = <S extends TSchema>(schema: S) => Type.Optional(schema);

const word = Type.Enum([...decisionOrder]);
const pair = object({ asFiled: word, withControls: word });
const figure = Type.Object(
  {
    value: number,
    low: optional(number),
    high: optional(number),
    unit: text,
    method: text,
    formula: text,
    inputs: list(
      object({
        name: text,
        value: Type.Union([number, text]),
        unit: text,
        origin: optional(originSchema),
      }),
    ),
    source: text,
    range: text,
  },
  { ...closed, description: 'a number that explains itself' },
);
const answer = Type.Enum(['mixed', 'layered', 'layeredP50', 'bound']);
const caseName = Type.Enum(['planned', 'worstCredible', 'fansOff']);
const note = object({ name: text, centsOff: number });
const releaseLine = object({
  title: text,
  gas: text,
  mass: figure,
  volume: figure,
  durationS: number,
});
const zone = object({
  id: text,
  title: text,
  space: text,
  spaceTitle: text,
  heightM: number,
  floorLevelM: number,
  kind: Type.Enum(['public', 'crew', 'floorLevelCheck']),
  count: orNull(figure),
  quantities: list(
    object({
      quantity: text,
      quantityTitle: text,
      caseName,
      answers: object({
        mixed: optional(figure),
        layered: optional(figure),
        layeredP50: optional(figure),
        bound: optional(figure),
      }),
      partialPressure: optional(figure),
      levels: object({ aim: orNull(figure), limit: orNull(figure), never: orNull(figure) }),
      standing: Type.Enum(['meets aim', 'meets limit', 'below limit', 'past never']),
      crossings: list(object({ level: Type.Enum(['aim', 'limit', 'never']), answer, at: figure })),
      readings: list(
        object({
          atS: number,
          why: list(object({ answer, what: Type.Enum(['worst', 'aim', 'limit', 'never']) })),
          values: object({
            mixed: optional(number),
            layered: optional(number),
            layeredP50: optional(number),
            bound: optional(number),
          }),
        }),
      ),
    }),
  ),
  series: list(
    object({
      caseName,
      quantity: text,
      answer: Type.Enum(['mixed', 'layered', 'layeredP50', 'bound', 'layeredP05', 'layeredP95']),
      timesS: list(number),
      values: list(number),
    }),
  ),
  notComputed: orNull(text),
});

const layers = list(
  object({
    space: text,
    at: Type.Enum(['floor', 'ceiling', 'whole']),
    depthM: number,
    gasFraction: figure,
  }),
);

const schema = Type.Object(
  {
    title: text,
    date: orNull(text),
    venueTitle: text,
    revision: text,
    preparedBy: text,
    decision: pair,
    governing: orNull(
      object({
        zone: text,
        zoneTitle: text,
        quantity: text,
        answer,
        caseName,
        figure,
        limit: figure,
        row: number,
        reason: text,
      }),
    ),
    acts: list(
      object({
        id: text,
        title: text,
        space: text,
        spaceTitle: text,
        decision: pair,
        planned: list(releaseLine),
        worstCredible: list(releaseLine),
        cautions: list(text),
      }),
    ),
    spaces: list(
      object({ id: text, title: text, decision: pair, volume: figure, freshAir: figure }),
    ),
    conditions: list(
      object({
        number,
        row: number,
        act: orNull(text),
        zone: orNull(text),
        text,
        checklistLine: text,
        blocksStart: flag,
      }),
    ),
    findings: list(
      object({
        code: text,
        kind: Type.Enum(['danger', 'caution', 'plausibility', 'note']),
        text,
        path: text,
      }),
    ),
    refusals: list(object({ act: text, reason: text, alternative: text })),
    zones: list(zone),
    sound: list(
      object({
        act: text,
        title: text,
        instrument: text,
        follows: flag,
        words: text,
        frequencyInAir: orNull(figure),
        frequency: orNull(figure),
        cents: orNull(figure),
        note: orNull(note),
        noteInAir: orNull(note),
        isStopped: flag,
        jet: list(
          object({
            supply: Type.Enum(['pressure', 'flow']),
            speaks: Type.Enum(['speaks', 'mayNotSpeak', 'mayOverblow', 'overblows']),
            intonation: figure,
            words: text,
          }),
        ),
        voice: orNull(
          object({
            speaker: Type.Enum(['man', 'woman', 'child']),
            vowel: Type.Enum(['i', 'ae', 'a', 'u']),
            fundamentalHz: number,
            factor: figure,
            formantsInAir: list(figure),
            formants: list(figure),
          }),
        ),
        amount: orNull(figure),
        amountByFlushing: orNull(figure),
        smallestAudible: list(
          object({
            words: text,
            cents: orNull(number),
            formantChange: orNull(number),
            gasFraction: figure,
            amount: orNull(figure),
            amountByFlushing: orNull(figure),
          }),
        ),
        remarks: list(text),
        refusal: orNull(object({ reason: text, alternative: text })),
        saferWay: text,
      }),
    ),
    largestAmounts: list(
      object({
        act: text,
        gas: text,
        zone: text,
        limitedBy: text,
        mass: figure,
        volume: figure,
        planned: figure,
      }),
    ),
    holdTimes: list(
      object({
        space: text,
        spaceTitle: text,
        quantity: text,
        toLevel: figure,
        time: orNull(figure),
        words: text,
      }),
    ),
    questionsThatDecide: list(
      object({
        path: text,
        question: text,
        wordAtBest: word,
        wordAtWorst: word,
        suffices: orNull(figure),
      }),
    ),
    controls: list(
      object({
        id: text,
        title: text,
        level: Type.Enum(['eliminate', 'substitute', 'engineer', 'organise', 'protect']),
        act: orNull(text),
        chosen: flag,
        credited: flag,
        words: text,
        before: orNull(figure),
        after: orNull(figure),
        terms: text,
        burden: number,
        rank: orNull(number),
        wordAlone: orNull(word),
        steps: list(text),
        checklistLine: text,
        choice: chosenControlSchema,
      }),
    ),
    leastControls: list(
      object({
        act: orNull(text),
        space: text,
        title: text,
        isReached: flag,
        wordAsFiled: word,
        word,
        burden: number,
        controls: list(
          object({
            title: text,
            burden: number,
            steps: list(text),
            checklistLine: text,
            choice: chosenControlSchema,
          }),
        ),
        numbers: list(
          object({
            zone: text,
            zoneTitle: text,
            quantity: text,
            answer,
            caseName,
            before: figure,
            after: orNull(figure),
            limit: figure,
          }),
        ),
      }),
    ),
    sensitivity: list(
      object({
        id: text,
        title: text,
        word,
        zoneTitle: text,
        quantity: text,
        figure: orNull(figure),
        limit: orNull(figure),
      }),
    ),
    rulesCited: list(
      object({
        id: text,
        instrument: text,
        section: text,
        edition: text,
        duty: text,
        why: text,
        checked: text,
        confirm: flag,
      }),
    ),
    cautions: list(object({ id: text, text })),
    assumptions: list(
      object({
        path: text,
        text,
        figure: orNull(figure),
        origin: originSchema,
        source: text,
      }),
    ),
    events: list(object({ atS: number, untilS: number, title: text, act: orNull(text) })),
    section: object({
      spaces: list(
        object({
          id: text,
          title: text,
          floorLevelM: number,
          floorRiseM: number,
          heightM: number,
          lengthM: number,
        }),
      ),
      openings: list(
        object({ from: text, to: text, kind: text, sillLevelM: number, heightM: number }),
      ),
      zones: list(
        object({
          id: text,
          title: text,
          space: text,
          levelM: number,
          lowestOxygen: orNull(figure),
          highestGas: orNull(figure),
        }),
      ),
      layers,
      moment: text,
      meters: optional(list(object({ id: text, title: text, space: text, levelM: number }))),
      moments: list(
        object({
          atS: number,
          caseName: Type.Enum(['planned', 'worstCredible']),
          kind: Type.Enum(['cue', 'worst']),
          title: text,
          layers,
          zones: list(
            object({
              id: text,
              oxygen: orNull(figure),
              oxygenBound: orNull(figure),
              gas: orNull(figure),
              gasTitle: orNull(text),
            }),
          ),
        }),
      ),
    }),
    drivers: list(
      object({
        zone: text,
        zoneTitle: text,
        quantity: text,
        input: text,
        inputTitle: text,
        rankCorrelation: number,
      }),
    ),
    sampling: orNull(object({ samples: number, seed: number })),
    site: object({
      pressure: figure,
      temperature: figure,
      altitude: figure,
      freshAirOxygenPressure: figure,
    }),
    carriage: Type.Null(),
    climate: orNull(object({ instrument: text, planned: figure, worstCredible: figure })),
    decisionTable: list(
      object({ row: number, test: text, word: orNull(word), fired: flag, where: text }),
    ),
    engineVersion: text,
    inputHash: text,
  },
  { ...closed, title: 'Stillair assessment' },
);

export const assessmentSchema = Type.Unsafe<Assessment>(schema);
