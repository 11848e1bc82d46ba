import * as z from 'zod';
import { IMAGE_TYPES } from './files';

/** What the image of a plan may be at most. A page of a PDF is drawn to fit in the browser. */
export const PLAN_LIMITS = { bytes: 8 * 1024 * 1024, pixels: 40_000_000, sidePx: 20_000, nameLength: 120 } as const;

const FARTHEST_UNITS = 1e6;
const planOffset = z.number().min(-FARTHEST_UNITS).max(FARTHEST_UNITS);
const planSize = z.number().min(1e-3).max(1e3);

/** Where the plan of a network lies: body of PUT /api/networks/:networkId/plan, with `If-Match: "<version>"`. */
export const PlanPlacement = z.strictObject({
  /** Its top left corner, in units of the drawing. */
  x: planOffset,
  y: planOffset,
  /** Units of the drawing that a pixel of the image takes. */
  unitsPerPixel: planSize,
  /** Metres of the plant that a unit of the drawing stands for; absent until a distance was given. */
  metresPerUnit: z.number().min(1e-6).max(1e4).optional(),
  opacity: z.number().min(0.05).max(1),
});
export type PlanPlacement = z.infer<typeof PlanPlacement>;

/** A name to be shown, of no other use: nothing that could lead anywhere, break a line or turn the text around it. */
export const PlanName = z
  .string()
  .trim()
  .min(1)
  .max(PLAN_LIMITS.nameLength)
  .regex(/^[^\\/\p{C}]+$/u, 'must be a file name without slashes and without characters that cannot be seen');

/**
 * The query of PUT /api/networks/:networkId/plan/image. Where it lies, when not given: as the plan before it, else at the drawing's
 * origin, a pixel a unit.
 */
export const PlanUpload = z.object({
  name: PlanName.optional(),
  x: z.coerce.number().pipe(planOffset).optional(),
  y: z.coerce.number().pipe(planOffset).optional(),
  unitsPerPixel: z.coerce.number().pipe(planSize).optional(),
});
export type PlanUpload = z.infer<typeof PlanUpload>;

export const Plan = z.object({
  ...PlanPlacement.shape,
  /** Names the image for good: another image has another. */
  fileId: z.string(),
  name: z.string(),
  mediaType: z.enum(IMAGE_TYPES),
  sizeBytes: z.number().int(),
  widthPx: z.number().int(),
  heightPx: z.number().int(),
  uploadedBy: z.string(),
  uploadedAt: z.iso.datetime(),
});
export type Plan = z.infer<typeof Plan>;

/** What lies under a drawing. The version counts every change of it, also its removal; 0 = there never was a plan. */
export const NetworkPlan = z.object({ version: z.number().int(), plan: Plan.optional() });
export type NetworkPlan = z.infer<typeof NetworkPlan>;

/** The members that problem type /problems/stale-version adds where a plan is changed. */
export const StalePlan = z.object({ currentVersion: z.number().int(), current: NetworkPlan });
export type StalePlan = z.infer<typeof StalePlan>;
