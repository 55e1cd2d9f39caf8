import type { ChosenControl, Origin } from './plan-file.js';

/**
 * The shape of one assessment: the single value that the page, the JSON answer and every sheet read.
 * Nothing downstream computes a number; it only formats Figures.
 */

/** The decision words, best first. */
export const decisionOrder = ['go', 'goWithConditions', 'notEnoughKnown', 'noGo'] as const;
export type DecisionWord = (typeof decisionOrder)[number];

export interface FigureInput {
  readonly name: string;
  readonly value: number | string;
  readonly unit: string;
  readonly origin?: Origin;
}

/** A number that explains itself. */
export interface Figure {
  readonly value: number;
  readonly low?: number;
  readonly high?: number;
  /** SI or the dimensionless unit of `figureUnits`. */
  readonly unit: FigureUnit;
  /** Key of the method text; the formula in plain text. */
  readonly method: string;
  readonly formula: string;
  readonly inputs: readonly FigureInput[];
  /** Key of the bibliography in science/sources. */
  readonly source: string;
  /** Where the method holds, in words; a value outside it says so here. */
  readonly range: string;
}

/** Units a Figure may carry; the formatter knows digits and rounding for each. */
export type FigureUnit =
  | 'oxygenFraction' // dry basis, printed in percent, rounded down
  | 'gasFraction' // printed in ppm or percent, rounded up
  | 'Pa'
  | 'Hz'
  | 'cents'
  | 'ratio'
  | 's' // printed as min and s, rounded up
  | 'kg'
  | 'mol'
  | 'm3'
  | 'm'
  | 'm2'
  | 'm3PerS'
  | 'perHour'
  | 'K'
  | 'mPerS'
  | 'people'
  | 'kgCO2e';

export type Answer = 'mixed' | 'layered' | 'layeredP50' | 'bound';
export type CaseName = 'planned' | 'worstCredible' | 'fansOff';

export interface DecisionPair {
  readonly asFiled: DecisionWord;
  readonly withControls: DecisionWord;
}

export interface Governing {
  readonly zone: string;
  readonly zoneTitle: string;
  readonly quantity: string;
  readonly answer: Answer;
  readonly caseName: CaseName;
  readonly figure: Figure;
  readonly limit: Figure;
  /** Row of the decision table, 1 to 12. */
  readonly row: number;
  readonly reason: string;
}

export interface Condition {
  readonly number: number;
  readonly row: number;
  readonly act: string | null;
  readonly zone: string | null;
  readonly text: string;
  readonly checklistLine: string;
  readonly blocksStart: boolean;
}

export type FindingKind = 'danger' | 'caution' | 'plausibility' | 'note';

export interface Finding {
  readonly code: string;
  readonly kind: FindingKind;
  readonly text: string;
  /** JSON Pointer into the plan file, '' when it concerns the whole. */
  readonly path: string;
}

export interface Refusal {
  readonly act: string;
  readonly reason: string;
  readonly alternative: string;
}

export interface Crossing {
  readonly level: 'aim' | 'limit' | 'never';
  readonly answer: Answer;
  readonly at: Figure;
}

/** A quantity in one zone in one case: the answers beside each other and how they stand. */
export interface ZoneQuantity {
  readonly quantity: string;
  readonly quantityTitle: string;
  readonly caseName: CaseName;
  readonly answers: Partial<Record<Answer, Figure>>;
  /** Oxygen also as partial pressure, wet, at the site. */
  readonly partialPressure?: Figure;
  readonly levels: {
    readonly aim: Figure | null;
    readonly limit: Figure | null;
    readonly never: Figure | null;
  };
  readonly standing: 'meets aim' | 'meets limit' | 'below limit' | 'past never';
  readonly crossings: readonly Crossing[];
  /** The answers side by side where one is at its worst or passes a level, in the order of time. */
  readonly readings: readonly Reading[];
}

export interface Reading {
  /** Seconds after midnight of the event day. */
  readonly atS: number;
  readonly why: readonly {
    readonly answer: Answer;
    readonly what: 'worst' | 'aim' | 'limit' | 'never';
  }[];
  readonly values: Partial<Record<Answer, number>>;
}

