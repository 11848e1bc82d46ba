import type { WhyNotRead } from '@riseback/contracts';
import type { Gauge } from '@riseback/network';
import type { ExpectedReading } from './field-sheet';
import type { KnownReading } from './kept-items';
import type { Doubt } from './plausibility';
import { dialText, type DialUnit } from './typed-reading';

export const WHY_NOT_WORDS: Readonly<Record<WhyNotRead, string>> = {
  noAccess: 'Cannot get to it',
  unsafe: 'Not safe to get to it',
  notFound: 'Not found',
  shutOff: 'Its valve is shut',
  broken: 'Broken',
  other: 'Another reason',
};

export const READING_CAUTION =
  'Steam and hot condensate burn and kill. Open nothing to get a reading; where it is not safe, say so and walk on.';

/** What is on the dial's plate: "0.0 to 60.0 psig, 1.6 % of span, water leg". */
export function plateWords(gauge: Gauge, unit: DialUnit): string {
  const { rangeLowPa, rangeHighPa, accuracy, waterLeg } = gauge;
  return [
    ...(rangeHighPa === undefined
      ? []
      : [`${dialText(rangeLowPa ?? 0, unit)} to ${dialText(rangeHighPa, unit)} ${unit}`]),
    ...(accuracy === undefined ? [] : [`${String(Number((accuracy * 100).toPrecision(3)))} % of span`]),
    ...(waterLeg ? ['filled water leg'] : []),
  ].join(', ');
}

export function expectedWords({ dialPa, abovePa, belowPa }: ExpectedReading, unit: DialUnit): string {
  if (abovePa === undefined || belowPa === undefined) return `Expected ${dialText(dialPa, unit)}`;
  return `Expected ${dialText(dialPa - belowPa, unit)} to ${dialText(dialPa + abovePa, unit)}`;
}

/** A reading in a word or two: "23.9 psig", or why there is none. */
export function readingWords({ valuePa, whyNot }: Pick<KnownReading, 'valuePa' | 'whyNot'>, unit: DialUnit): string {
  if (valuePa !== undefined) return `${dialText(valuePa, unit)} ${unit}`;
  return whyNot === undefined ? '' : WHY_NOT_WORDS[whyNot];
}

interface Judgement {
  readonly status: 'pass' | 'watch' | 'none';
  readonly head: string;
  readonly more: string;
}

const AGAIN = 'Read it again, or keep it as it is.';

/** One sentence on a reading that is in. */
export function judgement(doubt: Doubt | null, expected: ExpectedReading | undefined): Judgement {
  switch (doubt) {
    case 'aboveRange':
      return watch('Above the range of this gauge.', AGAIN);
    case 'belowRange':
      return watch('Below the range of this gauge.', AGAIN);
    case 'atHighStop':
      return watch('The needle is at its upper stop.', `There may be more than the dial can show. ${AGAIN}`);
    case 'atLowStop':
      return watch('The needle is at its lower stop.', `The tap may be shut or the gauge broken. ${AGAIN}`);
    case 'farAboveExpected':
      return watch('More than five times what was expected.', AGAIN);
    case 'farOff':
      return watch(
        'Far off what was expected.',
        'Is the tap open and the needle steady? Then keep it: it is a finding.',
      );
    case 'off':
      return watch('Just outside what was expected.', 'Is the tap open and the needle steady? Then keep it.');
    case null:
      return undoubted(expected);
  }
}

function undoubted(expected: ExpectedReading | undefined): Judgement {
  if (expected === undefined) {
    return {
      status: 'none',
      head: 'Nothing to compare with.',
      more: 'There is no result for this place in this case.',
    };
  }
  if (expected.abovePa === undefined) {
    return { status: 'none', head: 'Not judged.', more: 'The range or accuracy of this gauge is not in its list.' };
  }
  return { status: 'pass', head: 'Agrees with what was expected.', more: '' };
}

function watch(head: string, more: string): Judgement {
  return { status: 'watch', head, more };
}
