import { METHOD_GROUPS, type MethodSection, SUBSCRIPTS, SYMBOLS } from '@riseback/methods';
import type { Method } from '@riseback/network';
import { printFormula } from './formula-line';
import type { Sheet, TextStyle } from './sheet';
import { tableInText } from './table-pages';

const TEXT: TextStyle = { size: 8 };
const SMALL: TextStyle = { size: 7.4, ink: 'ink2' };
const FORMULA: TextStyle = { size: 8.4, weight: 500 };
const INDENT = 12;

/** How the numbers were made: the sections of the methods that this network takes, with their equations, limits and sources. */
export function methodPages(sheet: Sheet, method: Method): void {
  sheet.begin('Method');
  sheet.paragraph(
    'The equations behind the numbers, where each holds, what it does not know, and where it is from. Of methods that a network chooses among, the one that this network takes; the bands take the others too.',
    TEXT,
  );
  sheet.inColumns(2, () => {
    letters(sheet);
    for (const { title, sections } of METHOD_GROUPS) {
      const taken = sections.filter((section) => isTaken(section, method));
      taken.forEach((section, i) => sectionPart(sheet, section, i === 0 ? title : undefined));
    }
  });
}

function isTaken({ choice }: MethodSection, method: Method): boolean {
  return choice === undefined || method[choice.key] === choice.value;
}

function letters(sheet: Sheet): void {
  const words = (list: readonly (readonly [string, string])[]) =>
    list.map(([symbol, meaning]) => `${symbol} ${meaning}`).join('; ');
  sheet.paragraph(`Letters: ${words(SYMBOLS)}.`, SMALL, { gap: 2 });
  sheet.paragraph(`Below a letter: ${words(SUBSCRIPTS)}.`, SMALL);
}

function sectionPart(sheet: Sheet, section: MethodSection, group: string | undefined): void {
  const { title, summary, equations = [], symbols = [], table, notes = [], range, limits, sources, warning } = section;
  if (group !== undefined) sheet.heading(group, 90);
  sheet.ensure(64);
  sheet.tagged('H3', () => sheet.print(title, sheet.left, sheet.y + 9, { size: 8.8, weight: 600, ink: 'copper' }));
  sheet.y += 13;
  const box = { indent: INDENT, gap: 2 };
  sheet.paragraph(plain(summary), TEXT, box);
  for (const equation of equations) formula(sheet, equation);
  if (symbols.length > 0) {
    const words = symbols.map(([symbol, meaning]) => `${symbol} ${plain(meaning)}`).join('; ');
    sheet.paragraph(`with ${words}`, SMALL, { ...box, indent: 2 * INDENT });
  }
  if (table !== undefined) {
    const rows = table.rows.map((row) => row.map(plain));
    tableInText(sheet, table.head, rows);
  }
  for (const note of [...notes, ...(warning === undefined ? [] : [warning])]) sheet.paragraph(plain(note), SMALL, box);
  sheet.paragraph(`Holds: ${plain(range)}`, SMALL, box);
  if (limits.length > 0) sheet.paragraph(`Limits: ${limits.map(plain).join(' ')}`, SMALL, box);
  const from = sources.length === 0 ? 'beside each limit, in the list of limits' : sources.map(plain).join('; ');
  sheet.paragraph(`Sources: ${from}.`, { ...SMALL, ink: 'ink3' }, { ...box, gap: 6 });
}

function formula(sheet: Sheet, equation: string): void {
  const height = 15;
  sheet.ensure(height);
  const room = sheet.width - 2 * INDENT;
  const [x, baseline] = [sheet.left + 2 * INDENT, sheet.y + 10];
  sheet.tagged('Formula', () => printFormula(sheet, equation, x, baseline, FORMULA, room), { alt: equation });
  sheet.y += height;
}

/** Without the marks that set formulas apart on the screen. */
function plain(text: string): string {
  return text.replaceAll('`', '');
}
