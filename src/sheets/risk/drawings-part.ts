import type { Assessment, CaseName, ZoneResult } from '../../assessment/assessment.js';
import { chartSvg } from '../../web/charts/chart-svg.js';
import { curveOption } from '../../web/charts/curve-option.js';
import {
  clockText,
  zoneCurve,
  zoneCurveText,
  type ZoneCurve,
} from '../../web/charts/zone-curve.js';
import { dividedViews } from '../../web/section/placement.js';
import { sectionSvg } from '../../web/section/section-drawing.js';
import { sectionText } from '../../web/section/section-text.js';
import type { Block } from '../document-tree.js';
import { filledText } from '../filled-text.js';
import type { RiskTexts } from './risk-texts.js';

const chartSize = { width: 600, height: 250 };

/** Rows of a section that one page can hold at a legible size. */
const mostRows = 4;

interface Choice {
  readonly zone: ZoneResult;
  readonly quantity: string;
  readonly caseName: CaseName;
}

/** The curve of the number that decides, or of the first zone that has one. */
function chosenCurve(assessment: Assessment): (Choice & { readonly curve: ZoneCurve }) | null {
  const { governing, zones } = assessment;
  const choices: Choice[] = zones.flatMap((zone) =>
    zone.series.map((series) => ({
      zone,
      quantity: series.quantity,
      caseName: series.caseName,
    })),
  );
  if (governing !== null) {
    const zone = zones.find((entry) => entry.id === governing.zone);
    const { quantity, caseName } = governing;
    const same = zone?.quantities.find(
      (entry) => entry.quantity === quantity || entry.quantityTitle === quantity,
    );
    if (zone !== undefined && same !== undefined) {
      choices.unshift({ zone, quantity: same.quantity, caseName });
    }
  }
  for (const choice of choices) {
    const curve = zoneCurve(choice.zone, choice.quantity, choice.caseName, assessment.events);
    if (curve !== null) return { ...choice, curve };
  }
  return null;
}

/** The curve over the day, with its cues numbered below it. */
export function curvePart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.curve;
  const chosen = chosenCurve(assessment);
  if (chosen === null) return [{ kind: 'paragraph', look: 'body', words: words.none }];
  const { curve, zone, caseName } = chosen;
  const events = curve.events.map((event, index) =>
    filledText(words.event, {
      number: String(index + 1),
      title: event.title,
      at: clockText(event.atS),
    }),
  );
  return [
    {
      kind: 'figure',
      svg: chartSvg(curveOption(curve), chartSize.width, chartSize.height),
      alt: zoneCurveText(curve),
      aspect: chartSize.width / chartSize.height,
      caption: filledText(words.caption, {
        quantity: curve.quantityTitle,
        zone: zone.title,
        case: texts.cases[caseName],
        events: events.join(' '),
      }),
    },
  ];
}

/** The section, in several drawings when the venue has many spaces. */
export function sectionPart(assessment: Assessment, texts: RiskTexts): Block[] {
  return dividedViews(assessment.section, mostRows).map((view) => {
    const drawing = sectionSvg(view);
    return {
      kind: 'figure',
      svg: drawing.svg,
      alt: sectionText(view),
      aspect: drawing.width / drawing.height,
      caption: filledText(texts.parts.section.caption, { moment: view.moment }),
    };
  });
}
