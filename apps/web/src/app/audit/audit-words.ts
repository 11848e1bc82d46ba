import type { AuditRecord } from '@riseback/contracts';

/** What an entry tells, in words; an action that this page does not know yet keeps its own name. */
const WORDS: Readonly<Record<string, string>> = {
  'codes.off': 'turned one-time codes off',
  'codes.on': 'turned one-time codes on',
  'codes.recoveryRenew': 'made new recovery codes',
  'codes.recoveryUse': 'used a recovery code',
  'comment.add': 'wrote a comment',
  'comment.reopen': 'reopened a comment',
  'comment.resolve': 'resolved a comment',
  'invitation.accept': 'accepted an invitation',
  'invitation.make': 'invited somebody',
  'invitation.sendAgain': 'sent an invitation again',
  'invitation.withdraw': 'withdrew an invitation',
  'library.add': 'added a trap model to the library',
  'library.reinstate': 'took a trap model into use again',
  'library.retire': 'retired a trap model',
  'library.save': 'saved a trap model of the library',
  'network.create': 'made a network',
  'network.edit': 'edited a network',
  'person.create': 'added a person',
  'person.disable': 'disabled an account',
  'person.enable': 'enabled an account',
  'person.password': 'changed their password',
  'person.passwordReset': 'chose a new password by a link',
  'person.refuse': 'did not prove who they are',
  'person.rename': 'changed their name',
  'plan.place': 'placed the plan under a drawing',
  'plan.remove': 'took the plan from under a drawing',
  'plan.upload': 'put a plan under a drawing',
  'reading.correct': 'corrected a reading',
  'reading.photo': 'put a photograph beside a reading',
  'reading.take': 'took a reading',
  'report.make': 'made a report',
  'reset.ask': 'asked for a link for a new password',
  'reset.refuse': 'was refused a new password',
  'reset.send': 'sent a link for a new password',
  'revision.freeze': 'froze a revision',
  'revision.return': 'returned a revision',
  'revision.sign': 'signed a revision',
  'revision.submit': 'submitted a revision',
  'revision.withdraw': 'withdrew a revision',
  'role.change': 'changed a role',
  'role.give': 'gave a role',
  'role.take': 'took a role away',
  'round.begin': 'began a round of readings',
  'round.close': 'closed a round of readings',
  'session.start': 'signed in',
  'session.end': 'ended a session',
  'session.refuse': 'was refused at sign-in',
  'site.create': 'made the site',
  'site.settings': 'changed the settings of the site',
};

const REASONS: Readonly<Record<string, string>> = {
  wrongPassword: 'wrong password',
  wrongCode: 'wrong code',
  tooManyAttempts: 'too many attempts',
  tooManyMails: 'too many mails',
  unknownAccount: 'no such account',
  disabled: 'the person is disabled',
  signedOut: 'signed out',
  endedByOwner: 'ended from another session',
};

export function actionWords(action: string): string {
  return WORDS[action] ?? action;
}

/** The details of an entry as short text, `version 18, move TR-104`. */
export function detailWords({ details }: Pick<AuditRecord, 'details'>): string {
  return Object.entries(details)
    .map(([key, value]) => {
      if (key === 'why' && typeof value === 'string') return REASONS[value] ?? value;
      if (key === 'label' && typeof value === 'string') return `“${value}”`;
      return `${key} ${typeof value === 'string' ? value : JSON.stringify(value)}`;
    })
    .join(', ');
}
