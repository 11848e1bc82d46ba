import type { RevisionState } from '@riseback/contracts';
import { countVerdicts, verdictShapes } from '@riseback/figures';
import type { ReportStanding } from '../exports/report-standing';
import { caseNameOf, type TableSource } from '../exports/table-source';
import { unsolvedWords } from '../exports/solved-cases';
import type { FrozenState, ReportContent } from '../report-content';
import { CAUTIONS } from './caution-words';
import { paintShapes } from './figure-painter';
import type { Sheet, TextStyle } from './sheet';
import { timeWords } from './time-words';
import { worstTraps } from './worst-traps';

type Facts = readonly (readonly [title: string, text: string])[];

const LABEL: TextStyle = { size: 7.4, ink: 'ink3' };
const VALUE: TextStyle = { size: 9 };
const STATES: Readonly<Record<RevisionState, string>> = {
  draft: 'Frozen',
  underReview: 'Issued for review',
  returned: 'Returned',
  approved: 'Approved',
  superseded: 'Superseded',
  withdrawn: 'Withdrawn',
};
const STEP: TextStyle = { size: 8.2 };
const STEP_LINE = 11;
const GAP = 28;

/** What the report is of, how it stands, who made and signed it, what came out in short. */
export function coverPage(sheet: Sheet, content: ReportContent, standing: ReportStanding, source: TableSource): void {
  sheet.begin('Cover', 'Calculation report');
  const { left, right, width } = sheet;
  sheet.y += 10;
  const name = { size: 25, weight: 600 } as const;
  for (const line of sheet.lines(content.networkName, width, name).slice(0, 2)) {
    sheet.tagged('P', () => sheet.print(line, left, sheet.y + 22, name));
    sheet.y += 30;
  }
  const under = `${content.siteName}: back pressure in the steam-condensate return`;
  sheet.paragraph(sheet.fitted(under, width, { size: 11 }), { size: 11, ink: 'ink2' }, { gap: 12 });
  banner(sheet, standing);

  const [first, second] = [0.5 * (width - GAP), 0.5 * (width - GAP)];
  const top = sheet.y;
  facts(sheet, 'What it is of', stateFacts(content), left, first);
  if (content.state.kind === 'revision') people(sheet, content.state, content.reader.timeZone, left, first);
  const leftEnd = sheet.y;
  sheet.y = top;
  results(sheet, content, source, right - second, second);
  facts(sheet, 'What seals it', sealFacts(content), right - second, second);
  sheet.y = Math.max(leftEnd, sheet.y) + 4;
  worstTraps(sheet, source);
  for (const caution of CAUTIONS) sheet.paragraph(caution, { size: 8, ink: 'ink2' }, { gap: 2 });
}

function banner(sheet: Sheet, { words, provisional }: ReportStanding): void {
  const style: TextStyle = { size: 10, weight: 600, ink: provisional ? 'fail' : 'pass' };
  const lines = sheet.lines(words, sheet.width - 34, style);
  const height = 12 + lines.length * 14;
  const { left, right, y } = sheet;
  sheet.decoration(() => {
    sheet.fill(`M${left} ${y}H${right}V${y + height}H${left}Z`, 'ground');
    sheet.fill(`M${left} ${y}h3v${height}h-3Z`, provisional ? 'fail' : 'pass');
    paintShapes(sheet, verdictShapes(provisional ? 'watch' : 'pass'), left + 15, y + 13, 0.9);
  });
  lines.forEach((line, i) => sheet.tagged('P', () => sheet.print(line, left + 26, y + 16.5 + i * 14, style)));
  sheet.y += height + 12;
}

function stateFacts(content: ReportContent): Facts {
  const { state, reader, previous } = content;
  const time = (iso: string) => timeWords(iso, reader.timeZone);
  const compared: Facts =
    previous === undefined ? [] : [['Compared with', `Revision ${previous.letter}, ${previous.title}`]];
  if (state.kind === 'working') {
    return [
      ['Network as it stands', `Version ${String(state.version)}`],
      ['Last changed', `${time(state.changedAt)}, ${state.changedByName}`],
      ...compared,
      ['Made for', `${reader.name}, ${time(content.madeAt)}`],
    ];
  }
  return [
    ['Revision', `${state.letter}, ${state.title}`],
    ['Reason', state.reason],
    ['Frozen', `${time(state.createdAt)}, ${state.createdByName}, at version ${String(state.version)}`],
    ...compared,
    ['Made for', `${reader.name}, ${time(content.madeAt)}`],
  ];
}

function sealFacts({ fileHash, engineVersion, solverHash, state }: ReportContent): Facts {
  return [
    ['Inputs, SHA-256', fileHash],
    ['What was solved, SHA-256', solverHash],
    ...(state.kind === 'revision' ? [['Results, SHA-256', state.resultsHash] as const] : []),
    ['Engine', engineVersion],
  ];
}

