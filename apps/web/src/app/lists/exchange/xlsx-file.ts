import { guarded } from '@riseback/contracts';
import { strToU8 } from 'fflate';
import { type CellValue, readSheet } from 'read-excel-file/universal';
import { blockOf, type ReadBlock, type SheetCell } from './block-text';
import { readZip, writeZip, ZipRefused } from './zip-archive';

/**
 * Reads the first sheet of a workbook. The archive is unpacked here, within limits, and handed on unpacked: the reader's own unpacking
 * would start workers out of texts, which the page's security policy forbids (docs/decisions/0080).
 */
export async function readXlsx(file: ArrayBuffer): Promise<ReadBlock> {
  try {
    const entries = readZip(new Uint8Array(file), (name) => name.endsWith('.xml') || name.endsWith('.rels'));
    if (!('xl/workbook.xml' in entries)) return notRead('It is a zip archive, but no spreadsheet is in it.');
    const rows = await readSheet(writeZip(entries, 0).buffer);
    return blockOf(rows.map((cells) => cells.map(textOf)));
  } catch (error) {
    return notRead(
      error instanceof ZipRefused
        ? error.message
        : 'Its sheet cannot be read. Open it in a spreadsheet and save it once more, as .xlsx or as CSV.',
    );
  }
}

export const XLSX_TYPE = 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet';

/** One sheet: headings in bold that stay in sight, texts as texts, numbers as numbers. */
export function writeXlsx(name: string, rows: readonly (readonly SheetCell[])[]): Uint8Array<ArrayBuffer> {
  const parts: Readonly<Record<string, string>> = {
    '[Content_Types].xml': CONTENT_TYPES,
    '_rels/.rels': relations([['officeDocument', 'xl/workbook.xml']]),
    'xl/workbook.xml': `${XML}<workbook xmlns="${MAIN}" xmlns:r="${DOCUMENT_RELATIONS}"><sheets><sheet name="${escaped(sheetName(name))}" sheetId="1" r:id="rId1"/></sheets></workbook>`,
    'xl/_rels/workbook.xml.rels': relations([
      ['worksheet', 'worksheets/sheet1.xml'],
      ['styles', 'styles.xml'],
    ]),
    'xl/styles.xml': STYLES,
    'xl/worksheets/sheet1.xml': sheetXml(rows),
  };
  return writeZip(Object.fromEntries(Object.entries(parts).map(([path, text]) => [path, strToU8(text)])));
}

function notRead(detail: string): ReadBlock {
  return { ok: false, title: 'The file cannot be read', detail };
}

function textOf(value: CellValue | null): string {
  if (value === null) return '';
  // a spreadsheet's dates have no time zone; the reader gives them at midnight UTC
  if (value instanceof Date) return value.toISOString().slice(0, 10);
  return String(value);
}

// ECMA-376 (Office Open XML), part 1: the fewest parts that make a workbook
const XML = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n';
const SCHEMAS = 'http://schemas.openxmlformats.org';
const MAIN = `${SCHEMAS}/spreadsheetml/2006/main`;
const DOCUMENT_RELATIONS = `${SCHEMAS}/officeDocument/2006/relationships`;
const TYPE = 'application/vnd.openxmlformats-officedocument.spreadsheetml';

const CONTENT_TYPES = `${XML}<Types xmlns="${SCHEMAS}/package/2006/content-types"><Default Extension="rels" ContentType="application/vnd.openxmlformats-package.relationships+xml"/><Default Extension="xml" ContentType="application/xml"/><Override PartName="/xl/workbook.xml" ContentType="${TYPE}.sheet.main+xml"/><Override PartName="/xl/worksheets/sheet1.xml" ContentType="${TYPE}.worksheet+xml"/><Override PartName="/xl/styles.xml" ContentType="${TYPE}.styles+xml"/></Types>`;

const STYLES = `${XML}<styleSheet xmlns="${MAIN}"><fonts count="2"><font/><font><b/></font></fonts><fills count="2"><fill><patternFill patternType="none"/></fill><fill><patternFill patternType="gray125"/></fill></fills><borders count="1"><border/></borders><cellStyleXfs count="1"><xf/></cellStyleXfs><cellXfs count="2"><xf xfId="0"/><xf xfId="0" fontId="1" applyFont="1"/></cellXfs></styleSheet>`;

const BOLD = 1;
const COLUMN_WIDTH = 14;

function relations(targets: readonly (readonly [type: string, target: string])[]): string {
  const each = targets.map(
    ([type, target], index) =>
      `<Relationship Id="rId${String(index + 1)}" Type="${DOCUMENT_RELATIONS}/${type}" Target="${target}"/>`,
  );
  return `${XML}<Relationships xmlns="${SCHEMAS}/package/2006/relationships">${each.join('')}</Relationships>`;
}

function sheetXml(rows: readonly (readonly SheetCell[])[]): string {
  const width = Math.max(1, ...rows.map(({ length }) => length));
  const lines = rows.map((cells, row) => {
    const written = cells.map((cell, column) => cellXml(cell, `${columnName(column)}${String(row + 1)}`, row === 0));
    return `<row r="${String(row + 1)}">${written.join('')}</row>`;
  });
  return `${XML}<worksheet xmlns="${MAIN}"><sheetViews><sheetView workbookViewId="0"><pane xSplit="1" ySplit="1" topLeftCell="B2" activePane="bottomRight" state="frozen"/></sheetView></sheetViews><cols><col min="1" max="${String(width)}" width="${String(COLUMN_WIDTH)}" customWidth="1"/></cols><sheetData>${lines.join('')}</sheetData></worksheet>`;
}

function cellXml(cell: SheetCell, reference: string, heading: boolean): string {
  const style = heading ? ` s="${String(BOLD)}"` : '';
  if (cell === undefined || cell === '') return '';
  if (typeof cell === 'number') return `<c r="${reference}"${style}><v>${String(cell)}</v></c>`;
  return `<c r="${reference}"${style} t="inlineStr"><is><t xml:space="preserve">${escaped(guarded(cell))}</t></is></c>`;
}

/** A, B … Z, AA, AB … */
function columnName(index: number): string {
  const letter = String.fromCharCode(65 + (index % 26));
  return index < 26 ? letter : columnName(Math.floor(index / 26) - 1) + letter;
}

/** Without what XML 1.0 cannot hold; a carriage return would be read as a line feed. */
function escaped(text: string): string {
  return text
    .replace(NOT_XML, '')
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll('\r', '&#13;');
}

const NOT_XML =
  /[\u0000-\u0008\u000B\u000C\u000E-\u001F\uFFFE\uFFFF]|[\uD800-\uDBFF](?![\uDC00-\uDFFF])|(?<![\uD800-\uDBFF])[\uDC00-\uDFFF]/g;

/** Spreadsheets allow 31 characters without these marks. */
function sheetName(name: string): string {
  return (
    name
      .replace(/[\\/?*[\]:]/g, ' ')
      .slice(0, 31)
      .trim() || 'List'
  );
}
