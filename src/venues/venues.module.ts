import { Module } from '@nestjs/common';
import { AirLogController } from './air-log.controller.js';
import { VenuesController } from './venues.controller.js';
import { VenuesService } from './venues.service.js';

@Module({
  controllers: [AirLogController, VenuesController],
  providers: [VenuesService],
  exports: [VenuesService],
})
export class VenuesModule {}
