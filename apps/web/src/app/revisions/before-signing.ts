import type { SigningTerms } from '@riseback/contracts';

/** Something that the reviewer confirms before a signature is made. */
export interface SigningLine {
  readonly key: string;
  readonly words: string;
}

/**
 * What is to be confirmed. A failing trap and an open comment each ask by number, so that nobody signs over them unseen.
 * @param comparedWith the letter of the revision beside it; '' for the first
 * @param changeCount how many inputs differ from it; null while that is not known
 */
export function beforeSigning(
  { verdicts: { traps, fail, watch }, openComments }: Pick<SigningTerms, 'verdicts' | 'openComments'>,
  comparedWith: string,
  caseCount: number,
  changeCount: number | null,
): readonly SigningLine[] {
  const inputs =
    comparedWith === ''
      ? 'All inputs read: there is no earlier revision'
      : `Inputs compared with ${comparedWith}${seenWords(changeCount)}`;
  const cases = caseCount === 1 ? 'Its one case read' : `All ${String(caseCount)} cases read, worst of all included`;
  const concern = [failWords(fail), watchWords(watch)].filter((part) => part !== '').join(' and ');
  const lines = [
    { key: 'inputs', words: inputs },
    { key: 'cases', words: caseCount === 0 ? 'Results read' : cases },
    {
      key: 'verdicts',
      words:
        concern === ''
          ? `All ${String(traps)} traps pass, as far as they were checked`
          : `${concern}. I accept these as stated in the report`,
    },
  ];
  if (openComments === 0) return lines;
  const open =
    openComments === 1
      ? '1 comment is open. I sign although it is'
      : `${String(openComments)} comments are open. I sign although they are`;
  return [...lines, { key: 'comments', words: open }];
}

export function stillMissing(lines: readonly SigningLine[], ticked: ReadonlySet<string>): readonly SigningLine[] {
  return lines.filter(({ key }) => !ticked.has(key));
}

function seenWords(changes: number | null): string {
  if (changes === null) return '';
  return changes === 1 ? ', 1 change seen' : `, ${String(changes)} changes seen`;
}

function failWords(count: number): string {
  if (count === 0) return '';
  return count === 1 ? '1 trap fails' : `${String(count)} traps fail`;
}

function watchWords(count: number): string {
  if (count === 0) return '';
  return count === 1 ? '1 is on watch' : `${String(count)} are on watch`;
}
