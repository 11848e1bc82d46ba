import { describe, expect, it } from 'vitest';
import { tagRuns } from './tag-runs';

describe('tags as a person would say them', () => {
  it.each([
    [['CR-20', 'CR-21', 'CR-22', 'CR-23'], 'CR-20 to CR-23'],
    [['CR-25', 'CR-26'], 'CR-25, CR-26'],
    [['TR-10', 'TR-9', 'TR-11'], 'TR-9 to TR-11'],
    [['TR-009', 'TR-010', 'TR-011'], 'TR-009 to TR-011'],
    [['TR-099', 'TR-100', 'TR-101'], 'TR-099 to TR-101'],
    [['TR-8', 'TR-9', 'TR-010'], 'TR-8, TR-9, TR-010'],
    [['A-1', 'B-2', 'A-2', 'A-3'], 'A-1 to A-3, B-2'],
    [['Hall main', 'TR-1'], 'Hall main, TR-1'],
    [['99', '100', '101'], '99 to 101'],
    [[], ''],
  ])('%j: %s', (tags, said) => {
    expect(tagRuns(tags).join(', ')).toBe(said);
  });
});
