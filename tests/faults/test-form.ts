import { randomInt } from 'node:crypto';

/** The long form (`npm run test:full`) or the short one. */
export const FULL = process.env['RISEBACK_TEST_FULL'] === '1';

/** The short form's usual seed; the long form draws a new one, printed so that a failure can be had again with RISEBACK_TEST_SEED. */
const USUAL_SEED = 20_261_201;

/** The seed of this run. */
export function seedOfRun(what: string): number {
  const given = process.env['RISEBACK_TEST_SEED'];
  const seed = given !== undefined && given !== '' ? Number(given) : FULL ? randomInt(2 ** 31) : USUAL_SEED;
  process.stdout.write(`${what}: seed ${seed}\n`);
  return seed;
}

/** Numbers in [0, 1) that follow from a seed (mulberry32, public domain). */
export function randomFrom(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
}
