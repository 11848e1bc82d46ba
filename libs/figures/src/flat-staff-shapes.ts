import { FLAT, flatStaff } from './flat-staff';
import { rectanglePath, type Shape } from './shapes';
import type { StaffModel, StaffPartKind } from './staff-model';

/** A staff lying down, as in lists: what fills it to the back pressure, the empty part that is the differential, limit and bands. */
export function flatStaffShapes(model: StaffModel, width: number, scaleMaximumPa?: number): readonly Shape[] {
  const staff = flatStaff(model, width, scaleMaximumPa);
  const { tubeTop: top, tubeHeight: height, bandY } = FLAT;
  const band = (from: number, to: number, thickness: number): Shape => ({
    kind: 'path',
    d: `M${from} ${bandY}H${to}`,
    stroke: 'copperLine',
    width: thickness,
  });
  return [
    {
      kind: 'path',
      d: rectanglePath(1, top, Math.max(0, staff.tubeWidth), height),
      fill: 'paper',
      stroke: 'ink',
      width: 0.6,
    },
    ...staff.parts.flatMap(({ kind, x, width: part }) => filling(kind, x, part)),
    { kind: 'path', d: `M${staff.backX} ${top - 3}v${height + 6}`, stroke: 'ink', width: 1.4 },
    ...(staff.limitX === null
      ? []
      : [{ kind: 'path', d: `M${staff.limitX - 3} 0.5h6l-3 4Z`, fill: 'ink2' } satisfies Shape]),
    ...(staff.spread === null ? [] : [band(staff.spread.from, staff.spread.to, 0.7)]),
    ...(staff.credible === null ? [] : [band(staff.credible.from, staff.credible.to, 2.2)]),
  ];
}

/** Each part has a hatching of its own, so that none is told by its colour alone. */
function filling(kind: StaffPartKind, x: number, width: number): Shape[] {
  const { tubeTop: top, tubeHeight: height } = FLAT;
  if (width <= 0) return [];
  const box = rectanglePath(x, top, width, height);
  switch (kind) {
    case 'receiver':
      return [{ kind: 'path', d: box, fill: 'p5' }];
    case 'lift':
      return [
        { kind: 'path', d: box, fill: 'paper', stroke: 'p5', width: 0.5 },
        { kind: 'path', d: `M${x} ${top + 2}h${width}M${x} ${top + 4}h${width}`, stroke: 'p5', width: 0.8 },
      ];
    case 'friction':
      return [{ kind: 'path', d: box, fill: 'ink2' }];
    case 'flash':
      return [
        { kind: 'path', d: box, fill: 'paper', stroke: 'p5', width: 0.5 },
        { kind: 'path', d: `M${x} ${top + 3}h${width}`, stroke: 'p5', width: 1.4, dash: [1.2, 1.2] },
      ];
  }
}
