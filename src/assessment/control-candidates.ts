import type { Control } from './catalogue-types.js';
import { highestOf, molarMassOf } from './gas-content.js';
import type { GasLibrary } from '../science/gases/gas-library.js';
import type { Hit } from './decision-table.js';
import type { ChosenControl, PlanAct, PlanFile, PlanRelease } from './plan-file.js';
import type { Subject } from './standing.js';

/** What candidates are drawn up from. */
export interface CandidateFacts {
  readonly plan: PlanFile;
  readonly subject: Subject;
  /** What the subject fails as filed. */
  readonly hits: readonly Hit[];
  readonly gases: GasLibrary;
  /** Other gases that the demonstration of the act is shown with. */
  readonly otherGases: readonly string[];
  /** Spaces whose air the subject shares. */
  readonly spaces: ReadonlySet<string>;
  /**
   * Share of the planned amount that would do: the smallest audible one, else the largest that passes.
   * Zero where no amount passes, null where nothing less is called for.
   */
  readonly enoughShare: number | null;
}

type Draft = Omit<ChosenControl, 'control'>;

const airMolarMassKg = 0.029;
const isCold = ({ manner }: PlanRelease) => manner === 'fog' || manner === 'spill';

/**
 * The portion of an act that is weighed, such as dry ice. A cylinder cannot be brought in part, and
 * what is lost while filling is not what is needed.
 */
function portionOf(act: PlanAct): Draft['values'] | null {
  const capKg = act.releases.planned
    .filter(({ stock }) => stock === undefined)
    .reduce((sum, { massKg }) => sum + (highestOf(massKg) ?? 0), 0);
  return capKg > 0 ? { capKg } : null;
}

/** Spaces that lie under a hole in another floor: pits, trap rooms. */
const lowSpaces = ({ plan, spaces }: CandidateFacts): readonly string[] => [
  ...new Set(
    (plan.venue.openings ?? [])
      .filter(({ kind, to }) => kind === 'floorOpening' && spaces.has(to))
      .map(({ to }) => to),
  ),
];

/** The doors of a space to outdoors that the plan keeps shut, as a control states them. */
function shutDoors(plan: PlanFile, space: string): readonly Draft[] {
  const doors = (plan.venue.openings ?? []).filter(
    ({ kind, from, to, openFraction }) =>
      kind === 'doorway' &&
      [from, to].includes(space) &&
      [from, to].includes('outside') &&
      highestOf(openFraction) === 0,
  );
  const [first] = doors;
  const widthM = highestOf(first?.widthM);
  const heightM = highestOf(first?.heightM);
  if (widthM === undefined || heightM === undefined) return [];
  return [{ space, values: { widthM, heightM, count: doors.length } }];
}

