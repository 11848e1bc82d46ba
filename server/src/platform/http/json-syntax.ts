/** Where a text stops being JSON. */
export interface SyntaxPlace {
  readonly line: number;
  readonly column: number;
}

const TOKEN =
  /[\t\n\r ]*(?:([{}[\],:])|("(?:[^"\\\u0000-\u001f]|\\(?:["\\/bfnrt]|u[\da-fA-F]{4}))*")|(-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?|true|false|null))/y;

type Expecting = 'value' | 'valueOrEnd' | 'key' | 'keyOrEnd' | 'colon' | 'commaOrEnd';

/**
 * The place of the first syntax error. JSON.parse's own words name it in some engine versions only and quote the body.
 * @returns undefined for correct JSON
 */
export function findSyntaxError(text: string): SyntaxPlace | undefined {
  const open: ('{' | '[')[] = [];
  let expecting: Expecting = 'value';
  let finished = false;
  TOKEN.lastIndex = 0;
  for (;;) {
    const before = TOKEN.lastIndex;
    const match = TOKEN.exec(text);
    if (match === null) {
      const rest = /\S/.exec(text.slice(before));
      if (rest === null && finished) return undefined;
      return place(text, rest === null ? text.length : before + rest.index);
    }
    const [, sign, string] = match;
    const next: Expecting | undefined = finished ? undefined : step(sign, string !== undefined, expecting, open);
    if (next === undefined) return place(text, before + (/\S/.exec(match[0])?.index ?? 0));
    expecting = next;
    finished = open.length === 0 && expecting === 'commaOrEnd';
  }
}

/** One token onwards; undefined when it may not stand here. */
function step(
  sign: string | undefined,
  isString: boolean,
  expecting: Expecting,
  open: ('{' | '[')[],
): Expecting | undefined {
  const valueMayStand = expecting === 'value' || expecting === 'valueOrEnd';
  if (sign === undefined) {
    if (valueMayStand) return 'commaOrEnd';
    return isString && (expecting === 'key' || expecting === 'keyOrEnd') ? 'colon' : undefined;
  }
  switch (sign) {
    case '{':
    case '[':
      if (!valueMayStand) return undefined;
      open.push(sign);
      return sign === '{' ? 'keyOrEnd' : 'valueOrEnd';
    case '}':
      if (expecting !== 'keyOrEnd' && expecting !== 'commaOrEnd') return undefined;
      return open.pop() === '{' ? 'commaOrEnd' : undefined;
    case ']':
      if (expecting !== 'valueOrEnd' && expecting !== 'commaOrEnd') return undefined;
      return open.pop() === '[' ? 'commaOrEnd' : undefined;
    case ':':
      return expecting === 'colon' ? 'value' : undefined;
    default:
      if (expecting !== 'commaOrEnd' || open.length === 0) return undefined;
      return open.at(-1) === '{' ? 'key' : 'value';
  }
}

function place(text: string, index: number): SyntaxPlace {
  const before = text.slice(0, index);
  const lineStart = before.lastIndexOf('\n') + 1;
  return { line: before.split('\n').length, column: index - lineStart + 1 };
}
