import type { Position } from './network-file';
import type { SpanningTree } from './spanning-trees';

/** Drawing units, all multiples of the grid. */
const STEP_ALONG_HEADER = 160;
const STEP_BETWEEN_LEAVES = 100;
const LEAF_DISTANCE = 120;
const BRANCH_SHIFT = 40;
/** What a symbol with its label takes above and below its line. */
const MARGIN = 60;
const GAP = 40;

type Side = 'above' | 'below';

/** A chain of nodes drawn as one level line from right to left: from its head always on to the child with the most behind it. */
interface Header {
  readonly nodes: readonly string[];
  /** Single nodes that hang on a node of the line. */
  readonly leaves: ReadonlyMap<string, readonly { readonly id: string; readonly side: Side }[]>;
  /** Heads of the headers that branch off a node of the line. */
  readonly branches: ReadonlyMap<string, readonly string[]>;
}

/** How far a header reaches above and below its line, with all that hangs on it, and where its branches' lines are. */
interface Measure {
  readonly above: number;
  readonly below: number;
  readonly branchLines: ReadonlyMap<string, { readonly side: Side; readonly distance: number }>;
}

/** Where a header starts; the side at which its riser comes in is not free for a leaf. */
interface Start extends Position {
  readonly used: Readonly<Record<Side, number>>;
}

/**
 * Draws trees under each other. Each is a header from its root at the right to the left; single nodes hang above and below it in
 * turn, and each branch is a header of its own in a band above or below. Of two branches, the one nearer the receiver takes the outer
 * band, so that no riser crosses a branch.
 */
export function drawTrees(trees: readonly SpanningTree[]): Map<string, Position> {
  const positions = new Map<string, Position>();
  let top = 0;
  for (const tree of trees) {
    const headers = headersOf(tree);
    const measures = new Map<string, Measure>();
    // branches stand behind the headers that they branch off
    for (const [head, header] of [...headers].reverse()) measures.set(head, measure(header, measures));
    const main = measures.get(tree.order[0] ?? '');
    if (main === undefined) continue;
    place(tree, headers, measures, top + main.above, positions);
    top += main.above + main.below + GAP;
  }
  return positions;
}

/** The headers of a tree by their heads, each behind the one that it branches off. */
function headersOf(tree: SpanningTree): Map<string, Header> {
  const weights = weightsOf(tree);
  const headers = new Map<string, Header>();
  const heads = tree.order.slice(0, 1);
  for (const head of heads) {
    const nodes: string[] = [];
    const leaves = new Map<string, { id: string; side: Side }[]>();
    const branches = new Map<string, string[]>();
    let leafCount = 0;
    for (let at: string | undefined = head; at !== undefined;) {
      nodes.push(at);
      const children: readonly string[] = tree.children.get(at) ?? [];
      const next = heaviest(children, weights);
      const others = children.filter((child) => child !== next);
      const isLeaf = (id: string): boolean => weights.get(id) === 1;
      leaves.set(
        at,
        others.filter(isLeaf).map((id) => ({ id, side: leafCount++ % 2 === 0 ? 'above' : 'below' })),
      );
      branches.set(
        at,
        others.filter((id) => !isLeaf(id)),
      );
      heads.push(...others.filter((id) => !isLeaf(id)));
      at = next;
    }
    headers.set(head, { nodes, leaves, branches });
  }
  return headers;
}

/** How many nodes stand behind each node, itself included. */
function weightsOf(tree: SpanningTree): Map<string, number> {
  const weights = new Map<string, number>();
  for (const id of [...tree.order].reverse()) {
    weights.set(id, 1 + (tree.children.get(id) ?? []).reduce((sum, child) => sum + (weights.get(child) ?? 0), 0));
  }
  return weights;
}

/** Where the line goes on: an only child, else the one with the most behind it; where several single nodes end a line, nowhere. */
function heaviest(children: readonly string[], weights: ReadonlyMap<string, number>): string | undefined {
  let best: string | undefined;
  let most = children.length === 1 ? 0 : 1;
  for (const child of children) {
    const weight = weights.get(child) ?? 0;
    if (weight > most) [best, most] = [child, weight];
  }
  return best;
}

function measure(header: Header, measures: ReadonlyMap<string, Measure>): Measure {
  const sides = new Set([...header.leaves.values()].flat().map(({ side }) => side));
  const extent = {
    above: sides.has('above') ? LEAF_DISTANCE + MARGIN : MARGIN,
    below: sides.has('below') ? LEAF_DISTANCE + MARGIN : MARGIN,
  };
  const branchLines = new Map<string, { side: Side; distance: number }>();
  // from the far end, so that the outer bands are left for the branches nearest the receiver
  for (const node of [...header.nodes].reverse()) {
    for (const head of header.branches.get(node) ?? []) {
      const branch = measures.get(head);
      if (branch === undefined) continue;
      const side = extent.below < extent.above ? 'below' : 'above';
      const [near, far] = side === 'above' ? [branch.below, branch.above] : [branch.above, branch.below];
      const distance = extent[side] + GAP + near;
      branchLines.set(head, { side, distance });
      extent[side] = distance + far;
    }
  }
  return { ...extent, branchLines };
}

function place(
  tree: SpanningTree,
  headers: ReadonlyMap<string, Header>,
  measures: ReadonlyMap<string, Measure>,
  mainY: number,
  positions: Map<string, Position>,
): void {
  const starts = new Map<string, Start>([[tree.order[0] ?? '', { x: 0, y: mainY, used: { above: 0, below: 0 } }]]);
  for (const [head, header] of headers) {
    const start = starts.get(head);
    const branchLines = measures.get(head)?.branchLines;
    if (start === undefined || branchLines === undefined) continue;
    const y = start.y;
    let x = start.x;
    for (const node of header.nodes) {
      positions.set(node, { x, y });
      const used = node === head ? { ...start.used } : { above: 0, below: 0 };
      for (const branch of header.branches.get(node) ?? []) {
        const line = branchLines.get(branch);
        if (line === undefined) continue;
        starts.set(branch, {
          x: x - BRANCH_SHIFT * used[line.side],
          y: y + sign(line.side) * line.distance,
          used: line.side === 'above' ? { above: 0, below: 1 } : { above: 1, below: 0 },
        });
        used[line.side] += 1;
      }
      for (const { id, side } of header.leaves.get(node) ?? []) {
        positions.set(id, { x: x - STEP_BETWEEN_LEAVES * used[side], y: y + sign(side) * LEAF_DISTANCE });
        used[side] += 1;
      }
      x -= Math.max(STEP_ALONG_HEADER, STEP_BETWEEN_LEAVES * Math.max(used.above, used.below));
    }
  }
}

/** Drawing coordinates grow downward. */
function sign(side: Side): 1 | -1 {
  return side === 'above' ? -1 : 1;
}
