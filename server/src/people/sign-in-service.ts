import type { Person, SignIn } from '@riseback/contracts';
import type { SignedInPerson } from '../platform/auth/access';
import type { IssuedSession, Sessions } from '../platform/auth/sessions';
import type { CredentialCheck, SignInOrigin } from './credential-check';
import type { PeopleRepository } from './people-repository';

export interface SignedIn {
  readonly person: Person;
  readonly issued: IssuedSession;
}

export class SignInService {
  constructor(
    private readonly credentials: CredentialCheck,
    private readonly people: PeopleRepository,
    private readonly sessions: Sessions,
  ) {}

  /**
   * @param former whose session the browser held until now: it ends, so that none is left behind that nobody sees
   * @throws ProblemError as CredentialCheck
   */
  async signIn(input: SignIn, from: SignInOrigin, former?: SignedInPerson): Promise<SignedIn> {
    return this.credentials.prove(input, from, (person, details) => {
      if (former !== undefined) this.sessions.end(former.sessionId, former, 'signedOut');
      return {
        person: this.people.profileOf(person),
        issued: this.sessions.start(person.id, from.agent, details),
      };
    });
  }
}
