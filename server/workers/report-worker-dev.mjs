// The report's thread from its TypeScript, while developing and in tests: a worker does not inherit tsx's loader.
import { register } from 'tsx/esm/api';

register();
export const { report } = await import('./report-worker.ts');
