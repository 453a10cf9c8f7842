import { existsSync } from 'node:fs';
import path from 'node:path';
import { ConsoleLogger, type LoggerService } from '@nestjs/common';
import { NestFactory } from '@nestjs/core';
import type { NestExpressApplication } from '@nestjs/platform-express';
import compression from 'compression';
import cookieParser from 'cookie-parser';
import type { NextFunction, Request, Response } from 'express';
import express from 'express';
import { AppModule } from './app.module.js';
import type { Config } from './config/config.js';
import type { DatabaseHandle } from './database/connection.js';
import { API_PREFIX } from './platform/api-prefix.js';
import { DomainError } from './platform/domain-error.js';
import { bodyParsers, methodCheck, noStore, requestId } from './platform/http.js';
import { serveOpenApi } from './platform/openapi.js';
import { REPOSITORY_ROOT, VERSION } from './version.js';

/** The built web application. */
export const WEB_FOLDER = path.join(REPOSITORY_ROOT, 'apps/web/dist');

export function loggerFor(config: Config): LoggerService {
  return new ConsoleLogger({
    json: config.logFormat === 'json',
    prefix: 'Faintward',
    logLevels: config.logFormat === 'json' ? ['log', 'warn', 'error', 'fatal'] : ['warn', 'error', 'fatal'],
  });
}

/** Builds the application as `main.ts` and the tests use it, so that tests meet the same guard, pipes and filter as people do. */
export async function createApp(
  config: Config,
  database: DatabaseHandle,
  options: { logger?: LoggerService | false; webFolder?: string } = {},
): Promise<NestExpressApplication> {
  const app = await NestFactory.create<NestExpressApplication>(AppModule.register(config, database), {
    bodyParser: false,
    logger: options.logger ?? loggerFor(config),
    abortOnError: false,
    routeConflictPolicy: { duplicate: 'error', shadow: 'off' },
    routeResolutionStrategy: 'specificity',
  });
  configureApp(app, config, options.webFolder ?? WEB_FOLDER);
  await app.init();
  return app;
}

function configureApp(app: NestExpressApplication, config: Config, webFolder: string): void {
  const isHttps = config.publicUrl.startsWith('https:');
  app.set('trust proxy', config.trustedProxyCount);
  // Versions are our ETags; Express's own would be a hash of the body.
  app.set('etag', false);
  app.setGlobalPrefix(API_PREFIX);
  app.useSecurityHeaders({
    contentSecurityPolicy: {
      directives: {
        fontSrc: ["'self'"],
        // The interface's style engine writes style elements at run time.
        styleSrc: ["'self'", "'unsafe-inline'"],
        imgSrc: ["'self'", 'data:', 'blob:'],
        // Over plain http in a local network these two would send the browser to an https port that nobody serves.
        ...(isHttps ? {} : { upgradeInsecureRequests: null }),
      },
    },
    ...(isHttps ? {} : { strictTransportSecurity: false }),
  });
  app.enableCsrfProtection({ trustedOrigins: [new URL(config.publicUrl).origin] });
  app.use(requestId(config));
  app.use(compression());
  app.use(cookieParser());
  app.use(`/${API_PREFIX}`, noStore);
  app.use(bodyParsers(app));
  app.use(methodCheck(app));
  serveOpenApi(app, VERSION);
  serveWeb(app, webFolder);
}

/** Whether an address belongs to the api however it is written: `//api`, `/API/v1` and `/api%2Fv1` do. */
function isApiPath(requestPath: string): boolean {
  return /^(\/|%2f)+api(\/|%2f|$)/i.test(requestPath);
}

/** Addresses of pages: no file ending, no hidden file, nothing in the folder of built files. */
function isPagePath(requestPath: string): boolean {
  return !isApiPath(requestPath) && !/^\/+assets(\/|$)/i.test(requestPath) && !/(^|\/)\.|\.[^/]*$/.test(requestPath);
}

/**
 * The web application on the same port. Built files carry a hash in their name and never change; the page itself is asked
 * for again each time. Addresses without a file ending are the web's own routes and get the page; a missing file is 404.
 */
function serveWeb(app: NestExpressApplication, webFolder: string): void {
  const page = path.join(webFolder, 'index.html');
  const files = { index: false, redirect: false } as const;
  app.use('/assets', express.static(path.join(webFolder, 'assets'), { ...files, immutable: true, maxAge: '365d' }));
  app.use(express.static(webFolder, { ...files, maxAge: '1h', etag: true }));
  app.use((request: Request, response: Response, next: NextFunction) => {
    if (request.path.startsWith(`/${API_PREFIX}/`)) return next();
    const isPage =
      (request.method === 'GET' || request.method === 'HEAD') &&
      isPagePath(request.path) &&
      request.accepts(['html', 'json']) === 'html';
    if (!isPage) return next(new DomainError('not-found', 'There is nothing at this address.'));
    if (!existsSync(page)) {
      return next(new DomainError('unavailable', 'The web pages are not built yet: run "npm run build".'));
    }
    response.setHeader('Cache-Control', 'no-cache');
    response.sendFile(page, (error?: Error) => (error === undefined ? undefined : next(error)));
  });
}
