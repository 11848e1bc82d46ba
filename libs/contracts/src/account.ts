import * as z from 'zod';

/** Typed anew for what a session left open must not be enough for. */
const PresentPassword = z.string().min(1).max(1_000);
const Code = z.string().trim().min(1).max(64);

/** Body of POST /api/password. */
export const PasswordChange = z.strictObject({
  presentPassword: PresentPassword,
  /** `passwordMistake` says what it must be. */
  newPassword: z.string().min(1).max(1_000),
});
export type PasswordChange = z.infer<typeof PasswordChange>;

/** Body of POST /api/one-time-codes. */
export const CodesBeginning = z.strictObject({ password: PresentPassword });
export type CodesBeginning = z.infer<typeof CodesBeginning>;

/** What an authenticator is given. Codes count only once one of them has confirmed that it has it. */
export const CodesBegun = z.object({
  /** Base32, for typing. */
  secret: z.string(),
  /** otpauth:// address, for a picture that an authenticator reads. */
  address: z.string(),
});
export type CodesBegun = z.infer<typeof CodesBegun>;

/** Body of POST /api/one-time-codes/confirmation. */
export const CodesConfirmation = z.strictObject({ code: Code });
export type CodesConfirmation = z.infer<typeof CodesConfirmation>;

/** Body of what turns codes off, or makes new recovery codes. Either kind of code will do. */
export const CodesProof = z.strictObject({ password: PresentPassword, code: Code });
export type CodesProof = z.infer<typeof CodesProof>;

/** Shown this once: the server keeps only what can tell whether one of them is right. */
export const RecoveryCodes = z.object({ recoveryCodes: z.array(z.string()) });
export type RecoveryCodes = z.infer<typeof RecoveryCodes>;

export const CodesState = z.object({
  on: z.boolean(),
  /** Since when; absent when off. */
  since: z.iso.datetime().optional(),
  recoveryCodesLeft: z.number().int(),
});
export type CodesState = z.infer<typeof CodesState>;

/** Answer of DELETE /api/own-sessions. */
export const SessionsEnded = z.object({ ended: z.number().int() });
export type SessionsEnded = z.infer<typeof SessionsEnded>;
