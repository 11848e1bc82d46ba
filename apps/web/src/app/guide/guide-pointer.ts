/** Elements come late (a view loads, a solve ends) and are made anew by others, so the anchor is looked for again and again. */
const LOOKS_EVERY_MS = 200;

const MARK = 'data-shown';

/** Marks the first element that a selector finds, and brings it into view once. Not a cover over the page: everything stays usable. */
export class GuidePointer {
  private timer: ReturnType<typeof setInterval> | undefined;
  private marked: Element | null = null;

  constructor(private readonly page: Document) {}

  pointAt(selector: string): void {
    this.stop();
    let brought = false;
    const look = (): void => {
      const found = this.page.querySelector(selector);
      if (found === null || found.hasAttribute(MARK)) return;
      this.marked?.removeAttribute(MARK);
      found.setAttribute(MARK, '');
      this.marked = found;
      if (!brought) found.scrollIntoView({ block: 'nearest', inline: 'nearest' });
      brought = true;
    };
    look();
    this.timer = setInterval(look, LOOKS_EVERY_MS);
  }

  stop(): void {
    clearInterval(this.timer);
    this.marked?.removeAttribute(MARK);
    this.marked = null;
  }
}
