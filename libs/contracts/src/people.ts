import * as z from 'zod';
import { Role } from './roles';
import { PersonName } from './session';

const Email = z.string().trim().min(3).max(254).pipe(z.email());

/** GET /api/sites/:siteId/names: who has a role at a site, for whoever may see it; for mentions. */
export const NamedPerson = z.object({ id: z.string(), name: z.string(), role: Role });
export type NamedPerson = z.infer<typeof NamedPerson>;

/** GET /api/sites/:siteId/people, for its administrators. */
export const SitePerson = z.object({
  ...NamedPerson.shape,
  email: z.string(),
  grantedAt: z.iso.datetime(),
  grantedByName: z.string().optional(),
  disabledAt: z.iso.datetime().optional(),
  seenAt: z.iso.datetime().optional(),
  codesOn: z.boolean(),
  /** Has a role at no other site: only then may this site's administrators disable the account or turn its codes off. */
  onlyHere: z.boolean(),
});
export type SitePerson = z.infer<typeof SitePerson>;

export const RoleChange = z.strictObject({ role: Role });
export type RoleChange = z.infer<typeof RoleChange>;

/** Body of POST /api/sites/:siteId/invitations. */
export const NewInvitation = z.strictObject({ email: Email, role: Role });
export type NewInvitation = z.infer<typeof NewInvitation>;

/** One that was neither accepted nor withdrawn; an expired one can be sent again. */
export const Invitation = z.object({
  id: z.string(),
  email: z.string(),
  role: Role,
  madeByName: z.string(),
  madeAt: z.iso.datetime(),
  expiresAt: z.iso.datetime(),
  expired: z.boolean(),
});
export type Invitation = z.infer<typeof Invitation>;

/** The links in mails carry it; 256 bits, base64url. */
export const LinkToken = z.string().regex(/^[A-Za-z0-9_-]{43}$/, 'is not a link of ours');
export const LINK_PURPOSES = ['invitation', 'passwordReset'] as const;
export type LinkPurpose = (typeof LINK_PURPOSES)[number];

/** Body of POST /api/links: what a link is for, before anything is done with it. The token never stands in an address of the API. */
export const LinkQuestion = z.strictObject({ token: LinkToken });
export const LinkTold = z.discriminatedUnion('purpose', [
  z.object({
    purpose: z.literal('invitation'),
    email: z.string(),
    siteName: z.string(),
    role: Role,
    /** Who sent it. */
    fromName: z.string(),
    /** There is an account under this address: its own password accepts. */
    hasAccount: z.boolean(),
    expiresAt: z.iso.datetime(),
  }),
  z.object({
    purpose: z.literal('passwordReset'),
    email: z.string(),
    fromName: z.string().optional(),
    expiresAt: z.iso.datetime(),
  }),
]);
export type LinkTold = z.infer<typeof LinkTold>;

/** Body of POST /api/links/acceptance: a new account takes a name and a new password, an old one its own password (and code). */
export const InvitationAcceptance = z.strictObject({
  token: LinkToken,
  name: PersonName.optional(),
  password: z.string().min(1).max(1_000),
  code: z.string().trim().min(1).max(64).optional(),
});
export type InvitationAcceptance = z.infer<typeof InvitationAcceptance>;

/** Body of POST /api/password-resets: always answered alike, whether there is such an account or not. */
export const ResetRequest = z.strictObject({ email: Email });
export type ResetRequest = z.infer<typeof ResetRequest>;

/** Body of POST /api/password-resets/completion. Codes, where turned on, are asked for as at a sign-in. */
export const ResetCompletion = z.strictObject({
  token: LinkToken,
  newPassword: z.string().min(1).max(1_000),
  code: z.string().trim().min(1).max(64).optional(),
});
export type ResetCompletion = z.infer<typeof ResetCompletion>;
