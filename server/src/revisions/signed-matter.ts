import type { NetworkFile } from '@riseback/network';
import type { RevisionRecord, SignedMatter, Signer } from '@riseback/revisions';
import { caseNameOf, type OutcomeSummary } from './outcome-summary';

interface SignedParts {
  readonly record: RevisionRecord;
  readonly file: NetworkFile;
  readonly summary: OutcomeSummary;
  readonly signer: Pick<Signer, 'name' | 'role'>;
  readonly openComments: number;
}

/** What the sentences of a signature tell of a revision. */
export function signedMatter({ record, file, summary, signer, openComments }: SignedParts): SignedMatter {
  const { letter, title, networkVersion, fileHash, resultsHash, engineVersion } = record;
  const { verdicts, leftOut, unsolvedCases } = summary;
  return {
    personName: signer.name,
    role: signer.role,
    networkName: file.name,
    ...{ networkVersion, letter, title, fileHash, resultsHash, engineVersion, verdicts, openComments, leftOut },
    unsolvedCases: unsolvedCases.map((caseId) => caseNameOf(file, caseId)),
  };
}
