import { Module } from '@nestjs/common';
import { ThrottlerModule } from '@nestjs/throttler';
import { signInThrottle } from '../web/http/sign-in-throttle.guard.js';
import { WebModule } from '../web/web.module.js';
import { FirstLinkService } from './first-link.service.js';
import { PeopleController } from './people.controller.js';

@Module({
  imports: [WebModule, ThrottlerModule.forRoot(signInThrottle)],
  controllers: [PeopleController],
  providers: [FirstLinkService],
  exports: [FirstLinkService],
})
export class PeopleModule {}
