interface Recipe<View> {
  /** All that the view is made of; the same things give the same view. */
  readonly basis: readonly unknown[];
  readonly make: () => View;
}

/**
 * Keeps the view of each element as long as what it is made of stays the same, so that a drag draws only what it moves; and the whole
 * map while all of its views stay.
 */
export class ViewCache<Element, View> {
  private known = new Map<string, { readonly basis: readonly unknown[]; readonly view: View }>();
  private views: ReadonlyMap<string, View> = new Map();

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
    if (!sameInOrder(views, this.views)) this.views = views;
    return this.views;
  }
}

function sameInOrder<View>(a: ReadonlyMap<string, View>, b: ReadonlyMap<string, View>): boolean {
  if (a.size !== b.size) return false;
  const others = b.entries();
  for (const [id, view] of a) {
    const [otherId, otherView] = others.next().value ?? [];
    if (id !== otherId || view !== otherView) return false;
  }
  return true;
}
