import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { solveCommand } from '../../server/commands/solve';

const root = fileURLToPath(new URL('../..', import.meta.url));
const demo = readFileSync(new URL('../fixtures/tern-quay.json', import.meta.url), 'utf8');
let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-malformed-'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function solveText(text: string) {
  const path = join(folder, 'network.json');
  writeFileSync(path, text);
  return solveCommand([path, '--case', 'design']);
}

type Json = null | boolean | number | string | Json[] | { [key: string]: Json };

/** What a person or a program may put where it does not belong; no number that would be right anywhere. */
const junk = fc.constantFrom<Json>(null, -1e9, 1e300, 'forty-two', [], {}, [null], { x: 1 });

/** Each place in the demo file: key or index by key or index. */
function placesIn(value: Json, path: (string | number)[] = []): (string | number)[][] {
  if (value === null || typeof value !== 'object') return [path];
  const entries = Array.isArray(value) ? value.map((item, i) => [i, item] as const) : Object.entries(value);
  return [path, ...entries.flatMap(([key, item]) => placesIn(item, [...path, key]))];
}

function withJunk(path: readonly (string | number)[], put: Json): Json {
  const file = JSON.parse(demo) as Json;
  const last = path.at(-1);
  if (last === undefined) return put;
  let at = file as Record<string | number, Json>;
  for (const key of path.slice(0, -1)) at = at[key] as Record<string | number, Json>;
  at[last] = put;
  return file;
}

const places = placesIn(JSON.parse(demo) as Json);
const RUNS = { numRuns: 400, seed: 20_260_302 };

describe('malformed network files', () => {
  it('are refused with exit 2 and a pointer to each mistake, or solved without a NaN; never a crash', () => {
    fc.assert(
      fc.property(fc.constantFrom(...places), junk, (path, put) => {
        const { exitCode, error, output } = solveText(JSON.stringify(withJunk(path, put)));
        if (exitCode === 0) {
          // some junk is harmless: an emptied list of gauges, a tag of another name
          expect(JSON.stringify(output)).not.toContain('null');
          return;
        }
        expect(exitCode).toBe(2);
        expect(error?.errors.length).toBeGreaterThan(0);
        for (const { pointer } of error?.errors ?? []) expect(pointer).toMatch(/^(\/|$)/);
      }),
      RUNS,
    );
  });

  it('have each of several mistakes named at its own place', () => {
    const file = JSON.parse(demo) as { nodes: Record<string, Json>[]; pipes: Record<string, Json>[]; method: Json };
    Object.assign(file.nodes[3] ?? {}, { elevationM: 'high' });
    Object.assign(file.nodes[20] ?? {}, { loadKgS: -1 });
    Object.assign(file.pipes[5] ?? {}, { to: 'NOWHERE' });
    file.method = { friktion: 'flashVapour' };
    const { exitCode, error } = solveText(JSON.stringify(file));
    expect(exitCode).toBe(2);
    const pointers = error?.errors.map(({ pointer }) => pointer);
    expect(pointers).toEqual(
      expect.arrayContaining(['/nodes/3/elevationM', '/nodes/20/loadKgS', '/pipes/5/to', '/method/friktion']),
    );
  });

  it.each([
    ['nothing', ''],
    ['no JSON', '{"format": '],
    ['a list', '[]'],
    ['a number', '1'],
    ['another format', '{"format":"other","version":1,"name":"x"}'],
  ])('%s is refused with exit 2', (_what, text) => {
    const { exitCode, error, output } = solveText(text);
    expect([exitCode, output]).toEqual([2, undefined]);
    expect(error?.errors.length).toBeGreaterThan(0);
  });

  it('cut anywhere are refused with exit 2', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: demo.length - 2 }), (length) => {
        expect(solveText(demo.slice(0, length).trimEnd()).exitCode).toBe(2);
      }),
      { numRuns: 50, seed: 20_260_303 },
    );
  });
});

describe('the solve command as it is run', () => {
  const script = join(root, 'server', 'solve.mjs');

  it('prints one JSON object and nothing else', () => {
    const output = execFileSync(process.execPath, [script, 'tests/fixtures/tern-quay.json'], {
      cwd: root,
      encoding: 'utf8',
    });
    expect((JSON.parse(output) as { case: string }).case).toBe('design');
  });

  it('exits with 3 where computing finds no solution, with the element and the value', () => {
    const file = JSON.parse(demo) as { pipes: Record<string, Json>[] };
    const crossing = file.pipes.findIndex(({ id }) => id === 'L24');
    Object.assign(file.pipes[crossing] ?? {}, { size: { nps: '1/8', schedule: '80' } });
    const { exitCode, output, error } = solveText(JSON.stringify(file));
    expect([exitCode, output]).toEqual([3, undefined]);
    expect(error?.errors.map(({ pointer }) => pointer)).toEqual([`/pipes/${crossing}`]);
    expect(error?.detail).toMatch(/L24.*10000000/);
  });

  it('exits with 2 and one problem object on standard error', () => {
    const path = join(folder, 'bad.json');
    writeFileSync(path, demo.replace('"flashVessel"', '"flashVesel"'));
    const { status, stdout, stderr } = spawnSync(process.execPath, [script, path], { cwd: root, encoding: 'utf8' });
    expect([status, stdout]).toEqual([2, '']);
    const problem = JSON.parse(stderr) as { errors: { pointer: string }[] };
    expect(problem.errors.map(({ pointer }) => pointer)).toContain('/nodes/0/kind');
  });
});
