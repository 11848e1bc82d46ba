import { describe, expect, it } from 'vitest';
import { clockWords, timeWords, timeZoneChoices } from './time-words';

describe('times', () => {
  // Lisbon is an hour ahead of UTC in summer, Kolkata five and a half all the year (IANA time zone database).
  it('are those of the person’s zone', () => {
    expect(timeWords('2026-07-01T23:30:00.000Z', 'Europe/Lisbon')).toBe('2 Jul 2026, 00:30');
    expect(timeWords('2026-03-02T08:05:00.000Z', 'Asia/Kolkata')).toBe('2 Mar 2026, 13:35');
    expect(clockWords(new Date('2026-03-02T00:05:00.000Z'), 'UTC')).toBe('00:05');
  });

  it('may be shown in any zone, the present one and UTC among them once', () => {
    const values = timeZoneChoices('Europe/Lisbon').map(({ value }) => value);
    expect(values[0]).toBe('UTC');
    expect(values.length).toBeGreaterThan(200);
    expect(new Set(values).size).toBe(values.length);
    expect(timeZoneChoices('Etc/Nowhere').map(({ value }) => value)).toContain('Etc/Nowhere');
  });
});
