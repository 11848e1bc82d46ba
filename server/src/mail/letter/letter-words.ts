import { formatQuantity } from '@riseback/units';
import type { Figure } from '../mail-data';

/** How a person reads figures and times. */
export interface Reader {
  readonly name?: string;
  readonly units: 'us' | 'si';
  readonly timeZone: string;
}

const STANDARD_ATMOSPHERE_PA = 101_325;
const LONGEST_LINE = 200;

/** `2 March 2026, 03:00 (America/New_York)`: no form of it is read as another day elsewhere. */
export function timeFor({ timeZone }: Reader, at: string): string {
  const format = new Intl.DateTimeFormat('en-GB', {
    ...{ day: 'numeric', month: 'long', year: 'numeric', hour: '2-digit', minute: '2-digit', hourCycle: 'h23' },
    timeZone,
  });
  const part = Object.fromEntries(format.formatToParts(new Date(at)).map(({ type, value }) => [type, value]));
  return `${part['day']} ${part['month']} ${part['year']}, ${part['hour']}:${part['minute']} (${timeZone})`;
}

export function figureFor({ units }: Reader, { kind, value, atmosphericPressurePa }: Figure): string {
  const display = { system: units, atmosphericPressurePa: atmosphericPressurePa ?? STANDARD_ATMOSPHERE_PA };
  return formatQuantity(value, kind, display, { withUnit: true });
}

/**
 * Text that may stand in a header or in one line: without line breaks, other control characters, and marks that turn the
 * direction of what follows, which somebody could put into a name to say something else.
 */
export function oneLine(text: string): string {
  const line = text
    .replaceAll(/[\p{Cc}\p{Zl}\p{Zp}\u202A-\u202E\u2066-\u2069]+/gu, ' ')
    .replaceAll(/\s+/g, ' ')
    .trim();
  return line.length > LONGEST_LINE ? `${line.slice(0, LONGEST_LINE - 1).trimEnd()}…` : line;
}

/** Lines of a text, without other control characters. */
export function linesOf(text: string): string[] {
  return text
    .replaceAll(/\r\n?/g, '\n')
    .split('\n')
    .map((line) => line.replaceAll(/[\p{Cc}\u202A-\u202E\u2066-\u2069]+/gu, ' ').trimEnd());
}
