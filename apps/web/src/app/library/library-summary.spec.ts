import type { LibraryModel } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import { newestFirst, typeRows } from './library-summary';

const model = (id: string, rest: Partial<LibraryModel>): LibraryModel => ({
  id,
  name: id,
  version: 1,
  createdBy: 'Ines Kallan',
  createdAt: '2026-03-01T08:00:00.000Z',
  ...rest,
});

const MODELS = [
  model('a', { trapType: 'orifice' }),
  model('b', { trapType: 'orifice', capacity: [{ differentialPa: 50_000, flowKgS: 0.06 }] }),
  model('c', { trapType: 'orifice', retired: true }),
  model('d', { createdAt: '2026-03-02T08:00:00.000Z' }),
];

describe('the library at a glance', () => {
  it('counts what is in use by type, and what no capacity is known of', () => {
    expect(typeRows(MODELS).map(({ models, without }) => [models, without])).toEqual([
      [2, 1],
      [1, 1],
    ]);
    expect(typeRows([])).toEqual([]);
  });

  it('puts what was saved last first', () => {
    expect(newestFirst(MODELS)[0]?.id).toBe('d');
  });
});
