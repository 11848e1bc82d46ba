interface Size {
  readonly width: number;
  readonly height: number;
}
interface Box extends Size {
  readonly left: number;
  readonly top: number;
}

/** How far a tip keeps from the edge of the window, px. */
const MARGIN = 8;

/** Under the word where there is room, else over it; touching it, so that a pointer gets across without leaving both. */
export function tipPlace(word: Box, tip: Size, screen: Size): { readonly left: number; readonly top: number } {
  const under = word.top + word.height;
  const fits = under + tip.height + MARGIN <= screen.height;
  return {
    left: Math.max(MARGIN, Math.min(word.left, screen.width - tip.width - MARGIN)),
    top: fits ? under : Math.max(MARGIN, word.top - tip.height),
  };
}
