import { describe, expect, it } from 'vitest';
import type { KnownReading } from './kept-items';
import { standingReadings } from './standing-readings';

function reading(id: string, gaugeId: string, minute: number, replaces?: string): KnownReading {
  const takenAt = `2026-12-01T10:${String(minute).padStart(2, '0')}:00Z`;
  const base = { id, gaugeId, valuePa: minute, note: '', takenAt, networkId: 'n1', roundId: 'r1', waiting: false };
  return replaces === undefined ? base : { ...base, replaces };
}

const counted = (...readings: KnownReading[]) =>
  Object.fromEntries([...standingReadings(readings)].map(([gaugeId, { id }]) => [gaugeId, id]));

describe('standingReadings', () => {
  it('counts a correction in the place of what it replaces, whatever order they come in', () => {
    const [first, correction] = [reading('a', 'G1', 5), reading('b', 'G1', 9, 'a')];
    expect(counted(first, correction)).toEqual({ G1: 'b' });
    expect(counted(correction, first)).toEqual({ G1: 'b' });
  });

  it('counts the last of a chain, and the later of two that replace nothing', () => {
    expect(counted(reading('a', 'G1', 1), reading('b', 'G1', 2, 'a'), reading('c', 'G1', 3, 'b'))).toEqual({ G1: 'c' });
    expect(counted(reading('late', 'G1', 8), reading('early', 'G1', 2))).toEqual({ G1: 'late' });
  });

  it('keeps gauges apart', () => {
    expect(counted(reading('a', 'G1', 1), reading('b', 'G2', 2))).toEqual({ G1: 'a', G2: 'b' });
  });
});
