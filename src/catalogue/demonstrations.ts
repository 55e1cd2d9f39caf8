import { basename } from 'node:path';
import {
  demonstrationSchema,
  type Demonstration,
  type Spread,
} from '../assessment/catalogue-types.js';
import { checked, readDataFile, refuseFaults, type Fault } from './data-file.js';
import { slotFaults } from './policy.js';
import { repeatedIdFaults, unknownFaults, type KnownNames } from './references.js';

/** Ids a demonstration may refer to. */
export interface DemonstrationKnowledge extends KnownNames {
  readonly controls: ReadonlySet<string>;
  readonly cautions: ReadonlySet<string>;
  readonly slots: ReadonlySet<string>;
  readonly breathingHeights: ReadonlySet<string>;
}

type Release =
  Demonstration['releases']['planned'][number] | Demonstration['releases']['worstCredible'][number];

function spreadFaults(spread: Spread | undefined, path: string): readonly Fault[] {
  if (!spread || (spread.low <= spread.typical && spread.typical <= spread.high)) return [];
  const hint = 'Order the three figures; write the same one three times if there is only one.';
  return [{ path, problem: 'low, typical and high are not in order', hint }];
}

function compositionFaults(
  composition: Readonly<Record<string, number>> | undefined,
  gases: ReadonlySet<string>,
  path: string,
): readonly Fault[] {
  if (!composition) return [];
  const sum = Object.values(composition).reduce((total, share) => total + share, 0);
  return [
    ...Object.keys(composition).flatMap((gas) =>
      unknownFaults(gas, gases, 'gas', `${path}/${gas}`),
    ),
    ...(Math.abs(sum - 1) > 1e-6
      ? [{ path, problem: 'the shares do not add up to 1', hint: 'Correct the mole fractions.' }]
      : []),
  ];
}

function releaseFaults(
  release: Release,
  gases: ReadonlySet<string>,
  path: string,
): readonly Fault[] {
  const amounts = [release.massKg, release.volumeM3].filter((amount) => amount !== undefined);
  const kinds = [release.gas, release.composition].filter((kind) => kind !== undefined);
  return [
    ...unknownFaults(release.gas, gases, 'gas', `${path}/gas`),
    ...compositionFaults(release.composition, gases, `${path}/composition`),
    ...spreadFaults(release.massKg, `${path}/massKg`),
    ...spreadFaults(release.volumeM3, `${path}/volumeM3`),
    ...spreadFaults(release.durationS, `${path}/durationS`),
    ...spreadFaults(release.heightM, `${path}/heightM`),
    ...(amounts.length === 1
      ? []
      : [{ path, problem: 'needs either massKg or volumeM3', hint: 'State the amount once.' }]),
    ...(kinds.length === 1
      ? []
      : [{ path, problem: 'needs either gas or composition', hint: 'Name what is let out once.' }]),
    ...(release.profile === 'decaying' && release.timeConstantS === undefined
      ? [
          {
            path,
            problem: 'a decaying release needs timeConstantS',
            hint: 'A third of the duration if nothing better is known.',
          },
        ]
      : []),
  ];
}