function facts(sheet: Sheet, title: string, list: Facts, x: number, width: number): void {
  head(sheet, title, x, width);
  for (const [label, text] of list) {
    const lines = sheet.lines(text, width - 108, VALUE).slice(0, 6);
    sheet.tagged('P', () => {
      sheet.print(label, x, sheet.y + 9, LABEL);
      lines.forEach((line, i) => sheet.print(line, x + 108, sheet.y + 9 + i * 12, VALUE));
    });
    sheet.y += lines.length * 12 + 4;
    sheet.rule(x, sheet.y - 2, x + width);
  }
  sheet.y += 10;
}

function head(sheet: Sheet, title: string, x: number, width: number): void {
  sheet.tagged('H2', () => sheet.print(title, x, sheet.y + 9, { size: 10.5, weight: 600 }));
  sheet.rule(x, sheet.y + 14, x + width, 'ink', 0.9);
  sheet.y += 19;
}

/** The result in short: of each case how many traps fail and are to be watched. */
function results(sheet: Sheet, { outcomes }: ReportContent, source: TableSource, x: number, width: number): void {
  head(sheet, 'What came out', x, width);
  for (const outcome of outcomes.slice(0, 12)) {
    const name = sheet.fitted(caseNameOf(source, outcome.caseId), 150, VALUE);
    const unsolved = unsolvedWords(outcome);
    sheet.tagged('P', () => {
      sheet.print(name, x, sheet.y + 9, { ...VALUE, weight: 500 });
      if (unsolved !== undefined || outcome.status === 'refused') {
        sheet.print(sheet.fitted(unsolved ?? '', width - 160, VALUE), x + 160, sheet.y + 9, { ...VALUE, ink: 'fail' });
        return;
      }
      const { traps, fail, watch } = countVerdicts(outcome.result);
      const count = (verdict: 'fail' | 'watch', number: number, at: number) => {
        paintShapes(sheet, verdictShapes(verdict), at, sheet.y + 6, 0.7);
        sheet.print(`${String(number)} ${verdict}`, at + 8, sheet.y + 9, { ...VALUE, ink: verdict });
      };
      count('fail', fail, x + 164);
      count('watch', watch, x + 214);
      sheet.print(`of ${String(traps)} traps`, x + width, sheet.y + 9, { ...VALUE, ink: 'ink2' }, 'right');
    });
    sheet.y += 16;
    sheet.rule(x, sheet.y - 2, x + width);
  }
  if (outcomes.length > 12) {
    sheet.tagged('P', () => sheet.print(`and ${String(outcomes.length - 12)} more cases`, x, sheet.y + 9, LABEL));
    sheet.y += 14;
  }
  sheet.y += 10;
}

/** Who did what with the revision, and what each signature says of itself. */
function people(sheet: Sheet, { events, signatures }: FrozenState, timeZone: string, x: number, width: number): void {
  const steps = events.map(({ state, personName, at, note }) => ({
    at,
    words: `${STATES[state]} by ${personName}${note === '' ? '' : `: ${note}`}`,
  }));
  const signed = signatures.map(({ meaning, personName, role, at, keyId, statementHash }) => ({
    at,
    words: `Signed as ${meaning} by ${personName}, ${role}. Ed25519, key ${keyId.slice(0, 16)}, statement ${statementHash}`,
  }));
  const all = [...steps, ...signed]
    .sort((a, b) => a.at.localeCompare(b.at))
    .map(({ at, words }) => ({ at, lines: sheet.lines(words, width - 108, STEP).slice(0, 4) }));
  head(sheet, 'Who did what', x, width);
  const shown = lastThatFit(all, sheet.room - 24);
  if (shown.length < all.length) {
    const words = `${String(all.length - shown.length)} earlier steps stand in the history of the revision`;
    sheet.tagged('P', () => sheet.print(words, x, sheet.y + 8, LABEL));
    sheet.y += 13;
  }
  for (const { at, lines } of shown) {
    sheet.tagged('P', () => {
      sheet.print(timeWords(at, timeZone), x, sheet.y + 8, LABEL);
      lines.forEach((line, i) => sheet.print(line, x + 108, sheet.y + 8 + i * STEP_LINE, STEP));
    });
    sheet.y += stepHeight(lines);
    sheet.rule(x, sheet.y - 1, x + width);
  }
  sheet.y += 8;
}

/** The last ones, in their order: whoever needs the rest looks into the history. */
function lastThatFit<T extends { readonly lines: readonly string[] }>(steps: readonly T[], room: number): readonly T[] {
  let [first, left] = [steps.length, room];
  for (const step of steps.toReversed()) {
    left -= stepHeight(step.lines);
    if (left < 0) break;
    first -= 1;
  }
  return steps.slice(first);
}

function stepHeight(lines: readonly string[]): number {
  return lines.length * STEP_LINE + 3;
}
