/** The caller handed over a value that cannot exist (a negative density, NaN): a bug at the caller's, never a finding. */
export class NonPhysicalInputError extends Error {
  override readonly name = 'NonPhysicalInputError';

  /**
   * @param where name of the function that refused
   * @param values the refused arguments by name, all of them, so that the message alone is enough to reproduce the call
   */
  constructor(
    readonly where: string,
    readonly values: Readonly<Record<string, number>>,
  ) {
    const listed = Object.entries(values).map(([name, value]) => `${name} = ${value}`);
    super(`${where} cannot take ${listed.join(', ')}`);
  }
}

/** An iteration ran out of steps, or its function stopped being a number. */
export class NoConvergenceError extends Error {
  override readonly name = 'NoConvergenceError';

  /**
   * @param where name of the iteration, with the element it works on where the caller knows it
   * @param iterations how many were spent
   * @param residual what was left over, in the unit of the iteration's function
   */
  constructor(
    readonly where: string,
    readonly iterations: number,
    readonly residual: number,
  ) {
    super(`${where} did not converge: residual ${residual} after ${iterations} iterations`);
  }
}