function demonstrationFaults(
  demonstration: Demonstration,
  known: DemonstrationKnowledge,
): readonly Fault[] {
  const { releases } = demonstration;
  const noGas = demonstration.noGas ?? false;
  const count = releases.planned.length + releases.worstCredible.length;
  const named = new Set(demonstration.gases);
  const plannedIds = new Set(releases.planned.map(({ id }) => id));
  const all = [
    ...releases.planned.map((release, i) => [release, `/releases/planned/${String(i)}`] as const),
    ...releases.worstCredible.map(
      (release, i) => [release, `/releases/worstCredible/${String(i)}`] as const,
    ),
  ];
  return [
    ...demonstration.gases.flatMap((gas, i) =>
      unknownFaults(gas, known.gases, 'gas', `/gases/${String(i)}`),
    ),
    ...all.flatMap(([release, path]) => releaseFaults(release, known.gases, path)),
    ...all.flatMap(([release, path]): readonly Fault[] =>
      release.gas === undefined || named.has(release.gas)
        ? []
        : [
            {
              path: `${path}/gas`,
              problem: `${release.gas} is not among the gases of this demonstration`,
              hint: 'Add it to gases, or correct the release.',
            },
          ],
    ),
    ...(noGas === (count === 0) && (noGas || releases.worstCredible.length > 0)
      ? []
      : [
          {
            path: '/releases',
            problem: noGas
              ? 'a demonstration without gas lists releases'
              : 'both a planned and a worst credible release are needed',
            hint: 'State what goes out as rehearsed, and what goes out when the container is lost.',
          },
        ]),
    ...releases.planned.flatMap(({ insteadOf }, i) =>
      unknownFaults(
        insteadOf,
        plannedIds,
        'planned release',
        `/releases/planned/${String(i)}/insteadOf`,
      ),
    ),
    ...releases.worstCredible.flatMap(({ onlyWith }, i) =>
      unknownFaults(
        onlyWith,
        plannedIds,
        'planned release',
        `/releases/worstCredible/${String(i)}/onlyWith`,
      ),
    ),
    ...repeatedIdFaults(releases.planned, '/releases/planned'),
    ...repeatedIdFaults(releases.worstCredible, '/releases/worstCredible'),
    ...demonstration.sound.flatMap((sound, i) => [
      ...unknownFaults(sound.gas, known.gases, 'gas', `/sound/${String(i)}/gas`),
      ...compositionFaults(sound.composition, known.gases, `/sound/${String(i)}/composition`),
    ]),
    ...demonstration.people.flatMap((person, i) =>
      unknownFaults(
        person.breathingHeight,
        known.breathingHeights,
        'breathing height',
        `/people/${String(i)}/breathingHeight`,
      ),
    ),
    ...demonstration.controls.flatMap((control, i) => [
      ...unknownFaults(
        control.control,
        known.controls,
        'control',
        `/controls/${String(i)}/control`,
      ),
      ...slotFaults(control.text, `/controls/${String(i)}/text`, known.slots),
    ]),
    ...demonstration.substitutes.flatMap((substitute, i) =>
      unknownFaults(
        substitute.demonstration,
        new Set([...known.demonstrations].filter((id) => id !== demonstration.id)),
        'demonstration',
        `/substitutes/${String(i)}/demonstration`,
      ),
    ),
    ...demonstration.cautions.flatMap((caution, i) =>
      unknownFaults(caution, known.cautions, 'caution', `/cautions/${String(i)}`),
    ),
    ...demonstration.checklist.flatMap(({ text }, i) =>
      slotFaults(text, `/checklist/${String(i)}/text`, known.slots),
    ),
    ...(['setUp', 'clearDown'] as const).flatMap((part) =>
      demonstration[part].flatMap((text, i) =>
        slotFaults(text, `/${part}/${String(i)}`, known.slots),
      ),
    ),
  ];
}

/**
 * The demonstrations of the given files; each file is named by the id it holds.
 *
 * @throws {InvalidInput} naming file, line and place of everything that cannot be used
 */
export function demonstrationsOf(
  paths: readonly string[],
  known: DemonstrationKnowledge,
): readonly Demonstration[] {
  return paths.map((path) => {
    const file = readDataFile(path);
    const demonstration = checked(file, demonstrationSchema, 'demonstration');
    const name = basename(path).replace(/\.[a-z]+$/, '');
    refuseFaults(file, 'demonstration', [
      ...(demonstration.id === name
        ? []
        : [
            {
              path: '/id',
              problem: `the id "${demonstration.id}" is not the name of the file`,
              hint: 'Give file and demonstration the same name; others refer to it.',
            },
          ]),
      ...demonstrationFaults(demonstration, known),
    ]);
    return demonstration;
  });
}
