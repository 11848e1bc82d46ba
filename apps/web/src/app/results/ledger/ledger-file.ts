import { saveFile } from '../../shared/save-file';
import { type LedgerModel, valueOf } from '@riseback/figures';

/** A cell of a spreadsheet: numbers as numbers, so that a column can be added up there. */
type Cell = string | number | undefined;

/** What the account is of, for the lines under the table. */
export interface LedgerFacts {
  readonly trapName: string;
  readonly endName: string;
  readonly openingWords: string;
  /** Title and text, one line each. */
  readonly notes: readonly (readonly [title: string, text: string])[];
}

/** The ledger as rows of a spreadsheet: as printed, so that its columns add up there as they do on paper. */
export function ledgerRows(ledger: LedgerModel, facts: LedgerFacts): readonly (readonly Cell[])[] {
  const { titles, rows, opening, closing } = ledger;
  return [
    [
      'No.',
      'Element',
      'Place',
      'Bore',
      titles.length,
      titles.rise,
      titles.rise.replace('Rise', 'Fall'),
      titles.flow,
      'Flash %',
      `Static ${titles.adds}`,
      `Friction ${titles.adds}`,
      `Flash ${titles.adds}`,
      `Running ${titles.running}`,
      `Hand check adds ${titles.adds}`,
      `Hand check running ${titles.running}`,
    ],
    [
      undefined,
      facts.endName,
      `Opening: ${facts.openingWords}`,
      ...nothing(9),
      number(opening),
      undefined,
      number(opening),
    ],
    ...rows.map((row): Cell[] => [
      row.no,
      row.element,
      row.place,
      row.bore,
      number(row.length),
      number(row.up),
      number(row.down),
      number(row.flow),
      number(row.flash),
      number(row.static),
      number(row.friction),
      number(row.flashSteam),
      number(row.running),
      number(row.handAdds),
      number(row.handRunning),
    ]),
    [
      undefined,
      facts.trapName,
      'Back pressure',
      undefined,
      number(closing.length),
      number(closing.up),
      number(closing.down),
      ...nothing(2),
      number(closing.static),
      number(closing.friction),
      number(closing.flashSteam),
      number(closing.running),
      number(closing.handAdds),
      number(closing.handRunning),
    ],
    ...facts.notes.map(([title, text]): Cell[] => [undefined, title, text]),
  ];
}

/** Saves the rows under a name; texts that a spreadsheet would take for formulas are made safe as in the lists. */
export async function saveRows(kind: 'csv' | 'xlsx', name: string, rows: readonly (readonly Cell[])[]): Promise<void> {
  if (kind === 'csv') {
    const { writeCsv } = await import('../../lists/exchange/block-text');
    saveFile(`${name}.csv`, new Blob([writeCsv(rows)], { type: 'text/csv;charset=utf-8' }));
    return;
  }
  const { writeXlsx, XLSX_TYPE } = await import('../../lists/exchange/xlsx-file');
  saveFile(`${name}.xlsx`, new Blob([writeXlsx('Ledger', rows)], { type: XLSX_TYPE }));
}

function number(printed: string): number | undefined {
  return /\d/.test(printed) ? valueOf(printed) : undefined;
}

function nothing(count: number): undefined[] {
  return Array.from({ length: count }, () => undefined);
}
