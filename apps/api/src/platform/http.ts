import { randomUUID } from 'node:crypto';
import { Logger, SetMetadata } from '@nestjs/common';
import type { NestExpressApplication } from '@nestjs/platform-express';
import type { NextFunction, Request, RequestHandler, Response } from 'express';
import { json } from 'express';
import type { Config } from '../config/config.js';
import { DomainError } from './domain-error.js';
import { BODY_LIMIT, listRoutes, pathMatcher } from './routes.js';

const MEGABYTE = 1024 * 1024;
/** Enough for every form; a route that takes a table says so with `@BodyLimit`. */
const DEFAULT_BODY_BYTES = MEGABYTE;

/** Lets a route take a larger JSON body than 1 MB, up to 25 MB. */
export function BodyLimit(megabytes: number) {
  if (!(megabytes > 0 && megabytes <= 25))
    throw new RangeError(`A body limit is above 0 and at most 25 MB, not ${megabytes}.`);
  return SetMetadata(BODY_LIMIT, megabytes * MEGABYTE);
}

/** Names the request in every log line and answer; a proxy's own name for it is kept when it looks like one. */
export function requestId(config: Config): RequestHandler {
  const logger = new Logger('Request');
  return (request, response, next) => {
    const given = request.header('x-request-id');
    const id = given !== undefined && /^[\w-]{8,64}$/.test(given) ? given : randomUUID();
    (request as Request & { id: string }).id = id;
    response.setHeader('X-Request-Id', id);
    if (config.logFormat === 'json') {
      const startedAt = performance.now();
      response.once('finish', () =>
        logger.log({
          requestId: id,
          method: request.method,
          path: request.originalUrl.split('?', 1)[0],
          status: response.statusCode,
          durationMs: Math.round(performance.now() - startedAt),
        }),
      );
    }
    next();
  };
}

/** Answers of the api are personal and change at any moment: nothing between here and the person may keep them. */
export const noStore: RequestHandler = (_request, response, next) => {
  response.setHeader('Cache-Control', 'no-store');
  next();
};

/** Reads JSON bodies within the limit of their route; other content than JSON, tables and forms is refused by name. */
export function bodyParsers(app: NestExpressApplication): RequestHandler {
  // Routes are known only once the application is complete, so the list is made at the first request.
  let largeRoutes: { method: string; matches: (path: string) => boolean; limit: number }[] | undefined;
  const parsers = new Map<number, RequestHandler>();
  const parserFor = (limit: number): RequestHandler => {
    const known = parsers.get(limit);
    if (known !== undefined) return known;
    const parser = json({ limit, strict: true, verify: (_request, _response, body) => refuseDeepNesting(body) });
    parsers.set(limit, parser);
    return parser;
  };
  return (request: Request, response: Response, next: NextFunction) => {
    const hasBody =
      request.headers['transfer-encoding'] !== undefined || Number(request.headers['content-length'] ?? 0) > 0;
    if (!hasBody) return next();
    // Files are read by the route itself, as they stream in.
    if (request.is('multipart/form-data')) return next();
    if (!request.is(['json', '+json'])) {
      const given = request.header('content-type');
      request.resume();
      return next(
        new DomainError(
          'unsupported-media-type',
          `Send JSON (Content-Type: application/json)${given ? `, not ${given.slice(0, 80)}` : ''}.`,
        ),
      );
    }
    largeRoutes ??= listRoutes(app).flatMap((route) =>
      route.bodyLimitBytes === undefined
        ? []
        : [{ method: route.method, matches: pathMatcher(route.path), limit: route.bodyLimitBytes }],
    );
    const limit =
      largeRoutes.find((route) => route.method === request.method && route.matches(request.path))?.limit ??
      DEFAULT_BODY_BYTES;
    parserFor(limit)(request, response, (error?: unknown) =>
      next(error === undefined ? undefined : bodyError(error, limit)),
    );
  };
}

/** Deeper than any request of ours; the parser of JSON takes several times longer over nesting than over text. */
const MAX_NESTING = 64;

function refuseDeepNesting(body: Buffer): void {
  let depth = 0;
  let isInText = false;
  for (let index = 0; index < body.length; index += 1) {
    const byte = body[index];
    if (isInText) {
      if (byte === BACKSLASH) index += 1;
      else if (byte === QUOTE) isInText = false;
    } else if (byte === QUOTE) isInText = true;
    else if (byte === BRACKET || byte === BRACE) {
      depth += 1;
      if (depth > MAX_NESTING) throw new Error('nested too deeply');
    } else if (byte === BRACKET_END || byte === BRACE_END) depth -= 1;
  }
}
const [QUOTE, BACKSLASH, BRACKET, BRACKET_END, BRACE, BRACE_END] = Buffer.from('"\\[]{}');

function bodyError(error: unknown, limit: number): unknown {
  const { type, status } = error as { type?: unknown; status?: unknown };
  if (type === 'entity.verify.failed') return new DomainError('malformed-request', 'The body is nested too deeply.');
  if (type === 'entity.parse.failed') return new DomainError('malformed-request', 'The body is not valid JSON.');
  if (type === 'entity.too.large') {
    return new DomainError('too-large', `The body is larger than the ${limit / MEGABYTE} MB that are accepted here.`);
  }
  if (status === 415)
    return new DomainError('unsupported-media-type', 'This character set or compression is not understood.');
  return error;
}

/** Tells a wrong method apart from a wrong address, for requests that no route took. */
export function methodCheck(app: NestExpressApplication): RequestHandler {
  let routes: { method: string; matches: (path: string) => boolean }[] | undefined;
  return (request, _response, next) => {
    routes ??= listRoutes(app).map((route) => ({ method: route.method, matches: pathMatcher(route.path) }));
    const methods = new Set(routes.filter((route) => route.matches(request.path)).map((route) => route.method));
    if (methods.has('GET')) methods.add('HEAD');
    if (methods.size === 0 || methods.has('ALL') || methods.has(request.method)) return next();
    next(
      new DomainError('method-not-allowed', `${request.method} is not possible here.`, {
        allowedMethods: [...methods].sort(),
      }),
    );
  };
}
