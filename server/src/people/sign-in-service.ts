import type { Person, SignIn } from '@riseback/contracts';
import type { OneTimeCodes } from '../platform/auth/one-time-codes';
import type { Passwords } from '../platform/auth/passwords';
import type { IssuedSession, Sessions } from '../platform/auth/sessions';
import type { Attempt, SignInGuard } from '../platform/auth/sign-in-guard';
import { codeNeeded, wrongCode, wrongCredentials, type ProblemError } from '../platform/problem';
import type { PeopleRepository, PersonRow } from './people-repository';

/** Where an attempt comes from. */
export interface SignInOrigin {
  readonly address: string;
  readonly agent: string;
}

export interface SignedIn {
  readonly person: Person;
  readonly issued: IssuedSession;
}

interface Refused extends Attempt {
  readonly outcome: 'failed' | 'unfinished';
  readonly problem: ProblemError;
}
type Ended = Refused | (SignedIn & { readonly outcome: 'passed' });
type Why = 'unknownAccount' | 'wrongPassword' | 'disabled' | 'wrongCode' | 'tooManyAttempts';

export class SignInService {
  constructor(
    private readonly people: PeopleRepository,
    private readonly passwords: Passwords,
    private readonly codes: OneTimeCodes,
    private readonly guard: SignInGuard,
    private readonly sessions: Sessions,
    private readonly now: () => Date,
  ) {}

  /**
   * @throws ProblemError 401 in the same words and time whatever was wrong with address or password; 401 of another type
   *   when these are right and a code is missing or wrong; 429 when guessing
   */
  async signIn(input: SignIn, from: SignInOrigin): Promise<SignedIn> {
    const turnedAway = () => this.note(this.people.findByEmail(input.email), 'tooManyAttempts', from);
    const trial = { email: input.email, address: from.address };
    const ended = await this.guard.guard(trial, () => this.attempt(input, from, turnedAway), turnedAway);
    if (ended.outcome !== 'passed') throw ended.problem;
    return ended;
  }

  private async attempt(input: SignIn, from: SignInOrigin, turnedAway: () => void): Promise<Ended> {
    const person = this.people.findByEmail(input.email);
    const matches = await this.passwords.matches(input.password, person?.passwordHash);
    if (person === undefined) return this.refuse(person, 'unknownAccount', from);
    if (!matches) return this.refuse(person, 'wrongPassword', from);
    if (person.disabledAt !== null) return this.refuse(person, 'disabled', from);
    if (!this.codes.areOn(person.id)) return this.start(person, from, {});
    if (input.code === undefined) return { outcome: 'unfinished', problem: codeNeeded() };
    const kind = this.codes.take(person.id, input.code, turnedAway);
    if (kind === undefined) return this.refuse(person, 'wrongCode', from);
    return this.start(person, from, { code: kind });
  }

  /** On the row as it is by now: a password changed while the old one was being hashed must not let anybody in. */
  private start(person: PersonRow, from: SignInOrigin, details: Readonly<Record<string, string>>): Ended {
    return this.people.inOneTransaction(() => {
      const present = this.people.find(person.id);
      if (present?.passwordHash !== person.passwordHash) return this.refuse(person, 'wrongPassword', from);
      if (present.disabledAt !== null) return this.refuse(person, 'disabled', from);
      return {
        outcome: 'passed',
        person: this.people.profileOf(present),
        issued: this.sessions.start(person.id, from.agent, details),
      };
    });
  }

  private refuse(person: PersonRow | undefined, why: Why, from: SignInOrigin): Refused {
    this.note(person, why, from);
    return { outcome: 'failed', problem: why === 'wrongCode' ? wrongCode() : wrongCredentials() };
  }

  /** Never what was typed as an address: it may be a password that went into the wrong box. */
  private note(person: PersonRow | undefined, why: Why, { address }: SignInOrigin): void {
    const known = person === undefined ? { subject: 'unknown' } : { personId: person.id, subject: person.id };
    this.people.noteRefusal({ at: this.now(), ...known, action: 'session.refuse', details: { why, address } });
  }
}
