import { type INestApplicationContext, RequestMethod, type Type } from '@nestjs/common';
import { METHOD_METADATA, PATH_METADATA } from '@nestjs/common/constants.js';
import { DiscoveryService, MetadataScanner, Reflector } from '@nestjs/core';
import { ACCESS_RULE, type AccessRule } from './access.js';
import { API_PREFIX } from './api-prefix.js';

export interface RouteDescription {
  method: string;
  /** With the prefix and `:parameters`, such as `/api/v1/proposals/:proposalId`. */
  path: string;
  controller: string;
  handler: string;
  access: AccessRule | undefined;
  bodyLimitBytes: number | undefined;
}

export const BODY_LIMIT = 'faintward:body-limit';

/** Every route of the application, read from the controllers themselves. */
export function listRoutes(app: INestApplicationContext): RouteDescription[] {
  const discovery = app.get(DiscoveryService, { strict: false });
  const reflector = app.get(Reflector, { strict: false });
  const scanner = new MetadataScanner();
  const routes: RouteDescription[] = [];
  for (const { metatype } of discovery.getControllers()) {
    if (metatype == null) continue;
    const controller = metatype as Type<unknown>;
    const prototype = controller.prototype as Record<string, (...parameters: unknown[]) => unknown>;
    const bases = toPaths(reflector.get<string | string[] | undefined>(PATH_METADATA, controller));
    for (const handlerName of scanner.getAllMethodNames(prototype)) {
      const handler = prototype[handlerName];
      if (handler === undefined) continue;
      const method = reflector.get<RequestMethod | undefined>(METHOD_METADATA, handler);
      if (method === undefined) continue;
      for (const base of bases) {
        for (const path of toPaths(reflector.get<string | string[] | undefined>(PATH_METADATA, handler))) {
          routes.push({
            method: RequestMethod[method],
            path: `/${[API_PREFIX, base, path]
              .flatMap((part) => part.split('/'))
              .filter((part) => part !== '')
              .join('/')}`,
            controller: controller.name,
            handler: handlerName,
            access: reflector.getAllAndOverride<AccessRule | undefined>(ACCESS_RULE, [handler, controller]),
            bodyLimitBytes: reflector.get<number | undefined>(BODY_LIMIT, handler),
          });
        }
      }
    }
  }
  return routes;
}

function toPaths(path: string | string[] | undefined): string[] {
  return Array.isArray(path) ? path : [path ?? ''];
}

/** A test for request paths that fit a route's path. */
export function pathMatcher(routePath: string): (requestPath: string) => boolean {
  const pattern = routePath
    .split('/')
    .map((part) => (part.startsWith(':') ? '[^/]+' : part.replace(/[.*+?^${}()|[\]\\]/g, '\\$&')))
    .join('/');
  const expression = new RegExp(`^${pattern}/?$`, 'i');
  return (requestPath) => expression.test(requestPath);
}
