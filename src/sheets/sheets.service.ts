import { Injectable } from '@nestjs/common';
import { InvalidInput } from '../errors.js';
import { PlansService } from '../plans/plans.service.js';
import { renderRiskSheet, type SheetKind } from './risk-sheet-pdf.js';

export interface SheetFile {
  readonly name: string;
  readonly bytes: Uint8Array;
}

const fileEnds: Record<SheetKind, string> = { risk: 'risk-sheet', workings: 'workings' };

/** Sheets of plans, printed from the same assessment that the page shows. */
@Injectable()
export class SheetsService {
  constructor(private readonly plans: PlansService) {}

  /** @throws {NotFound} without such a plan; {InvalidInput} while it cannot be worked out */
  async sheet(planId: string, kind: SheetKind, printedOn: string): Promise<SheetFile> {
    const { plan, outcome } = await this.plans.open(planId);
    if (outcome.assessment === undefined) {
      throw new InvalidInput(
        `There is no sheet yet, because the plan cannot be worked out: ${outcome.failure.message}`,
        'Open the plan: its results list what is missing, each with a link to its entry.',
        outcome.failure.details,
      );
    }
    const bytes = await renderRiskSheet(outcome.assessment, { printedOn, status: 'draft', kind });
    const name = plan.title.replaceAll(/[^A-Za-z0-9]+/g, '-').slice(0, 60);
    return { name: `${name === '' ? 'plan' : name}-${fileEnds[kind]}.pdf`, bytes };
  }
}
