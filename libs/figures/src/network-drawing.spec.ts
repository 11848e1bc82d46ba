import { fromFile, readNetworkFile } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { colourScale } from './colour-scale';
import { networkDrawing } from './network-drawing';
import { nodeSymbol, symbolShapes } from './node-symbols';
import type { Shape } from './shapes';

const read = readNetworkFile({
  format: 'riseback-network',
  version: 1,
  name: 'One lift',
  nodes: [
    {
      id: 'T1',
      kind: 'trap',
      tag: 'TR-1',
      elevationM: 0,
      inletPressurePa: 6e5,
      loadKgS: 0.1,
      position: { x: 0, y: 200 },
    },
    { id: 'J1', kind: 'junction', elevationM: 3.048, position: { x: 0, y: 0 } },
    { id: 'R1', kind: 'receiver', tag: 'VR-1', elevationM: 3.048, vented: true, position: { x: 400, y: 0 } },
  ],
  pipes: [
    { id: 'L1', tag: 'CR-1', from: 'T1', to: 'J1', lengthM: 4, insideDiameterM: 0.05 },
    { id: 'L2', tag: 'CR-2', from: 'J1', to: 'R1', lengthM: 20, insideDiameterM: 0.05, checkValve: true },
  ],
});
if (!read.ok) throw new Error(JSON.stringify(read.errors));
const document = fromFile(read.file);
const units = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const drawn = (width: number, height: number) =>
  networkDrawing({
    document,
    result: undefined,
    isolated: new Set(),
    scale: colourScale('pressure', [], units),
    units,
    width,
    height,
  });

function texts(shapes: readonly Shape[]): string[] {
  return shapes.flatMap((shape) => {
    if (shape.kind === 'text') return [shape.text];
    return shape.kind === 'path' ? [] : texts(shape.shapes);
  });
}

describe('a network on paper', () => {
  it.each([
    [780, 440],
    [300, 440],
    [780, 120],
  ])('fits into %i by %i', (width, height) => {
    const drawing = drawn(width, height);
    expect(drawing.width).toBeLessThanOrEqual(width + 1e-9);
    expect(drawing.height).toBeLessThanOrEqual(height + 1e-9);
  });

  it('names its elements, its lift of 10 ft and the zones of its sheet, and no pressure where nothing is solved', () => {
    const found = texts(drawn(780, 440).shapes);
    for (const text of ['TR-1', 'VR-1', '10 ft lift', 'A', '1']) expect(found).toContain(text);
    expect(found.filter((text) => /^\d+\.\d$/.test(text))).toEqual([]);
  });

  it('draws what is not solved dashed, without a wash', () => {
    const { shapes } = drawn(780, 440);
    const washes = shapes.filter((shape) => shape.kind === 'path' && shape.stroke?.startsWith('p') === true);
    expect(washes.filter((shape) => shape.kind === 'path' && shape.stroke !== 'paper')).toEqual([]);
    expect(shapes.filter((shape) => shape.kind === 'path' && shape.dash !== undefined).length).toBe(2);
  });

  it('keeps every label within the edge of the sheet', () => {
    const { shapes, width, height } = drawn(300, 200);
    for (const shape of shapes) {
      if (shape.kind !== 'text') continue;
      expect(shape.x).toBeGreaterThanOrEqual(0);
      expect(shape.x).toBeLessThanOrEqual(width);
      expect(shape.y).toBeLessThanOrEqual(height);
    }
  });
});

describe('symbols', () => {
  it('show what a trap of each type has inside, and a vent only where there is one', () => {
    const types = ['invertedBucket', 'floatThermostatic', 'thermostatic', 'thermodynamic', 'orifice'] as const;
    const inside = types.map((type) =>
      nodeSymbol('trap', type, false)
        .map(({ d }) => d)
        .join('|'),
    );
    expect(
      new Set([
        ...inside,
        nodeSymbol('trap', undefined, false)
          .map(({ d }) => d)
          .join('|'),
      ]).size,
    ).toBe(6);
    expect(nodeSymbol('receiver', undefined, true).length).toBe(nodeSymbol('receiver', undefined, false).length + 1);
  });

  it('are the same parts as shapes', () => {
    for (const kind of ['trap', 'junction', 'receiver', 'flashVessel', 'pumpedInlet'] as const) {
      const parts = nodeSymbol(kind, undefined, true).map(({ d }) => d);
      expect(symbolShapes(kind, undefined, true).map(({ d }) => d)).toEqual(parts);
    }
  });
});
