import { Problem } from '@riseback/contracts';
import * as z from 'zod';
import { publicRoute, type Route } from './route-table';

type Json = Record<string, unknown>;

const PROBLEM_REF = {
  description: 'A problem object.',
  content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } },
};

/** GET /api/openapi.json, made from the very table that is registered, so that it cannot lag behind. */
export function openApiRoute(table: () => readonly Route[]): Route {
  // Made at the first request: the table holds this route too, and does not change.
  let description: Json | undefined;
  return publicRoute({
    method: 'get',
    path: '/api/openapi.json',
    summary: 'This description (OpenAPI 3.1).',
    answers: { 200: 'An OpenAPI document.' },
    handler: ({ res }) => {
      description ??= describeRoutes(table());
      res.json(description);
    },
  });
}

export function describeRoutes(routes: readonly Route[]): Json {
  const paths: Record<string, Json> = {};
  for (const route of routes) {
    const path = route.path.replaceAll(/:(\w+)/g, '{$1}');
    paths[path] = { ...paths[path], [route.method]: describeRoute(route) };
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Riseback',
      version: '1',
      description:
        'Pressures are absolute, in Pa; all numbers are SI with the unit in the name. Every error is a problem object (RFC 9457).',
    },
    paths,
    components: {
      schemas: { Problem: schemaOf(Problem, 'output') },
      securitySchemes: {
        session: {
          type: 'apiKey',
          in: 'cookie',
          name: 'riseback-session',
          description: 'Set by POST /api/session; over https the name begins with __Host-.',
        },
        proof: {
          type: 'apiKey',
          in: 'header',
          name: 'X-XSRF-TOKEN',
          description: 'The value of the cookie XSRF-TOKEN, at every change.',
        },
      },
    },
  };
}

function describeRoute(route: Route): Json {
  const answers = Object.entries(route.answers).map(([status, answer]) => [status, describeAnswer(answer)] as const);
  return {
    summary: route.summary,
    ...(route.rule.kind === 'public'
      ? { security: [] }
      : { security: [route.mutates ? { session: [], proof: [] } : { session: [] }] }),
    ...('anyOf' in route.rule ? { 'x-permission': route.rule.anyOf } : {}),
    parameters: [...pathParameters(route), ...queryParameters(route)],
    ...describeBody(route),
    responses: { ...Object.fromEntries(answers), default: PROBLEM_REF },
  };
}

function describeBody({ body, upload }: Route): Json {
  if (upload !== undefined) {
    // OpenAPI 3.1: a body of bytes is one without a schema
    return { requestBody: { required: true, content: Object.fromEntries(upload.types.map((type) => [type, {}])) } };
  }
  if (body === undefined) return {};
  return { requestBody: { required: true, content: { 'application/json': { schema: schemaOf(body, 'input') } } } };
}

function describeAnswer(answer: z.ZodType | string): Json {
  if (typeof answer === 'string') return { description: answer };
  return { description: 'Done.', content: { 'application/json': { schema: schemaOf(answer, 'output') } } };
}

function pathParameters(route: Route): Json[] {
  return [...route.path.matchAll(/:(\w+)/g)].map(([, name]) => ({
    name,
    in: 'path',
    required: true,
    schema: { type: 'string' },
  }));
}

function queryParameters(route: Route): Json[] {
  if (route.query === undefined) return [];
  const { properties, required } = schemaOf(route.query, 'input') as {
    properties?: Record<string, Json>;
    required?: string[];
  };
  return Object.entries(properties ?? {}).map(([name, schema]) => {
    return { name, in: 'query', required: required?.includes(name) ?? false, schema };
  });
}

function schemaOf(schema: z.ZodType, io: 'input' | 'output'): Json {
  // What JSON Schema cannot say (a refinement, a coercion) is left open rather than refused.
  const { $schema: _dialect, ...rest } = z.toJSONSchema(schema, { io, unrepresentable: 'any' });
  return rest;
}
