import type { CommentThread } from '@riseback/contracts';
import { emptyDocument } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { elementOf, numberedThreads, openFirst, subjectKey, subjectWords } from './comment-subjects';

const by = { personId: 'p1', personName: 'Ana Reyes' };
const thread = (id: string, minute: number, resolved = false): CommentThread => ({
  id,
  subject: { kind: 'whole' },
  comments: [{ ...by, id, at: `2026-03-01T08:${String(minute)}:00.000Z`, body: 'x', mentions: [] }],
  ...(resolved ? { resolved: { ...by, at: '2026-03-02T08:00:00.000Z' } } : {}),
});

describe('threads', () => {
  const threads = [thread('late', 30), thread('first', 10, true), thread('second', 20)];

  it('have the numbers of the order in which they were begun, resolved ones too', () => {
    expect([...numberedThreads(threads)]).toEqual([
      ['first', 1],
      ['second', 2],
      ['late', 3],
    ]);
  });

  it('stand with the open ones first', () => {
    expect(openFirst(threads, numberedThreads(threads)).map(({ id }) => id)).toEqual(['second', 'late', 'first']);
  });
});

describe('a subject', () => {
  const document = emptyDocument('Trial');
  const result = { kind: 'result', elementId: 'T1', caseId: 'design', code: 'capacity' } as const;

  it('is said in words, by the id of an element that is gone', () => {
    expect(subjectWords({ kind: 'whole' }, document)).toBe('The whole');
    expect(subjectWords({ kind: 'element', elementId: 'L7' }, document)).toBe('L7');
    expect(subjectWords(result, null)).toBe('T1, capacity');
  });

  it('has a key of its own for each result', () => {
    expect(subjectKey(result)).not.toBe(subjectKey({ ...result, caseId: 'startUp' }));
    expect(elementOf(result)).toBe('T1');
    expect(elementOf({ kind: 'whole' })).toBeNull();
  });
});
