import type { AuditRecord } from '@riseback/contracts';

/** What an entry tells, in words; an action that this page does not know yet keeps its own name. */
const WORDS: Readonly<Record<string, string>> = {
  'codes.off': 'turned one-time codes off',
  'codes.on': 'turned one-time codes on',
  'codes.recoveryRenew': 'made new recovery codes',
  'codes.recoveryUse': 'used a recovery code',
  'library.add': 'added a trap model to the library',
  'library.reinstate': 'took a trap model into use again',
  'library.retire': 'retired a trap model',
  'library.save': 'saved a trap model of the library',
  'network.create': 'made a network',
  'network.edit': 'edited a network',
  'person.create': 'added a person',
  'person.password': 'changed their password',
  'person.refuse': 'did not prove who they are',
  'person.rename': 'changed their name',
  'plan.place': 'placed the plan under a drawing',
  'plan.remove': 'took the plan from under a drawing',
  'plan.upload': 'put a plan under a drawing',
  'role.give': 'gave a role',
  'session.start': 'signed in',
  'session.end': 'ended a session',
  'session.refuse': 'was refused at sign-in',
  'site.create': 'made the site',
};

const REASONS: Readonly<Record<string, string>> = {
  wrongPassword: 'wrong password',
  wrongCode: 'wrong code',
  tooManyAttempts: 'too many attempts',
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
