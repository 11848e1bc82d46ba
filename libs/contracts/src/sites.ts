import { Limits, SiteConditions } from '@riseback/network';
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

/** What carries a tag, and may have a pattern for it. */
export const TAGGED_KINDS = ['trap', 'junction', 'receiver', 'flashVessel', 'pumpedInlet', 'pipe', 'gauge'] as const;
export type TaggedKind = (typeof TAGGED_KINDS)[number];

const PLAIN = String.raw`[A-Za-z0-9 ._\/-]{0,8}`;
/**
 * How tags are made at a site: the text as it stands, one run of `#` for a number of at least so many digits, and `*`, if any, for the
 * letters of the tag that came before (docs/data.md).
 */
export const TagPattern = z
  .string()
  .regex(
    new RegExp(`^${PLAIN}\\*?${PLAIN}#{1,6}${PLAIN}$`),
    'is letters, digits and signs with one run of # for the number, and at most one * before it, as in TR-### or *-##',
  );

const patternPerKind = <T extends z.ZodType>(pattern: T) =>
  Object.fromEntries(TAGGED_KINDS.map((kind) => [kind, pattern])) as Record<TaggedKind, T>;
export const TagPatterns = z.strictObject(patternPerKind(TagPattern.optional()));
export type TagPatterns = z.infer<typeof TagPatterns>;

/** What new networks of a site begin with, and how its elements are tagged. */
export const SiteSettings = z.object({
  atmosphericPressurePa: z.number(),
  ambientTemperatureK: z.number(),
  limits: Limits,
  tagPatterns: TagPatterns,
});
export type SiteSettings = z.infer<typeof SiteSettings>;

/** The limits with each of them open to `null`. */
const LimitsChange = z.strictObject(
  Object.fromEntries(
    Object.entries(Limits.shape).map(([check, limits]) => [
      check,
      z
        .strictObject(
          Object.fromEntries(Object.entries(limits.unwrap().shape).map(([key, of]) => [key, of.nullable()])),
        )
        .optional(),
    ]),
  ),
);

/** Body of PATCH /api/sites/:siteId/settings: only what changes; `null` gives a limit back to its default and takes a pattern away (RFC 7396). */
export const SiteSettingsChange = z.strictObject({
  atmosphericPressurePa: SiteConditions.shape.atmosphericPressurePa.unwrap().optional(),
  ambientTemperatureK: SiteConditions.shape.ambientTemperatureK.unwrap().optional(),
  limits: LimitsChange.optional(),
  tagPatterns: z.strictObject(patternPerKind(TagPattern.nullable().optional())).optional(),
});
export type SiteSettingsChange = z.infer<typeof SiteSettingsChange>;

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
