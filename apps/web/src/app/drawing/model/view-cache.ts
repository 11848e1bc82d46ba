interface Recipe<View> {
  /** All that the view is made of; the same things give the same view. */
  readonly basis: readonly unknown[];
  readonly make: () => View;
}

/** Keeps the view of each element as long as what it is made of stays the same, so that a drag draws only what it moves. */
export class ViewCache<Element, View> {
  private known = new Map<string, { readonly basis: readonly unknown[]; readonly view: View }>();

  all(elements: ReadonlyMap<string, Element>, recipeOf: (element: Element) => Recipe<View>): ReadonlyMap<string, View> {
    const known = new Map<string, { readonly basis: readonly unknown[]; readonly view: View }>();
    const views = new Map<string, View>();
    for (const [id, element] of elements) {
      const { basis, make } = recipeOf(element);
      const before = this.known.get(id);
      const same = before?.basis.length === basis.length && before.basis.every((part, i) => Object.is(part, basis[i]));
      const entry = same ? before : { basis, view: make() };
      known.set(id, entry);
      views.set(id, entry.view);
    }
    this.known = known;
    return views;
  }
}
