import * as z from 'zod';
import { SavedBatch } from './networks';

/**
 * GET /api/networks/:networkId/events is a stream of server-sent events. Only `edit` carries an id, its version: what a
 * browser sends as Last-Event-ID after a lost connection is the last version that it has.
 */
export const NETWORK_EVENTS = ['edit', 'solve', 'people', 'plan', 'revisions', 'comments', 'rounds', 'reload'] as const;

/** `edit`: someone's batch was saved, also one's own. */
export const EditEvent = SavedBatch;

/** `solve`: how far the solve of a version is. */
export const SolveEvent = z.object({
  version: z.number().int(),
  solverHash: z.string(),
  state: z.enum(['waiting', 'finished', 'failed']),
});
export type SolveEvent = z.infer<typeof SolveEvent>;

export const PersonHere = z.object({
  personId: z.string(),
  name: z.string(),
  /** Ids of the elements that the person has selected. */
  selected: z.array(z.string()),
});
export type PersonHere = z.infer<typeof PersonHere>;

/** `people`: everyone who has the network open, oneself too. */
export const PeopleEvent = z.object({ people: z.array(PersonHere) });
export type PeopleEvent = z.infer<typeof PeopleEvent>;

/** `plan`: the plan under the drawing was changed; which way, GET /api/networks/:networkId/plan says. */
export const PlanEvent = z.object({ version: z.number().int() });
export type PlanEvent = z.infer<typeof PlanEvent>;

/** `revisions`: one was frozen, moved on or signed; what it is now, GET /api/networks/:networkId/revisions/:revisionId says. */
export const RevisionsEvent = z.object({ revisionId: z.string() });
export type RevisionsEvent = z.infer<typeof RevisionsEvent>;

/** `comments`: a thread was begun, answered, resolved or opened again; `revisionId` is absent for one on the network as it stands. */
export const CommentsEvent = z.object({ threadId: z.string(), revisionId: z.string().optional() });
export type CommentsEvent = z.infer<typeof CommentsEvent>;

/** `rounds`: one was begun, read in or closed; what it holds now, GET /api/networks/:networkId/rounds/:roundId says. */
export const RoundsEvent = z.object({ roundId: z.string() });
export type RoundsEvent = z.infer<typeof RoundsEvent>;

/** `reload`: too far behind to be told edit by edit; the network is to be read again. */
export const ReloadEvent = z.object({ currentVersion: z.number().int() });
export type ReloadEvent = z.infer<typeof ReloadEvent>;

/** Body of POST /api/networks/:networkId/presence. */
export const Presence = z.strictObject({ selected: z.array(z.string().max(129)).max(100) });
export type Presence = z.infer<typeof Presence>;
