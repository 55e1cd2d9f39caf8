import type {
  Assessment,
  CaseName,
  SectionMoment,
  ZoneResult,
} from '../../assessment/assessment.js';
import { clockText } from '../../assessment/clock-text.js';
import { sentence } from '../../assessment/sentence.js';
import { chartSvg } from '../../web/charts/chart-svg.js';
import { curveOption } from '../../web/charts/curve-option.js';
import { curveSizes } from '../../web/charts/curve-scale.js';
import { zoneCurve, zoneCurveText, type ZoneCurve } from '../../web/charts/zone-curve.js';
import { momentView } from '../../web/section/moment-view.js';
import { dividedViews } from '../../web/section/placement.js';
import { sectionSvg } from '../../web/section/section-drawing.js';
import { sectionWords } from '../../web/section/section-words.js';
import { spacesInUse } from '../../web/section/spaces-in-use.js';
import { sectionText } from '../../web/section/section-text.js';
import type { Block } from '../document-tree.js';
import { filledText } from '../filled-text.js';
import type { RiskTexts } from './risk-texts.js';

const chartSize = curveSizes.paper;

/** The picture takes a third of a page at most; its key of names may need more. */
const sectionRoom = { tallestRow: 95, narrowestSpace: 34 };
const mostRows = 2;
const tallestFigure = 0.5;

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
  const events = curve.cues.map(({ number, title, events: times }) =>
    filledText(words.event, {
      number: String(number),
      title,
      at: times.map((event) => clockText(event.atS)).join(', '),
    }),
  );
  return [
    {
      kind: 'figure',
      svg: chartSvg(curveOption(curve, chartSize), chartSize.width, chartSize.height),
      alt: zoneCurveText(curve),
      aspect: chartSize.width / chartSize.height,
      tallest: tallestFigure,
      caption: filledText(words.caption, {
        quantity: sentence(curve.quantityTitle),
        zone: zone.title,
        case: texts.cases[caseName],
        events: [...events, ...bandWords(assessment, zone, texts)].join(' '),
      }),
    },
  ];
}

/** How the shaded band was drawn, and what moves it most in this zone. */
function bandWords(
  { sampling, drivers }: Assessment,
  zone: ZoneResult,
  texts: RiskTexts,
): string[] {
  const words = texts.parts.curve;
  if (sampling === null) return [];
  const own = drivers.filter((driver) => zone.id.startsWith(driver.zone));
  const inputs = [...new Set(own.map(({ inputTitle }) => inputTitle))].slice(0, 3);
  return [
    filledText(words.band, { samples: String(sampling.samples), seed: String(sampling.seed) }),
    ...(inputs.length === 0 ? [] : [filledText(words.drivers, { inputs: inputs.join('; ') })]),
  ];
}

/** The moments worth paper: each case at its worst. */
function printedMoments({ section }: Assessment): readonly SectionMoment[] {
  return (['planned', 'worstCredible'] as const).flatMap(
    (caseName) =>
      section.moments.find((one) => one.kind === 'worst' && one.caseName === caseName) ?? [],
  );
}

/** The section at the worst of the case that decides. */
export function sectionPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const moments = printedMoments(assessment);
  const caseName = assessment.governing?.caseName;
  const [decisive = moments.at(-1)] = moments.filter((moment) => moment.caseName === caseName);
  return drawnMoments(assessment, decisive === undefined ? [] : [decisive], texts);
}

/** The section at the worst of each case. */
export const momentsPart = (assessment: Assessment, texts: RiskTexts): Block[] =>
  drawnMoments(assessment, printedMoments(assessment), texts);

/** The section of the spaces with people, acts or gas, and the names of those left out. */
function drawnMoments(
  assessment: Assessment,
  moments: readonly SectionMoment[],
  texts: RiskTexts,
): Block[] {
  const words = texts.parts.section;
  const { view, leftOut } = spacesInUse(assessment.section, assessment.acts, moments);
  const drawn = moments.map((moment) => ({
    view: momentView(view, moment, sectionWords),
    title: `${texts.cases[moment.caseName]}, `,
  }));
  const sections = drawn.length > 0 ? drawn : [{ view, title: '' }];
  return sections.flatMap((section, turn) => {
    const isLast = turn === sections.length - 1;
    return dividedViews(section.view, mostRows, sectionRoom).map((part, index, parts) => {
      const drawing = sectionSvg(part, { room: sectionRoom });
      const caption = [
        fullSentence(`${section.title}${part.moment}`),
        ...(turn === 0 && index === 0 ? [words.caption] : []),
        ...(leftOut.length > 0 && isLast && index === parts.length - 1
          ? [filledText(words.leftOut, { spaces: leftOut.join(', ') })]
          : []),
      ];
      return {
        kind: 'figure',
        svg: drawing.svg,
        alt: sectionText(part),
        aspect: drawing.width / drawing.height,
        tallest: tallestFigure,
        caption: caption.join(' '),
      };
    });
  });
}

/** With a capital and a full stop, whoever wrote it. */
const fullSentence = (words: string): string =>
  words === '' ? '' : sentence(words).replace(/[^.]$/, '$&.');
