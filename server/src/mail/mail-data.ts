import type { MailPurpose } from '@riseback/contracts';
import { Role } from '@riseback/contracts';
import type { QuantityKind } from '@riseback/units';
import * as z from 'zod';

/** What a mail may give figures of; a count has no unit and stands in words. */
const KINDS = [
  'pressure',
  'absolutePressure',
  'gaugePressure',
  'pressureDifference',
  'length',
  'diameter',
  'massFlow',
  'temperature',
  'temperatureDifference',
  'velocity',
  'fraction',
  'quality',
  'factor',
] as const satisfies readonly QuantityKind[];

/** SI, printed in the recipient's units. */
const Figure = z.strictObject({
  label: z.string(),
  kind: z.enum(KINDS),
  value: z.number(),
  /** Of the site, which gauge pressures are counted from. */
  atmosphericPressurePa: z.number().optional(),
});
export type Figure = z.infer<typeof Figure>;

const network = {
  siteId: z.string(),
  siteName: z.string().optional(),
  networkId: z.string(),
  networkName: z.string(),
  /** Who caused the mail. */
  byName: z.string(),
  figures: z.array(Figure).max(20).optional(),
};
const verdicts = z.strictObject({ traps: z.number().int(), fail: z.number().int(), watch: z.number().int() });

/** A revision that moved on: submitted, returned, approved. */
const RevisionData = z.strictObject({
  ...network,
  revisionId: z.string(),
  letter: z.string(),
  title: z.string(),
  note: z.string().optional(),
  verdicts: verdicts.optional(),
});
export type RevisionData = z.infer<typeof RevisionData>;

/** A comment, on a revision or on the network as it stands. */
const CommentData = z.strictObject({
  ...network,
  revisionId: z.string().optional(),
  letter: z.string().optional(),
  title: z.string().optional(),
  threadId: z.string().optional(),
  /** What it is pinned to. */
  elementId: z.string().optional(),
  elementTag: z.string().optional(),
  excerpt: z.string(),
});
export type CommentData = z.infer<typeof CommentData>;

const InvitationData = z.strictObject({
  linkId: z.string(),
  siteName: z.string(),
  role: Role,
  byName: z.string(),
  expiresAt: z.iso.datetime(),
});
export type InvitationData = z.infer<typeof InvitationData>;

const ResetData = z.strictObject({
  linkId: z.string(),
  /** Absent where the person asked themselves. */
  byName: z.string().optional(),
  expiresAt: z.iso.datetime(),
});
export type ResetData = z.infer<typeof ResetData>;

/** The one schema of the column `data` of each purpose. */
export const MAIL_DATA = {
  invitation: InvitationData,
  passwordReset: ResetData,
  submitted: RevisionData,
  returned: RevisionData,
  approved: RevisionData,
  mention: CommentData,
  comment: CommentData,
} as const satisfies Record<MailPurpose, z.ZodType>;