/**
 * One series for the curve; times in seconds after midnight of the event day. Points that a straight
 * line between their neighbours shows as well are left out; the two ends of the band share their times.
 */
export interface ZoneSeries {
  readonly caseName: CaseName;
  readonly quantity: string;
  readonly answer: Answer | 'layeredP05' | 'layeredP95';
  readonly timesS: readonly number[];
  readonly values: readonly number[];
}

export interface ZoneResult {
  readonly id: string;
  readonly title: string;
  readonly space: string;
  readonly spaceTitle: string;
  readonly heightM: number;
  readonly floorLevelM: number;
  readonly kind: 'public' | 'crew' | 'floorLevelCheck';
  readonly count: Figure | null;
  readonly quantities: readonly ZoneQuantity[];
  readonly series: readonly ZoneSeries[];
  /** Printed instead of a number where the models do not apply. */
  readonly notComputed: string | null;
}

export interface SoundNote {
  readonly name: string;
  readonly centsOff: number;
}

/** How a jet-driven pipe takes to the gas, by what its supply keeps the same as in air. */
export interface JetAnswer {
  readonly supply: 'pressure' | 'flow';
  readonly speaks: 'speaks' | 'mayNotSpeak' | 'mayOverblow' | 'overblows';
  readonly intonation: Figure;
  readonly words: string;
}

/** A voice in a breathable mixture: what moves is the timbre. */
export interface VoiceAnswer {
  readonly speaker: 'man' | 'woman' | 'child';
  readonly vowel: 'i' | 'ae' | 'a' | 'u';
  readonly fundamentalHz: number;
  /** Sound speed over that of air, in the tract. */
  readonly factor: Figure;
  readonly formantsInAir: readonly Figure[];
  readonly formants: readonly Figure[];
}

export interface SmallestAudible {
  readonly words: string;
  /** Shift of the note; null for a voice. */
  readonly cents: number | null;
  /** Relative shift of the formants; null for a note. */
  readonly formantChange: number | null;
  readonly gasFraction: Figure;
  /** Gas for the bag pressed flat first, where the bag is known. */
  readonly amount: Figure | null;
  /** Gas for the bag flushed while it mixes. */
  readonly amountByFlushing: Figure | null;
}

export interface SoundResult {
  readonly act: string;
  readonly title: string;
  readonly instrument: string;
  readonly follows: boolean;
  readonly words: string;
  readonly frequencyInAir: Figure | null;
  readonly frequency: Figure | null;
  readonly cents: Figure | null;
  readonly note: SoundNote | null;
  readonly noteInAir: SoundNote | null;
  /** Only odd partials sound, as in a stopped pipe. */
  readonly isStopped: boolean;
  readonly jet: readonly JetAnswer[];
  readonly voice: VoiceAnswer | null;
  /** The gas that buys the effect: bag pressed flat first, and bag flushed while it mixes. */
  readonly amount: Figure | null;
  readonly amountByFlushing: Figure | null;
  readonly smallestAudible: readonly SmallestAudible[];
  readonly remarks: readonly string[];
  /** Set where the gas may not be breathed; then nothing is computed. */
  readonly refusal: { readonly reason: string; readonly alternative: string } | null;
  readonly saferWay: string;
}

export interface LargestAmount {
  readonly act: string;
  readonly gas: string;
  readonly zone: string;
  readonly limitedBy: string;
  readonly mass: Figure;
  readonly volume: Figure;
  readonly planned: Figure;
}

export interface HoldTime {
  readonly space: string;
  readonly spaceTitle: string;
  readonly quantity: string;
  readonly toLevel: Figure;
  readonly time: Figure | null;
  readonly words: string;
}

export interface DecidingQuestion {
  readonly path: string;
  readonly question: string;
  readonly wordAtBest: DecisionWord;
  readonly wordAtWorst: DecisionWord;
  /** The value that would suffice, when one does. */
  readonly suffices: Figure | null;
}

