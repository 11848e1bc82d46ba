import { REVISION_STATES, Role, SIGNATURE_MEANINGS } from '@riseback/contracts';
import type { SigningStatement } from '@riseback/revisions';
import * as z from 'zod';
import { parsedJson } from './parsed-json';

const text = z.string();

/** What `statementText` of libs/revisions writes, and nothing else. */
const Statement = z.strictObject({
  format: z.literal('riseback-signature'),
  version: z.literal(1),
  revision: z.strictObject({
    id: text,
    networkId: text,
    letter: text,
    title: text,
    reason: text,
    networkVersion: z.number().int(),
    fileHash: text,
    solverHash: text,
    resultsHash: text,
    engineVersion: text,
    createdBy: text,
    createdAt: text,
  }),
  events: z.array(
    z.strictObject({ seq: z.number().int(), state: z.enum(REVISION_STATES), personId: text, at: text, note: text }),
  ),
  person: z.strictObject({ id: text, name: text, role: Role }),
  at: z.iso.datetime(),
  meaning: z.enum(SIGNATURE_MEANINGS),
  sentences: z.array(text),
  audit: z.strictObject({ seq: z.number().int(), hash: text }),
});
export type ReadStatement = z.infer<typeof Statement> & SigningStatement;

/** Undefined for a text that is no statement of ours. */
export function readStatement(statement: string): ReadStatement | undefined {
  return Statement.safeParse(parsedJson(statement)).data;
}
