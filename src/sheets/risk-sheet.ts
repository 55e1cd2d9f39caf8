import type { Assessment } from '../assessment/assessment.js';
import { quantityText } from '../assessment/figure-text.js';
import type { Block, DocumentTree, SheetStatus } from './document-tree.js';
import { filledText } from './filled-text.js';
import { actsPart } from './risk/acts-part.js';
import {
  conditionsPart,
  controlsPart,
  findingsPart,
  offeredPart,
  questionsPart,
} from './risk/controls-part.js';
import { decisionPart } from './risk/decision-part.js';
import { curvePart, momentsPart, sectionPart } from './risk/drawings-part.js';
import { amountsPart, soundPart } from './risk/effects-part.js';
import {
  assumptionsPart,
  cautionsPart,
  inputsPart,
  rulesPart,
  signOffPart,
  validityPart,
} from './risk/record-part.js';
import type { PartName, RiskTexts } from './risk/risk-texts.js';
import { driversPart, numberPart, tablePart } from './risk/workings-part.js';
import { floorPart, zonesPart } from './risk/zones-part.js';

export interface RiskSheetFacts {
  /** Day of printing, yyyy-mm-dd; passed in, so that the same sheet is the same bytes. */
  readonly printedOn: string;
  readonly status: SheetStatus;
}

const parts: Record<PartName, (assessment: Assessment, texts: RiskTexts) => Block[]> = {
  decision: decisionPart,
  acts: actsPart,
  zones: zonesPart,
  curve: curvePart,
  section: sectionPart,
  conditions: conditionsPart,
  controls: controlsPart,
  amounts: amountsPart,
  sound: soundPart,
  findings: findingsPart,
  questions: questionsPart,
  rules: rulesPart,
  cautions: cautionsPart,
  assumptions: assumptionsPart,
  validity: (_assessment, texts) => validityPart(texts),
  signOff: signOffPart,
  number: numberPart,
  drivers: driversPart,
  floor: floorPart,
  moments: momentsPart,
  offered: offeredPart,
  inputs: inputsPart,
  table: tablePart,
};

/** The risk sheet of an assessment: nothing is computed here, every number is a formatted Figure. */
export function riskSheet(
  assessment: Assessment,
  texts: RiskTexts,
  facts: RiskSheetFacts,
): DocumentTree {
  const { sheetName, subject, order, running } = texts;
  return sheetOf(assessment, texts, facts, {
    sheetName,
    subject,
    order,
    headerLeft: running.headerLeft,
  });
}

/** How the numbers of a risk sheet came about, from the same assessment. */
export function workingsSheet(
  assessment: Assessment,
  texts: RiskTexts,
  facts: RiskSheetFacts,
): DocumentTree {
  return sheetOf(assessment, texts, facts, texts.workings);
}

function sheetOf(
  assessment: Assessment,
  texts: RiskTexts,
  facts: RiskSheetFacts,
  kind: RiskTexts['workings'],
): DocumentTree {
  const status = texts.status[facts.status];
  const { running } = texts;
  const slots = { title: assessment.title, revision: assessment.revision, status };
  return {
    title: `${kind.sheetName}: ${assessment.title}`,
    lang: texts.language,
    revision: assessment.revision,
    status: facts.status,
    mark: facts.status === 'approved' ? null : texts.mark[facts.status],
    sheetName: kind.sheetName,
    subject: kind.subject,
    keywords: texts.keywords,
    headerLeft: filledText(kind.headerLeft, slots),
    headerRight: filledText(running.headerRight, slots),
    footerLeft: running.footerLeft,
    footerRight: running.footerRight,
    blocks: [
      { kind: 'heading', level: 1, over: kind.sheetName, words: assessment.title },
      aboutThisSheet(assessment, texts, facts),
      ...kind.order.flatMap((name, index): Block[] => [
        {
          kind: 'heading',
          level: 2,
          number: String(index + 1),
          words: texts.parts[name].heading,
        },
        ...parts[name](assessment, texts),
      ]),
    ],
  };
}

function aboutThisSheet(assessment: Assessment, texts: RiskTexts, facts: RiskSheetFacts): Block {
  const words = texts.facts;
  const { site } = assessment;
  const text = (figure: typeof site.pressure): string => quantityText(figure.value, figure.unit);
  return {
    kind: 'facts',
    title: words.title,
    pairs: [
      { label: words.venue, words: assessment.venueTitle },
      { label: words.date, words: assessment.date ?? words.noDate },
      { label: words.preparedBy, words: assessment.preparedBy },
      { label: words.revision, words: `${assessment.revision}, ${texts.status[facts.status]}` },
      {
        label: words.site,
        words: filledText(words.siteWords, {
          pressure: text(site.pressure),
          temperature: text(site.temperature),
          altitude: text(site.altitude),
        }),
      },
      { label: words.printedOn, words: facts.printedOn },
      {
        label: words.freshAir,
        words: filledText(words.freshAirWords, { pressure: text(site.freshAirOxygenPressure) }),
      },
    ],
  };
}
