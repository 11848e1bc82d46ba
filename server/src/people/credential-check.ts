import type { SignIn } from '@riseback/contracts';
import type { OneTimeCodes } from '../platform/auth/one-time-codes';
import type { Passwords } from '../platform/auth/passwords';
import type { Attempt, SignInGuard } from '../platform/auth/sign-in-guard';
import type { Queries } from '../platform/db/database';
import { codeNeeded, wrongCode, wrongCredentials, type ProblemError } from '../platform/problem';
import type { PeopleRepository, PersonRow } from './people-repository';

/** Where an attempt comes from. */
export interface SignInOrigin {
  readonly address: string;
  readonly agent: string;
}

/** What follows once somebody has proved who they are; `details` say how, for the log. */
export type Proven<T> = (person: PersonRow, details: Readonly<Record<string, string>>, tx: Queries) => T;

interface Refused extends Attempt {
  readonly outcome: 'failed' | 'unfinished';
  readonly problem: ProblemError;
}
type Ended<T> = Refused | { readonly outcome: 'passed'; readonly result: T };
type Why = 'unknownAccount' | 'wrongPassword' | 'disabled' | 'wrongCode' | 'tooManyAttempts';

/** Asks somebody who is not signed in who they are. */
export class CredentialCheck {
  constructor(
    private readonly people: PeopleRepository,
    private readonly passwords: Passwords,
    private readonly codes: OneTimeCodes,
    private readonly guard: SignInGuard,
    private readonly now: () => Date,
  ) {}

  /**
   * @param proven done in the transaction that has looked at the person once more
   * @throws ProblemError 401 in the same words and time whatever was wrong with address or password; 401 of another type
   *   when these are right and a code is missing or wrong; 429 when guessing
   */
  async prove<T>(input: SignIn, from: SignInOrigin, proven: Proven<T>): Promise<T> {
    const turnedAway = () => this.note(this.people.findByEmail(input.email), 'tooManyAttempts', from);
    const trial = { email: input.email, address: from.address };
    const ended = await this.guard.guard(trial, () => this.attempt(input, from, proven, turnedAway), turnedAway);
    if (ended.outcome !== 'passed') throw ended.problem;
    return ended.result;
  }

  private async attempt<T>(
    input: SignIn,
    from: SignInOrigin,
    proven: Proven<T>,
    turnedAway: () => void,
  ): Promise<Ended<T>> {
    const person = this.people.findByEmail(input.email);
    const matches = await this.passwords.matches(input.password, person?.passwordHash);
    if (person === undefined) return this.refuse(person, 'unknownAccount', from);
    if (!matches) return this.refuse(person, 'wrongPassword', from);
    if (person.disabledAt !== null) return this.refuse(person, 'disabled', from);
    if (!this.codes.areOn(person.id)) return this.pass(person, from, proven, {});
    if (input.code === undefined) return { outcome: 'unfinished', problem: codeNeeded() };
    const kind = this.codes.take(person.id, input.code, turnedAway);
    if (kind === undefined) return this.refuse(person, 'wrongCode', from);
    return this.pass(person, from, proven, { code: kind });
  }

  /** On the row as it is by now: a password changed while the old one was being hashed must not let anybody in. */
  private pass<T>(
    person: PersonRow,
    from: SignInOrigin,
    proven: Proven<T>,
    details: Readonly<Record<string, string>>,
  ): Ended<T> {
    return this.people.inOneTransaction((tx) => {
      const present = this.people.find(person.id);
      if (present?.passwordHash !== person.passwordHash) return this.refuse(person, 'wrongPassword', from);
      if (present.disabledAt !== null) return this.refuse(person, 'disabled', from);
      return { outcome: 'passed', result: proven(present, details, tx) };
    });
  }

  private refuse(person: PersonRow | undefined, why: Why, from: SignInOrigin): Refused {
    this.note(person, why, from);
    return { outcome: 'failed', problem: why === 'wrongCode' ? wrongCode() : wrongCredentials() };
  }

  /** Never what was typed as an address: it may be a password that went into the wrong box. */
  private note(person: PersonRow | undefined, why: Why, { address }: SignInOrigin): void {
    const known = person === undefined ? { subject: 'unknown' } : { personId: person.id, subject: person.id };
    this.people.note({ at: this.now(), ...known, action: 'session.refuse', details: { why, address } });
  }
}
