const CALENDAR_DATE = /^(\d{4})-(\d{1,2})-(\d{1,2})$/;

export const DATE_HINT = 'Year, month and day, as 2026-03-01';

/** The date as stored; null when the text is none. Days and months in another order would be guessed at, so they are refused. */
export function calendarDate(text: string): string | null {
  const [, year = '', month = '', day = ''] = CALENDAR_DATE.exec(text.trim()) ?? [];
  const date = `${year}-${month.padStart(2, '0')}-${day.padStart(2, '0')}`;
  const at = new Date(`${date}T00:00:00Z`);
  // the 31st of a shorter month would run on into the next
  return Number.isNaN(at.getTime()) || at.toISOString().slice(0, 10) !== date ? null : date;
}

export function noDate(text: string): string {
  return `${text} is not a date. Write year, month and day, as in 2026-03-01.`;
}
