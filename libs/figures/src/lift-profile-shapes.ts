import { type DisplayUnits, displayUnit, formatQuantity } from '@riseback/units';
import type { BackPressureLimit } from './back-pressure-limit';
import { type BandMark, PROFILE, profileFigure, type ProfileInput } from './profile-figure';
import { circlePath, type Ink, rectanglePath, type Shape, type TextShape } from './shapes';

export interface LiftProfileInput extends Omit<ProfileInput, 'limitPa'> {
  readonly limit: BackPressureLimit | null;
  readonly exceeded: boolean;
  readonly trapName: string;
  readonly endName: string;
}

type TextLook = Pick<TextShape, 'size' | 'weight' | 'ink' | 'anchor'>;

const LOOKS = {
  title: { size: 11, weight: 600, ink: 'ink', anchor: 'start' },
  note: { size: 11, weight: 400, ink: 'ink3', anchor: 'start' },
  axis: { size: 11, weight: 400, ink: 'ink3', anchor: 'end' },
  distance: { size: 11, weight: 400, ink: 'ink3', anchor: 'middle' },
  number: { size: 11, weight: 600, ink: 'ink', anchor: 'middle' },
  size: { size: 10, weight: 400, ink: 'ink3', anchor: 'middle' },
  lift: { size: 11, weight: 600, ink: 'ink', anchor: 'middle' },
  gauge: { size: 10.5, weight: 400, ink: 'ink2', anchor: 'middle' },
} as const satisfies Record<string, TextLook>;

