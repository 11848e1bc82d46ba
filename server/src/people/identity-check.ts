import type { PersonAccess } from '../platform/auth/access';
import type { OneTimeCodes } from '../platform/auth/one-time-codes';
import type { Passwords } from '../platform/auth/passwords';
import type { Attempt, SignInGuard } from '../platform/auth/sign-in-guard';
import { notFound, unprocessable, WRONG_CODE } from '../platform/problem';
import type { PeopleRepository, PersonRow } from './people-repository';

/** A field of the body that holds a proof, by its pointer. */
interface Proof {
  readonly text: string;
  readonly pointer: string;
}

interface Checked extends Attempt {
  readonly person: PersonRow;
}

/** Asks who is signed in to prove it anew, before what a session left open must not be enough for. */
export class IdentityCheck {
  constructor(
    private readonly people: PeopleRepository,
    private readonly passwords: Passwords,
    private readonly codes: OneTimeCodes,
    private readonly guard: SignInGuard,
    private readonly now: () => Date,
  ) {}

  /**
   * Guesses count together with those at sign-in: a stolen session gains none.
   * @returns the person as they were when the password was compared
   * @throws ProblemError 422 with the pointer when it is wrong, 429 when guessing
   */
  async password(access: PersonAccess, { text, pointer }: Proof, address: string): Promise<PersonRow> {
    const attempt = async (): Promise<Checked> => {
      const person = this.people.find(access.person.id);
      if (person === undefined) throw notFound('This person is not known any more.');
      const matches = await this.passwords.matches(text, person.passwordHash);
      if (!matches) this.note(access, 'wrongPassword', address);
      return { outcome: matches ? 'passed' : 'failed', person };
    };
    const trial = { email: access.person.email, address };
    const { outcome, person } = await this.guard.guard(trial, attempt, this.turnedAway(access, address));
    if (outcome !== 'passed') {
      throw unprocessable('The password is wrong.', [{ pointer, detail: 'This is not your present password.' }]);
    }
    return person;
  }

  /** @throws ProblemError 422 with the pointer when it is wrong or was used, 429 when guessing */
  code(access: PersonAccess, { text, pointer }: Proof, address: string): void {
    const kind = this.codes.take(access.person.id, text, this.turnedAway(access, address));
    if (kind !== undefined) return;
    this.note(access, 'wrongCode', address);
    throw unprocessable('The code is wrong.', [{ pointer, detail: WRONG_CODE }]);
  }

  private turnedAway(access: PersonAccess, address: string): () => void {
    return () => this.note(access, 'tooManyAttempts', address);
  }

  private note({ person }: PersonAccess, why: string, address: string): void {
    const { id, sessionId } = person;
    const details = { why, address };
    this.people.note({
      at: this.now(),
      personId: id,
      sessionId,
      action: 'person.refuse',
      subject: id,
      details,
    });
  }
}
