/** A gauge may have the id of a node or a pipe, so on the sheet it goes by a name that no element can have. */
const PREFIX = 'gauge:';

export function gaugeKey(gaugeId: string): string {
  return PREFIX + gaugeId;
}

/** The gauge's own id; undefined where the name is an element's. */
export function gaugeIdOf(key: string): string | undefined {
  return key.startsWith(PREFIX) ? key.slice(PREFIX.length) : undefined;
}
