import type { Assessment, CaseName, SectionView, ZoneResult } from '../../assessment/assessment.js';
import { chartSvg } from '../../web/charts/chart-svg.js';
import { curveOption } from '../../web/charts/curve-option.js';
import {
  clockText,
  numberedCues,
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

const chartSize = { width: 600, height: 215 };

/** The picture takes a third of a page at most; its key of names may need more. */
const sectionRoom = { tallestRow: 160, narrowestSpace: 34 };
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
  const events = numberedCues(curve.events).map(({ number, title, events: times }) =>
    filledText(words.event, {
      number: String(number),
      title,
      at: times.map((event) => clockText(event.atS)).join(', '),
    }),
  );
  return [
    {
      kind: 'figure',
      svg: chartSvg(curveOption(curve), chartSize.width, chartSize.height),
      alt: zoneCurveText(curve),
      aspect: chartSize.width / chartSize.height,
      tallest: tallestFigure,
      caption: filledText(words.caption, {
        quantity: curve.quantityTitle.charAt(0).toUpperCase() + curve.quantityTitle.slice(1),
        zone: zone.title,
        case: texts.cases[caseName],
        events: events.join(' '),
      }),
    },
  ];
}

/** The section of the spaces with people, acts or gas, and the names of those left out. */
export function sectionPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.section;
  const { view, leftOut } = spacesInUse(assessment);
  const parts = dividedViews(view, mostRows, sectionRoom);
  return parts.map((part, index) => {
    const drawing = sectionSvg(part, { room: sectionRoom });
    const caption = [
      filledText(words.caption, { moment: sentence(part.moment) }),
      ...(leftOut.length === 0 || index < parts.length - 1
        ? []
        : [filledText(words.leftOut, { spaces: leftOut.join(', ') })]),
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
}

/** With a capital and a full stop, whoever wrote it. */
const sentence = (words: string): string =>
  words === '' ? '' : `${words.charAt(0).toUpperCase()}${words.slice(1)}`.replace(/[^.]$/, '$&.');

function spacesInUse(assessment: Assessment): { view: SectionView; leftOut: string[] } {
  const { section, acts } = assessment;
  const used = new Set([
    ...section.zones.map((zone) => zone.space),
    ...section.layers.map((layer) => layer.space),
    ...acts.map((act) => act.space),
  ]);
  const kept = section.spaces.filter((space) => used.has(space.id));
  if (kept.length === 0) return { view: section, leftOut: [] };
  const ids = new Set(kept.map((space) => space.id));
  // An opening into a space that is not drawn would look like one to the outside.
  const drawn = (id: string): boolean =>
    ids.has(id) || !section.spaces.some((space) => space.id === id);
  return {
    view: {
      ...section,
      spaces: kept,
      openings: section.openings.filter((opening) => drawn(opening.from) && drawn(opening.to)),
    },
    leftOut: section.spaces.filter((space) => !ids.has(space.id)).map((space) => space.title),
  };
}
