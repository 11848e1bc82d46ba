export * from './compare-networks';
export * from './compare-results';
export * from './next-letter';
export * from './revision-deeds';
export * from './revision-state';
export * from './signature-meaning';
export * from './signing-statement';
