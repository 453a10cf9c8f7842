import type { INestApplication } from '@nestjs/common';
import { DocumentBuilder, type OpenAPIObject, SwaggerModule } from '@nestjs/swagger';
import { Problem } from '@faintward/contracts/errors';
import { z } from 'zod';
import { ACCESS_COOKIE } from './jwt.strategy.js';
import { API_PREFIX } from './api-prefix.js';

type JsonSchema = Record<string, unknown>;

/**
 * Turns zod schemas into OpenAPI 3.1 schemas, which are JSON Schema 2020-12. A schema with `.meta({ id })` becomes a
 * component of that name; where its request and its answer form differ (a default makes a field optional in one only),
 * the second form to appear is named `…Request` or `…Answer`.
 */
function schemaConverter() {
  const formOf = new Map<string, string>();

  function nameFor(id: string, form: string, direction: 'input' | 'output'): string {
    for (const name of [id, `${id}${direction === 'input' ? 'Request' : 'Answer'}`]) {
      const known = formOf.get(name);
      if (known === undefined || known === form) {
        formOf.set(name, form);
        return name;
      }
    }
    throw new Error(`Two different schemas are called ${id}.`);
  }

  return (schema: unknown, { schemaType }: { schemaType: 'input' | 'output' }) => {
    if (!(schema instanceof z.ZodType)) return undefined;
    // Wrapped, so that a named schema at the root is a definition like any other.
    const json = z.toJSONSchema(z.object({ root: schema }), {
      target: 'draft-2020-12',
      io: schemaType,
      unrepresentable: 'any',
      override: ({ jsonSchema }) => {
        // Answers are sieved rather than closed, and a client must bear new fields.
        if (jsonSchema.additionalProperties === false) delete jsonSchema.additionalProperties;
        delete jsonSchema.id;
      },
    }) as unknown as { $defs?: Record<string, JsonSchema>; properties: { root: JsonSchema } };
    const definitions = json.$defs ?? {};
    const names = new Map(
      Object.keys(definitions).map((id) => [id, nameFor(id, closureOf(id, definitions), schemaType)] as const),
    );
    return {
      schema: renamed(json.properties.root, names),
      components: Object.fromEntries(
        Object.entries(definitions).map(([id, definition]) => [
          names.get(id) ?? id,
          renamed(definition, names) as JsonSchema,
        ]),
      ),
    };
  };
}

/** A definition with all that it refers to, as text: two are the same form only if nothing within differs. */
function closureOf(id: string, definitions: Record<string, JsonSchema>): string {
  const seen = new Set<string>();
  const visit = (name: string) => {
    if (seen.has(name)) return;
    seen.add(name);
    for (const [, referred] of JSON.stringify(definitions[name]).matchAll(/"\$ref":"#\/\$defs\/([^"]+)"/g))
      visit(referred ?? '');
  };
  visit(id);
  return JSON.stringify([...seen].sort().map((name) => [name, definitions[name]]));
}

function renamed(value: unknown, names: ReadonlyMap<string, string>): unknown {
  if (Array.isArray(value)) return value.map((part) => renamed(part, names));
  if (value === null || typeof value !== 'object') return value;
  return Object.fromEntries(
    Object.entries(value).map(([key, part]) => {
      if (key !== '$ref' || typeof part !== 'string') return [key, renamed(part, names)];
      const id = part.replace('#/$defs/', '');
      return [key, `#/components/schemas/${names.get(id) ?? id}`];
    }),
  );
}

export function buildOpenApi(app: INestApplication, version: string): OpenAPIObject {
  const settings = new DocumentBuilder()
    .setOpenAPIVersion('3.1.0')
    .setTitle('Faintward')
    .setDescription(
      'From a redshift to a night at the telescope. Errors are problem details (RFC 9457) with a stable `code`. ' +
        'Objects that several people edit carry a version: send it back as `If-Match`. ' +
        'Exposure times are planning figures, to be confirmed by the observatory’s instrument team.',
    )
    .setVersion(version)
    .addCookieAuth(ACCESS_COOKIE, { type: 'apiKey', in: 'cookie', name: ACCESS_COOKIE }, 'session')
    .build();
  const convert = schemaConverter();
  const document = SwaggerModule.createDocument(app, settings, { standardSchemaConverter: convert });
  completeAnswers(document);
  Object.assign((document.components ??= {}), {
    schemas: { ...document.components.schemas, ...convert(Problem, { schemaType: 'output' })?.components },
  });
  return document;
}

/**
 * An answer declared without a status has the framework's: 201 after POST, 200 otherwise. And every operation can refuse,
 * always in the same form.
 */
function completeAnswers(document: OpenAPIObject): void {
  for (const methods of Object.values(document.paths)) {
    for (const [method, operation] of Object.entries(
      methods as Record<string, { responses: Record<string, unknown> }>,
    )) {
      const { default: declared, ...responses } = operation.responses;
      operation.responses = {
        ...responses,
        ...(declared === undefined ? {} : { [method === 'post' ? '201' : '200']: declared }),
        default: {
          description: 'Refused: the problem says why.',
          content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } },
        },
      };
    }
  }
}

/** Serves the document at `/api/v1/openapi.json` and a readable page at `/api/v1/docs`, both made at the first request. */
export function serveOpenApi(app: INestApplication, version: string): void {
  let document: OpenAPIObject | undefined;
  SwaggerModule.setup(`${API_PREFIX}/docs`, app, () => (document ??= buildOpenApi(app, version)), {
    jsonDocumentUrl: `${API_PREFIX}/openapi.json`,
    yamlDocumentUrl: `${API_PREFIX}/openapi.yaml`,
    customSiteTitle: 'Faintward API',
  });
}
