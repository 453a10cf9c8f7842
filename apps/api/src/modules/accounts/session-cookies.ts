import { SESSION_HINT_COOKIE } from '@faintward/contracts/accounts';
import type { CookieOptions, Request, Response } from 'express';
import type { Config } from '../../config/config.js';
import { API_PREFIX } from '../../platform/api-prefix.js';
import { ACCESS_COOKIE } from '../../platform/jwt.strategy.js';
import { REFRESH_SECONDS, type SessionTokens } from './sessions.service.js';

export const REFRESH_COOKIE = 'faintward_refresh';

// The access cookie outlives its token on purpose: an expired token tells "renew me" apart from "never signed in".
const accessCookie = (config: Config): CookieOptions => ({
  httpOnly: true,
  secure: config.isCookieSecure,
  sameSite: 'lax',
  path: `/${API_PREFIX}`,
  maxAge: REFRESH_SECONDS * 1000,
});

const refreshCookie = (config: Config): CookieOptions => ({
  ...accessCookie(config),
  sameSite: 'strict',
  path: `/${API_PREFIX}/session`,
});

const hintCookie = (config: Config): CookieOptions => ({ ...accessCookie(config), httpOnly: false, path: '/' });

export function setSessionCookies(response: Response, config: Config, tokens: SessionTokens): void {
  response.cookie(ACCESS_COOKIE, tokens.accessToken, accessCookie(config));
  response.cookie(REFRESH_COOKIE, tokens.refreshToken, refreshCookie(config));
  response.cookie(SESSION_HINT_COOKIE, '1', hintCookie(config));
}

export function clearSessionCookies(response: Response, config: Config): void {
  for (const [name, options] of [
    [ACCESS_COOKIE, accessCookie(config)],
    [REFRESH_COOKIE, refreshCookie(config)],
    [SESSION_HINT_COOKIE, hintCookie(config)],
  ] as const) {
    response.clearCookie(name, { ...options, maxAge: undefined });
  }
}

/** A cookie of another form (the parser reads `j:{…}` as JSON) is no token of ours. */
export function refreshTokenOf(request: Request): string | undefined {
  const token = (request.cookies as Record<string, unknown>)[REFRESH_COOKIE];
  return typeof token === 'string' ? token : undefined;
}
