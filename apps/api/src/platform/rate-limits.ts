import { applyDecorators, type ExecutionContext, Injectable, SetMetadata } from '@nestjs/common';
import { Throttle, ThrottlerGuard, type ThrottlerLimitDetail, type ThrottlerModuleOptions } from '@nestjs/throttler';
import type { Request } from 'express';
import type { Config } from '../config/config.js';
import { DomainError } from './domain-error.js';

const MINUTE_MS = 60_000;

/**
 * Requests a minute from one network address to one route. The general limit is far above what a person with several
 * windows makes; the others guard what is worth guessing or costs computing. Counted in each process by itself.
 */
export const RATE_LIMITS = {
  general: 1200,
  /** Sign-in, counted per address and e-mail; beside it one address may try 20 times as often over all e-mails. */
  credentials: 10,
  signUp: 20,
  passwordReset: 10,
  calculator: 120,
} as const;

const PER_EMAIL = 'faintward:limit-per-email';

/** Sets a route's own limit. */
export const RateLimit = (kind: Exclude<keyof typeof RATE_LIMITS, 'general'>) =>
  kind === 'credentials'
    ? applyDecorators(
        SetMetadata(PER_EMAIL, true),
        Throttle({
          default: { limit: RATE_LIMITS.credentials * 20, ttl: MINUTE_MS },
          perEmail: { limit: RATE_LIMITS.credentials, ttl: MINUTE_MS },
        }),
      )
    : applyDecorators(Throttle({ default: { limit: RATE_LIMITS[kind], ttl: MINUTE_MS } }));

export function throttlerOptions(config: Config): ThrottlerModuleOptions {
  return {
    skipIf: () => !config.areRateLimitsOn,
    setHeaders: false,
    throttlers: [
      { name: 'default', limit: RATE_LIMITS.general, ttl: MINUTE_MS },
      {
        name: 'perEmail',
        limit: RATE_LIMITS.credentials,
        ttl: MINUTE_MS,
        skipIf: (context) => Reflect.getMetadata(PER_EMAIL, context.getHandler()) !== true || !config.areRateLimitsOn,
        getTracker: (request) => {
          const { ip, body } = request as Request;
          const email = (body as { email?: unknown } | undefined)?.email;
          return Promise.resolve(`${ip} ${typeof email === 'string' ? email.trim().toLowerCase().slice(0, 254) : ''}`);
        },
      },
    ],
  };
}

@Injectable()
export class RateLimitGuard extends ThrottlerGuard {
  protected override throwThrottlingException(_context: ExecutionContext, detail: ThrottlerLimitDetail): Promise<void> {
    const seconds = Math.max(1, detail.timeToBlockExpire);
    throw new DomainError('rate-limited', `Too many requests of this kind. Please wait ${seconds} s and try again.`, {
      retryAfterSeconds: seconds,
    });
  }
}
