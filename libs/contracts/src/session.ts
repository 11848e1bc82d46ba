import * as z from 'zod';
import { DECLINABLE_MAILS, DeclinableMail } from './mails';

export const SignIn = z.strictObject({
  email: z.string().trim().min(3).max(254),
  password: z.string().min(1).max(1_000),
  /** One-time or recovery code of a person who turned codes on; asked for once the password was right. */
  code: z.string().trim().min(1).max(64).optional(),
});
export type SignIn = z.infer<typeof SignIn>;

export const UNIT_SYSTEMS = ['us', 'si'] as const;
export const THEMES = ['system', 'light', 'dark'] as const;

export const Person = z.object({
  id: z.string(),
  name: z.string(),
  email: z.string(),
  units: z.enum(UNIT_SYSTEMS),
  theme: z.enum(THEMES),
  timeZone: z.string(),
  /** Mails that the person does not want. */
  unwantedMails: z.array(DeclinableMail),
});
export type Person = z.infer<typeof Person>;

export const Session = z.object({ person: Person });
export type Session = z.infer<typeof Session>;

/** Neither control characters nor marks that turn the direction of what stands beside the name. */
export const PersonName = z
  .string()
  .trim()
  .min(1)
  .max(80)
  .regex(/^[^\p{Cc}\u202A-\u202E\u2066-\u2069]*$/u, 'leave out control characters');

/** What a person may change of their own profile. */
export const ProfileChange = z
  .strictObject({
    name: PersonName,
    units: z.enum(UNIT_SYSTEMS),
    theme: z.enum(THEMES),
    timeZone: z.string().min(1).max(64),
    unwantedMails: z.array(DeclinableMail).max(DECLINABLE_MAILS.length),
  })
  .partial();
export type ProfileChange = z.infer<typeof ProfileChange>;

/** One of the person's own sessions. */
export const OwnSession = z.object({
  id: z.string(),
  agent: z.string(),
  createdAt: z.iso.datetime(),
  seenAt: z.iso.datetime(),
  current: z.boolean(),
});
export type OwnSession = z.infer<typeof OwnSession>;
