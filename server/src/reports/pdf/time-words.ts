const formats = new Map<string, Intl.DateTimeFormat>();

/** A moment in a person's time zone, which is named. */
export function timeWords(iso: string, timeZone: string): string {
  const known = formats.get(timeZone) ?? formatFor(timeZone);
  // one is slow to make
  formats.set(timeZone, known);
  return known.format(new Date(iso));
}

function formatFor(timeZone: string): Intl.DateTimeFormat {
  return new Intl.DateTimeFormat('en-GB', {
    timeZone,
    year: 'numeric',
    month: 'short',
    day: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    timeZoneName: 'short',
  });
}
