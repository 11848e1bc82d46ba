import type { Sheet, TextStyle } from './sheet';

/** A stretch of a formula and where it stands: on the line, below or above it. */
export interface FormulaPiece {
  readonly text: string;
  readonly place: 'line' | 'below' | 'above';
}

const RAISED = { line: 0, below: 0.22, above: -0.36 } as const;
const SMALLER = 0.72;

/** `x_l` and `x^2` with what follows the sign below or above the line; what stands in brackets after it belongs together. */
export function formulaPieces(formula: string): FormulaPiece[] {
  const pieces: FormulaPiece[] = [];
  let rest = formula.replaceAll('"', '');
  while (rest !== '') {
    const sign = /[_^]/u.exec(rest);
    if (sign === null) return [...pieces, { text: rest, place: 'line' }];
    if (sign.index > 0) pieces.push({ text: rest.slice(0, sign.index), place: 'line' });
    const place = sign[0] === '_' ? 'below' : 'above';
    const after = rest.slice(sign.index + 1);
    const text = after.startsWith('(') ? bracket(after) : (/^-?[\p{L}\p{N}.]+/u.exec(after)?.[0] ?? after.slice(0, 1));
    pieces.push({ text: text.startsWith('(') ? text.slice(1, -1) : text, place });
    rest = after.slice(Math.max(1, text.length));
  }
  return pieces;
}

/** From an opening bracket to the one that closes it. */
function bracket(text: string): string {
  let depth = 0;
  for (const [i, sign] of Array.from(text).entries()) {
    if (sign === '(') depth += 1;
    if (sign === ')') depth -= 1;
    if (depth === 0)
      return Array.from(text)
        .slice(0, i + 1)
        .join('');
  }
  return text;
}

/** One formula on its baseline; what is too wide for the line is set smaller. */
export function printFormula(
  sheet: Sheet,
  formula: string,
  x: number,
  baseline: number,
  style: TextStyle,
  room: number,
): void {
  const pieces = formulaPieces(formula);
  const sized = (size: number, { place }: FormulaPiece): TextStyle => ({
    ...style,
    size: place === 'line' ? size : size * SMALLER,
  });
  const width = (size: number) => pieces.reduce((sum, piece) => sum + sheet.measure(piece.text, sized(size, piece)), 0);
  const size = style.size * Math.min(1, room / width(style.size));
  let at = x;
  for (const piece of pieces) {
    sheet.print(piece.text, at, baseline + RAISED[piece.place] * size, sized(size, piece));
    at += sheet.measure(piece.text, sized(size, piece));
  }
}
