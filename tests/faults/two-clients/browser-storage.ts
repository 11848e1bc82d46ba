/**
 * What the client uses of a browser's storage, for a run without a browser: `idb`'s calls on a map, kept for all tabs, and
 * locks. Values are copied on their way in and out, as IndexedDB does.
 */
const stored = new Map<string, unknown>();

export const idbStandIn = {
  openDB: () =>
    Promise.resolve({
      put: (_store: string, value: unknown, key: readonly string[]) => {
        stored.set(JSON.stringify(key), structuredClone(value));
        return Promise.resolve();
      },
      delete: (_store: string, key: readonly string[]) => {
        stored.delete(JSON.stringify(key));
        return Promise.resolve();
      },
      getKey: (_store: string, key: readonly string[]) =>
        Promise.resolve(stored.has(JSON.stringify(key)) ? key : undefined),
      getAllKeys: (_store: string, range: Range) => Promise.resolve(within(range).map(([key]) => key)),
      getAll: (_store: string, range: Range) => Promise.resolve(within(range).map(([, value]) => value)),
    }),
};

type Range = readonly [personId: string, networkId: string];
export const keyRangeStandIn = { bound: (lowest: Range) => lowest };

function within([personId, networkId]: Range) {
  return [...stored]
    .map(([key, value]) => [JSON.parse(key) as string[], structuredClone(value)] as const)
    .filter(([key]) => key[0] === personId && key[1] === networkId);
}

const held = new Set<string>();
export const locksStandIn = {
  request: async (name: string, act: () => Promise<void>) => {
    held.add(name);
    try {
      await act();
    } finally {
      held.delete(name);
    }
  },
  query: () => Promise.resolve({ held: [...held].map((name) => ({ name })) }),
};
