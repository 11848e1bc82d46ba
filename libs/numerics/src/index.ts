export { NoConvergenceError, NonPhysicalInputError } from './errors';
export {
  integrateAdaptive,
  integrationWorkspace,
  type Derivative,
  type IntegrationOptions,
  type IntegrationResult,
  type IntegrationWorkspace,
} from './integrate-adaptive';
export { relativeError } from './relative-error';
export { findRootBracketed, type RootOptions } from './root-finding';
export { solveLinearSystem } from './linear-system';
export { SparseSymmetric } from './sparse-symmetric';
