import type { Control } from './catalogue-types.js';
import {
  spaceOf,
  stockOf,
  valueOf,
  statedOf,
  withActs,
  withReleases,
  withStock,
  type ControlChange,
  type ControlUse,
} from './control-change.js';
import {
  cappedTo,
  contentMol,
  molarMassOf,
  referenceMolarVolumeM3,
  withContentTimes,
} from './gas-content.js';
import type { PlanFile, PlanRelease, PlanStock } from './plan-file.js';

/** Manners of what is cold: no other gas comes out like it. */
const coldManners: readonly PlanRelease['manner'][] = ['fog', 'spill'];

const shrunk =
  (share: (use: ControlUse) => number | undefined): ControlChange =>
  (plan, use) => {
    const factor = share(use);
    if (factor === undefined || factor >= 1) return plan;
    return withReleases(plan, use, 'planned', (release) => [withContentTimes(release, factor)]);
  };

const lessShare = (key: string) =>
  shrunk((use) => {
    const share = valueOf(use, key);
    return share === undefined ? undefined : 1 - share;
  });

/** Worst credible releases of a control's acts, and its stock, capped each at its own amount [mol]. */
function capped(
  plan: PlanFile,
  use: ControlUse,
  capMol: (item: PlanRelease | PlanStock) => number | undefined,
  isMeant: (item: PlanStock) => boolean,
): PlanFile {
  const cap = <T extends PlanRelease | PlanStock>(item: T): T => {
    const most = capMol(item);
    return most === undefined ? item : cappedTo(item, most, plan, use.gases);
  };
  const acts = withActs(plan, use, (act) => ({
    ...act,
    releases: { ...act.releases, worstCredible: act.releases.worstCredible.map(cap) },
  }));
  return withStock(acts, isMeant, cap);
}

const molOfVolume = (volumeM3: number) => volumeM3 / referenceMolarVolumeM3;

const swapped =
  (gas: string, use: ControlUse) =>
  (release: PlanRelease): PlanRelease => {
    const before = molarMassOf(release, use.gases);
    const after = use.gases.species[gas]?.molarMass.molarMassKgPerMol;
    if (coldManners.includes(release.manner) || before === undefined || after === undefined) {
      return release;
    }
    const { composition: _left, stock: _stays, ...rest } = release;
    // The same amount of substance, so that a bag or a tank is as full as before.
    const { massKg } = withContentTimes(rest, after / before);
    return { ...rest, gas, ...(massKg === undefined ? {} : { massKg }) };
  };

/** Changes in what is let out, planned or by a slip. */
export const releaseChanges = {
  sourceRemoved: (plan, use) =>
    use.chosen.act === undefined
      ? plan
      : withActs(plan, use, (act) => ({ ...act, releases: { planned: [], worstCredible: [] } })),

  gasSwapped: (plan, use) => {
    const { gas } = use.chosen;
    const change = gas === undefined ? null : swapped(gas, use);
    if (!change) return plan;
    return (['planned', 'worstCredible'] as const).reduce(
      (current, row) => withReleases(current, use, row, (release) => [change(release)]),
      plan,
    );
  },

  releaseScaled: shrunk((use) => valueOf(use, 'amountShare')),
  sourceCaptured: lessShare('capturedShare'),
  gasRecovered: lessShare('recoveredShare'),

  inventoryCapped: (plan, use) => {
    const kg = statedOf(use, 'capKg');
    const volume = statedOf(use, 'capM3');
    if (kg === undefined && volume === undefined) return plan;
    const space = spaceOf(plan, use);
    return capped(
      plan,
      use,
      (item) => {
        const molar = molarMassOf(item, use.gases);
        if (kg !== undefined) return molar === undefined ? undefined : kg / molar;
        return volume === undefined ? undefined : molOfVolume(volume);
      },
      (item) => space === undefined || item.place === space,
    );
  },

  containerSmaller: (plan, use) => {
    const volume = statedOf(use, 'contentM3');
    if (volume === undefined) return plan;
    return capped(plan, use, () => molOfVolume(volume), stockOf(plan, use));
  },

  autoShutOff: (plan, use) => {
    const flow = valueOf(use, 'flowM3PerS');
    const shutS = valueOf(use, 'closesAfterS');
    if (flow === undefined || shutS === undefined || use.chosen.act === undefined) return plan;
    return capped(
      plan,
      use,
      () => molOfVolume(flow * shutS),
      () => false,
    );
  },

  containerOutside: (plan, use) => {
    const line = valueOf(use, 'lineM3');
    const flow = valueOf(use, 'flowM3PerS');
    const shutS = valueOf(use, 'shutS');
    if (line === undefined || flow === undefined || shutS === undefined) return plan;
    if (use.chosen.act === undefined) return plan;
    const isMeant = stockOf(plan, use);
    return withStock(
      capped(
        plan,
        use,
        () => molOfVolume(line + flow * shutS),
        () => false,
      ),
      isMeant,
      (item) => ({ ...item, place: 'outside', open: false }),
    );
  },

  flowCapped: (plan, use) => {
    const flow = valueOf(use, 'flowM3PerS');
    if (flow === undefined || flow <= 0) return plan;
    const slowed = (release: PlanRelease): readonly PlanRelease[] => {
      const content = contentMol(release, plan, use.gases);
      if (content === undefined) return [release];
      const leastS = (content * referenceMolarVolumeM3) / flow;
      return [{ ...release, durationS: Math.max(release.durationS ?? 0, leastS) }];
    };
    return withReleases(withReleases(plan, use, 'planned', slowed), use, 'worstCredible', slowed);
  },

  releaseSplit: (plan, use) => {
    const parts = Math.round(valueOf(use, 'parts') ?? 1);
    const gapS = valueOf(use, 'gapS') ?? 0;
    if (parts < 2) return plan;
    return withReleases(plan, use, 'planned', (release) =>
      Array.from({ length: parts }, (_, index) => ({
        ...withContentTimes(release, 1 / parts),
        startS: (release.startS ?? 0) + index * gapS,
        durationS: (release.durationS ?? 0) / parts,
      })),
    );
  },

  idleLossOnly: (plan, use) => {
    const loss = valueOf(use, 'lossPerHour');
    if (loss === undefined) return plan;
    const meant = stockOf(plan, use);
    return withStock(
      plan,
      (item) => meant(item) && item.form === 'dryIce',
      (item) => ({ ...item, idleLossPerHour: { value: loss, origin: 'supplied' } }),
    );
  },

  stockMoved: (plan, use) =>
    withStock(plan, stockOf(plan, use), (item) => ({ ...item, place: 'outside', open: false })),
} as const satisfies Partial<Record<Control['effect'], ControlChange>>;
