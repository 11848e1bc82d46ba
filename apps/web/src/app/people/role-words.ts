import { type Permission, PERMISSIONS, permissionsOf, type Role, ROLES } from '@riseback/contracts';

/** As heads of columns. */
export const PERMISSION_HEADS: Readonly<Record<Permission, string>> = {
  view: 'Read everything',
  draw: 'Draw, cases, library, revisions',
  readings: 'Gauges, readings',
  comment: 'Comment',
  sign: 'Return, sign',
  people: 'People, mails, log',
};

/** As parts of a sentence. */
const PERMISSION_WORDS: Readonly<Record<Permission, string>> = {
  view: 'reads everything',
  draw: 'draws networks, keeps cases and the trap library, submits revisions',
  readings: 'keeps gauges and takes readings',
  comment: 'comments',
  sign: 'returns or signs revisions, never one they edited or submitted themselves',
  people: 'invites people, changes their roles, reads the mails and the log of the site',
};

export function roleName(role: Role): string {
  return role.charAt(0).toUpperCase() + role.slice(1);
}

/** What a role may do at its site, in one sentence made of its permissions. */
export function roleMeaning(role: Role): string {
  const [first = '', ...others] = permissionsOf(role).map((permission) => PERMISSION_WORDS[permission]);
  return `${first.charAt(0).toUpperCase()}${first.slice(1)}${others.length > 0 ? `; ${others.join('; ')}` : ', changes nothing'}.`;
}

/** What somebody gains and loses when one role takes the place of another. */
export function roleChangeLines(from: Role, to: Role): string[] {
  const [had, has] = [permissionsOf(from), permissionsOf(to)];
  const gained = PERMISSIONS.filter((permission) => has.includes(permission) && !had.includes(permission));
  const lost = PERMISSIONS.filter((permission) => had.includes(permission) && !has.includes(permission));
  return [
    ...gained.map((permission) => `From now on: ${PERMISSION_WORDS[permission]}.`),
    ...lost.map((permission) => `No longer: ${PERMISSION_WORDS[permission]}.`),
  ];
}

export const ROLE_CHOICES = ROLES.map((role) => ({ value: role, words: roleName(role) }));
