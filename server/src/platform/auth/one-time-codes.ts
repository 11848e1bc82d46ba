import type { CodesBegun, CodesState } from '@riseback/contracts';
import type { AuditEntry } from '../db/audit';
import type { SignedInPerson } from './access';
import { newRecoveryCodes, plainRecoveryCode, recoveryCodeHash } from './one-time-recovery';
import type { OneTimeRepository } from './one-time-repository';
import { authenticatorAddress, newOneTimeSecret, stepOfCode, type SecretSeal } from './one-time-secret';
import type { SignInGuard } from './sign-in-guard';

/** Which of the two a code was. */
export type CodeKind = 'oneTime' | 'recovery';

/** The second thing that a person may ask to be asked for: codes of an authenticator, and ten for when it is lost. */
export class OneTimeCodes {
  constructor(
    private readonly repository: OneTimeRepository,
    private readonly seal: SecretSeal,
    private readonly guard: SignInGuard,
    private readonly now: () => Date,
  ) {}

  areOn(personId: string): boolean {
    return this.repository.find(personId)?.confirmedAt != null;
  }

  state(personId: string): CodesState {
    const since = this.repository.find(personId)?.confirmedAt ?? undefined;
    if (since === undefined) return { on: false, recoveryCodesLeft: 0 };
    return { on: true, since, recoveryCodesLeft: this.repository.unusedRecoveryCodes(personId) };
  }

  /** A secret for the authenticator; nothing is asked for at sign-in until `confirm`. Only while codes are off. */
  begin({ id, email }: SignedInPerson): CodesBegun {
    const secret = newOneTimeSecret();
    const createdAt = this.now().toISOString();
    const sealedSecret = this.seal.seal(secret, id);
    this.repository.begin({ personId: id, sealedSecret, createdAt, confirmedAt: null, lastStep: null });
    return { secret, address: authenticatorAddress(secret, email) };
  }

  /** @returns the recovery codes, or undefined when the code is not one of the secret that waits for it */
  confirm({ id, sessionId }: SignedInPerson, code: string): string[] | undefined {
    const row = this.repository.find(id);
    if (row === undefined || row.confirmedAt !== null) return undefined;
    const step = this.stepOf(row.sealedSecret, id, code);
    if (step === undefined) return undefined;
    const codes = newRecoveryCodes();
    const audit = { at: this.now(), personId: id, sessionId, action: 'codes.on', subject: id };
    return this.repository.confirm(row, step, codes.map(hashOf), audit) ? codes : undefined;
  }

  /**
   * Takes a code of a person whose codes are on; each is taken once.
   * @returns which kind it was, undefined when it is none or was taken before
   * @throws ProblemError 429 when codes are being guessed
   */
  take(personId: string, typed: string, turnedAway: () => void): CodeKind | undefined {
    const recovery = plainRecoveryCode(typed);
    if (recovery !== undefined) {
      const audit = { at: this.now(), personId, action: 'codes.recoveryUse', subject: personId };
      return this.repository.takeRecoveryCode(personId, hashOf(recovery), audit) ? 'recovery' : undefined;
    }
    const isRight = () => {
      const row = this.repository.find(personId);
      const step = row === undefined ? undefined : this.stepOf(row.sealedSecret, personId, typed);
      return step !== undefined && this.repository.takeStep(personId, step);
    };
    return this.guard.guardCode(personId, isRight, turnedAway) ? 'oneTime' : undefined;
  }

  renewRecoveryCodes({ id, sessionId }: SignedInPerson): string[] {
    const codes = newRecoveryCodes();
    const audit = { at: this.now(), personId: id, sessionId, action: 'codes.recoveryRenew', subject: id };
    this.repository.renewRecoveryCodes(id, codes.map(hashOf), audit);
    return codes;
  }

  turnOff({ id, sessionId }: SignedInPerson): void {
    this.repository.remove(id, { at: this.now(), personId: id, sessionId, action: 'codes.off', subject: id });
  }

  /** For somebody who lost what makes them, by who may do so. */
  turnOffFor(personId: string, audit: AuditEntry): void {
    this.repository.remove(personId, audit);
  }

  private stepOf(sealed: string, personId: string, typed: string): number | undefined {
    const digits = typed.replaceAll(/\s/g, '');
    const secret = this.seal.open(sealed, personId);
    return secret === undefined ? undefined : stepOfCode(secret, digits, this.now());
  }
}

function hashOf(code: string): string {
  return recoveryCodeHash(plainRecoveryCode(code) ?? code);
}
