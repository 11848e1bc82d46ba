import { COMMON_PASSWORD_WORDS, KEY_ROWS } from './common-password-words';

/** In UTF-8, since bcrypt reads 72 bytes and drops the rest without a word. */
export const FEWEST_PASSWORD_BYTES = 12;
export const MOST_PASSWORD_BYTES = 72;

/** A password must take more guesses than this many known pieces in a row. */
const FEWEST_PIECES = 5;
const SHORTEST_WALK = 3;
const SHORTEST_PERSONAL_WORD = 3;

/**
 * The text that is hashed: Unicode NFC, so that an é typed as one character on one keyboard and as e and an accent on
 * another is the same password. Nothing is trimmed: spaces count.
 */
export function normalPassword(text: string): string {
  return text.normalize('NFC');
}

/** Length in UTF-8 bytes of the text that is hashed. */
export function passwordBytes(text: string): number {
  return [...normalPassword(text)].reduce((sum, character) => sum + bytesOf(character), 0);
}

/**
 * Why a new password is refused, or undefined when it is good. No rules of composition: length counts, and that it is
 * not made of what others would try first.
 * @param personal words of the person's own, such as the parts of their name and address
 */
export function passwordMistake(password: string, personal: readonly string[]): string | undefined {
  const bytes = passwordBytes(password);
  if (bytes < FEWEST_PASSWORD_BYTES) {
    return `The password needs at least ${String(FEWEST_PASSWORD_BYTES)} characters; a few words do well.`;
  }
  if (bytes > MOST_PASSWORD_BYTES) {
    return `The password may be ${String(MOST_PASSWORD_BYTES)} bytes long at most; this one is ${String(bytes)}.`;
  }
  if (isPredictable(normalPassword(password), personal)) {
    return 'This is among the first that others would try: common words, rows of keys, a year, your own name. Add words that have nothing to do with each other.';
  }
  return undefined;
}

/** The words of a person's own that a password must not be made of. */
export function personalWords({ name, email }: { readonly name: string; readonly email: string }): string[] {
  return [...name.split(/\s+/), ...email.split(/[@.+_-]/)];
}

function isPredictable(password: string, personal: readonly string[]): boolean {
  const text = password.toLowerCase().replaceAll(/[\s._-]/g, '');
  const words = [...COMMON_PASSWORD_WORDS, ...personal.map((word) => word.normalize('NFC').toLowerCase())]
    .filter((word) => word.length >= SHORTEST_PERSONAL_WORD || word.charCodeAt(0) > 0x7f)
    .sort((a, b) => b.length - a.length);
  return [text, plainLetters(text, 'i'), plainLetters(text, 'l')].some(
    (form) => guessesOf(form, words) < FEWEST_PIECES,
  );
}

/** With p@ssw0rd read as password; the digits and signs at either end stay what they are. */
function plainLetters(text: string, one: string): string {
  const [, head = '', core = '', tail = ''] = /^([^\p{L}]*)(.*?)([^\p{L}]*)$/su.exec(text) ?? [];
  const letters: Readonly<Record<string, string>> = {
    '@': 'a',
    '4': 'a',
    '3': 'e',
    '1': one,
    '0': 'o',
    $: 's',
    '5': 's',
  };
  return head + core.replaceAll(/[@4310$5]/g, (sign) => letters[sign] ?? sign) + tail;
}

/** How many different pieces the text is made of: a known word, a walk over keys, a year, else a character by its bytes. */
function guessesOf(text: string, words: readonly string[]): number {
  const pieces = new Map<string, number>();
  for (let at = 0; at < text.length;) {
    const known = knownPieceAt(text, at, words);
    const piece = known ?? String.fromCodePoint(text.codePointAt(at) ?? 0);
    pieces.set(piece, known === undefined ? bytesOf(piece) : 1);
    at += piece.length;
  }
  return [...pieces.values()].reduce((sum, cost) => sum + cost, 0);
}

function knownPieceAt(text: string, at: number, words: readonly string[]): string | undefined {
  const candidates = [
    words.find((word) => text.startsWith(word, at)),
    longestWalk(text, at),
    longestSequence(text, at),
    /^(19|20)\d\d/.exec(text.slice(at, at + 4))?.[0],
  ];
  return candidates
    .filter((piece) => piece !== undefined)
    .sort((a, b) => b.length - a.length)
    .at(0);
}

function longestWalk(text: string, at: number): string | undefined {
  const rows = [...KEY_ROWS, ...KEY_ROWS.map((row) => [...row].reverse().join(''))];
  let longest: string | undefined;
  for (let end = at + SHORTEST_WALK; end <= text.length; end += 1) {
    const walk = text.slice(at, end);
    if (!rows.some((row) => row.includes(walk))) break;
    longest = walk;
  }
  return longest;
}

/** abcd, 4321 or aaaa: characters a constant step apart. */
function longestSequence(text: string, at: number): string | undefined {
  const step = text.charCodeAt(at + 1) - text.charCodeAt(at);
  if (!(Math.abs(step) <= 1)) return undefined;
  let end = at + 2;
  while (end < text.length && text.charCodeAt(end) - text.charCodeAt(end - 1) === step) end += 1;
  return end - at >= SHORTEST_WALK ? text.slice(at, end) : undefined;
}

function bytesOf(character: string): number {
  const point = character.codePointAt(0) ?? 0;
  if (point < 0x80) return 1;
  if (point < 0x800) return 2;
  return point < 0x10000 ? 3 : 4;
}
