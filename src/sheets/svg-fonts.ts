import { textRuns, type Glyphs } from './text-runs.js';

/**
 * The drawing with each text divided into spans that name the font able to draw them, gas formulas
 * with lowered digits: an SVG renderer for print does not look for a second font by itself.
 */
export function svgWithFonts(svg: string, glyphs: Glyphs): string {
  // A size of its own would win over the place on the sheet; the view box keeps the proportions.
  const unsized = svg.replace(/^<svg\b[^>]*>/, (open) =>
    open.replace(/ (?:width|height)="[^"]*"/g, ''),
  );
  return unsized.replace(
    /(<text\b[^>]*>)([^<]*)(<\/text>)/g,
    (_whole: string, open: string, content: string, close: string) => {
      const strong = /font-weight(?:="|:)\s*(?:bold|[6-9]00)/.test(open);
      const runs = textRuns(unescaped(content), strong ? 'strong' : 'regular', glyphs);
      const size = Number(/font-size(?:="|:)\s*([\d.]+)/.exec(open)?.[1] ?? '12');
      let lowered = false;
      const spans = runs.map((run) => {
        const drop = size * 0.16;
        const shift =
          run.subscript === lowered ? '' : ` dy="${(run.subscript ? drop : -drop).toFixed(2)}"`;
        lowered = run.subscript;
        const small = run.subscript ? ` font-size="${(size * 0.72).toFixed(2)}"` : '';
        return `<tspan font-family="${run.font}"${shift}${small}>${escaped(run.text)}</tspan>`;
      });
      // The outer family would win over the spans where it stands in a style attribute.
      const bare = open.replace(/font-family:[^;"]*;?/, '').replace(/ font-family="[^"]*"/, '');
      return `${bare}${spans.join('')}${close}`;
    },
  );
}

const entities: Record<string, string> = {
  '&lt;': '<',
  '&gt;': '>',
  '&quot;': '"',
  '&#39;': "'",
  '&#x27;': "'",
  '&apos;': "'",
  '&amp;': '&',
};

const unescaped = (text: string): string =>
  text.replace(/&(?:lt|gt|quot|#39|#x27|apos|amp);/g, (entity) => entities[entity] ?? entity);

/** Text made safe for XML, as element content or a quoted attribute. */
export const escaped = (text: string): string =>
  text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;');
