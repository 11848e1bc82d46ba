import type { Edge, Graph, Layout } from '@swimlane/ngx-graph';

interface Point {
  readonly x: number;
  readonly y: number;
}

/** What the canvas puts into a graph node's `data`. */
export interface PlacedNode extends Point {
  readonly elementId: string;
}

/** What the canvas puts into a link's `data`. */
export interface PlacedLink {
  readonly elementId: string;
  readonly points: readonly Point[];
}

/**
 * Leaves everything where the document says. The graph writes a known node's former position over the one it is handed, so places are
 * read from `data`, which it leaves alone.
 */
export class FixedLayout implements Layout {
  readonly defaultSettings = { multigraph: true };
  settings: unknown = {};

  run(graph: Graph): Graph {
    for (const node of graph.nodes) {
      const { x, y } = node.data as PlacedNode;
      node.position = { x, y };
    }
    for (const edge of graph.edges) this.updateEdge(graph, edge);
    return graph;
  }

  updateEdge(graph: Graph, edge: Edge): Graph {
    edge.points = (edge.data as PlacedLink).points.map(({ x, y }) => ({ x, y }));
    return graph;
  }
}
