import type { Assessment } from '../assessment/assessment.js';
import type { SheetStatus, Size } from './document-tree.js';
import { renderPdf } from './render-pdf.js';
import { riskSheet, workingsSheet } from './risk-sheet.js';
import { riskSheetTexts } from './sheet-texts.js';

export interface RiskSheetOptions {
  /** Day of printing, yyyy-mm-dd: with the same input the same bytes. */
  readonly printedOn: string;
  readonly status: SheetStatus;
  readonly size?: Size;
  readonly language?: string;
  readonly timeoutMs?: number;
  /** Default the sheet that is signed. */
  readonly kind?: SheetKind;
}

const sheets = { risk: riskSheet, workings: workingsSheet } as const;
export type SheetKind = keyof typeof sheets;

/**
 * The risk sheet as a tagged PDF, ready for signature, or its workings.
 *
 * @throws {InvalidInput} for text that cannot be printed right, or a word missing in the wording
 * @throws {NotComputable} when drawing takes longer than the timeout
 */
export async function renderRiskSheet(
  assessment: Assessment,
  options: RiskSheetOptions,
): Promise<Uint8Array> {
  const { printedOn, status, size = 'a4', language = 'en', timeoutMs, kind = 'risk' } = options;
  const tree = sheets[kind](assessment, riskSheetTexts(language), { printedOn, status });
  return renderPdf(tree, {
    size,
    date: new Date(`${printedOn}T00:00:00Z`),
    ...(timeoutMs === undefined ? {} : { timeoutMs }),
  });
}
