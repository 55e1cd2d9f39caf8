import { Module } from '@nestjs/common';
import { APP_INTERCEPTOR } from '@nestjs/core';
import { VenuesModule } from '../venues/venues.module.js';
import { CalculateController } from './calculate.controller.js';
import { ExamplesService } from './examples.service.js';
import { AssessmentPool } from '../workers/assessment-pool.js';
import { AssessmentsService } from './assessments.service.js';
import { PlansController } from './plans.controller.js';
import { PlansService } from './plans.service.js';
import { SoundPreviewController } from './sound-preview.controller.js';

@Module({
  imports: [VenuesModule],
  controllers: [CalculateController, PlansController, SoundPreviewController],
  providers: [
    AssessmentPool,
    AssessmentsService,
    PlansService,
    ExamplesService,
    { provide: APP_INTERCEPTOR, useExisting: ExamplesService },
  ],
  exports: [PlansService],
})
export class PlansModule {}
