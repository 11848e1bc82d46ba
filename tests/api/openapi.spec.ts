import { afterAll, describe, expect, it } from 'vitest';
import { TestServer } from './test-server';

const server = new TestServer();
afterAll(() => {
  server.close();
});

interface Operation {
  readonly summary: string;
  readonly security: unknown[];
  readonly parameters: { name: string; in: string }[];
  readonly requestBody?: {
    content: Record<string, { schema: { properties?: Record<string, unknown>; additionalProperties?: unknown } }>;
  };
  readonly responses: Record<string, unknown>;
}
interface Description {
  readonly openapi: string;
  readonly paths: Record<string, Record<string, Operation>>;
  readonly components: { schemas: Record<string, unknown> };
}

async function describeApi(): Promise<Description> {
  return (await server.as('anonymous').get('/api/openapi.json').expect(200)).body as Description;
}

describe('/api/openapi.json', () => {
  it('lists every route with its summary, its path parameters and a problem object for errors', async () => {
    const description = await describeApi();
    expect(description.openapi).toBe('3.1.0');
    const listed = Object.entries(description.paths).flatMap(([path, methods]) =>
      Object.keys(methods).map((method) => `${method} ${path}`),
    );
    const registered = server.app.routes.map(({ method, path }) => `${method} ${path.replaceAll(/:(\w+)/g, '{$1}')}`);
    expect(listed.sort()).toEqual(registered.sort());
    for (const [path, methods] of Object.entries(description.paths)) {
      for (const operation of Object.values(methods)) {
        expect(operation.summary.length).toBeGreaterThan(3);
        expect(operation.responses['default']).toMatchObject({ content: { 'application/problem+json': {} } });
        const inPath = operation.parameters.filter((parameter) => parameter.in === 'path').map(({ name }) => name);
        expect(inPath).toEqual([...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name));
      }
    }
  });

  it('describes bodies by the contract, unknown keys refused', async () => {
    const { paths } = await describeApi();
    const schema = paths['/api/session']?.['post']?.requestBody?.content['application/json']?.schema;
    expect(Object.keys(schema?.properties ?? {})).toEqual(['email', 'password', 'code']);
    expect(schema?.additionalProperties).toBe(false);
  });

  it('refers to nothing that it does not hold', async () => {
    const description = await describeApi();
    const references = [...JSON.stringify(description).matchAll(/"\$ref":"([^"]+)"/g)].map(
      ([, target]) => target ?? '',
    );
    expect(references.length).toBeGreaterThan(0);
    for (const target of references) {
      expect(target).toMatch(/^#\/components\//);
      const [, ...keys] = target.split('/');
      const found = keys.reduce<unknown>((at, key) => (at as Record<string, unknown>)[key], description);
      expect(found, target).toBeDefined();
    }
  });
});
