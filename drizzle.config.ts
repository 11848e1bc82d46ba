import { defineConfig } from 'drizzle-kit';

// eslint-disable-next-line no-restricted-syntax -- drizzle-kit reads the default export
export default defineConfig({ dialect: 'sqlite', schema: './server/src/platform/db/schema.ts', out: './drizzle' });
