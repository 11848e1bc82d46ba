import { describe, expect, it } from 'vitest';
import { fromFile, toFile } from './document-file';
import { GRID, layoutMissingPositions } from './layout';
import type { NetworkFile, Position } from './network-file';
import { fileOf, junction, pipe, receiver, smallJson, trap, vessel } from './spec-network';

function positions(file: NetworkFile): Map<string, Position> {
  return new Map(file.nodes.flatMap(({ id, position }) => (position === undefined ? [] : [[id, position]])));
}

/** A header of ten junctions with three traps each, and a branch of two. */
function plant(): NetworkFile {
  const nodes = [receiver('R1'), junction('B1'), junction('B2'), trap('TB')];
  const pipes = [pipe('LB1', 'B1', 'J2'), pipe('LB2', 'B2', 'B1'), pipe('LTB', 'TB', 'B2')];
  for (let i = 0; i < 10; i++) {
    nodes.push(junction(`J${i}`), ...[0, 1, 2].map((k) => trap(`T${i}${k}`)));
    pipes.push(pipe(`H${i}`, `J${i}`, i === 0 ? 'R1' : `J${i - 1}`));
    pipes.push(...[0, 1, 2].map((k) => pipe(`L${i}${k}`, `T${i}${k}`, `J${i}`)));
  }
  return fileOf(smallJson({ nodes, pipes }));
}

function nearest(all: ReadonlyMap<string, Position>): number {
  const list = [...all.values()];
  const distances = list.flatMap((a, i) => list.slice(i + 1).map((b) => Math.hypot(a.x - b.x, a.y - b.y)));
  return Math.min(...distances);
}

describe('positions for a network without any', () => {
  const drawn = positions(layoutMissingPositions(plant()));

  it('stand on the grid, each node on its own spot with room for its label', () => {
    expect(drawn.size).toBe(44);
    for (const { x, y } of drawn.values())
      expect([x % GRID, y % GRID].every((rest) => Math.abs(rest) === 0)).toBe(true);
    expect(nearest(drawn)).toBeGreaterThanOrEqual(80);
  });

  it('have the receiver at the right and the header on one line to the left', () => {
    const at = (id: string): Position => drawn.get(id) ?? { x: NaN, y: NaN };
    for (let i = 0; i < 10; i++) {
      expect(at(`J${i}`).y).toBe(at('R1').y);
      expect(at(`J${i}`).x).toBeLessThan(i === 0 ? at('R1').x : at(`J${i - 1}`).x);
    }
  });

  it('have traps both above and below it', () => {
    const header = drawn.get('R1')?.y ?? NaN;
    const traps = [...drawn].filter(([id]) => /^T\d/.test(id));
    expect(traps.filter(([, { y }]) => y < header)).toHaveLength(15);
    expect(traps.filter(([, { y }]) => y > header)).toHaveLength(15);
  });

  it('are the same each time, and for the document as for the file', () => {
    expect(positions(layoutMissingPositions(plant()))).toEqual(drawn);
    expect(toFile(layoutMissingPositions(fromFile(plant())))).toEqual(layoutMissingPositions(plant()));
  });
});

describe('positions beside given ones', () => {
  it('leave those as they are and carry on from them', () => {
    const file = plant();
    const given = { x: 1_013, y: -7 };
    const nodes = file.nodes.map((node) => (node.id === 'J3' ? { ...node, position: given } : node));
    const drawn = positions(layoutMissingPositions({ ...file, nodes }));
    expect(drawn.get('J3')).toEqual(given);
    expect(Math.abs((drawn.get('J4')?.y ?? NaN) - given.y)).toBeLessThan(GRID);
    expect(drawn.get('J4')?.x).toBeLessThan(given.x);
    expect(nearest(drawn)).toBeGreaterThanOrEqual(GRID);
  });

  it('change nothing in a file that is drawn already', () => {
    const file = layoutMissingPositions(plant());
    expect(layoutMissingPositions(file)).toBe(file);
  });

  it('avoid spots that are taken', () => {
    const nodes = [receiver('R1'), { ...junction('J1'), position: { x: -160, y: 60 } }, trap('T1'), vessel('V1')];
    const file = fileOf(smallJson({ nodes, pipes: [pipe('a', 'J1', 'R1')] }));
    expect(nearest(positions(layoutMissingPositions(file)))).toBeGreaterThanOrEqual(GRID);
  });
});

it('loops, lonely nodes and 70,000 in a line are drawn within the range of coordinates', () => {
  const nodes = [junction('A'), junction('B'), junction('C'), trap('T1')];
  const ring = fileOf(smallJson({ nodes, pipes: [pipe('a', 'A', 'B'), pipe('b', 'B', 'C'), pipe('c', 'C', 'A')] }));
  expect(positions(layoutMissingPositions(ring)).size).toBe(4);
  const count = 70_000;
  const line = fileOf(
    smallJson({
      nodes: [receiver('J0'), ...Array.from({ length: count }, (_, i) => junction(`J${i + 1}`))],
      pipes: Array.from({ length: count }, (_, i) => pipe(`L${i}`, `J${i + 1}`, `J${i}`)),
    }),
  );
  const drawn = [...positions(layoutMissingPositions(line)).values()];
  expect(new Set(drawn.map(({ x, y }) => `${x},${y}`)).size).toBe(count + 1);
  expect(drawn.every(({ x, y }) => Math.abs(x) < 1e7 && Math.abs(y) < 1e7)).toBe(true);
});
