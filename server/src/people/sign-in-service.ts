import type { SignIn } from '@riseback/contracts';
import type { Passwords } from '../platform/auth/passwords';
import type { IssuedSession, Sessions } from '../platform/auth/sessions';
import type { SignInGuard } from '../platform/auth/sign-in-guard';
import { wrongCredentials } from '../platform/problem';
import type { PeopleRepository, PersonRow } from './people-repository';

/** Where an attempt comes from. */
export interface SignInOrigin {
  readonly address: string;
  readonly agent: string;
}

export class SignInService {
  constructor(
    private readonly people: PeopleRepository,
    private readonly passwords: Passwords,
    private readonly guard: SignInGuard,
    private readonly sessions: Sessions,
    private readonly now: () => Date,
  ) {}

  /** @throws ProblemError 401 in the same words and time whatever was wrong; 429 when guessing */
  async signIn(input: SignIn, from: SignInOrigin): Promise<{ person: PersonRow; issued: IssuedSession }> {
    const person = await this.guard.guard(input.email, from.address, () => this.recognise(input, from.address));
    if (person === undefined) throw wrongCredentials();
    return { person, issued: this.sessions.start(person.id, from.agent) };
  }

  private async recognise(input: SignIn, address: string): Promise<PersonRow | undefined> {
    const person = this.people.findByEmail(input.email);
    const matches = await this.passwords.matches(input.password, person?.passwordHash);
    if (matches && person?.disabledAt === null) return person;
    this.noteRefusal(person, matches, address);
    return undefined;
  }

  /** Never what was typed as an address: it may be a password that went into the wrong box. */
  private noteRefusal(person: PersonRow | undefined, matches: boolean, address: string): void {
    const known = person === undefined ? { subject: 'unknown' } : { personId: person.id, subject: person.id };
    const why = person === undefined ? 'unknownAccount' : matches ? 'disabled' : 'wrongPassword';
    this.people.noteRefusedSignIn({ at: this.now(), ...known, action: 'session.refuse', details: { why, address } });
  }
}
