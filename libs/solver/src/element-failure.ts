import { NoConvergenceError } from '@riseback/numerics';
import { SteamRangeError } from '@riseback/steam';

const REMEDY = 'Look at the flow, the bore, the length and the rises here: no return works at such a state.';

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
    super(reason instanceof SteamRangeError ? `${reason.message} ${REMEDY}` : reason.message);
  }
}

const COLLECTION = { node: 'nodes', pipe: 'pipes' } as const;

/**
 * What to throw where computing failed at an element: a failure that names it, or the error itself where it is a bug.
 * Meant for a catch clause: `throw atElement('pipe', pipe, index, error)`.
 */
export function atElement(
  kind: keyof typeof COLLECTION,
  element: { readonly id: string },
  index: number,
  error: unknown,
): unknown {
  if (!(error instanceof SteamRangeError || error instanceof NoConvergenceError)) return error;
  return new ElementFailure(element.id, `/${COLLECTION[kind]}/${index}`, error);
}
