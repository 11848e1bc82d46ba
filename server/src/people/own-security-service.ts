import { passwordMistake, personalWords } from '@riseback/contracts';
import type { CodesBegun, CodesProof, CodesState, PasswordChange } from '@riseback/contracts';
import type { PersonAccess } from '../platform/auth/access';
import type { OneTimeCodes } from '../platform/auth/one-time-codes';
import type { Passwords } from '../platform/auth/passwords';
import type { Sessions } from '../platform/auth/sessions';
import { badRequest, conflict, unprocessable, WRONG_CODE } from '../platform/problem';
import type { IdentityCheck } from './identity-check';
import type { PeopleRepository } from './people-repository';
import type { SignInOrigin } from './credential-check';
import type { SignedIn } from './sign-in-service';

const CHANGED_MEANWHILE = 'Your password was changed from elsewhere meanwhile. Sign in with the new one.';
const CODES_ARE_ON = 'One-time codes are on already. Turn them off first to begin anew.';
const CODES_ARE_OFF = 'One-time codes are off.';

/** The locks on one's own door: password and one-time codes. */
export class OwnSecurityService {
  constructor(
    private readonly people: PeopleRepository,
    private readonly passwords: Passwords,
    private readonly codes: OneTimeCodes,
    private readonly identity: IdentityCheck,
    private readonly sessions: Sessions,
    private readonly now: () => Date,
  ) {}

  /**
   * Ends every session of the person, this one too, whose cookie may be known to somebody by now; the person goes on in a
   * new one (docs/decisions/0050).
   * @throws ProblemError 400 for a new password that will not do, 422 for a wrong present one, 429 when guessing
   */
  async changePassword(access: PersonAccess, input: PasswordChange, from: SignInOrigin): Promise<SignedIn> {
    const { presentPassword, newPassword } = input;
    const mistake =
      presentPassword === newPassword
        ? 'This is the password you have already.'
        : passwordMistake(newPassword, personalWords(access.person));
    if (mistake !== undefined) {
      throw badRequest('The new password will not do.', [{ pointer: '/newPassword', detail: mistake }]);
    }
    const proof = { text: presentPassword, pointer: '/presentPassword' };
    const { passwordHash } = await this.identity.password(access, proof, from.address);
    const to = await this.passwords.hash(newPassword);
    const { id, sessionId } = access.person;
    return this.people.inOneTransaction(() => {
      const audit = { at: this.now(), personId: id, sessionId, action: 'person.password', subject: id };
      const changed = this.people.changePassword(id, { from: passwordHash, to }, audit);
      const person = this.people.find(id);
      if (!changed || person === undefined) throw conflict(CHANGED_MEANWHILE);
      return {
        person: this.people.profileOf(person),
        issued: this.sessions.start(id, from.agent, { after: sessionId }),
      };
    });
  }

  codesState(access: PersonAccess): CodesState {
    return this.codes.state(access.person.id);
  }

  /** @throws ProblemError 409 when codes are on, 422 for a wrong password, 429 when guessing */
  async beginCodes(access: PersonAccess, password: string, address: string): Promise<CodesBegun> {
    if (this.codes.areOn(access.person.id)) throw conflict(CODES_ARE_ON);
    await this.identity.password(access, { text: password, pointer: '/password' }, address);
    if (this.codes.areOn(access.person.id)) throw conflict(CODES_ARE_ON);
    return this.codes.begin(access.person);
  }

  /** @returns the recovery codes @throws ProblemError 409 when codes are on, 422 for a code of another secret */
  confirmCodes(access: PersonAccess, code: string): string[] {
    if (this.codes.areOn(access.person.id)) throw conflict(CODES_ARE_ON);
    const recoveryCodes = this.codes.confirm(access.person, code);
    if (recoveryCodes !== undefined) return recoveryCodes;
    throw unprocessable('The code is wrong.', [{ pointer: '/code', detail: WRONG_CODE }]);
  }

  /** @throws ProblemError 409 when codes are off, 422 for a wrong proof, 429 when guessing */
  async renewRecoveryCodes(access: PersonAccess, proof: CodesProof, address: string): Promise<string[]> {
    await this.prove(access, proof, address);
    return this.codes.renewRecoveryCodes(access.person);
  }

  /** @throws ProblemError as renewRecoveryCodes */
  async turnCodesOff(access: PersonAccess, proof: CodesProof, address: string): Promise<void> {
    await this.prove(access, proof, address);
    this.codes.turnOff(access.person);
  }

  private async prove(access: PersonAccess, { password, code }: CodesProof, address: string): Promise<void> {
    if (!this.codes.areOn(access.person.id)) throw conflict(CODES_ARE_OFF);
    await this.identity.password(access, { text: password, pointer: '/password' }, address);
    this.identity.code(access, { text: code, pointer: '/code' }, address);
  }
}
