import { Global, Module } from '@nestjs/common';
import { APP_FILTER, APP_GUARD, APP_INTERCEPTOR, APP_PIPE, DiscoveryModule } from '@nestjs/core';
import { PassportModule } from '@nestjs/passport';
import { ThrottlerModule } from '@nestjs/throttler';
import { Config } from '../config/config.js';
import { AccessGuard } from './access.guard.js';
import { ActorQueries } from './actor.queries.js';
import { AnswerInterceptor } from './answers.js';
import { DemoMode } from './demo-mode.js';
import { HistoryService } from './history.js';
import { IdempotencyService } from './idempotency.js';
import { JobsService } from './jobs.js';
import { JwtStrategy } from './jwt.strategy.js';
import { LocalMailServer } from './mail/local-mail-server.js';
import { MailQueries } from './mail/mail.queries.js';
import { MailService } from './mail/mail.service.js';
import { ProblemFilter } from './problem.filter.js';
import { RateLimitGuard, throttlerOptions } from './rate-limits.js';
import { ValidationPipe } from './validation.js';

@Global()
@Module({
  imports: [
    DiscoveryModule,
    PassportModule,
    ThrottlerModule.forRootAsync({ inject: [Config], useFactory: throttlerOptions }),
  ],
  providers: [
    { provide: APP_GUARD, useClass: RateLimitGuard },
    { provide: APP_GUARD, useClass: AccessGuard },
    { provide: APP_PIPE, useClass: ValidationPipe },
    { provide: APP_INTERCEPTOR, useClass: AnswerInterceptor },
    { provide: APP_FILTER, useClass: ProblemFilter },
    ActorQueries,
    DemoMode,
    HistoryService,
    IdempotencyService,
    JobsService,
    JwtStrategy,
    LocalMailServer,
    MailQueries,
    MailService,
  ],
  exports: [DemoMode, HistoryService, IdempotencyService, JobsService, MailQueries, MailService],
})
export class PlatformModule {}
