import { NoConvergenceError } from '@riseback/numerics';
import { SteamRangeError } from '@riseback/steam';

/** Computing failed at one element of the network for a reason that lies in the network, not in the program. */
export class ElementFailure extends Error {
  override readonly name = 'ElementFailure';

  /**
   * @param element id
   * @param pointer RFC 6901 into the network file
   * @param reason what went wrong, with the value it went wrong at
   */
  constructor(
    readonly element: string,
    readonly pointer: string,
    readonly reason: Error,
  ) {
    super(reason.message);
  }
}

const COLLECTION = { node: 'nodes', pipe: 'pipes' } as const;

/** Runs a computation for one element, so that a failure in it carries the element's name. Bugs pass through as they are. */
export function naming<T>(
  kind: keyof typeof COLLECTION,
  element: { readonly id: string },
  index: number,
  compute: () => T,
): T {
  try {
    return compute();
  } catch (error) {
    if (!(error instanceof SteamRangeError || error instanceof NoConvergenceError)) throw error;
    throw new ElementFailure(element.id, `/${COLLECTION[kind]}/${index}`, error);
  }
}
