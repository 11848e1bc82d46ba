/** A number found at the start of typed text. */
export interface TypedNumber {
  readonly value: number;
  /** The number as typed, tidied. */
  readonly text: string;
  /** What follows it. */
  readonly rest: string;
}

export interface NumberRefusal {
  readonly reason: string;
  /** The number as it was probably meant, when that can be told, and what follows it. */
  readonly meant?: { readonly text: string; readonly rest: string };
}

/** Said when the text does not begin with a number at all. */
export const NO_NUMBER = 'There is no number at the start.';

const FRACTION = /^(?:(\d+)\s*[-\s]\s*)?(\d+)\s*\/\s*(\d+)(?![\d.,])/;
/** Groups of three set apart by spaces, as ISO 80000-1 writes them. */
const SPACED_GROUPS = /^[1-9]\d{0,2}(?: \d{3})+(?:\.\d+)?(?![\d.,])/;
const DIGITS_AND_MARKS = /^[\d.,]+/;
const EXPONENT = /^e[+-]?\d+/i;
const PLAIN = /^(?:\d+\.?\d*|\.\d+)$/;
const COMMA_GROUPS = /^[1-9]\d{0,2}(?:,\d{3})+(?:\.\d*)?$/;
const POINT_GROUPS_COMMA_DECIMAL = /^\d{1,3}(?:\.\d{3})+,\d+$/;
const COMMA_DECIMAL = /^\d*,\d+$/;

/** Folds the characters that copying from documents brings along into the ones a keyboard types. */
export function foldTypography(text: string): string {
  return text
    .replace(/[\u00a0\u2000-\u200a\u202f\u205f\u3000\t\r\n]/g, ' ')
    .replace(/[\u2212\u2010-\u2014\ufe63\uff0d]/g, '-')
    .replace(/\u2044/g, '/')
    .replace(/[\u2032\u2018\u2019\u02b9\u00b4]/g, "'")
    .replace(/[\u2033\u201c\u201d\u02ba]|''/g, '"')
    .replace(/[\u00bc-\u00be\u2150-\u215e]/g, (fraction) => ` ${fraction.normalize('NFKC').replace('\u2044', '/')}`)
    .trim();
}

/**
 * Reads the number at the start of folded text: "12.5", "1,040", "1 040", "1/2", "1-1/2", "5e-5", with or without a sign.
 * Commas must separate thousands; a decimal comma is refused rather than guessed at, since "1,040" would then have two meanings.
 * @returns the number, or the reason why there is none
 */
export function readTypedNumber(text: string): TypedNumber | NumberRefusal {
  const sign = /^[+-]?/.exec(text)?.[0] ?? '';
  const body = text.slice(sign.length).trimStart();
  const negative = sign === '-';
  return readFraction(body, negative) ?? readDecimal(body, negative);
}

function readFraction(body: string, negative: boolean): TypedNumber | NumberRefusal | undefined {
  const match = FRACTION.exec(body);
  if (match === null) return undefined;
  const [whole, numerator, denominator] = [match[1] ?? '', match[2] ?? '', match[3] ?? ''];
  if (Number(denominator) === 0) return { reason: `${match[0]} divides by zero.` };
  const magnitude = Number(whole) + Number(numerator) / Number(denominator);
  const text = `${whole === '' ? '' : `${whole}-`}${numerator}/${denominator}`;
  return typedNumber(magnitude, text, negative, body.slice(match[0].length));
}

function readDecimal(body: string, negative: boolean): TypedNumber | NumberRefusal {
  const written = SPACED_GROUPS.exec(body)?.[0] ?? DIGITS_AND_MARKS.exec(body)?.[0];
  if (written === undefined) return { reason: NO_NUMBER };
  const afterMarks = body.slice(written.length);
  const refusal = refuseMarks(written, negative, afterMarks);
  if (refusal !== undefined) return refusal;
  const exponent = EXPONENT.exec(afterMarks)?.[0] ?? '';
  const text = written + exponent;
  return typedNumber(Number(text.replace(/[, ]/g, '')), text, negative, afterMarks.slice(exponent.length));
}

function refuseMarks(written: string, negative: boolean, rest: string): NumberRefusal | undefined {
  if (PLAIN.test(written) || COMMA_GROUPS.test(written) || written.includes(' ')) return undefined;
  const sign = negative ? '-' : '';
  if (POINT_GROUPS_COMMA_DECIMAL.test(written)) {
    const text = sign + written.replaceAll('.', '').replace(',', '.');
    return { reason: `${written} has a comma after its points. ${COMMA_RULE}`, meant: { text, rest: rest.trim() } };
  }
  if (COMMA_DECIMAL.test(written)) {
    const text = sign + written.replace(',', '.').replace(/^\./, '0.');
    return {
      reason: `The comma in ${written} does not separate thousands. ${COMMA_RULE}`,
      meant: { text, rest: rest.trim() },
    };
  }
  if (written.includes(',')) return { reason: `The commas in ${written} do not separate thousands. ${COMMA_RULE}` };
  if (/\d/.test(written)) return { reason: `${written} has more than one decimal point.` };
  return { reason: NO_NUMBER };
}

const COMMA_RULE = 'Write decimals with a point; a comma may only separate thousands, as in 1,040.5.';

function typedNumber(magnitude: number, text: string, negative: boolean, rest: string): TypedNumber | NumberRefusal {
  if (!Number.isFinite(magnitude)) return { reason: `${text} is too large a number.` };
  // 0 − x rather than −x: a typed "-0" is stored as 0
  return { value: negative ? 0 - magnitude : magnitude, text: (negative ? '-' : '') + text, rest: rest.trim() };
}
