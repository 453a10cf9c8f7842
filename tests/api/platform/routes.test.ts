import { readFileSync } from 'node:fs';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { listRoutes, type RouteDescription } from '../../../apps/api/src/platform/routes.js';
import { aPerson, signedInAs } from '../../factories/people.js';
import { type Agent, createTestApp, type TestApp } from '../support/app.js';

const METHODS = ['get', 'post', 'put', 'patch', 'delete'] as const;

/** A route's path with an identifier that nothing has in place of each parameter. */
function addressOf(route: RouteDescription): string {
  return route.path.replaceAll(/:[^/]+/g, 'c0ffee00-0000-4000-8000-000000000000');
}

function send(client: Agent | ReturnType<TestApp['http']>, route: RouteDescription) {
  const method = METHODS.find((name) => name.toUpperCase() === route.method);
  if (method === undefined) throw new Error(`${route.method} ${route.path} has a method this test does not know.`);
  return client[method](addressOf(route));
}

describe('every route', () => {
  let app: TestApp;
  let routes: RouteDescription[];

  beforeAll(async () => {
    app = await createTestApp();
    routes = listRoutes(app.app);
  });
  afterAll(() => app.close());

  it('is found by the walk, which compares them with the documentation', async () => {
    const { body } = await app.http().get('/api/v1/openapi.json').expect(200);
    const { paths } = body as { paths: Record<string, Record<string, unknown>> };
    const documented = Object.entries(paths).flatMap(([path, methods]) =>
      Object.keys(methods).map((method) => `${method.toUpperCase()} ${path.replaceAll(/\{([^}]+)\}/g, ':$1')}`),
    );
    expect(documented.sort()).toEqual(routes.map((route) => `${route.method} ${route.path}`).sort());
    expect(documented.length).toBeGreaterThan(15);
  });

  it('stands in the table of the contracts, which names no other', () => {
    const readme = readFileSync(path.resolve(import.meta.dirname, '../../../libs/contracts/README.md'), 'utf8');
    const described = readme.split('\n').flatMap((line) => {
      const [, cell] = /^\| (`(?:GET|POST|PUT|PATCH|DELETE).*?) \|/.exec(line) ?? [];
      let address = '';
      return [...(cell ?? '').matchAll(/`([A-Z]+)(?: (\S+))?`/g)].map(([, method, given]) => {
        address = given ?? address;
        return `${method} /api/v1${address.replaceAll(/\{[^}]+\}/g, '{}')}`;
      });
    });
    const present = routes.map((route) => `${route.method} ${route.path.replaceAll(/:[^/]+/g, '{}')}`);
    expect(described.sort()).toEqual(present.sort());
  });

  it('is public, for the signed-in, or names a permission', () => {
    const silent = routes.filter((route) => route.access === undefined);
    expect(silent.map((route) => `${route.controller}.${route.handler}`)).toEqual([]);
  });

  it('answers 401 to somebody who is not signed in, unless it is public', async () => {
    const closed = routes.filter((route) => route.access?.kind !== 'public');
    expect(closed.length).toBeGreaterThan(5);
    for (const route of closed) {
      const response = await send(app.http(), route);
      expect([route.method, route.path, response.status, response.body.code]).toEqual([
        route.method,
        route.path,
        401,
        'not-signed-in',
      ]);
    }
  });

  it('answers 403 to a person without roles where the permission belongs to staff or administrators', async () => {
    const agent = await signedInAs(app, await aPerson(app));
    const byRole = ['semester.manage', 'facility.manage', 'people.manage', 'audit.read', 'mail.read'];
    const closed = routes.filter(
      (route) => route.access?.kind === 'permission' && byRole.includes(route.access.permission),
    );
    expect(closed.length).toBeGreaterThan(2);
    for (const route of closed) {
      const response = await send(agent, route);
      expect([route.method, route.path, response.status]).toEqual([route.method, route.path, 403]);
    }
  });

  it('never answers 500 to a signed-in person who asks for what does not exist, with or without a body', async () => {
    const agent = await signedInAs(app, await aPerson(app, { isStaff: true, isAdministrator: true }));
    for (const route of routes.filter(({ path }) => !path.endsWith('/session'))) {
      for (const body of [undefined, {}, [], { unexpected: null }, JSON.parse('{"__proto__":{"a":1},"a":"\\u0000"}')]) {
        const call = send(agent, route).set('If-Match', '"1"');
        const response = body === undefined || route.method === 'GET' ? await call : await call.send(body);
        expect([route.method, route.path, JSON.stringify(body), response.status >= 500]).toEqual([
          route.method,
          route.path,
          JSON.stringify(body),
          false,
        ]);
      }
    }
  });
});