function draftsFor(effect: Control['effect'], facts: CandidateFacts): readonly Draft[] {
  const { plan, subject, hits, otherGases, enoughShare } = facts;
  const act = plan.acts.find(({ id }) => id === subject.act);
  const spaces = [
    ...new Set([subject.space, ...hits.flatMap(({ outcome }) => outcome?.group.space ?? [])]),
  ];
  const failing = new Set(hits.flatMap(({ outcome }) => (outcome ? [outcome.zone] : [])));
  const groups = plan.event.audience.filter(({ id }) => failing.has(id));
  const ofAct = (draft: Draft = {}): readonly Draft[] => (act ? [{ act: act.id, ...draft }] : []);
  const ofSpaces = (isMeant: (space: string) => boolean = () => true): readonly Draft[] =>
    spaces.filter(isMeant).map((space) => ({ space }));
  const low = lowSpaces(facts);
  const ofLow = (isMeant: (space: string) => boolean = () => true): readonly Draft[] =>
    low.filter(isMeant).map((space) => ({ space }));
  const hasPeople = (space: string) => plan.event.audience.some(({ zone }) => zone.space === space);
  const isWarmRelease = act?.releases.planned.some((one) => !isCold(one)) ?? false;

  switch (effect) {
    case 'sourceRemoved':
      return ofAct();
    case 'gasSwapped':
      return isWarmRelease ? otherGases.slice(0, 1).flatMap((gas) => ofAct({ gas })) : [];
    case 'releaseScaled':
      if (enoughShare === null) return [];
      return enoughShare > 0 ? ofAct({ values: { amountShare: enoughShare } }) : ofAct();
    case 'inventoryCapped': {
      const values = act ? portionOf(act) : null;
      return values && hits.some(({ caseName }) => caseName === 'worstCredible')
        ? ofAct({ values })
        : [];
    }
    case 'openingOpened':
      return spaces.flatMap((space) => shutDoors(plan, space));
    case 'doorsBetweenShows':
      return plan.event.performances.length > 1
        ? spaces.flatMap((space) => shutDoors(plan, space))
        : [];
    case 'allOutdoorAir':
    case 'fansOn':
    case 'recirculationOff':
      return ofSpaces().slice(0, 1);
    case 'lowExtract':
    case 'highVent':
      return ofSpaces((space) => !low.includes(space)).slice(-1);
    case 'zoneExtract':
      return ofLow();
    case 'openingCovered':
      return ofLow();
    case 'zoneEmptied':
      return ofLow(hasPeople);
    case 'spreadBlocked':
    case 'releaseSplit':
      return ofAct();
    case 'sourceCaptured':
      return isWarmRelease ? ofAct() : [];
    case 'gasRecovered':
      return isWarmRelease && act?.recovery === false ? ofAct() : [];
    case 'containerOutside':
    case 'autoShutOff':
      return hits.some(({ caseName }) => caseName === 'worstCredible') && isWarmRelease
        ? ofAct()
        : [];
    case 'idleLossOnly':
    case 'stockMoved':
      return ofSpaces((space) => plan.stock?.some(({ place }) => place === space) ?? false);
    case 'peopleMoved':
    case 'seatsRaised':
      return groups
        .filter(({ kind }) => kind === 'public')
        .map(({ id, zone }) => ({ group: id, space: zone.space }));
    case 'holdTime':
      return plan.event.performances.length > 1 ? [{}] : [];
    case 'fixedMonitor': {
      const unseen = hits.filter(({ reason }) => reason === 'noMeter');
      const wanted = new Map(
        unseen.flatMap(({ outcome }) => {
          if (!outcome) return [];
          const gas = outcome.level.gas ?? 'O2';
          return [[`${outcome.zone} ${gas}`, { group: outcome.zone, gas }] as const];
        }),
      );
      return [...wanted.values()].map((draft) => {
        const heightM = plan.event.audience.find(({ id }) => id === draft.group)?.zone.heightM;
        return { ...draft, ...(heightM === undefined ? {} : { value: heightM }) };
      });
    }
    case 'liftUnmanned':
      return hits.some(({ reason }) => reason === 'placeFails') ? [{}] : [];
    // Each needs a number, a measurement or a fact that only the planner has.
    case 'condition':
    case 'containerSmaller':
    case 'evacuation':
    case 'flowCapped':
    case 'headcountCapped':
    case 'leakCutShort':
    case 'mixingFan':
    case 'noiseLowered':
    case 'personalMonitor':
    case 'readingGate':
    case 'storeVentilated':
    case 'vehicleAired':
      return [];
  }
}

/** True where a control for dense gas is asked about light gas, or the other way round. */
function isOutOfPlace(control: Control, { plan, subject, gases }: CandidateFacts): boolean {
  if (control.suits === undefined || control.suits === 'any') return false;
  const releases = plan.acts
    .filter(({ id }) => subject.act === null || id === subject.act)
    .flatMap(({ releases: { planned, worstCredible } }) => [...planned, ...worstCredible]);
  const isDense = (one: PlanRelease) => (molarMassOf(one, gases) ?? 0) >= airMolarMassKg;
  const dense = releases.some(isDense) || releases.length === 0;
  const light = releases.some((one) => !isDense(one));
  return control.suits === 'dense' ? !dense : !light;
}

/** Controls that could help a subject, each with the numbers that this plan gives it. */
export function controlCandidates(
  controls: readonly Control[],
  facts: CandidateFacts,
): readonly { readonly control: Control; readonly choice: ChosenControl }[] {
  return controls
    .filter((control) => control.credit && !isOutOfPlace(control, facts))
    .flatMap((control) =>
      draftsFor(control.effect, facts).map((draft) => ({
        control,
        choice: { control: control.id, ...draft },
      })),
    );
}
