import packageFile from '../../../package.json';

/**
 * Goes up with every change of the solver or of what it rests on that can change a number, so that results of the older
 * engine count as stale.
 */
const SOLVER_REVISION = 3;

/** Stored with every result. */
export const ENGINE_VERSION = `${packageFile.version}+${SOLVER_REVISION}`;
