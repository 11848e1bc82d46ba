import type { CommentSubject } from '@riseback/contracts';
import type { NetworkDocument, NetworkFile } from '@riseback/network';
import { unprocessable } from '../platform/problem';

/** What comments are pinned to: the elements, with their tags, and the cases of a network. */
export interface Commentable {
  readonly tags: ReadonlyMap<string, string | undefined>;
  readonly cases: ReadonlySet<string>;
}

interface Tagged {
  readonly id: string;
  readonly tag?: string | undefined;
}

export function commentableFile({ nodes, pipes, gauges, cases }: NetworkFile): Commentable {
  return commentable([...nodes, ...pipes, ...gauges], cases);
}

export function commentableDocument({ nodes, pipes, gauges, cases }: NetworkDocument): Commentable {
  const elements = [nodes, pipes, gauges].flatMap((collection) =>
    Array.from<{ readonly value: Tagged }, Tagged>(collection.values(), ({ value }) => value),
  );
  return commentable(
    elements,
    Array.from(cases.values(), ({ value }) => value),
  );
}

/** @throws ProblemError 422 when there is no such element or case */
export function demandSubject(subject: CommentSubject, { tags, cases }: Commentable): void {
  if (subject.kind === 'whole') return;
  if (!tags.has(subject.elementId)) {
    throw missing('/subject/elementId', `There is no element ${subject.elementId} in it.`);
  }
  const { caseId } = subject.kind === 'result' ? subject : {};
  // '' is the plain network of a file without cases
  if (caseId !== undefined && caseId !== '' && !cases.has(caseId)) {
    throw missing('/subject/caseId', `There is no case ${caseId} in it.`);
  }
}

function commentable(elements: readonly Tagged[], cases: readonly { readonly id: string }[]): Commentable {
  return {
    tags: new Map(elements.map(({ id, tag }) => [id, tag])),
    cases: new Set(cases.map(({ id }) => id)),
  };
}

function missing(pointer: string, detail: string): Error {
  return unprocessable('The comment is pinned to what is not there.', [{ pointer, detail }]);
}
