import type { NewSignature, Revision, SignatureMeaning, SigningTerms } from '@riseback/contracts';
import { roleMay } from '@riseback/contracts';
import { canonicalText } from '@riseback/network';
import { signatureSentences } from '@riseback/revisions';
import type { IdentityCheck } from '../people/identity-check';
import type { PeopleRepository, PersonRow } from '../people/people-repository';
import type { NetworkAccess } from '../platform/auth/access';
import type { OneTimeCodes } from '../platform/auth/one-time-codes';
import { conflict, forbidden, unprocessable } from '../platform/problem';
import { resultsHashOf } from './frozen-revision';
import { sha256 } from './hashes';
import type { RevisionWithHistory } from './revision-history';
import type { RevisionMails } from './revision-mails';
import type { RevisionRepository } from './revision-repository';
import { demandDeed, type RevisionListener, type RevisionService } from './revision-service';
import { recordSignature } from './signature-making';
import { signedMatter } from './signed-matter';
import type { SigningKey } from './signing-key';

export interface SigningParts {
  readonly revisions: RevisionRepository;
  readonly service: RevisionService;
  readonly people: Pick<PeopleRepository, 'find'>;
  readonly identity: Pick<IdentityCheck, 'password' | 'code'>;
  readonly codes: Pick<OneTimeCodes, 'areOn'>;
  readonly mails: RevisionMails;
  readonly listener: RevisionListener;
  readonly key: SigningKey;
  readonly now: () => Date;
}

/** What a person is shown before they sign, and the signature itself. */
export class SigningService {
  constructor(private readonly parts: SigningParts) {}

  /** @throws ProblemError 404; 403 one's own work; 409 not to be signed now */
  terms(access: NetworkAccess, id: string, meaning: SignatureMeaning): SigningTerms {
    const { revisions, service } = this.parts;
    return this.termsOf(revisions, access, service.find(revisions, access, id), meaning);
  }

  /**
   * The person proves anew who they are: a session left open, or a copied cookie, is not enough.
   * @throws ProblemError as `terms`; 409 when what was shown has changed since, or comments are open; 422 for a wrong password or
   *   code; 429 when guessing
   */
  async sign(access: NetworkAccess, id: string, input: NewSignature, address: string): Promise<Revision> {
    const { revisions, service } = this.parts;
    // first, so that nobody types a password, and spends a code, for what will be refused
    this.demandTerms(revisions, access, service.find(revisions, access, id), input);
    const person = await this.prove(access, input, address);
    this.parts.revisions.transaction((inside, tx) => {
      this.demandStill(inside, access, person);
      const revision = service.find(inside, access, id);
      const { sentences } = this.demandTerms(inside, access, revision, input);
      const { siteId, role } = access;
      const by = { personId: person.id, sessionId: access.person.sessionId, siteId, at: this.parts.now() };
      const signer = { id: person.id, name: person.name, role };
      recordSignature(inside, this.parts.key, { revision, signer, meaning: input.meaning, sentences }, by);
      if (input.meaning === 'approved') {
        this.parts.mails.judged(tx, inside, access, revision, { purpose: 'approved', note: '' });
      }
    });
    this.parts.listener.revisionsChanged(access.networkId, id);
    return service.get(access, id);
  }

  private async prove(access: NetworkAccess, { password, code }: NewSignature, address: string): Promise<PersonRow> {
    const { identity, codes } = this.parts;
    const asksForCode = codes.areOn(access.person.id);
    if (asksForCode && code === undefined) {
      const detail = 'Give the code of your authenticator, or one of your recovery codes.';
      throw unprocessable('A code is needed too.', [{ pointer: '/code', detail }]);
    }
    const person = await identity.password(access, { text: password, pointer: '/password' }, address);
    if (asksForCode && code !== undefined) identity.code(access, { text: code, pointer: '/code' }, address);
    return person;
  }

  /** What may have changed while the password was being hashed. */
  private demandStill(revisions: RevisionRepository, access: NetworkAccess, proven: PersonRow): void {
    const present = this.parts.people.find(proven.id);
    if (present?.passwordHash !== proven.passwordHash) {
      throw conflict('Your password was changed from elsewhere meanwhile. Sign in with the new one.');
    }
    const member = revisions.peopleOfSite(access.siteId).find(({ id }) => id === proven.id);
    if (member === undefined || !roleMay(member.role, 'sign') || member.role !== access.role) {
      throw forbidden('Your role at the site was changed meanwhile.');
    }
  }

  private demandTerms(
    revisions: RevisionRepository,
    access: NetworkAccess,
    revision: RevisionWithHistory,
    input: Pick<NewSignature, 'meaning' | 'token' | 'despiteOpenComments'>,
  ): SigningTerms {
    const terms = this.termsOf(revisions, access, revision, input.meaning);
    if (terms.token !== input.token) {
      throw conflict('What this signature would mean has changed since it was shown. Read it again, then sign.');
    }
    if (terms.openComments > 0 && !input.despiteOpenComments) {
      throw conflict(
        `${terms.openComments} of the comments on this revision ${terms.openComments === 1 ? 'is' : 'are'} still open. Resolve them, or say that you sign despite them.`,
      );
    }
    return terms;
  }

  private termsOf(
    revisions: RevisionRepository,
    access: NetworkAccess,
    revision: RevisionWithHistory,
    meaning: SignatureMeaning,
  ): SigningTerms {
    demandDeed(revision, access, 'sign');
    const { row, events } = revision;
    const { person, role } = access;
    const signatures = revisions.signatures(row.id);
    if (signatures.some((signature) => signature.personId === person.id && signature.meaning === meaning)) {
      throw conflict(`You have signed revision ${row.letter} as ${meaning} already.`);
    }
    demandWhole(revisions, revision);
    const summary = this.parts.service.outcomeSummary(row.id);
    if (summary === undefined) throw broken(row.letter, 'results');
    const file = this.parts.service.file(row);
    const openComments = revisions.openComments(row.networkId).get(row.id) ?? 0;
    const signer = { name: person.name, role };
    const sentences = signatureSentences(meaning, signedMatter({ record: row, file, summary, signer, openComments }));
    const { fileHash, resultsHash, engineVersion } = row;
    const { verdicts } = summary;
    // all that the signature would rest on: whatever of it changes makes another token
    const shown = {
      personId: person.id,
      role,
      meaning,
      sentences,
      events: events.map(plain),
      signed: signatures.length,
    };
    return {
      ...{ meaning, sentences, fileHash, resultsHash, engineVersion, openComments, verdicts: { ...verdicts } },
      asksForCode: this.parts.codes.areOn(person.id),
      token: sha256(canonicalText({ revisionId: row.id, ...shown })),
    };
  }
}

/** Nobody signs what is not what its hashes say. */
function demandWhole(revisions: RevisionRepository, { row }: RevisionWithHistory): void {
  if (sha256(revisions.fileText(row.id) ?? '') !== row.fileHash) throw broken(row.letter, 'inputs');
  if (resultsHashOf(revisions.outcomes(row.id)) !== row.resultsHash) throw broken(row.letter, 'results');
}

function broken(letter: string, what: string): Error {
  return conflict(`The frozen ${what} of revision ${letter} are not those that were frozen: verify the revision.`);
}

function plain({ seq, state, personId, at, note }: RevisionWithHistory['events'][number]) {
  return { seq, state, personId, at, note };
}
