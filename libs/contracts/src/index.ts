export * from './audit';
export * from './events';
export * from './networks';
export * from './problem';
export * from './results';
export * from './roles';
export * from './session';
export * from './sites';
