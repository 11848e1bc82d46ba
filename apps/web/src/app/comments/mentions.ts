import type { NamedPerson } from '@riseback/contracts';

/** A mention being typed: from its `@` to the caret. */
export interface MentionStart {
  readonly from: number;
  readonly typed: string;
}

const LONGEST_NAME = 80;
const MOST_SHOWN = 6;

/** The mention that the caret stands in; null where it stands in none. An `@` within a word is an address, not a mention. */
export function mentionAt(text: string, caret: number): MentionStart | null {
  const before = text.slice(0, caret);
  const from = before.lastIndexOf('@');
  if (from < 0 || caret - from > LONGEST_NAME) return null;
  if (from > 0 && !/[\s(]/u.test(before.charAt(from - 1))) return null;
  const typed = before.slice(from + 1);
  return /[\n@]/u.test(typed) ? null : { from, typed };
}

/** Whose name, or a later word of it, begins with what is typed. */
export function namesFor(typed: string, people: readonly NamedPerson[]): readonly NamedPerson[] {
  const wanted = typed.toLocaleLowerCase();
  return people
    .filter(({ name }) => {
      const whole = name.toLocaleLowerCase();
      // a name that stands there whole is finished
      if (whole === wanted) return false;
      return whole.startsWith(wanted) || (wanted !== '' && whole.includes(` ${wanted}`));
    })
    .slice(0, MOST_SHOWN);
}

/** The text with the name in place of what was typed of it, and where the caret goes. */
export function withMention(
  text: string,
  caret: number,
  { from }: MentionStart,
  name: string,
): { readonly text: string; readonly caret: number } {
  const after = text.slice(caret);
  const put = `@${name}${after.startsWith(' ') ? '' : ' '}`;
  return { text: text.slice(0, from) + put + after, caret: from + name.length + 2 };
}

/** Whom a text mentions. */
export function mentioned(text: string, people: readonly NamedPerson[]): readonly NamedPerson[] {
  const names = new Set(
    partsOf(
      text,
      people.map(({ name }) => name),
    ).flatMap((part) => (part.name === null ? [] : [part.name])),
  );
  return people.filter(({ name }) => names.has(name));
}

/** A text cut at its mentions; `name` is null for the words between them. */
export interface TextPart {
  readonly text: string;
  readonly name: string | null;
}

export function partsOf(text: string, names: readonly string[]): readonly TextPart[] {
  // the longest first: "Ana Reyes Soto" is not "Ana Reyes"
  const longestFirst = [...new Set(names)].sort((a, b) => b.length - a.length);
  const parts: TextPart[] = [];
  let from = 0;
  for (let at = text.indexOf('@'); at >= 0; at = text.indexOf('@', at + 1)) {
    const free = at === 0 || /[\s(]/u.test(text.charAt(at - 1));
    const name = free ? longestFirst.find((one) => standsAt(text, at + 1, one)) : undefined;
    if (name === undefined) continue;
    if (at > from) parts.push({ text: text.slice(from, at), name: null });
    from = at + 1 + name.length;
    parts.push({ text: text.slice(at, from), name });
  }
  if (from < text.length) parts.push({ text: text.slice(from), name: null });
  return parts;
}

function standsAt(text: string, at: number, name: string): boolean {
  const end = at + name.length;
  return text.slice(at, end) === name && !/[\p{L}\p{N}]/u.test(text.charAt(end));
}
