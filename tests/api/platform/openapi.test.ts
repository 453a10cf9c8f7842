import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createTestApp, type TestApp } from '../support/app.js';

type Json = null | boolean | number | string | Json[] | { [key: string]: Json };

describe('the OpenAPI document', () => {
  let app: TestApp;
  let document: { [key: string]: Json };

  beforeAll(async () => {
    app = await createTestApp();
    document = (await app.http().get('/api/v1/openapi.json').expect(200)).body as { [key: string]: Json };
  });
  afterAll(() => app.close());

  function* nodes(value: Json, path = '#'): Generator<[string, { [key: string]: Json }]> {
    if (Array.isArray(value)) for (const [index, part] of value.entries()) yield* nodes(part, `${path}/${index}`);
    else if (value !== null && typeof value === 'object') {
      yield [path, value];
      for (const [key, part] of Object.entries(value)) yield* nodes(part, `${path}/${key}`);
    }
  }

  it('is version 3.1 and holds nothing of 3.0 that 3.1 does not know', () => {
    expect(document['openapi']).toBe('3.1.0');
    const outdated = [...nodes(document['components'] ?? null)].filter(
      ([, node]) => 'nullable' in node || typeof node['exclusiveMinimum'] === 'boolean',
    );
    expect(outdated.map(([path]) => path)).toEqual([]);
  });

  it('refers only to what it defines', () => {
    const names = new Set(Object.keys((document['components'] as { schemas: object }).schemas));
    expect(names.size).toBeGreaterThan(5);
    for (const [path, node] of nodes(document)) {
      const reference = node['$ref'];
      if (typeof reference !== 'string') continue;
      expect(reference, path).toMatch(/^#\/components\/schemas\//);
      expect(names.has(reference.split('/').at(-1) ?? ''), `${path} refers to ${reference}`).toBe(true);
    }
  });

  it('gives every operation a different id and an answer', () => {
    const operations = Object.values(
      document['paths'] as Record<string, Record<string, { operationId: string; responses: object }>>,
    ).flatMap((methods) => Object.values(methods));
    expect(new Set(operations.map(({ operationId }) => operationId)).size).toBe(operations.length);
    for (const { operationId, responses } of operations) {
      const statuses = Object.keys(responses);
      expect([operationId, statuses.some((status) => /^2\d\d$/.test(status)), statuses.includes('default')]).toEqual([
        operationId,
        true,
        true,
      ]);
    }
  });

  it('names the headers that a route reads', () => {
    const paths = document['paths'] as Record<string, Record<string, { parameters: { name: string; in: string }[] }>>;
    const parameters = paths['/api/v1/administration/people/{personId}']?.['patch']?.parameters ?? [];
    expect(parameters).toContainEqual(expect.objectContaining({ name: 'If-Match', in: 'header', required: true }));
  });

  it('describes the contract’s own limits', () => {
    const { schemas } = document['components'] as { schemas: Record<string, { properties: Record<string, Json> }> };
    expect(schemas['PasswordReset']?.properties['password']).toMatchObject({
      type: 'string',
      minLength: 12,
      maxLength: 200,
    });
  });

  it('has a readable page that ships with the application', async () => {
    const page = await app.http().get('/api/v1/docs').expect(200);
    expect(page.text).toContain('Faintward API');
    expect(page.text).not.toMatch(/(src|href)="https?:/);
  });
});
