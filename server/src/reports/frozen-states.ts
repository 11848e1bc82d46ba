import { RevisionEvent, Signature } from '@riseback/contracts';
import type { RevisionRepository, RevisionRow } from '../revisions/revision-repository';
import { readStatement } from '../revisions/statement-reading';
import type { FrozenState } from './report-content';
import type { ReportMaterial } from './report-material';

/** A revision as a report takes it: its texts are not taken apart here. */
export interface FrozenRevision {
  readonly state: Omit<FrozenState, 'editsSince' | 'presentEngineVersion'>;
  readonly fileHash: string;
  readonly solverHash: string;
  readonly engineVersion: string;
  readonly fileText: string;
  readonly outcomesText: string;
}

/** Revisions for reports, read through the repository of those who make them. */
export class FrozenStates {
  constructor(private readonly revisions: RevisionRepository) {}

  find(networkId: string, revisionId: string): FrozenRevision | undefined {
    const row = this.revisions.find(revisionId);
    if (row?.networkId !== networkId) return undefined;
    const { id, letter, title, reason, networkVersion: version, createdAt, createdByName, resultsHash } = row;
    const { fileHash, solverHash, engineVersion } = row;
    const events = this.events(id);
    return {
      state: {
        kind: 'revision',
        ...{ id, letter, title, reason, version, createdAt, createdByName, resultsHash, events },
        state: events.at(-1)?.state ?? 'draft',
        signatures: this.signatures(id),
      },
      ...{ fileHash, solverHash, engineVersion },
      ...this.texts(id),
    };
  }

  letterOf(networkId: string, revisionId: string): string | undefined {
    const row = this.revisions.find(revisionId);
    return row?.networkId === networkId ? row.letter : undefined;
  }

  /** The one frozen last before another; by default the newest of all. */
  before(networkId: string, revisionId?: string): ReportMaterial['previous'] {
    const rows = this.revisions.list(networkId);
    const place = revisionId === undefined ? rows.length : rows.findIndex(({ id }) => id === revisionId);
    const row = rows[place - 1];
    return row === undefined ? undefined : this.previousOf(row);
  }

  private previousOf({ id, letter, title, createdAt, engineVersion }: RevisionRow): ReportMaterial['previous'] {
    const state = this.events(id).at(-1)?.state ?? 'draft';
    return { letter, title, createdAt, engineVersion, state, ...this.texts(id) };
  }

  private texts(id: string): Pick<FrozenRevision, 'fileText' | 'outcomesText'> {
    const outcomes = this.revisions.outcomes(id).map(({ result }) => result);
    return { fileText: this.revisions.fileText(id) ?? '', outcomesText: `[${outcomes.join(',')}]` };
  }

  private events(id: string): RevisionEvent[] {
    return this.revisions.events(id).map((event) => RevisionEvent.parse(event));
  }

  /** Time and role stand in what was signed; one that cannot be read any more is left out, and verification names it. */
  private signatures(id: string): Signature[] {
    return this.revisions.signatures(id).flatMap((row) => {
      const statement = readStatement(row.statement);
      if (statement === undefined) return [];
      return [Signature.parse({ ...row, at: statement.at, role: statement.person.role })];
    });
  }
}
