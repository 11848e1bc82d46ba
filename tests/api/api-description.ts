import { readFileSync } from 'node:fs';
import type { Response } from 'supertest';
import * as z from 'zod';
import type { Route } from '../../server/src/platform/routes/route-table';
import type { TestServer } from './test-server';

export type JsonSchema = Parameters<typeof z.fromJSONSchema>[0] & object;
type Content = Record<string, { readonly schema: JsonSchema }>;

/** The types and statuses of docs/problems.md. */
const PROBLEMS = new Map<string, number>(
  [...readFileSync('docs/problems.md', 'utf8').matchAll(/^\| `([a-z-]+)` +\| (\d{3}) /gm)].map(
    ([, type, status]) => [`/problems/${String(type)}`, Number(status)] as const,
  ),
);

interface Operation {
  readonly requestBody?: { readonly content: Content };
  readonly responses: Record<string, { readonly content?: Content }>;
}

/**
 * What /api/openapi.json promises, read back from its JSON: an answer is measured against the published description, not
 * against the schema in the program that it was made from.
 */
export class ApiDescription {
  private readonly checks = new Map<JsonSchema, z.ZodType>();

  private constructor(
    private readonly paths: Record<string, Record<string, Operation>>,
    private readonly problem: z.ZodType,
  ) {}

  static async of(server: TestServer): Promise<ApiDescription> {
    const answer = await server.as('anonymous').get('/api/openapi.json').expect(200);
    const { paths, components } = answer.body as {
      paths: Record<string, Record<string, Operation>>;
      components: { schemas: Record<string, JsonSchema> };
    };
    return new ApiDescription(paths, z.fromJSONSchema(components.schemas['Problem'] ?? false));
  }

  /** The schema of the body that a route takes. */
  bodyOf(route: Route): JsonSchema | undefined {
    return this.operation(route).requestBody?.content['application/json']?.schema;
  }

  /** Why an answer is not what the description says, or undefined when it is. */
  misfit(route: Route, response: Response): string | undefined {
    const { status } = response;
    const described = this.operation(route).responses[String(status)];
    if (described !== undefined) return this.misfitOf(described.content, response);
    return status < 400 ? `status ${String(status)} is not described` : this.problemMisfit(response);
  }

  private problemMisfit(response: Response): string | undefined {
    const type = String(response.headers['content-type']);
    if (!type.startsWith('application/problem+json')) return `an error as ${type}`;
    const parsed = this.problem.safeParse(response.body);
    if (!parsed.success) return z.prettifyError(parsed.error);
    const problem = response.body as { type: string; status: number };
    const status = PROBLEMS.get(problem.type);
    if (status === undefined) return `docs/problems.md does not know ${problem.type}`;
    return status === response.status && problem.status === status ? undefined : `${problem.type} with another status`;
  }

  private misfitOf(content: Content | undefined, response: Response): string | undefined {
    const schema = content?.['application/json']?.schema;
    // Words alone: a file, a stream, or an answer without a body.
    if (schema === undefined) return response.status === 204 && response.text !== '' ? '204 with a body' : undefined;
    const type = String(response.headers['content-type']);
    if (!type.startsWith('application/json')) return `JSON as ${type}`;
    const parsed = this.check(schema).safeParse(response.body);
    return parsed.success ? undefined : z.prettifyError(parsed.error);
  }

  private check(schema: JsonSchema): z.ZodType {
    const check = this.checks.get(schema) ?? z.fromJSONSchema(schema);
    this.checks.set(schema, check);
    return check;
  }

  private operation({ method, path }: Route): Operation {
    const operation = this.paths[path.replaceAll(/:(\w+)/g, '{$1}')]?.[method];
    if (operation === undefined) throw new Error(`${method} ${path} is not described`);
    return operation;
  }
}
