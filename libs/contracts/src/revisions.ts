import { NetworkFileShape } from '@riseback/network';
import * as z from 'zod';
import { PersonName } from './session';
import { Role } from './roles';
import { visible, visibleLines } from './visible-text';

/** What becomes of a revision, in the words of document control: `underReview` is issued for review. */
export const REVISION_STATES = ['draft', 'underReview', 'returned', 'approved', 'superseded', 'withdrawn'] as const;
export const RevisionState = z.enum(REVISION_STATES);
export type RevisionState = z.infer<typeof RevisionState>;

/** What a signature means. Only `approved` ends the review. */
export const SIGNATURE_MEANINGS = ['reviewed', 'approved'] as const;
export const SignatureMeaning = z.enum(SIGNATURE_MEANINGS);
export type SignatureMeaning = z.infer<typeof SignatureMeaning>;

/** Body of POST /api/networks/:networkId/revisions: freeze the network as it stood at this version. */
export const NewRevision = z.strictObject({
  title: visible(120).min(1),
  reason: visibleLines(1_000).min(1),
  networkVersion: z.number().int().positive(),
});
export type NewRevision = z.infer<typeof NewRevision>;

/** Body of what moves a revision on: submission, return, withdrawal. A return and a withdrawal say why. */
export const RevisionNote = z.strictObject({ note: visibleLines(2_000).default('') });
export type RevisionNote = z.infer<typeof RevisionNote>;
export const RevisionReason = z.strictObject({ note: visibleLines(2_000).min(1) });
export type RevisionReason = z.infer<typeof RevisionReason>;

const by = { personId: z.string(), personName: PersonName, at: z.iso.datetime() };

export const RevisionEvent = z.object({ ...by, seq: z.number().int(), state: RevisionState, note: z.string() });
export type RevisionEvent = z.infer<typeof RevisionEvent>;

export const Signature = z.object({
  ...by,
  seq: z.number().int(),
  meaning: SignatureMeaning,
  role: Role,
  /** RFC 8785 text over which the signature stands. */
  statement: z.string(),
  statementHash: z.string(),
  auditHead: z.string(),
  /** Ed25519, base64. */
  signature: z.string(),
  keyId: z.string(),
});
export type Signature = z.infer<typeof Signature>;

/** One line of a network's history. */
export const RevisionSummary = z.object({
  id: z.string(),
  letter: z.string(),
  /** `name` for lists: letter and title. */
  name: z.string(),
  title: z.string(),
  reason: z.string(),
  state: RevisionState,
  networkVersion: z.number().int(),
  fileHash: z.string(),
  resultsHash: z.string(),
  solverHash: z.string(),
  engineVersion: z.string(),
  createdBy: z.string(),
  createdByName: z.string(),
  createdAt: z.iso.datetime(),
  /** Of its last event. */
  changedAt: z.iso.datetime(),
  openComments: z.number().int(),
  verdicts: z.object({ traps: z.number().int(), fail: z.number().int(), watch: z.number().int() }).optional(),
});
export type RevisionSummary = z.infer<typeof RevisionSummary>;

/** What the reader may do with a revision now, and if not, why: in words to be shown. */
export const REVISION_DEEDS = ['submit', 'return', 'withdraw', 'sign'] as const;
export const RevisionDeed = z.enum(REVISION_DEEDS);
export type RevisionDeed = z.infer<typeof RevisionDeed>;
export const AllowedDeeds = z.record(
  RevisionDeed,
  z.discriminatedUnion('allowed', [
    z.object({ allowed: z.literal(true) }),
    z.object({ allowed: z.literal(false), why: z.string() }),
  ]),
);
export type AllowedDeeds = z.infer<typeof AllowedDeeds>;

export const Revision = z.object({
  ...RevisionSummary.shape,
  networkId: z.string(),
  /** Frozen. */
  file: NetworkFileShape,
  events: z.array(RevisionEvent),
  signatures: z.array(Signature),
  /** Who made any accepted edit after the last approved revision, up to this one's version: none of them may sign. */
  editedBy: z.array(z.object({ personId: z.string(), personName: z.string() })),
  deeds: AllowedDeeds,
});
export type Revision = z.infer<typeof Revision>;

