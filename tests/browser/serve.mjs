// The application for the browser tests: as `npm start` serves it, on a fresh database in a temporary folder.
import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

process.env.RISEBACK_DB = join(mkdtempSync(join(tmpdir(), 'riseback-browser-')), 'riseback.db');
await import('../../server/start.mjs');