export interface ControlResult {
  readonly id: string;
  readonly title: string;
  readonly level: 'eliminate' | 'substitute' | 'engineer' | 'organise' | 'protect';
  readonly act: string | null;
  readonly chosen: boolean;
  readonly credited: boolean;
  readonly words: string;
  /** The number that decides, without any control and with this one alone, by one layered run each. */
  readonly before: Figure | null;
  /** Null where it was not worked out, or where nobody is left in that zone. */
  readonly after: Figure | null;
  /** What must be shown before it counts, or why it earns nothing. */
  readonly terms: string;
  /** What it asks of a house and its crew, 1 little to 5 much. */
  readonly burden: number;
  /** Place among what was tried for its act or space, 1 the best; null where it was not tried. */
  readonly rank: number | null;
  /** Word of its act or space with this control alone, where it was tried. */
  readonly wordAlone: DecisionWord | null;
  /** How it is done here, its numbers filled in. */
  readonly steps: readonly string[];
  readonly checklistLine: string;
  /** The same as a plan file states it. */
  readonly choice: ChosenControl;
}

/** The least set of controls found that brings an act, or a space, from No-go to Go with conditions. */
export interface LeastControls {
  readonly act: string | null;
  readonly space: string;
  readonly title: string;
  /** False where no set was found; then the closest one stands here. */
  readonly isReached: boolean;
  readonly wordAsFiled: DecisionWord;
  readonly word: DecisionWord;
  /** Sum over its controls. */
  readonly burden: number;
  readonly controls: readonly {
    readonly title: string;
    readonly burden: number;
    readonly steps: readonly string[];
    readonly checklistLine: string;
    readonly choice: ChosenControl;
  }[];
  /** What refuses it as filed, and the same number with the set; null where nobody is left there. */
  readonly numbers: readonly {
    readonly zone: string;
    readonly zoneTitle: string;
    readonly quantity: string;
    readonly answer: Answer;
    readonly caseName: CaseName;
    readonly before: Figure;
    readonly after: Figure | null;
    readonly limit: Figure;
  }[];
}

/** The planned day with one thing that carries it given way. */
export interface SensitivityRow {
  /** asJudged, halfAir, twiceRelease, fansOff, or without:n for the n-th credited control. */
  readonly id: string;
  readonly title: string;
  readonly word: DecisionWord;
  readonly zoneTitle: string;
  readonly quantity: string;
  readonly figure: Figure | null;
  readonly limit: Figure | null;
}

export interface CitedRule {
  readonly id: string;
  readonly instrument: string;
  readonly section: string;
  readonly edition: string;
  readonly duty: string;
  readonly why: string;
  readonly checked: string;
  readonly confirm: boolean;
}

export interface StatedAssumption {
  readonly path: string;
  readonly text: string;
  readonly figure: Figure | null;
  readonly origin: Origin;
  readonly source: string;
}

/** One cue or state change on the time axis, for curves and run sheets. */
export interface DayEvent {
  readonly atS: number;
  readonly untilS: number;
  readonly title: string;
  readonly act: string | null;
}

export interface ActResult {
  readonly id: string;
  readonly title: string;
  readonly space: string;
  readonly spaceTitle: string;
  readonly decision: DecisionPair;
  readonly planned: readonly ReleaseLine[];
  readonly worstCredible: readonly ReleaseLine[];
  readonly cautions: readonly string[];
}

export interface ReleaseLine {
  readonly title: string;
  readonly gas: string;
  readonly mass: Figure;
  readonly volume: Figure;
  readonly durationS: number;
}

