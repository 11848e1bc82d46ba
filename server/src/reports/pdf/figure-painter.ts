import type { PathShape, Shape, TextShape } from '@riseback/figures';
import { INKS } from './inks';
import type { Sheet } from './sheet';

/** Paints shapes about a place, in the order in which they come. */
export function paintShapes(sheet: Sheet, shapes: readonly Shape[], x: number, y: number, scale: number): void {
  const { doc } = sheet;
  doc.save().translate(x, y).scale(scale);
  for (const shape of shapes) paint(sheet, shape);
  doc.restore();
}

function paint(sheet: Sheet, shape: Shape): void {
  const { doc } = sheet;
  switch (shape.kind) {
    case 'path':
      paintPath(sheet, shape);
      return;
    case 'text':
      paintText(sheet, shape);
      return;
    case 'group':
      doc
        .save()
        .translate(shape.x, shape.y)
        .rotate(shape.turnDeg ?? 0)
        .scale(shape.scale);
      for (const inner of shape.shapes) paint(sheet, inner);
      doc.restore();
      return;
    case 'clipped':
      doc.save().rect(shape.x, shape.y, shape.width, shape.height).clip();
      for (const inner of shape.shapes) paint(sheet, inner);
      doc.restore();
  }
}

function paintPath({ doc }: Sheet, { d, stroke, fill, width = 1, dash, round = false }: PathShape): void {
  if (d === '') return;
  const end = round ? 'round' : 'butt';
  doc
    .path(d)
    .lineWidth(width)
    .lineJoin(round ? 'round' : 'miter')
    .lineCap(end);
  if (dash === undefined) doc.undash();
  else doc.dash(dash[0], { space: dash[1] });
  if (stroke !== undefined && fill !== undefined) doc.fillAndStroke(INKS[fill], INKS[stroke]);
  else if (stroke !== undefined) doc.stroke(INKS[stroke]);
  else doc.fill(INKS[fill ?? 'ink']);
}

function paintText(sheet: Sheet, { x, y, text, size, weight, ink, anchor, halo = false }: TextShape): void {
  const style = { size, weight, ink };
  const align = ({ start: 'left', middle: 'center', end: 'right' } as const)[anchor];
  if (halo) {
    const width = sheet.measure(text, style);
    const left = align === 'left' ? x : align === 'right' ? x - width : x - width / 2;
    sheet.fill(`M${left - 1} ${y - 0.8 * size}h${width + 2}v${size}h${-width - 2}Z`, 'paper');
  }
  sheet.print(text, x, y, style, align);
}
