/**
 * Ids for the graph library and the DOM: a letter and six digits. It joins ids without a separator and makes element ids of them, so the
 * file's own would clash. An element keeps its number as long as the page lives.
 */
export class GraphIds {
  private readonly byElement = new Map<string, string>();

  of(elementId: string, letter: 'n' | 'p'): string {
    const known = this.byElement.get(elementId);
    if (known !== undefined) return known;
    const made = letter + String(this.byElement.size + 1).padStart(6, '0');
    this.byElement.set(elementId, made);
    return made;
  }
}
