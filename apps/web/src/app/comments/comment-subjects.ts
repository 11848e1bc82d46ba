import type { CommentSubject, CommentThread } from '@riseback/contracts';
import type { NetworkDocument } from '@riseback/network';
import { checkName } from '../results/finding-words';
import { isPipe, KIND_WORDS, nameOf } from '../shared/element-words';

export const WHOLE: CommentSubject = { kind: 'whole' };

/** The element that a subject is pinned to; null for the whole. */
export function elementOf(subject: CommentSubject): string | null {
  return subject.kind === 'whole' ? null : subject.elementId;
}

/** The same subject, the same text. */
export function subjectKey(subject: CommentSubject): string {
  if (subject.kind === 'whole') return 'whole';
  if (subject.kind === 'element') return `element/${subject.elementId}`;
  return `result/${subject.elementId}/${subject.caseId ?? ''}/${subject.code ?? ''}`;
}

/** `CR-18`, `TR-164, capacity in Start-up`, `The whole`. An element that was removed since is called by its id. */
export function subjectWords(subject: CommentSubject, document: NetworkDocument | null): string {
  if (subject.kind === 'whole') return 'The whole';
  const name = elementName(subject.elementId, document);
  if (subject.kind === 'element') return name;
  const about = subject.code === undefined ? 'result' : checkName(subject.code).toLowerCase();
  const caseName = subject.caseId === undefined ? '' : document?.cases.get(subject.caseId)?.value.name;
  return `${name}, ${about}${caseName === undefined || caseName === '' ? '' : ` in ${caseName}`}`;
}

export function elementName(id: string, document: NetworkDocument | null): string {
  const element = document?.nodes.get(id)?.value ?? document?.pipes.get(id)?.value;
  if (element === undefined) return id;
  if (element.tag !== undefined) return element.tag;
  return `${isPipe(element) ? KIND_WORDS.pipe : KIND_WORDS[element.kind]} ${nameOf(element)}`;
}

/** The order in which threads were begun gives each its number, which it keeps: it can be cited. */
export function numberedThreads(threads: readonly CommentThread[]): ReadonlyMap<string, number> {
  const begun = [...threads].sort((a, b) => (a.comments[0]?.at ?? '').localeCompare(b.comments[0]?.at ?? ''));
  return new Map(begun.map(({ id }, index) => [id, index + 1]));
}

/** Open ones before resolved ones, each in the order of their numbers. */
export function openFirst(
  threads: readonly CommentThread[],
  numbers: ReadonlyMap<string, number>,
): readonly CommentThread[] {
  const rank = ({ id, resolved }: CommentThread) => (resolved === undefined ? 0 : 1e9) + (numbers.get(id) ?? 0);
  return [...threads].sort((a, b) => rank(a) - rank(b));
}
