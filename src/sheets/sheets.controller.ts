import { Controller, Get, Param, Res } from '@nestjs/common';
import type { PageReply } from '../web/http/exchange.js';
import type { SheetKind } from './risk-sheet-pdf.js';
import { SheetsService } from './sheets.service.js';

@Controller('plans/:id/sheets')
export class SheetsController {
  constructor(private readonly sheets: SheetsService) {}

  @Get('risk.pdf')
  async risk(@Param('id') id: string, @Res() reply: PageReply): Promise<void> {
    await this.#send(id, 'risk', reply);
  }

  @Get('workings.pdf')
  async workings(@Param('id') id: string, @Res() reply: PageReply): Promise<void> {
    await this.#send(id, 'workings', reply);
  }

  async #send(id: string, kind: SheetKind, reply: PageReply): Promise<void> {
    const today = new Date().toISOString().slice(0, 10);
    const { name, bytes } = await this.sheets.sheet(id, kind, today);
    void reply
      .header('content-type', 'application/pdf')
      .header('content-disposition', `attachment; filename="${name}"`)
      .header('cache-control', 'no-store')
      .send(Buffer.from(bytes));
  }
}
