/** Makes a prepared statement when it is first needed: a repository of one transaction uses few of its statements. */
export function onFirstUse<T>(make: () => T): () => T {
  let made: { readonly value: T } | undefined;
  return () => (made ??= { value: make() }).value;
}
