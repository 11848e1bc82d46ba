export * from './method-pages';
export * from './method-section';
export * from './method-sentences';
export { printed } from './printed-number';
