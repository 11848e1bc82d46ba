import type { CaseOutcome, SolveResult } from '@riseback/contracts';
import { colourScale, networkDrawing, type Shape, verdictShapes } from '@riseback/figures';
import { fromFile } from '@riseback/network';
import { displayUnit, toDisplay } from '@riseback/units';
import { caseNameOf, type TableSource } from '../exports/table-source';
import { paintShapes } from './figure-painter';
import type { Sheet } from './sheet';

const LEGEND = 22;

/** The network as it is drawn, with the pressures of its first solved case. */
export function drawingPage(sheet: Sheet, source: TableSource): void {
  const { file, outcomes, units } = source;
  const solved = outcomes.find(isSolved);
  const caseName = solved === undefined ? undefined : caseNameOf(source, solved.caseId);
  sheet.begin('Drawing', caseName === undefined ? 'Drawing, not solved' : `Drawing, case ${caseName}`);
  const scale = colourScale('pressure', outcomes, units);
  const operatingCase = file.cases.find(({ id }) => id === solved?.caseId);
  const isolated = new Set(
    operatingCase?.overrides.filter(({ state }) => state === 'isolated').map(({ node }) => node) ?? [],
  );
  const room = { width: sheet.width, height: sheet.room - LEGEND };
  const drawing = networkDrawing({ ...room, document: fromFile(file), result: solved?.result, isolated, scale, units });
  const x = sheet.left + (sheet.width - drawing.width) / 2;
  const y = sheet.y + LEGEND;
  const left =
    drawing.labelsLeftOut === 0
      ? ''
      : `Labels that found no room: ${String(drawing.labelsLeftOut)}; the lists have them all.`;
  sheet.tagged('P', () => {
    legend(
      sheet,
      scale.limits.map((limit) => toDisplay(limit, 'pressure', units)),
      scale.decimals,
    );
    const words = `Back pressure, ${displayUnit('pressure', units.system)}`;
    sheet.print(words, sheet.left, sheet.y + 6, { size: 7.4, weight: 600 });
    if (left !== '') sheet.print(left, sheet.right, sheet.y + 6, { size: 7, ink: 'ink2' }, 'right');
  });
  const names = file.nodes.length + file.pipes.length;
  const words = `Drawing of the network: ${String(names)} elements, pipes washed by pressure, each trap with its back pressure. The tables of results hold the same numbers.`;
  sheet.figure(drawing.shapes, { x, y }, words, { x, y, width: drawing.width, height: drawing.height });
  sheet.y = y + drawing.height;
}

function isSolved(outcome: CaseOutcome): outcome is { caseId: string; status: 'solved'; result: SolveResult } {
  return outcome.status === 'solved' && outcome.result.converged;
}

function legend(sheet: Sheet, limits: readonly number[], decimals: number): void {
  const [x, y, step] = [sheet.left + 92, sheet.y + 1, 34];
  const shapes: Shape[] = ([1, 2, 3, 4, 5, 6, 7] as const).flatMap((level, i): Shape[] => [
    { kind: 'path', d: `M${i * step} 2.5h${step}`, stroke: `p${level}`, width: 5 },
    { kind: 'path', d: `M${i * step} 2.5h${step}`, stroke: level >= 5 ? 'paper' : 'ink', width: 0.9 },
  ]);
  const numbers = limits.map((limit, i): Shape => ({
    kind: 'text',
    x: i * step,
    y: 13,
    text: limit
      .toLocaleString('en', { minimumFractionDigits: decimals, maximumFractionDigits: decimals })
      .replace('-', '−'),
    size: 6.6,
    weight: 400,
    ink: 'ink2',
    anchor: 'middle',
  }));
  paintShapes(sheet, [...shapes, ...numbers], x, y, 1);
  const after = x + 7 * step + 26;
  for (const [i, [verdict, word]] of (
    [
      ['fail', 'Fail'],
      ['watch', 'Watch'],
    ] as const
  ).entries()) {
    paintShapes(sheet, verdictShapes(verdict), after + i * 48, y + 3.5, 0.7);
    sheet.print(word, after + 8 + i * 48, y + 6, { size: 7.4, ink: verdict });
  }
}
