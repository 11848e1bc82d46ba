import { type Box, type DrawnNetwork, type LabelRequest, placeLabels, pointAt } from '@riseback/figures';
import type { Position } from '@riseback/network';
import type { NodeView, PipeView } from '../model/element-views';
import { symbolScale } from '../model/viewport';
import type { ElementChangeAt, GoneElement } from './changes-at';

export interface ComparisonMark {
  readonly elementId: string;
  readonly kind: ElementChangeAt['kind'] | 'removed';
  readonly way: ElementChangeAt['way'];
  readonly text: string;
  /** Sheet coordinates times zoom, as labels have theirs. */
  readonly box: Box;
}

/** Where an element stood that is there no more. */
export interface Ghost {
  readonly id: string;
  readonly d: string;
}

const HEIGHT = 16;
const ICON = 14;
const LETTER = 6.4;
const PAD = 4;
/** From which zoom on the words stand beside the signs. */
const WORDS_FROM = 0.45;
/** Off a node's middle, px at symbol scale 1, and off a pipe's line. */
const NODE_REACH = 16;
const PIPE_GAP = 8;
/** Ways along a pipe at which a mark may stand, the best first. */
const ALONG = [0.62, 0.5, 0.75, 0.3, 0.88] as const;
/** Radius of the ring where a node stood, px at symbol scale 1. */
const GHOST_RADIUS = 12;

interface Subject {
  readonly changes: ReadonlyMap<string, ElementChangeAt>;
  readonly gone: readonly GoneElement[];
  readonly earlier: DrawnNetwork;
  readonly nodes: ReadonlyMap<string, NodeView>;
  readonly pipes: ReadonlyMap<string, PipeView>;
}

/**
 * A mark for each element that is otherwise, laid where nothing else is; one whose words find no room keeps its signs alone.
 * @param seen what the window shows: a place that its edge cuts is taken only where there is no other
 */
export function comparisonMarks(
  subject: Subject,
  zoom: number,
  obstacles: readonly Box[],
  seen?: Box,
): ComparisonMark[] {
  const wanted = wantedMarks(subject, zoom, zoom >= WORDS_FROM);
  const placed = placeLabels(wanted, obstacles, undefined, seen);
  const laid = wanted.flatMap(({ mark, key, candidates }): ComparisonMark[] => {
    const box = candidates[placed.get(key) ?? -1];
    return box === undefined ? [] : [{ ...mark, box }];
  });
  const signs = wantedMarks(subject, zoom, false).filter(({ key }) => !placed.has(key));
  const squeezed = placeLabels(signs, [...obstacles, ...laid.map(({ box }) => box)], undefined, seen);
  return [
    ...laid,
    ...signs.flatMap(({ mark, key, candidates }): ComparisonMark[] => {
      const box = candidates[squeezed.get(key) ?? 0];
      return box === undefined ? [] : [{ ...mark, box }];
    }),
  ];
}

function wantedMarks(subject: Subject, zoom: number, words: boolean): WantedMark[] {
  return [...changedMarks(subject, zoom, words), ...goneMarks(subject, zoom, words)];
}

export function ghosts({ gone, earlier }: Pick<Subject, 'gone' | 'earlier'>, zoom: number): Ghost[] {
  const radius = GHOST_RADIUS * symbolScale(zoom) * zoom;
  return gone.flatMap(({ id, kind }): Ghost[] => {
    if (kind === 'pipe') {
      const points = earlier.pipes.get(id)?.points ?? [];
      return points.length === 0
        ? []
        : [{ id, d: `M${points.map(({ x, y }) => `${at(x * zoom)} ${at(y * zoom)}`).join('L')}` }];
    }
    const node = earlier.nodes.get(id)?.at;
    if (node === undefined) return [];
    const [x, y] = [node.x * zoom, node.y * zoom];
    return [
      {
        id,
        d: `M${at(x - radius)} ${at(y)}a${at(radius)} ${at(radius)} 0 1 0 ${at(2 * radius)} 0a${at(radius)} ${at(radius)} 0 1 0 ${at(-2 * radius)} 0`,
      },
    ];
  });
}

interface WantedMark extends LabelRequest {
  readonly mark: Omit<ComparisonMark, 'box'>;
}

function changedMarks({ changes, nodes, pipes }: Subject, zoom: number, withWords: boolean): WantedMark[] {
  return [...changes].flatMap(([elementId, { kind, words, change, way }]): WantedMark[] => {
    const text = !withWords ? '' : [words, change].filter((part) => part !== '').join(' ');
    const mark = { elementId, kind, way, text };
    const size = { width: widthOf(mark), height: HEIGHT };
    const node = nodes.get(elementId);
    const pipe = pipes.get(elementId);
    const candidates =
      node !== undefined
        ? aroundNode(node.at, size, zoom)
        : pipe === undefined
          ? []
          : alongPipe(pipe.drawn.points, size, zoom);
    return kind === null && way === null ? [] : [{ key: elementId, mark, candidates }];
  });
}

function goneMarks({ gone, earlier }: Subject, zoom: number, withWords: boolean): WantedMark[] {
  return gone.flatMap(({ id, kind, name }): WantedMark[] => {
    const mark = {
      elementId: id,
      kind: 'removed' as const,
      way: null,
      text: withWords ? `${name} removed` : '',
    };
    const size = { width: widthOf(mark), height: HEIGHT };
    const node = earlier.nodes.get(id);
    const points = earlier.pipes.get(id)?.points ?? [];
    if (kind === 'node' && node !== undefined)
      return [{ key: `gone ${id}`, mark, candidates: aroundNode(node.at, size, zoom) }];
    return points.length === 0 ? [] : [{ key: `gone ${id}`, mark, candidates: alongPipe(points, size, zoom) }];
  });
}

function widthOf({ kind, way, text }: Pick<ComparisonMark, 'kind' | 'way' | 'text'>): number {
  const icons = Number(kind !== null) + Number(way !== null);
  return 2 * PAD - 2 + icons * ICON + text.length * LETTER;
}

interface Size {
  readonly width: number;
  readonly height: number;
}

function aroundNode(node: Position, { width, height }: Size, zoom: number): Box[] {
  const reach = NODE_REACH * symbolScale(zoom) * zoom;
  const [x, y] = [node.x * zoom, node.y * zoom];
  const lefts = [x - width / 2, x + reach, x - reach - width, x - width, x];
  const tops = [
    y + reach,
    y - reach - height,
    y - height / 2,
    ...[2, 3, 4].map((n) => y - reach - n * height),
    y + reach + height,
  ];
  return tops
    .flatMap((top) => lefts.map((left) => ({ x: left, y: top, width, height })))
    .filter(
      // not on the symbol itself
      (box) => box.x >= x + reach || box.x + width <= x - reach || box.y >= y + reach || box.y + height <= y - reach,
    );
}

function alongPipe(points: readonly Position[], { width, height }: Size, zoom: number): Box[] {
  return ALONG.flatMap((share) => {
    const { x, y } = pointAt(points, share);
    const [px, py] = [x * zoom, y * zoom];
    return [
      { x: px - width / 2, y: py - PIPE_GAP - height, width, height },
      { x: px - width / 2, y: py + PIPE_GAP, width, height },
      { x: px + PIPE_GAP, y: py - height / 2, width, height },
      { x: px - PIPE_GAP - width, y: py - height / 2, width, height },
    ];
  });
}

function at(value: number): string {
  return value.toFixed(1);
}
