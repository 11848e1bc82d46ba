import type { CaseOutcome, Role } from '@riseback/contracts';
import { applyBatch, toFile, type EditOp, type NetworkDocument } from '@riseback/network';
import { nextLetter, signatureSentences } from '@riseback/revisions';
import type { NetworkService } from '../src/networks/network-service';
import { solverHashOf } from '../src/networks/network-hashes';
import type { Database } from '../src/platform/db/database';
import { frozenContent } from '../src/revisions/frozen-revision';
import { summaryOf } from '../src/revisions/outcome-summary';
import { historyOf, type RevisionWithHistory } from '../src/revisions/revision-history';
import { recordFreeze, recordMove, type DoneBy } from '../src/revisions/revision-moves';
import { RevisionRepository } from '../src/revisions/revision-repository';
import { recordSignature } from '../src/revisions/signature-making';
import { signedMatter } from '../src/revisions/signed-matter';
import type { SigningKey } from '../src/revisions/signing-key';
import { ENGINE_VERSION } from '../src/solve/engine-version';
import { solvedOverview } from '../src/solve/live-solves';
import type { SolvePort } from '../src/solve/solve-port';
import { caseIdsOf } from '../src/solve/solve-cases';
import { SolveRepository } from '../src/solve/solve-repository';

/** What a solve said. */
export interface Solved {
  readonly outcomes: readonly CaseOutcome[];
  readonly solveMs: number;
}

/** A network as one revision freezes it. */
interface SolvedVersion extends Solved {
  readonly document: NetworkDocument;
}

interface DemoEdit {
  readonly label: string;
  readonly ops: readonly EditOp[];
}

/** The plant before its last four edits, and those edits: after them it is the plant of the file again, op for op. */
export interface DemoHistory {
  readonly before: NetworkDocument;
  readonly edits: readonly DemoEdit[];
  readonly after: NetworkDocument;
}

/** What the designer changed after the first issue, told backwards. */
const UNDONE: readonly DemoEdit[] = [
  {
    label: 'unit heater UH-4 over the hall door, with its drain',
    ops: [
      { op: 'remove', in: 'pipes', id: 'L18' },
      { op: 'remove', in: 'nodes', id: 'TH4' },
    ],
  },
  {
    label: 'can washer CW-1 at its new load',
    ops: [{ op: 'set', in: 'nodes', id: 'TW1', key: 'loadKgS', from: 0.1008, to: 0.0756 }],
  },
  {
    label: 'CR-133 out of the washer bay in 2 in',
    ops: [
      {
        op: 'set',
        in: 'pipes',
        id: 'L33',
        key: 'size',
        from: { nps: '2', schedule: '80' },
        to: { nps: '1-1/2', schedule: '80' },
      },
    ],
  },
  {
    label: 'CR-125 along the rack in 2-1/2 in',
    ops: [
      {
        op: 'set',
        in: 'pipes',
        id: 'L25',
        key: 'size',
        from: { nps: '2-1/2', schedule: '80' },
        to: { nps: '1-1/2', schedule: '80' },
      },
    ],
  },
];

export function demoHistory(plant: NetworkDocument): DemoHistory {
  let before = plant;
  const edits = UNDONE.map(({ label, ops }) => {
    const applied = applyBatch(before, ops);
    if (!applied.ok) throw new Error(`demo, "${label}": ${JSON.stringify(applied.errors)}`);
    before = applied.document;
    return { label, ops: applied.inverse };
  });
  return { before, edits: edits.reverse(), after: plant };
}

/** Both versions that are frozen, before anything is stored: a transaction does not wait for a solver. */
export async function solveHistory(solver: SolvePort, { before, after }: DemoHistory): Promise<[Solved, Solved]> {
  return [await solve(solver, before), await solve(solver, after)];
}

async function solve(solver: SolvePort, document: NetworkDocument): Promise<Solved> {
  const file = toFile(document);
  const ended = await solver.solve('demo', { file, caseIds: caseIdsOf(file), partial: true, bands: true });
  if (ended.end !== 'finished') throw new Error(`the demo plant could not be solved: ${JSON.stringify(ended)}`);
  return ended;
}

