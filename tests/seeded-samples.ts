import fc from 'fast-check';

/**
 * Property tests draw the same sample at every run, so that a change and not chance makes them fail; the long form draws a new one, and
 * fast-check prints the seed of what failed. RISEBACK_TEST_SEED asks for another or for that one again.
 */
const USUAL_SEED = 20_261_201;
const { RISEBACK_TEST_SEED: given, RISEBACK_TEST_FULL: full } = process.env;

if (given !== undefined && given !== '') fc.configureGlobal({ seed: Number(given) });
else if (full !== '1') fc.configureGlobal({ seed: USUAL_SEED });
