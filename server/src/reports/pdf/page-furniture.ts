import type { ReportContent } from '../report-content';
import type { ReportStanding } from '../exports/report-standing';
import type { Sheet } from './sheet';
import { timeWords } from './time-words';

const CAUTION =
  'Steam and hot condensate burn and kill. This calculation does not replace local codes or a licensed engineer’s judgement.';

/** Head and foot of every page: what it belongs to, how it stands, what seals it. */
export function furnish(
  sheet: Sheet,
  content: ReportContent,
  standing: ReportStanding,
  { index, count, section }: { index: number; count: number; section: string },
): void {
  const { pageLeft: left, pageRight: right, bottom } = sheet;
  const head = 32;
  const small = { size: 7, ink: 'ink2' } as const;
  const site = sheet.fitted(content.siteName, 200, { size: 8, weight: 600 });
  sheet.print(site, left, head, { size: 8, weight: 600 });
  const nameAt = left + sheet.measure(site, { size: 8, weight: 600 }) + 10;
  const words = sheet.fitted(standing.words, 330, { size: 8, weight: 600 });
  const standingWidth = sheet.measure(words, { size: 8, weight: 600 });
  const network = content.networkName === content.siteName ? '' : content.networkName;
  const name = sheet.fitted(network, right - standingWidth - nameAt - 20, { size: 8 });
  sheet.print(name, nameAt, head, { size: 8, ink: 'ink2' });
  sheet.print(words, right, head, { size: 8, weight: 600, ink: standing.provisional ? 'fail' : 'pass' }, 'right');
  sheet.stroke(`M${left} ${head + 7}H${right}`, 'ink', 1);

  const foot = bottom + 14;
  sheet.stroke(`M${left} ${foot - 8}H${right}`, 'ruleStrong', 0.5);
  sheet.print(CAUTION, left, foot + 1, small);
  sheet.print(section, right - 92, foot + 1, small, 'right');
  sheet.print(
    `Page ${String(index + 1)} of ${String(count)}`,
    right,
    foot + 1,
    { ...small, weight: 600, ink: 'ink' },
    'right',
  );
  sheet.print(`Inputs, SHA-256 ${content.fileHash}`, left, foot + 11, { size: 6.4, ink: 'ink3' });
  const made = `Engine ${content.engineVersion}. Made ${timeWords(content.madeAt, content.reader.timeZone)}`;
  sheet.print(made, right, foot + 11, { size: 6.4, ink: 'ink3' }, 'right');
}