export interface DemoPersonHere {
  readonly id: string;
  readonly name: string;
  readonly role: Role;
}

export interface DemoRevisionParts {
  readonly db: Database;
  readonly networks: Pick<NetworkService, 'createFor' | 'editFor'>;
  readonly key: SigningKey;
  readonly newId: () => string;
  readonly now: () => Date;
  readonly siteId: string;
  readonly designer: DemoPersonHere;
  readonly reviewer: DemoPersonHere;
}

/**
 * The network with its history: one revision that the reviewer has approved and signed, and after four edits another that is under
 * review. Part of the transaction that the caller holds.
 * @returns the network's id
 */
export function seedRevisions(
  parts: DemoRevisionParts,
  { before, edits, after }: DemoHistory,
  solved: readonly [Solved, Solved],
): string {
  const [first, second] = [
    { ...solved[0], document: before },
    { ...solved[1], document: after },
  ];
  const { db, networks, key, newId, now, siteId, designer, reviewer } = parts;
  const revisions = new RevisionRepository(db);
  const by = ({ id }: DemoPersonHere): DoneBy => ({ personId: id, siteId, at: now() });
  const networkId = networks.createFor(siteId, { id: designer.id }, first.document);
  storeSolve(parts, networkId, first);
  const issued = freeze(parts, networkId, 1, first, {
    title: 'First issue for construction',
    reason: 'Return mains of the retort hall and the washer bay, for the order of pipe.',
  });
  recordMove(revisions, issued, 'submit', 'For review before the order goes out.', by(designer));
  const revision = historyOf(revisions, issued.row, ENGINE_VERSION);
  const file = toFile(first.document);
  const matter = { record: revision.row, file, summary: summaryOf(first.outcomes), signer: reviewer, openComments: 0 };
  const sentences = signatureSentences('approved', signedMatter(matter));
  recordSignature(revisions, key, { revision, signer: reviewer, meaning: 'approved', sentences }, by(reviewer));

  for (const { label, ops } of edits) {
    networks.editFor(networkId, designer, { batchId: newId(), label, ops: [...ops] });
  }
  storeSolve(parts, networkId, second);
  const later = freeze(parts, networkId, 1 + edits.length, second, {
    title: 'Wider rack, washer bay and hall door',
    reason:
      'The rack was left at the size of the first four retorts; the can washer drains more than was said, and the hall door gets a unit heater.',
  });
  recordMove(
    revisions,
    later,
    'submit',
    'CR-125 takes the hall down; CR-133 is a size larger for the washer.',
    by(designer),
  );
  return networkId;
}

function freeze(
  { db, newId, now, siteId, designer }: DemoRevisionParts,
  networkId: string,
  networkVersion: number,
  { document, outcomes }: SolvedVersion,
  { title, reason }: { readonly title: string; readonly reason: string },
): RevisionWithHistory {
  const revisions = new RevisionRepository(db);
  const content = frozenContent(document, JSON.stringify(outcomes));
  const { file, fileHash, resultsHash } = content;
  const at = now();
  const row = {
    ...{ id: newId(), networkId, letter: nextLetter(revisions.lastLetter(networkId)), title, reason, networkVersion },
    ...{ file, fileHash, solverHash: solverHashOf(document), resultsHash, engineVersion: ENGINE_VERSION },
    ...{ createdBy: designer.id, createdAt: at.toISOString() },
  };
  recordFreeze(revisions, row, content.outcomes, { personId: designer.id, siteId, at });
  return historyOf(revisions, { ...row, createdByName: designer.name }, ENGINE_VERSION);
}

/** As the live solves store theirs, so that nobody waits for one at the first look. */
function storeSolve({ db, newId, now }: DemoRevisionParts, networkId: string, solved: SolvedVersion): void {
  const at = now().toISOString();
  const key = { networkId, solverHash: solverHashOf(solved.document), engineVersion: ENGINE_VERSION };
  new SolveRepository(db).storeFinished(
    { ...key, id: newId(), startedAt: at, finishedAt: at },
    solvedOverview(solved.outcomes, solved.solveMs),
    solved.outcomes,
  );
}
