import type { ReportContent } from '../report-content';
import { CAUTIONS, MODEL_LIMITS } from './caution-words';
import type { Sheet } from './sheet';
import { MISSING } from './typeface';

const READING = [
  'Pressures are gauge, above the site’s atmosphere, unless a column says otherwise; differences are neither gauge nor absolute.',
  'Back pressure is what stands against a trap’s outlet: the pressure of the receiver or vessel that its way ends in, and what lift, friction of the liquid and flash steam add on the way.',
  'Two bands stand beside it. The spread runs from the lowest to the highest over all friction methods, each with both bases of lift; the credible band is the part of it that suits the flow in each pipe. A band only worsens a verdict.',
  'The hand check is the half-psi-per-foot walk: receiver and half a psi for each foot of every rise on the way, falls not credited.',
  'Each trap’s and pipe’s verdict is the worst of its checks: fail, watch or pass, with its shape. What was not checked has no verdict.',
] as const;

/** What the report covers, how its numbers are to be read, and what it must be read with. */
export function scopePages(sheet: Sheet, { file }: ReportContent): void {
  sheet.begin('Scope and cautions');
  const count = (kind: string) => file.nodes.filter((node) => node.kind === kind).length;
  const parts = [
    counted(count('trap'), 'trap'),
    counted(file.pipes.length, 'pipe'),
    counted(count('junction'), 'junction'),
    counted(count('receiver'), 'receiver'),
    counted(count('flashVessel'), 'flash vessel'),
    counted(count('pumpedInlet'), 'pumped inlet'),
    counted(file.gauges.length, 'gauge'),
    counted(file.cases.length, 'operating case'),
  ];
  sheet.paragraph(
    `The report covers one network of ${parts.join(', ')}. Steady state, by the method and the limits in this report.`,
  );
  list(sheet, 'How to read it', READING);
  list(sheet, 'Cautions', CAUTIONS);
  list(sheet, 'Where the models end', MODEL_LIMITS);
  sheet.paragraph(
    `Long notes are cut here and stand whole in the spreadsheet. A character that the report’s typeface does not have is printed as ${MISSING}.`,
    { size: 7.6, ink: 'ink3' },
  );
}

function counted(count: number, what: string): string {
  return `${String(count)} ${what}${count === 1 ? '' : 's'}`;
}

function list(sheet: Sheet, title: string, sentences: readonly string[]): void {
  sheet.heading(title);
  for (const sentence of sentences) {
    sheet.ensure(24);
    const { left, y } = sheet;
    sheet.decoration(() => sheet.fill(`M${left} ${y + 4.6}h4v1.2h-4Z`, 'copperLine'));
    sheet.paragraph(sentence, { size: 8.6 }, { indent: 11, width: Math.min(640, sheet.width - 11), gap: 3 });
  }
}
