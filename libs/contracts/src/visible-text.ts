import * as z from 'zod';

/** One line that is shown to others: no control characters, and no marks that turn the direction of what stands beside it. */
export const visible = (longest: number) =>
  z
    .string()
    .trim()
    .max(longest)
    .regex(/^[^\p{Cc}\u202A-\u202E\u2066-\u2069]*$/u, 'leave out control characters');

/** The same over several lines. */
export const visibleLines = (longest: number) =>
  z
    .string()
    .trim()
    .max(longest)
    .regex(/^(?:[^\p{Cc}\u202A-\u202E\u2066-\u2069]|[\n\t])*$/u, 'leave out control characters');
