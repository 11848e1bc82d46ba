import { setImmediate as nextTurn } from 'node:timers/promises';
import { comparisonTables } from '../exports/comparison-tables';
import { findingTable } from '../exports/finding-table';
import { inputTables } from '../exports/input-tables';
import { reportStanding } from '../exports/report-standing';
import type { ReportTable } from '../exports/report-table';
import { resultTables } from '../exports/result-tables';
import { solvedCases } from '../exports/solved-cases';
import { tableSource } from '../exports/table-source';
import { toldWays } from '../exports/told-ways';
import type { PreviousRevision, ReportContent, ReportProgress } from '../report-content';
import { byCase } from './case-tables';
import { coverPage } from './cover-page';
import { drawingPage } from './drawing-page';
import { ledgerPages } from './ledger-pages';
import { methodPages } from './method-pages';
import { furnish } from './page-furniture';
import { scopePages } from './scope-pages';
import { sharedRows } from './shared-rows';
import { Sheet } from './sheet';
import { cellText } from './table-columns';
import { tablePages } from './table-pages';

/** The calculation report as a PDF, in the order in which it is read. */
export async function makePdf(content: ReportContent, progress: ReportProgress, signal: AbortSignal): Promise<Buffer> {
  const source = tableSource(content.file, content.outcomes, content.reader.units);
  const standing = reportStanding(content);
  const cases = solvedCases(source);
  const inputs = inputTables(source);
  const sheet = new Sheet({
    paper: content.paper,
    title: `${content.networkName}: calculation report, ${standing.words}`,
    author: content.reader.name,
    madeAt: new Date(content.madeAt),
  });
  const { previous } = content;
  const sections: readonly (readonly [doing: string, print: () => void])[] = [
    ['Setting the cover', () => coverPage(sheet, content, standing, source)],
    ['Setting scope and cautions', () => scopePages(sheet, content)],
    ['Drawing the network', () => drawingPage(sheet, source)],
    ['Setting the inputs', () => inputPages(sheet, inputs)],
    ['Setting the method', () => methodPages(sheet, content.file.method)],
    ['Setting the results', () => resultPages(sheet, resultTables(source, cases))],
    ['Setting the ledgers', () => ledgerPages(sheet, source, toldWays(cases, content.ledgersOf))],
    ['Setting the findings', () => findingPages(sheet, findingTable(source))],
    ...(previous === undefined
      ? []
      : [['Comparing', () => comparisonPages(sheet, content, previous, { source, inputs, cases })] as const]),
  ];
  for (const [index, [doing, print]] of sections.entries()) {
    progress(0.05 + (0.85 * index) / sections.length, doing);
    // so that what was told gets out before the next long piece of work
    await nextTurn();
    signal.throwIfAborted();
    print();
  }
  progress(0.92, 'Closing the file');
  await nextTurn();
  return sheet.finish((page) => furnish(sheet, content, standing, page));
}

function inputPages(sheet: Sheet, tables: readonly ReportTable[]): void {
  sheet.begin('Inputs');
  for (const table of tables) tablePages(sheet, table, { title: table.name, kept: ['Tag', 'Inlet', 'Load', 'Length'] });
}

function resultPages(sheet: Sheet, tables: readonly ReportTable[]): void {
  sheet.begin('Results');
  for (const table of byCase(tables)) {
    const kept = ['Tag', 'Back', 'Differential', 'Verdict', 'Static', 'Friction', 'Flash', 'Flow', 'Liquid', 'Mixture'];
    tablePages(sheet, table, { title: table.name, kept });
  }
}

function findingPages(sheet: Sheet, table: ReportTable): void {
  sheet.begin('Findings');
  const note = 'What was found and what would mend it; the same thing stands once, with its elements and cases.';
  const kept = ['Verdict', 'Element', 'Check'];
  tablePages(sheet, sharedRows(table, 'Element', ['Id']), {
    title: 'Findings',
    note,
    kept,
    narrow: ['Element', 'Check', 'Cases'],
    none: 'Nothing was found that fails or is to be watched.',
  });
}

function comparisonPages(
  sheet: Sheet,
  { reader, file }: ReportContent,
  { letter, title, file: before, outcomes }: PreviousRevision,
  after: Parameters<typeof comparisonTables>[1],
): void {
  sheet.begin('Comparison', `Comparison with revision ${letter}`);
  sheet.paragraph(
    `What changed since revision ${letter}, ${title}: the inputs, and what that did to the results, the greatest effect first.`,
  );
  const own = tableSource(before, outcomes, reader.units);
  // old and new gauge pressures stand side by side, so both count from the present atmosphere
  const source = { ...own, units: { ...own.units, atmosphericPressurePa: file.site.atmosphericPressurePa } };
  for (const table of comparisonTables({ source, inputs: inputTables(source) }, after)) {
    const changed = { ...table, rows: table.rows.filter((row) => isChanged(table, row)) };
    tablePages(sheet, changed, { title: table.name, kept: ['Trap', 'Case', 'Change'], none: 'Nothing.' });
  }
}

/** Whether anything that is printed of a row differs before and after; a list of what changed holds no other rows. */
function isChanged({ columns }: ReportTable, row: ReportTable['rows'][number]): boolean {
  const text = (title: string) => cellText(row[columns.findIndex((column) => column.title === title)]);
  if (!columns.some(({ title }) => title === 'Back before')) return true;
  return text('Back before') !== text('Back after') || text('Verdict before') !== text('Verdict after');
}
