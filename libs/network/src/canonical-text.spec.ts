import { describe, expect, it } from 'vitest';
import { canonicalText } from './canonical-text';
import { setNetworkOp, setOp } from './edit-ops';
import { applyBatch } from './apply-batch';
import type { EditOp } from './edit-batch';
import { solverInput, solverInputText } from './solver-input';
import { documentOf, smallJson } from './spec-network';

// RFC 8785, section 3.2.2 (the sample object) and its canonical form in section 3.2.3; from memory
it('writes the sample of RFC 8785 as printed there', () => {
  const sample: unknown = JSON.parse(
    '{"numbers":[333333333.33333329,1E30,4.50,2e-3,0.000000000000000000000000001],' +
      '"string":"\\u20ac$\\u000F\\u000aA\'\\u0042\\u0022\\u005c\\\\\\"\\/","literals":[null,true,false]}',
  );
  expect(canonicalText(sample)).toBe(
    '{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],' +
      '"string":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"}',
  );
});

it('refuses what JSON cannot say', () => {
  expect(() => canonicalText({ a: NaN })).toThrow();
  expect(() => canonicalText(undefined)).toThrow(TypeError);
});

describe('the input of a solve', () => {
  const document = documentOf(
    smallJson({
      trapModels: [{ id: 'M1', name: 'M' }],
      cases: [{ id: 'design', name: 'Design', overrides: [{ node: 'T1', loadKgS: 1 }] }],
      gauges: [{ id: 'G1', node: 'J1', elevationM: 0 }],
    }),
  );
  const textAfter = (op: EditOp): string => {
    const applied = applyBatch(document, [op]);
    if (!applied.ok) throw new Error(JSON.stringify(applied.errors));
    return solverInputText(applied.document);
  };

  // design rule: "what can change a number: without names, tags, positions, bends, notes, gauges"
  it.each([
    ['a name', setNetworkOp(document, 'name', 'Other')],
    ['a tag', setOp(document, 'nodes', 'T1', 'tag', 'TR-9')],
    ['a position', setOp(document, 'nodes', 'T1', 'position', { x: 20, y: 20 })],
    ['bends', setOp(document, 'pipes', 'L1', 'bends', [{ x: 1, y: 1 }])],
    ['an area', setOp(document, 'pipes', 'L1', 'area', 'Hall')],
    ['a note', setOp(document, 'nodes', 'J1', 'note', 'n')],
    ['the name of a model', setOp(document, 'trapModels', 'M1', 'name', 'N')],
    ['the name of a case', setOp(document, 'cases', 'design', 'name', 'N')],
    ['a gauge', setOp(document, 'gauges', 'G1', 'elevationM', 1)],
  ])('does not change with %s', (_, op) => {
    expect(textAfter(op)).toBe(solverInputText(document));
  });

  it.each([
    ['a load', setOp(document, 'nodes', 'T1', 'loadKgS', 2)],
    ['a length', setOp(document, 'pipes', 'L1', 'lengthM', 7)],
    ['an override', setOp(document, 'overrides', 'design/T1', 'loadKgS', 2)],
    ['a limit', setNetworkOp(document, 'limits', { momentum: { limitPa: 1000 } })],
    ['the site', setNetworkOp(document, 'site', { ...document.site, atmosphericPressurePa: 90_000 })],
  ])('changes with %s', (_, op) => {
    expect(textAfter(op)).not.toBe(solverInputText(document));
  });

  it('is a plain object that lists by id', () => {
    expect(JSON.parse(solverInputText(document))).toEqual(solverInput(document));
    expect(solverInput(document).nodes.map(({ id }) => id)).toEqual(['J1', 'R1', 'T1']);
  });
});
