import { Module } from '@nestjs/common';
import { APP_FILTER, APP_GUARD } from '@nestjs/core';
import { DomainErrorFilter } from './http/domain-error.filter.js';
import { HomeController } from './home.controller.js';
import { HealthController } from './http/health.controller.js';
import { SameSiteGuard } from './session/same-site.guard.js';
import { SessionGuard } from './session/session.guard.js';
import { SessionsService } from './session/sessions.service.js';

/** What stands before every handler, in this order: who is it, and is it really them. */
@Module({
  controllers: [HealthController, HomeController],
  providers: [
    SessionsService,
    { provide: APP_GUARD, useClass: SessionGuard },
    { provide: APP_GUARD, useClass: SameSiteGuard },
    { provide: APP_FILTER, useClass: DomainErrorFilter },
  ],
  exports: [SessionsService],
})
export class WebModule {}
