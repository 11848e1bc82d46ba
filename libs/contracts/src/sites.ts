import * as z from 'zod';
import { Permission, Role } from './roles';

export const Site = z.object({
  id: z.string(),
  name: z.string(),
  role: Role,
  permissions: z.array(Permission),
  atmosphericPressurePa: z.number(),
  ambientTemperatureK: z.number(),
  networkCount: z.number().int(),
});
export type Site = z.infer<typeof Site>;

/** Verdicts of the case that a network shows first, or why there are none. */
export const SolveSummary = z.discriminatedUnion('state', [
  z.object({ state: z.literal('solved'), traps: z.number().int(), fail: z.number().int(), watch: z.number().int() }),
  z.object({ state: z.literal('stale') }),
  z.object({ state: z.literal('failed') }),
]);
export type SolveSummary = z.infer<typeof SolveSummary>;

export const NetworkSummary = z.object({
  id: z.string(),
  siteId: z.string(),
  name: z.string(),
  version: z.number().int(),
  changedAt: z.iso.datetime(),
  changedBy: z.string(),
  solve: SolveSummary,
});
export type NetworkSummary = z.infer<typeof NetworkSummary>;
