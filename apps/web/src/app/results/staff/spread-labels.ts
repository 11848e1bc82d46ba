export interface LabelWish {
  /** Where the label would stand best: the height of what it names. */
  readonly at: number;
  readonly height: number;
}

/**
 * Places labels of a column near what they name, in the order of those heights, without any two overlapping.
 * Labels that crowd are laid as one block around the middle of their wishes, so that a crowd moves no label farther than it must.
 * @returns the middle of each label, in the order given
 */
export function spreadLabels(wishes: readonly LabelWish[], top: number, bottom: number): number[] {
  const order = wishes.map((_, i) => i).sort((a, b) => (wishes[a]?.at ?? 0) - (wishes[b]?.at ?? 0) || a - b);
  const blocks: Block[] = [];
  for (const index of order) {
    const wish = wishes[index];
    if (wish === undefined) continue;
    let block: Block = { members: [index], height: wish.height, start: wish.at - wish.height / 2 };
    block = { ...block, start: within(block, top, bottom) };
    for (
      let above = blocks.at(-1);
      above !== undefined && above.start + above.height > block.start;
      above = blocks.at(-1)
    ) {
      blocks.pop();
      block = joined(above, block, wishes);
      block = { ...block, start: within(block, top, bottom) };
    }
    blocks.push(block);
  }
  const middles = new Array<number>(wishes.length).fill(0);
  for (const { members, start } of blocks) {
    let y = start;
    for (const index of members) {
      const height = wishes[index]?.height ?? 0;
      middles[index] = y + height / 2;
      y += height;
    }
  }
  return middles;
}

interface Block {
  readonly members: readonly number[];
  readonly height: number;
  readonly start: number;
}

/** Two crowding blocks as one, where the sum of all its labels' moves is least squared. */
function joined(above: Block, below: Block, wishes: readonly LabelWish[]): Block {
  const members = [...above.members, ...below.members];
  let offset = 0;
  let sum = 0;
  for (const index of members) {
    const wish = wishes[index];
    if (wish === undefined) continue;
    sum += wish.at - (offset + wish.height / 2);
    offset += wish.height;
  }
  return { members, height: offset, start: sum / members.length };
}

function within({ start, height }: Block, top: number, bottom: number): number {
  return Math.max(top, Math.min(start, bottom - height));
}
