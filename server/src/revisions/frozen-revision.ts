import { CaseOutcome } from '@riseback/contracts';
import { canonicalText, fileCanonicalText, toFile, type NetworkDocument } from '@riseback/network';
import * as z from 'zod';
import { sha256 } from './hashes';
import type { StoredOutcome } from './revision-repository';

/** What a revision freezes, with the hashes that stand for it. */
export interface FrozenContent {
  /** RFC 8785 text of the whole file, sorted by id. */
  readonly file: string;
  readonly fileHash: string;
  /** In the order of the cases. */
  readonly outcomes: readonly StoredOutcome[];
  readonly resultsHash: string;
}

const Outcomes = z.array(CaseOutcome);
const AnyOutcomes = z.array(z.looseObject({ caseId: z.string() }));

/** @param casesText the JSON text of the list of outcomes, as solves are stored; every key of it is kept */
export function frozenContent(document: NetworkDocument, casesText: string): FrozenContent {
  const file = fileCanonicalText(toFile(document));
  const stored = AnyOutcomes.parse(JSON.parse(casesText)).map((outcome, ordinal) => ({
    caseId: outcome.caseId,
    ordinal,
    result: canonicalText(outcome),
  }));
  return { file, fileHash: sha256(file), outcomes: stored, resultsHash: resultsHashOf(stored) };
}

/** SHA-256 of the RFC 8785 text of the list of outcomes: of a list that text is the texts of its items between brackets. */
export function resultsHashOf(outcomes: readonly StoredOutcome[]): string {
  return sha256(outcomesText(outcomes));
}

/** The JSON text of the list of outcomes. */
export function outcomesText(outcomes: readonly StoredOutcome[]): string {
  return `[${outcomes.map(({ result }) => result).join(',')}]`;
}

/** @throws ZodError, SyntaxError for a text that is none of ours */
export function readOutcomes(text: string): CaseOutcome[] {
  return Outcomes.parse(JSON.parse(text));
}
