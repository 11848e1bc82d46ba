import { InjectionToken } from '@angular/core';

/** The calendar date, as 2026-03-01; a test may have another. */
export const TODAY = new InjectionToken<() => string>('today', {
  factory: () => () => new Date().toISOString().slice(0, 10),
});
