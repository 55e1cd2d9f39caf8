import { Module } from '@nestjs/common';
import { PlansModule } from '../plans/plans.module.js';
import { SheetsController } from './sheets.controller.js';
import { SheetsService } from './sheets.service.js';

@Module({
  imports: [PlansModule],
  controllers: [SheetsController],
  providers: [SheetsService],
})
export class SheetsModule {}
