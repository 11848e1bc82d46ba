import type { ReportContent } from '../report-content';
import { comparisonTables } from './comparison-tables';
import { coverTable } from './cover-table';
import { findingTable } from './finding-table';
import { inputTables } from './input-tables';
import { ledgerTables } from './ledger-tables';
import type { ReportTable } from './report-table';
import { resultTables } from './result-tables';
import { solvedCases } from './solved-cases';
import { tableSource } from './table-source';
import { toldWays } from './told-ways';

/** The whole report as tables, in the reader's units: what XLSX has as sheets and CSV as files. */
export function reportTables(content: ReportContent): ReportTable[] {
  const { file, outcomes, previous, reader, ledgersOf } = content;
  const source = tableSource(file, outcomes, reader.units);
  const inputs = inputTables(source);
  const cases = solvedCases(source);
  return [
    coverTable(content, source),
    ...inputs,
    ...resultTables(source, cases),
    findingTable(source),
    ...ledgerTables(source, toldWays(cases, ledgersOf)),
    ...(previous === undefined ? [] : compared(content, previous, { source, inputs, cases })),
  ];
}

function compared(
  { reader, file }: ReportContent,
  previous: NonNullable<ReportContent['previous']>,
  after: Parameters<typeof comparisonTables>[1],
): ReportTable[] {
  const own = tableSource(previous.file, previous.outcomes, reader.units);
  // old and new gauge pressures stand side by side, so both count from the present atmosphere
  const source = { ...own, units: { ...own.units, atmosphericPressurePa: file.site.atmosphericPressurePa } };
  return comparisonTables({ source, inputs: inputTables(source) }, after);
}
