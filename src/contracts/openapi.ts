/** The API's description, made from the same schemas that validate. */
import * as z from 'zod/v4';
import { PERMISSIONS, type Permission } from '@/domain/people';
import { Problem } from './common';
import { NAMED_BLOCKS } from './fault-body';
import type { Route } from './route';
import { ROUTES } from './routes';

type Json = Record<string, unknown>;

/** Schemas with an id of their own are described once, under components. */
type Shared = Map<string, Json>;
const DEFS = /"#\/\$defs\//g;

// Not the library's global registry: a module that the development server loads again would name them twice.
const metadata = z.registry<{ id: string }>();
for (const { id, schema } of NAMED_BLOCKS) metadata.add(schema, { id });

function describer(shared: Shared) {
  return (schema: z.ZodType, io: 'input' | 'output'): Json => {
    const json = JSON.stringify(z.toJSONSchema(schema, { io, unrepresentable: 'any', metadata }));
    const found = JSON.parse(json.replace(DEFS, '"#/components/schemas/')) as Json;
    const { $schema: _draft, $defs, ...rest } = found;
    for (const [name, def] of Object.entries(($defs ?? {}) as Record<string, Json>)) {
      const { id: _id, ...plain } = def;
      shared.set(name, plain);
    }
    return rest;
  };
}
type Describe = ReturnType<typeof describer>;

function parametersOf(route: Route, schemaOf: Describe): Json[] {
  const part = (schema: z.ZodType | undefined, place: 'path' | 'query'): Json[] => {
    if (!schema) return [];
    const json = schemaOf(schema, 'input') as {
      properties?: Record<string, Json>;
      required?: string[];
    };
    return Object.entries(json.properties ?? {}).map(([name, s]) => ({
      name,
      in: place,
      required: place === 'path' || (json.required ?? []).includes(name),
      schema: s,
    }));
  };
  const header = (name: string, required: boolean, description: string): Json => ({
    name,
    in: 'header',
    required,
    description,
    schema: { type: 'string' },
  });
  return [
    ...part(route.params, 'path'),
    ...part(route.query, 'query'),
    ...(route.versioned ? [header('If-Match', true, 'The ETag that was read.')] : []),
    ...(route.repeatable ? [header('Idempotency-Key', false, 'Makes a repeat harmless.')] : []),
  ];
}

function whoOf(route: Route): string {
  if (route.who === 'public') return 'Open to everybody.';
  if (route.who === 'customer') return 'For a signed-in customer, their own tickets.';
  const p = PERMISSIONS[route.who as Permission];
  return `For ${p.roles.join(', ')}; a token needs the scope \`${p.scope}\`.`;
}

const problem = (description: string): Json => ({
  description,
  content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } },
});

function operationOf(route: Route, schemaOf: Describe): Json {
  const media = route.media ?? 'application/json';
  return {
    summary: route.summary,
    description: whoOf(route),
    operationId: `${route.method.toLowerCase()}${route.path.replace(/[^a-z]+(.)?/gi, (_, c: string | undefined) => (c ?? '').toUpperCase())}`,
    parameters: parametersOf(route, schemaOf),
    ...(route.who === 'public' ? { security: [] } : {}),
    ...(route.body
      ? {
          requestBody: {
            required: true,
            content: { 'application/json': { schema: schemaOf(route.body, 'input') } },
          },
        }
      : {}),
    responses: {
      [route.status]: {
        description: 'As asked.',
        ...(route.answer
          ? {
              content: {
                [media]: { schema: schemaOf(route.answer, 'input') },
                ...(route.csv ? { 'text/csv': { schema: { type: 'string' } } } : {}),
              },
            }
          : {}),
      },
      default: problem('Refused, and why.'),
    },
  };
}

/** The OpenAPI 3.1 document. */
export function describeApi(origin: string): Json {
  const shared: Shared = new Map();
  const schemaOf = describer(shared);
  const problemSchema = schemaOf(Problem, 'output');
  const paths: Record<string, Json> = {};
  for (const route of ROUTES) {
    paths[route.path] = {
      ...paths[route.path],
      [route.method.toLowerCase()]: operationOf(route, schemaOf),
    };
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Meterwright',
      version: '1',
      description:
        'The shop’s tool for repairing electronic test instruments. Times are RFC 3339 in UTC, money is in minor units, resistances are ohms as numbers and "OL" over range.',
    },
    servers: [{ url: origin }],
    security: [{ session: [] }, { token: [] }],
    paths,
    components: {
      schemas: { Problem: problemSchema, ...Object.fromEntries(shared) },
      securitySchemes: {
        session: { type: 'apiKey', in: 'cookie', name: 'mw_session' },
        token: { type: 'http', scheme: 'bearer' },
      },
    },
  };
}
