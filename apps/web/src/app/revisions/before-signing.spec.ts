import { describe, expect, it } from 'vitest';
import { beforeSigning, stillMissing } from './before-signing';

const words = (...terms: Parameters<typeof beforeSigning>) => beforeSigning(...terms).map((line) => line.words);

describe('what is confirmed before a signature', () => {
  it('names what it was compared with, the cases, and by number what fails and is on watch', () => {
    expect(words({ verdicts: { traps: 30, fail: 2, watch: 6 }, openComments: 0 }, 'B', 6, 8)).toEqual([
      'Inputs compared with B, 8 changes seen',
      'All 6 cases read, worst of all included',
      '2 traps fail and 6 are on watch. I accept these as stated in the report',
    ]);
  });

  it('has a line of its own for comments that are open', () => {
    expect(words({ verdicts: { traps: 1, fail: 0, watch: 1 }, openComments: 1 }, '', 1, null)).toEqual([
      'All inputs read: there is no earlier revision',
      'Its one case read',
      '1 is on watch. I accept these as stated in the report',
      '1 comment is open. I sign although it is',
    ]);
  });

  it('is missing what is not ticked', () => {
    const lines = beforeSigning({ verdicts: { traps: 3, fail: 0, watch: 0 }, openComments: 0 }, 'A', 2, 1);
    expect(stillMissing(lines, new Set(['inputs', 'verdicts'])).map(({ key }) => key)).toEqual(['cases']);
    expect(stillMissing(lines, new Set(['inputs', 'verdicts', 'cases']))).toEqual([]);
  });
});
