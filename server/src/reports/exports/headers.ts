/** Which pipes the condensate of one trap goes through, from the trap down. */
export interface TrapWay {
  readonly trapId: string;
  readonly walk: readonly string[];
}

/**
 * The header that collects each trap, by the trap's id. A header is a run of pipes that more than one trap drains through, as far as
 * where another such run meets it; it is named by its last pipe. A trap that shares no pipe is a header of its own.
 */
export function headersOf(ways: readonly TrapWay[]): ReadonlyMap<string, string> {
  const traps = new Map<string, number>();
  const next = new Map<string, string>();
  for (const { walk } of ways) {
    walk.forEach((pipe, i) => {
      traps.set(pipe, (traps.get(pipe) ?? 0) + 1);
      const following = walk[i + 1];
      if (following !== undefined) next.set(pipe, following);
    });
  }
  const isShared = (pipe: string): boolean => (traps.get(pipe) ?? 0) > 1;
  const meetings = new Map<string, number>();
  for (const [pipe, following] of next) {
    if (isShared(pipe)) meetings.set(following, (meetings.get(following) ?? 0) + 1);
  }
  const lastOf = (first: string): string => {
    let pipe = first;
    // a pipe never follows itself: a walk that came round would not end
    for (let following = next.get(pipe); following !== undefined && meetings.get(following) === 1;) {
      pipe = following;
      following = next.get(pipe);
    }
    return pipe;
  };
  return new Map(
    ways.map(({ trapId, walk }) => {
      const shared = walk.find(isShared);
      return [trapId, shared === undefined ? trapId : lastOf(shared)];
    }),
  );
}
