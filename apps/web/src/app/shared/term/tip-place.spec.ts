import { describe, expect, it } from 'vitest';
import { tipPlace } from './tip-place';

const TIP = { width: 280, height: 60 };
const SCREEN = { width: 1440, height: 900 };

describe('tipPlace', () => {
  it('stands under the word', () => {
    expect(tipPlace({ left: 100, top: 200, width: 60, height: 24 }, TIP, SCREEN)).toEqual({ left: 100, top: 224 });
  });

  it('stands over a word at the foot of the window', () => {
    expect(tipPlace({ left: 100, top: 870, width: 60, height: 24 }, TIP, SCREEN)).toEqual({ left: 100, top: 810 });
  });

  it('stays within the window, also on a phone narrower than word and tip', () => {
    expect(tipPlace({ left: 1400, top: 200, width: 60, height: 24 }, TIP, SCREEN).left).toBe(1152);
    expect(tipPlace({ left: 4, top: 4, width: 60, height: 24 }, TIP, { width: 240, height: 30 })).toEqual({
      left: 8,
      top: 8,
    });
  });
});
