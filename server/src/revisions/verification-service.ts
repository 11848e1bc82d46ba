import type { Verification } from '@riseback/contracts';
import type { NetworkAccess } from '../platform/auth/access';
import { notFound } from '../platform/problem';
import type { RevisionRepository } from './revision-repository';
import { verifyRevision, type VerificationParts } from './verification';

/** Verifies for whoever may see the revision. It reads the whole log and solves, so that those who ask at the same time share one. */
export class VerificationService {
  private readonly underWay = new Map<string, Promise<Verification | undefined>>();

  constructor(
    private readonly revisions: RevisionRepository,
    private readonly parts: VerificationParts,
  ) {}

  /** @throws ProblemError 404 */
  async verify({ networkId }: NetworkAccess, id: string): Promise<Verification> {
    const isHere = this.revisions.find(id)?.networkId === networkId;
    const verification = isHere ? await this.shared(id) : undefined;
    if (verification === undefined) throw notFound('The network has no such revision.');
    return verification;
  }

  private shared(id: string): Promise<Verification | undefined> {
    const present = this.underWay.get(id);
    if (present !== undefined) return present;
    const begun = verifyRevision(id, this.parts).finally(() => this.underWay.delete(id));
    this.underWay.set(id, begun);
    return begun;
  }
}
