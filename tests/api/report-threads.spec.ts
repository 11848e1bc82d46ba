import { readFileSync } from 'node:fs';
import { afterAll, describe, expect, it } from 'vitest';
import type { ReportOrder } from '../../server/src/reports/report-material';
import { ReportThreads } from '../../server/src/reports/report-threads';

const AT = '2026-03-01T08:00:00.000Z';
const fileText = readFileSync(new URL('../fixtures/tern-quay.json', import.meta.url), 'utf8');
const order: ReportOrder = {
  format: 'pdf',
  material: {
    siteName: 'Quay',
    networkName: 'Tern Quay Cannery',
    paper: 'letter',
    reader: { name: 'Ines Keel', units: 'si', timeZone: 'UTC' },
    madeAt: AT,
    state: { kind: 'working', version: 1, changedAt: AT, changedByName: 'Dee Signer' },
    fileHash: 'a'.repeat(64),
    solverHash: 'b'.repeat(64),
    engineVersion: '1',
    fileText,
    outcomesText: '[]',
    ledgersOf: [],
  },
};

const threads = new ReportThreads();
afterAll(() => threads.close());

describe('the thread that makes reports', () => {
  it('makes one, and tells how far it is', async () => {
    const told: number[] = [];
    const bytes = await threads.make(order, (share) => told.push(share), new AbortController().signal);
    expect(Buffer.from(bytes).subarray(0, 8).toString()).toBe('%PDF-1.7');
    expect(told.length).toBeGreaterThan(3);
    expect(told).toEqual(told.toSorted((a, b) => a - b));
  });

  it('is ended within a second when its report is called off in the middle, and another makes the next', async () => {
    const calledOff = new AbortController();
    let at = 0;
    const made = threads.make(
      order,
      (share) => {
        // well inside: the thread is at work and would not hear a word
        if (share > 0.2 && at === 0) {
          at = performance.now();
          calledOff.abort();
        }
      },
      calledOff.signal,
    );
    await expect(made).rejects.toThrow('aborted');
    expect(performance.now() - at).toBeLessThan(1_000);
    const next = await threads.make(order, () => undefined, new AbortController().signal);
    expect(next.length).toBeGreaterThan(1_000);
  });

  it('hands back what breaks in it', async () => {
    const broken = { ...order, material: { ...order.material, fileText: '{}' } };
    await expect(threads.make(broken, () => undefined, new AbortController().signal)).rejects.toThrow('does not read');
  });
});
