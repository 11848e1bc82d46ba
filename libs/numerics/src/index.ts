export { NoConvergenceError, NonPhysicalInputError } from './errors';
export {
  integrateAdaptive,
  type Derivative,
  type IntegrationOptions,
  type IntegrationResult,
} from './integrate-adaptive';
export { relativeError } from './relative-error';
export { findRootBracketed, type RootOptions } from './root-finding';