/** What the section drawing needs, in metres and fractions; no computing left to do. */
export interface SectionView {
  readonly spaces: readonly {
    readonly id: string;
    readonly title: string;
    readonly floorLevelM: number;
    readonly floorRiseM: number;
    readonly heightM: number;
    readonly lengthM: number;
  }[];
  readonly openings: readonly {
    readonly from: string;
    readonly to: string;
    readonly kind: string;
    readonly sillLevelM: number;
    readonly heightM: number;
  }[];
  readonly zones: readonly {
    readonly id: string;
    readonly title: string;
    readonly space: string;
    readonly levelM: number;
    readonly lowestOxygen: Figure | null;
    readonly highestGas: Figure | null;
  }[];
  /** Gas drawn at the moment of the governing number. */
  readonly layers: readonly SectionLayer[];
  readonly moment: string;
  /** Where the meters of the plan hang. */
  readonly meters?: readonly {
    readonly id: string;
    readonly title: string;
    readonly space: string;
    readonly levelM: number;
  }[];
}

export interface SectionLayer {
  readonly space: string;
  readonly at: 'floor' | 'ceiling' | 'whole';
  readonly depthM: number;
  readonly gasFraction: Figure;
}

/** The air at one moment worth a look: when a cue begins or ends, or when a case is at its worst. */
export interface SectionMoment {
  readonly atS: number;
  readonly caseName: 'planned' | 'worstCredible';
  readonly kind: 'cue' | 'worst';
  readonly title: string;
  readonly layers: readonly SectionLayer[];
  /** What is breathed then; the answer that judges (layered, or mixed where none) and the bound. */
  readonly zones: readonly {
    readonly id: string;
    readonly oxygen: Figure | null;
    readonly oxygenBound: Figure | null;
    readonly gas: Figure | null;
    readonly gasTitle: string | null;
  }[];
}

/** The section of an assessment: the view at the governing number, and the other moments. */
export interface SectionOfDay extends SectionView {
  readonly moments: readonly SectionMoment[];
}

/** How strongly one uncertain input moves the layered answer of a zone on the planned day. */
export interface DriverResult {
  readonly zone: string;
  readonly zoneTitle: string;
  readonly quantity: string;
  readonly input: string;
  readonly inputTitle: string;
  /** Spearman, -1 to 1, with the worst value of the quantity. */
  readonly rankCorrelation: number;
}

/** How the band of the layered answer was drawn. */
export interface Sampling {
  readonly samples: number;
  readonly seed: number;
}

export interface Assessment {
  readonly title: string;
  readonly date: string | null;
  readonly venueTitle: string;
  readonly revision: string;
  readonly preparedBy: string;
  readonly decision: DecisionPair;
  readonly governing: Governing | null;
  readonly acts: readonly ActResult[];
  readonly spaces: readonly {
    readonly id: string;
    readonly title: string;
    readonly decision: DecisionPair;
    readonly volume: Figure;
    readonly freshAir: Figure;
  }[];
  readonly conditions: readonly Condition[];
  readonly findings: readonly Finding[];
  readonly refusals: readonly Refusal[];
  readonly zones: readonly ZoneResult[];
  readonly sound: readonly SoundResult[];
  readonly largestAmounts: readonly LargestAmount[];
  readonly holdTimes: readonly HoldTime[];
  readonly questionsThatDecide: readonly DecidingQuestion[];
  readonly controls: readonly ControlResult[];
  readonly leastControls: readonly LeastControls[];
  readonly sensitivity: readonly SensitivityRow[];
  readonly rulesCited: readonly CitedRule[];
  readonly cautions: readonly { readonly id: string; readonly text: string }[];
  readonly assumptions: readonly StatedAssumption[];
  readonly events: readonly DayEvent[];
  readonly section: SectionOfDay;
  readonly drivers: readonly DriverResult[];
  /** Null where nothing was sampled. */
  readonly sampling: Sampling | null;
  readonly site: {
    readonly pressure: Figure;
    readonly temperature: Figure;
    readonly altitude: Figure;
    readonly freshAirOxygenPressure: Figure;
  };
  readonly carriage: null;
  readonly climate: {
    readonly instrument: string;
    readonly planned: Figure;
    readonly worstCredible: Figure;
  } | null;
  readonly decisionTable: readonly {
    readonly row: number;
    readonly test: string;
    readonly word: DecisionWord | null;
    readonly fired: boolean;
    readonly where: string;
  }[];
  readonly engineVersion: string;
  readonly inputHash: string;
}
