import { defineConfig } from 'vitest/config';

// The web's unit specs run through `ng test`; everything without Angular runs here.
export default defineConfig({
  test: {
    include: ['libs/**/*.spec.ts', 'server/**/*.spec.ts', 'tests/{api,validation,properties,faults}/**/*.spec.ts'],
    setupFiles: ['tests/seeded-samples.ts'],
    testTimeout: 30_000,
    hookTimeout: 60_000,
  },
});
