import {
  checklistsFileSchema,
  controlLevels,
  controlsFileSchema,
  policyDefaultNames,
  policySchema,
  questionsFileSchema,
  type Checklists,
  type Control,
  type Policy,
  type ReviewQuestion,
} from '../assessment/catalogue-types.js';
import { checked, readDataFile, refuseFaults, type Fault } from './data-file.js';
import { repeatedIdFaults, unknownFaults, whenFaults, type KnownNames } from './references.js';

/** A level must become worse from aim to limit to never. */
function levelFaults(policy: Policy): readonly Fault[] {
  return policy.levels.flatMap((level, i) => {
    const sign = level.failsWhen === 'below' ? 1 : -1;
    const values = (['aim', 'limit', 'never'] as const).map((name) => level[name].value);
    const [aim, limit, never] = values;
    if (aim === undefined || limit === undefined || never === undefined) return [];
    const ordered = sign * (aim - limit) >= 0 && sign * (limit - never) >= 0;
    if (ordered) return [];
    return [
      {
        path: `/levels/${String(i)}/limit/value`,
        problem: 'aim, limit and never must each allow more than the one before',
        hint: 'The aim is the strictest value, never the loosest.',
      },
    ];
  });
}

function twiceFaults(rows: readonly { readonly name: string }[], path: string): readonly Fault[] {
  return repeatedIdFaults(
    rows.map(({ name }) => ({ id: name })),
    path,
  );
}

function missingDefaultFaults(policy: Policy): readonly Fault[] {
  const present = new Set<string>(policy.defaults.map(({ name }) => name));
  return policyDefaultNames
    .filter((name) => !present.has(name))
    .map((name) => ({
      path: '/defaults',
      problem: `the default ${name} is missing`,
      hint: 'Add the row, with value, unit, title and source.',
    }));
}

/** The levels and defaults of `policy/default.yaml`. */
export function policyOf(path: string, names: KnownNames): Policy {
  const file = readDataFile(path);
  const policy = checked(file, policySchema, 'policy');
  refuseFaults(file, 'policy', [
    ...levelFaults(policy),
    ...twiceFaults(policy.defaults, '/defaults'),
    ...missingDefaultFaults(policy),
    ...repeatedIdFaults(policy.containers, '/containers'),
    ...repeatedIdFaults(policy.refusals, '/refusals'),
    ...repeatedIdFaults(policy.roomTypes, '/roomTypes'),
    ...repeatedIdFaults(policy.breathingHeights, '/breathingHeights'),
    ...repeatedIdFaults(policy.carbonDioxidePerPerson, '/carbonDioxidePerPerson'),
    ...whenFaults(policy.meters, '/meters', names),
    ...[
      ...policy.freshAir.map((row, i) => [row.gas, `/freshAir/${String(i)}/gas`] as const),
      ...policy.meters.map((row, i) => [row.gas, `/meters/${String(i)}/gas`] as const),
      ...policy.authorities.map((row, i) => [row.gas, `/authorities/${String(i)}/gas`] as const),
      ...policy.containers.flatMap((row, i) =>
        row.gases.map((gas, j) => [gas, `/containers/${String(i)}/gases/${String(j)}`] as const),
      ),
      ...policy.costBands.map((row, i) => [row.gas, `/costBands/${String(i)}/gas`] as const),
    ].flatMap(([gas, place]) => unknownFaults(gas, names.gases, 'gas', place)),
  ]);
  return policy;
}

const slotPattern = /\{([^{}]*)\}/g;

/** Names of the slots in a checklist line, in order. */
function slotsOf(text: string): readonly string[] {
  return [...text.matchAll(slotPattern)].map(([, name = '']) => name);
}

/** Slots of a text that nobody defined. */
export function slotFaults(
  text: string,
  path: string,
  slots: ReadonlySet<string>,
): readonly Fault[] {
  return slotsOf(text).flatMap((slot) => unknownFaults(slot, slots, 'slot', path));
}

/** The lines of `policy/checklists.yaml` and the slots they fill. */
export function checklistsOf(path: string, names: KnownNames): Checklists {
  const file = readDataFile(path);
  const checklists = checked(file, checklistsFileSchema, 'checklist');
  const slots = new Set(checklists.slots.map(({ id }) => id));
  refuseFaults(file, 'checklist', [
    ...repeatedIdFaults(checklists.slots, '/slots'),
    ...repeatedIdFaults(checklists.lines, '/lines'),
    ...checklists.lines.flatMap(({ text }, i) =>
      slotFaults(text, `/lines/${String(i)}/text`, slots),
    ),
    ...whenFaults(checklists.lines, '/lines', names),
  ]);
  return checklists;
}

/** Slots of every control besides its own parameters. */
const controlSlots = ['act', 'space', 'group', 'gas', 'cap'] as const;

/** The controls of `policy/controls.yaml`, best first. */
export function controlsOf(path: string, checklists: Checklists): readonly Control[] {
  const file = readDataFile(path);
  const { controls } = checked(file, controlsFileSchema, 'control list');
  const lines = new Set(checklists.lines.map(({ id }) => id));
  refuseFaults(file, 'control list', [
    ...repeatedIdFaults(controls, '/controls'),
    ...controls.flatMap((control, i): readonly Fault[] => {
      const place = `/controls/${String(i)}`;
      const before = controls[i - 1];
      const outOfOrder =
        before && controlLevels.indexOf(before.level) > controlLevels.indexOf(control.level);
      return [
        ...control.checklist.flatMap((line, j) =>
          unknownFaults(line, lines, 'checklist line', `${place}/checklist/${String(j)}`),
        ),
        ...(outOfOrder
          ? [
              {
                path: `${place}/level`,
                problem: `${control.level} stands after ${before.level}`,
                hint: `Order of levels: ${controlLevels.join(', ')}.`,
              },
            ]
          : []),
        ...(control.credit === (control.noCreditBecause !== undefined)
          ? [
              {
                path: `${place}/credit`,
                problem: control.credit
                  ? 'a control with credit has no reason for none'
                  : 'a control without credit must say why',
                hint: 'State noCreditBecause where credit is false, and only there.',
              },
            ]
          : []),
        ...[...control.steps, control.line].flatMap((text, j) =>
          slotFaults(
            text,
            j < control.steps.length ? `${place}/steps/${String(j)}` : `${place}/line`,
            new Set([...controlSlots, ...control.parameters.map(({ key }) => key)]),
          ),
        ),
        ...(control.credit && control.effect === 'condition'
          ? [
              {
                path: `${place}/credit`,
                problem: 'a condition earns no credit in the numbers',
                hint: 'Set credit to false, or name the effect that the models compute.',
              },
            ]
          : []),
      ];
    }),
  ]);
  return controls;
}

/** The questions of `policy/review-questions.yaml`, in the order a reviewer asks them. */
export function questionsOf(path: string): readonly ReviewQuestion[] {
  const file = readDataFile(path);
  const { questions } = checked(file, questionsFileSchema, 'list of review questions');
  refuseFaults(file, 'list of review questions', repeatedIdFaults(questions, '/questions'));
  return questions;
}