/**
 * GET …/revisions/:revisionId/signing?meaning=…: what the signature would mean, word for word, before it is made. Its `token` names this
 * very text: a revision that has changed its state since, or another text, is not signed.
 */
export const SigningQuery = z.object({ meaning: SignatureMeaning });
export const SigningTerms = z.object({
  meaning: SignatureMeaning,
  /** Sentences, the first what is declared, then what it rests on, then the cautions. */
  sentences: z.array(z.string()),
  fileHash: z.string(),
  resultsHash: z.string(),
  engineVersion: z.string(),
  openComments: z.number().int(),
  verdicts: z.object({ traps: z.number().int(), fail: z.number().int(), watch: z.number().int() }),
  /** The person turned codes on: the signature asks for one. */
  asksForCode: z.boolean(),
  token: z.string(),
});
export type SigningTerms = z.infer<typeof SigningTerms>;

/** Body of POST …/revisions/:revisionId/signatures. */
export const NewSignature = z.strictObject({
  meaning: SignatureMeaning,
  token: z.string().min(1).max(200),
  password: z.string().min(1).max(1_000),
  code: z.string().trim().min(1).max(64).optional(),
  /** Needed while comments are open. */
  despiteOpenComments: z.boolean().default(false),
});
export type NewSignature = z.infer<typeof NewSignature>;

/** One thing that was verified, in the order in which it was; after the first that does not match, the rest still say theirs. */
export const VerificationStep = z.object({
  /** Such as `inputs`, `results`, `signature 1`, `log`. */
  name: z.string(),
  outcome: z.enum(['matches', 'broken', 'notThere']),
  detail: z.string(),
});
export type VerificationStep = z.infer<typeof VerificationStep>;

/** GET …/revisions/:revisionId/verification, and what `npm run verify-revision -- ID` prints. */
export const Verification = z.object({
  revisionId: z.string(),
  letter: z.string(),
  sound: z.boolean(),
  /** The first that does not match; absent when all is sound. */
  firstBroken: z.string().optional(),
  steps: z.array(VerificationStep),
  /** PEM of the public key that the signatures were verified with. */
  publicKey: z.string(),
  /** The frozen inputs solved again by the present engine; absent where that found no solution. */
  solvedAgain: z
    .object({
      engineVersion: z.string(),
      sameEngine: z.boolean(),
      /** The largest difference of any trap's back pressure in any case, and where. */
      largestDifferencePa: z.number(),
      trapId: z.string().optional(),
      caseId: z.string().optional(),
      verdictsChanged: z.number().int(),
    })
    .optional(),
});
export type Verification = z.infer<typeof Verification>;

/** What a comment is pinned to. A result names its element and, where it is of one case, the case. */
export const CommentSubject = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('whole') }),
  z.strictObject({ kind: z.literal('element'), elementId: z.string().min(1).max(64) }),
  z.strictObject({
    kind: z.literal('result'),
    elementId: z.string().min(1).max(64),
    caseId: z.string().max(64).optional(),
    /** Code of the check or finding it is about. */
    code: z.string().min(1).max(64).optional(),
  }),
]);
export type CommentSubject = z.infer<typeof CommentSubject>;

/** Body of POST /api/networks/:networkId/comments. An answer names its thread and takes that one's subject and revision. */
export const NewComment = z.strictObject({
  revisionId: z.string().min(1).max(64).optional(),
  threadId: z.string().min(1).max(64).optional(),
  subject: CommentSubject.optional(),
  body: visibleLines(4_000).min(1),
  mentions: z.array(z.string().min(1).max(64)).max(20).default([]),
});
export type NewComment = z.infer<typeof NewComment>;

export const CommentResolution = z.strictObject({ resolved: z.boolean() });
export type CommentResolution = z.infer<typeof CommentResolution>;

export const Comment = z.object({
  ...by,
  id: z.string(),
  body: z.string(),
  mentions: z.array(z.object({ personId: z.string(), personName: z.string() })),
});
export type Comment = z.infer<typeof Comment>;

export const CommentThread = z.object({
  id: z.string(),
  revisionId: z.string().optional(),
  subject: CommentSubject,
  comments: z.array(Comment),
  resolved: z.object({ personId: z.string(), personName: z.string(), at: z.iso.datetime() }).optional(),
});
export type CommentThread = z.infer<typeof CommentThread>;
