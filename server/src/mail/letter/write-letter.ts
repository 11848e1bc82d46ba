import type { MailPurpose } from '@riseback/contracts';
import type { CommentData, InvitationData, ResetData, RevisionData } from '../mail-data';
import type { Fact, Letter } from './letter';
import { figureFor, oneLine, timeFor, type Reader } from './letter-words';
import { pageAddresses } from './page-addresses';

/** What a letter is written from. `data` is what mail-data.ts has under the purpose. */
export type MailMatter =
  | { readonly purpose: 'invitation'; readonly data: InvitationData; readonly token: string }
  | { readonly purpose: 'passwordReset'; readonly data: ResetData; readonly token: string }
  | { readonly purpose: 'submitted' | 'returned' | 'approved'; readonly data: RevisionData }
  | { readonly purpose: 'mention' | 'comment'; readonly data: CommentData };

export interface Setting {
  readonly reader: Reader;
  /** Where people open the application. */
  readonly origin: URL;
  /** When what the mail tells happened. */
  readonly at: string;
}

export function writeLetter(matter: MailMatter, setting: Setting): Letter {
  const { name } = setting.reader;
  const letter = bodyOf(matter, setting);
  return { ...letter, subject: oneLine(letter.subject), ...(name === undefined ? {} : { name: oneLine(name) }) };
}

function bodyOf(matter: MailMatter, setting: Setting): Letter {
  switch (matter.purpose) {
    case 'invitation':
      return invitation(matter.data, matter.token, setting);
    case 'passwordReset':
      return passwordReset(matter.data, matter.token, setting);
    case 'submitted':
    case 'returned':
    case 'approved':
      return aboutRevision(matter.purpose, matter.data, setting);
    case 'mention':
    case 'comment':
      return aboutComment(matter.purpose, matter.data, setting);
  }
}

function invitation(
  { siteName, role, byName, expiresAt }: InvitationData,
  token: string,
  { reader, origin }: Setting,
): Letter {
  return {
    subject: `${byName} invites you to ${siteName}`,
    paragraphs: [
      `${oneLine(byName)} invites you to work on ${oneLine(siteName)} in Riseback, which computes what stands against every trap of a condensate return network.`,
    ],
    facts: [
      { label: 'Your role there', value: role },
      { label: 'The link works once, until', value: timeFor(reader, expiresAt) },
    ],
    action: { label: 'Accept the invitation', url: pageAddresses(origin).invitation(token) },
    tellsResults: false,
    footing: `${oneLine(byName)} gave this address. If you do not know them, do nothing: without the link no account is made.`,
  };
}

function passwordReset({ byName, expiresAt }: ResetData, token: string, { reader, origin }: Setting): Letter {
  const asked =
    byName === undefined
      ? 'Somebody asked for a new password for your account.'
      : `${oneLine(byName)}, who administers your site, asks you to choose a new password for your account.`;
  return {
    subject: 'Choose a new password for Riseback',
    paragraphs: [`${asked} The link below leads to where you choose it; until then the present one holds.`],
    facts: [{ label: 'The link works once, until', value: timeFor(reader, expiresAt) }],
    action: { label: 'Choose a new password', url: pageAddresses(origin).passwordReset(token) },
    tellsResults: false,
    footing:
      byName === undefined
        ? 'If it was not you who asked, do nothing: your password stays as it is. Tell an administrator of your site when it happens again.'
        : 'Nobody but you sees the new password.',
  };
}

const REVISION_WORDS = {
  submitted: { subject: 'is issued for review', done: 'issued it for review', action: 'Review it' },
  returned: { subject: 'was returned', done: 'returned it', action: 'See why' },
  approved: { subject: 'is approved', done: 'signed it as approved', action: 'Open it' },
} as const satisfies Partial<Record<MailPurpose, object>>;

function aboutRevision(purpose: keyof typeof REVISION_WORDS, data: RevisionData, setting: Setting): Letter {
  const { reader, origin, at } = setting;
  const words = REVISION_WORDS[purpose];
  return {
    subject: `Revision ${data.letter} of ${data.networkName} ${words.subject}`,
    paragraphs: [
      `Revision ${oneLine(data.letter)} of ${oneLine(data.networkName)}: ${oneLine(data.title)}. ${oneLine(data.byName)} ${words.done}.`,
    ],
    ...(data.note === undefined || data.note.trim() === '' ? {} : { quote: data.note }),
    facts: [
      ...siteFact(data.siteName),
      { label: 'When', value: timeFor(reader, at) },
      ...verdictFact(data.verdicts),
      ...figureFacts(data.figures, reader),
    ],
    action: { label: words.action, url: pageAddresses(origin).revision(data) },
    tellsResults: true,
    footing: declinable(origin),
  };
}

function aboutComment(purpose: 'mention' | 'comment', data: CommentData, setting: Setting): Letter {
  const { reader, origin, at } = setting;
  const onWhat =
    data.letter === undefined
      ? oneLine(data.networkName)
      : `revision ${oneLine(data.letter)} of ${oneLine(data.networkName)}`;
  const place = data.elementTag === undefined ? onWhat : `${oneLine(data.elementTag)} in ${onWhat}`;
  const deed = purpose === 'mention' ? 'mentions you in a comment on' : 'commented on';
  return {
    subject: `${data.byName} ${deed} ${place}`,
    paragraphs: [`${oneLine(data.byName)} ${deed} ${place}:`],
    quote: data.excerpt,
    facts: [
      ...siteFact(data.siteName),
      { label: 'When', value: timeFor(reader, at) },
      ...figureFacts(data.figures, reader),
    ],
    action: { label: 'Read and answer', url: pageAddresses(origin).comment(data) },
    tellsResults: (data.figures ?? []).length > 0,
    footing: declinable(origin),
  };
}

function siteFact(siteName: string | undefined): Fact[] {
  return siteName === undefined ? [] : [{ label: 'Site', value: oneLine(siteName) }];
}

function verdictFact(verdicts: RevisionData['verdicts']): Fact[] {
  if (verdicts === undefined) return [];
  const { traps, fail, watch } = verdicts;
  const value = `${String(traps)} traps: ${String(fail)} fail, ${String(watch)} to watch`;
  return [{ label: 'Verdicts', value }];
}

function figureFacts(figures: RevisionData['figures'], reader: Reader): Fact[] {
  return (figures ?? []).map((figure) => ({ label: oneLine(figure.label), value: figureFor(reader, figure) }));
}

function declinable(origin: URL): string {
  return `You get this because you have a role at the site. What you do not want to be written about is chosen at ${pageAddresses(origin).account()}`;
}
