/** `2 Mar 2026, 14:35` by the clocks of the zone. */
export function timeWords(at: string, timeZone: string): string {
  const parts = new Intl.DateTimeFormat('en-GB', {
    timeZone,
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
  });
  return parts.format(new Date(at));
}

export function clockWords(at: Date, timeZone: string): string {
  const options = { timeZone, hour: '2-digit', minute: '2-digit', hourCycle: 'h23' } as const;
  return new Intl.DateTimeFormat('en-GB', options).format(at);
}

export function deviceTimeZone(): string {
  return new Intl.DateTimeFormat().resolvedOptions().timeZone;
}

/** All zones that the browser knows; UTC first, and the present one whatever the browser thinks of it. */
export function timeZoneChoices(present: string): { value: string; words: string }[] {
  const names = new Set(['UTC', present, ...Intl.supportedValuesOf('timeZone')]);
  const [utc = 'UTC', ...rest] = names;
  return [utc, ...rest.sort()].map((value) => ({ value, words: value.replaceAll('_', ' ') }));
}
