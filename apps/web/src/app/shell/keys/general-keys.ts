export interface KeySection {
  readonly title: string;
  /** The view whose keys these are, as the address names it; '' everywhere. */
  readonly view: string;
  readonly keys: readonly (readonly [keys: string, words: string])[];
}

/** What the keyboard does outside the drawing, which has a list of its own. */
export const KEY_SECTIONS: readonly KeySection[] = [
  {
    title: 'Lists',
    view: 'lists',
    keys: [
      ['Arrows', 'to the next cell; with Ctrl to the edge of the table'],
      ['Home, End', 'to the first or last cell of the row; with Ctrl of the table'],
      ['Page Up, Page Down', 'a page of rows'],
      ['Enter, F2', 'edit the cell; in a head, sort by it'],
      ['Any letter or digit', 'begin the cell anew'],
      ['Enter, Tab', 'while editing: accept and go on'],
      ['Escape', 'keep what stood there; then deselect the rows'],
      ['Delete', 'empty the cell'],
      ['Space', 'select the row; with Shift up to there'],
      ['Ctrl+A', 'select all rows'],
      ['Ctrl+D', 'fill the column down from the first selected row'],
      ['Ctrl+C, Ctrl+V', 'copy; paste a block from a spreadsheet'],
      ['Ctrl+Z, Ctrl+Shift+Z', 'undo, redo'],
    ],
  },
  {
    title: 'Lift profile',
    view: 'ledger',
    keys: [
      ['Arrows', 'from place to place along the way'],
      ['Home, End', 'to the trap, to the vessel'],
    ],
  },
  {
    title: 'Everywhere',
    view: '',
    keys: [
      ['Tab, Shift+Tab', 'to the next control and back'],
      ['Enter', 'accept what was typed into a field'],
      ['Escape', 'put away a tip, a menu or a dialog'],
      ['Arrows', 'along a menu or a row of tabs'],
      ['?', 'the keys of this view'],
    ],
  },
];

/** The open view's keys first, then those of everywhere. */
export function keySectionsOf(path: string): readonly KeySection[] {
  const view = /\/networks\/[^/]+\/([a-z-]+)/.exec(path)?.[1] ?? '';
  return KEY_SECTIONS.filter((section) => section.view === '' || section.view === view);
}
