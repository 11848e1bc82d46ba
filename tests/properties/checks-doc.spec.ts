import { readFileSync } from 'node:fs';
import { CHECK_LIMITS, type CheckLimit } from '@riseback/solver';
import { describe, expect, it } from 'vitest';

const page = readFileSync(new URL('../../docs/methods/checks.md', import.meta.url), 'utf8');
const rows = page.split('\n').map((line) => line.split('|').map((cell) => cell.trim()));

describe('docs/methods/checks.md', () => {
  const limits = Object.entries(CHECK_LIMITS).flatMap(([code, ofCode]) =>
    Object.entries<CheckLimit>(ofCode).map(([key, limit]) => ({ name: `${code}.${key}`, limit })),
  );

  it.each(limits)('gives the default and the source of $name', ({ name, limit }) => {
    const row = rows.find(([, cell]) => cell === `\`${name}\``);
    expect([Number.parseFloat(row?.[2] ?? ''), row?.[3]]).toEqual([limit.value, limit.source]);
  });
});
