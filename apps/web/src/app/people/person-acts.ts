import type { SitePerson } from '@riseback/contracts';
import type { AccountAct } from './people-api';
import type { Question } from './confirm-dialog';

/** What the menu of a person offers, with what is asked before and what is said after. */
export interface PersonAct {
  readonly what: AccountAct | 'taking-away';
  readonly words: string;
  readonly question: Question;
  readonly done: string;
}

/** What may be done to somebody; an account that other sites rely on as well is not this site's to close. */
export function actsOn(person: SitePerson): PersonAct[] {
  const acts = [passwordReset(person)];
  if (person.codesOn) acts.push(codesOff(person));
  acts.push(person.disabledAt === undefined ? disabling(person) : enabling(person), takingAway(person));
  return acts;
}

function passwordReset({ name, email }: SitePerson): PersonAct {
  return {
    what: 'password-reset',
    words: 'Send a link for a new password',
    question: {
      title: `Send ${name} a link for a new password?`,
      lines: [
        `It goes to ${email}, says that it comes from you, and can be used once within 24 hours.`,
        'The present password holds until a new one is chosen; then every session of theirs ends. One-time codes, where on, are still asked for.',
      ],
      act: 'Send the link',
    },
    done: `A link for a new password is on its way to ${email}.`,
  };
}

function codesOff(person: SitePerson): PersonAct {
  const { name } = person;
  return {
    what: 'codes-off',
    words: 'Turn one-time codes off',
    question: onlyHere(person, {
      title: `Turn the one-time codes of ${name} off?`,
      lines: [
        'For somebody who has lost both the authenticator and the recovery codes. Make sure that it is they who ask: from then on the password alone lets in.',
        'Their sessions end. They can turn codes on again on the page of their account.',
      ],
      act: 'Turn codes off',
    }),
    done: `The one-time codes of ${name} are off.`,
  };
}

function disabling(person: SitePerson): PersonAct {
  const { name } = person;
  return {
    what: 'disabling',
    words: 'Disable the account',
    question: onlyHere(person, {
      title: `Disable the account of ${name}?`,
      lines: [
        'They are signed out everywhere at once and cannot sign in; mails to them stop.',
        'Nothing of theirs goes away: edits, readings, comments and signatures stay under their name. You can enable the account again.',
      ],
      act: 'Disable',
    }),
    done: `The account of ${name} is disabled.`,
  };
}

function enabling(person: SitePerson): PersonAct {
  const { name } = person;
  return {
    what: 'enabling',
    words: 'Enable the account',
    question: onlyHere(person, {
      title: `Enable the account of ${name}?`,
      lines: ['They can sign in again with the password that they had, in the role that they had.'],
      act: 'Enable',
    }),
    done: `The account of ${name} is enabled.`,
  };
}

function takingAway({ name, email }: SitePerson): PersonAct {
  return {
    what: 'taking-away',
    words: 'Take the role away',
    question: {
      title: `Take the role of ${name} away?`,
      lines: [
        'They are signed out, and this site is then to them as if it did not exist. Their account stays, with its roles at other sites.',
        `Nothing that they did here goes away. To let them in again, invite ${email}.`,
      ],
      act: 'Take away',
    },
    done: `${name} has no role here any more.`,
  };
}

function onlyHere({ onlyHere: mayBe, name }: SitePerson, question: Question): Question {
  if (mayBe) return question;
  return {
    title: 'Not this site’s alone',
    lines: [
      `${name} has a role at another site as well, or administers the installation, so the account is not this site’s alone to change.`,
      'What you can do here is take the role away.',
    ],
  };
}
