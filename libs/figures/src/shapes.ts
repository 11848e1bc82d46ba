/** Colours by what they say; whoever paints knows what they are on screen or paper. */
export type Ink =
  | 'ink'
  | 'ink2'
  | 'ink3'
  | 'rule'
  | 'ruleStrong'
  | 'paper'
  | 'ground'
  | 'copper'
  | 'copperLine'
  | 'copperWash'
  | 'fail'
  | 'watch'
  | 'pass'
  | 'water'
  | `p${1 | 2 | 3 | 4 | 5 | 6 | 7}`;

/** A line or an area; `d` is SVG path data. */
export interface PathShape {
  readonly kind: 'path';
  readonly d: string;
  readonly stroke?: Ink;
  readonly fill?: Ink;
  /** Of the stroke. */
  readonly width?: number;
  readonly dash?: readonly [on: number, off: number];
  readonly round?: boolean;
}

/** One line of text; `y` is its baseline. */
export interface TextShape {
  readonly kind: 'text';
  readonly x: number;
  readonly y: number;
  readonly text: string;
  readonly size: number;
  readonly weight: 400 | 500 | 600;
  readonly ink: Ink;
  readonly anchor: 'start' | 'middle' | 'end';
  /** A rim of paper under the letters, so that they read on lines. */
  readonly halo?: boolean;
}

/** Shapes about an origin of their own. */
export interface GroupShape {
  readonly kind: 'group';
  readonly x: number;
  readonly y: number;
  readonly scale: number;
  readonly turnDeg?: number;
  readonly shapes: readonly Shape[];
}

/** Shapes of which only what lies within a rectangle is seen. */
export interface ClippedShape {
  readonly kind: 'clipped';
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
  readonly shapes: readonly Shape[];
}

/** What a figure is made of, in the order in which it is painted. */
export type Shape = PathShape | TextShape | GroupShape | ClippedShape;

export function circlePath(radius: number, x = 0, y = 0): string {
  const diameter = 2 * radius;
  return `M${x - radius} ${y}a${radius} ${radius} 0 1 0 ${diameter} 0a${radius} ${radius} 0 1 0 ${-diameter} 0Z`;
}

export function rectanglePath(x: number, y: number, width: number, height: number, corner = 0): string {
  if (corner === 0) return `M${x} ${y}h${width}v${height}h${-width}Z`;
  const [w, h, c] = [width - 2 * corner, height - 2 * corner, corner];
  const arc = (dx: number, dy: number) => `a${c} ${c} 0 0 1 ${dx} ${dy}`;
  return `M${x + c} ${y}h${w}${arc(c, c)}v${h}${arc(-c, c)}h${-w}${arc(-c, -c)}v${-h}${arc(c, -c)}Z`;
}