/** A lift profile on paper: the same figure as on the screen, with its bands under the line and without what only a pointer asks for. */
export function liftProfileShapes(input: LiftProfileInput): readonly Shape[] {
  const { units, limit } = input;
  const figure = profileFigure({ ...input, limitPa: limit?.pressurePa });
  const { right } = figure;
  const { left, pressureTop, pressureBottom, numbers, sizes, elevationTop, elevationBottom } = PROFILE;
  const path = (d: string, stroke: Ink, width: number, dash?: readonly [number, number]): Shape => ({
    kind: 'path',
    d,
    stroke,
    width,
    ...(dash === undefined ? {} : { dash }),
  });
  const text = (x: number, y: number, words: string, look: TextLook, halo = false): Shape => ({
    kind: 'text',
    x,
    y,
    text: words,
    halo,
    ...look,
  });
  const grid = (at: number) => path(`M${left} ${at}H${right}`, 'rule', 0.7);
  const ticks = (list: readonly { at: number; text: string }[]): Shape[] =>
    list.flatMap(({ at, text: words }) => [grid(at), text(left - 8, at + 4, words, LOOKS.axis)]);
  const pressureAt = (index: number) => pressureText(input.points.at(index)?.pressurePa, units);

  return [
    text(0, 11, `Pressure, ${displayUnit('pressure', units.system)}`, LOOKS.title),
    path(`M${right - 74} 7h46m-7 -3.5l7 3.5l-7 3.5`, 'ink3', 1),
    text(right - 22, 11, 'flow', LOOKS.note),
    ...figure.lifts.map((lift): Shape => ({
      kind: 'path',
      d: rectanglePath(lift.x, 14, lift.width, elevationBottom - 14),
      fill: 'ground',
    })),
    ...ticks(figure.pressureTicks),
    ...bandsAlong(figure.bands, right),
    ...(figure.spread === null ? [] : [path(whisker(figure.spread), 'copperLine', 1)]),
    ...(figure.credible === null
      ? []
      : [
          {
            kind: 'path',
            fill: 'copperWash',
            stroke: 'copperLine',
            width: 1,
            d: rectanglePath(left - 4, figure.credible.top, 8, figure.credible.bottom - figure.credible.top),
          } as const,
        ]),
    ...figure.washes.map(({ path: d, pressureClass }) => path(d, `p${pressureClass}`, 8)),
    ...figure.washes.map(({ path: d, paperCore }) => path(d, paperCore ? 'paper' : 'ink', 1.4)),
    ...limitMark(figure.limit, input),
    text(
      left + 6,
      figure.start.pressureY - 9,
      `${pressureAt(0)} at ${input.trapName}`,
      { ...LOOKS.title, size: 12 },
      true,
    ),
    text(right + 8, figure.end.pressureY + 2, pressureAt(-1), { ...LOOKS.title, size: 12 }),
    text(right + 8, figure.end.pressureY + 16, `in ${input.endName}`, LOOKS.note),

    path(`M${left} ${numbers}H${right}`, 'ruleStrong', 0.7),
    ...figure.joints.flatMap(({ x, elevationY }) => [
      path(`M${x} ${numbers - 4}v8`, 'ink', 1),
      path(`M${x} ${elevationY}V${elevationBottom}`, 'ruleStrong', 0.5),
    ]),
    ...figure.pipeNumbers.map(({ x, text: words }) => text(x, numbers + 4, words, LOOKS.number, true)),
    ...figure.sizes.map(({ x, text: words }) => text(x, sizes, words, LOOKS.size)),

    text(0, elevationTop - 10, `Elevation, ${displayUnit('length', units.system)}`, LOOKS.title),
    ...ticks(figure.elevationTicks),
    { kind: 'path', d: figure.elevationFill, fill: 'ground' },
    path(figure.elevationLine, 'ink', 1.8),
    ...figure.lifts.map(({ labelX, text: words }) => text(labelX, elevationBottom - 10, words, LOOKS.lift)),
    text(right + 8, figure.end.elevationY + 4, input.endName, LOOKS.note),
    ...figure.distanceTicks.flatMap(({ at, text: words }) => [
      path(`M${at} ${elevationBottom}v4`, 'ink', 1),
      text(at, elevationBottom + 17, words, LOOKS.distance),
    ]),
    text(right + 16, elevationBottom + 17, `${displayUnit('length', units.system)} of way`, LOOKS.note),
    ...figure.gauges.flatMap(({ x, elevationY, dialY, pressureY, silent, beside, tag }): Shape[] => [
      path(`M${x} ${elevationY}V${dialY}`, 'ink2', 1),
      { kind: 'path', d: circlePath(5, x, dialY), fill: 'paper', stroke: 'ink', width: 1.2 },
      path(`M${x} ${dialY}l2.6 -2.6`, 'ink', 1),
      { kind: 'path', d: circlePath(3, x, pressureY), fill: 'paper', stroke: 'ink', width: 1.2 },
      ...(silent
        ? []
        : [
            text(beside ? x - 9 : x, beside ? dialY + 12 : dialY - 8, tag, {
              ...LOOKS.gauge,
              anchor: beside ? 'end' : 'middle',
            }),
          ]),
    ]),
  ];

  function bandsAlong(bands: typeof figure.bands, end: number): Shape[] {
    if (bands === null) return [];
    const plot = { x: left, y: pressureTop, width: end - left, height: pressureBottom - pressureTop };
    const shapes: Shape[] = [
      path(bands.spread.edges, 'copperLine', 0.8, [3, 3]),
      { kind: 'path', d: bands.credible.fill, fill: 'copperWash' },
      path(bands.credible.edges, 'copperLine', 1),
    ];
    return [{ kind: 'clipped', ...plot, shapes }];
  }
}

/** A line with a cap at each end that lies within the plot. */
function whisker({ top, bottom, capped }: BandMark): string {
  const cap = (y: number) => `M${PROFILE.left - 5} ${y}h10`;
  return `M${PROFILE.left} ${top}V${bottom}${capped.top ? cap(top) : ''}${capped.bottom ? cap(bottom) : ''}`;
}

function limitMark(
  line: ReturnType<typeof profileFigure>['limit'],
  { limit, exceeded, units }: LiftProfileInput,
): Shape[] {
  if (line === null || limit === null) return [];
  const ink = exceeded ? 'fail' : 'ink2';
  const words = `Limit ${pressureText(limit.pressurePa, units)}, ${limit.word}`;
  const { left } = PROFILE;
  return [
    { kind: 'path', d: `M${left} ${line.y}h100`, stroke: ink, width: 1.4, dash: [4, 3] },
    {
      kind: 'text',
      x: left + 6,
      y: line.labelY,
      text: words,
      halo: true,
      size: 11,
      weight: 500,
      ink,
      anchor: 'start',
    },
  ];
}

function pressureText(pa: number | undefined, units: DisplayUnits): string {
  return pa === undefined ? '' : formatQuantity(pa, 'pressure', units);
}
