import { describe, expect, it } from 'vitest';
import type { CommentData, RevisionData } from '../mail-data';
import { CAUTION } from './letter';
import { letterHtml } from './letter-html';
import { letterText } from './letter-text';
import type { Reader } from './letter-words';
import { writeLetter, type MailMatter } from './write-letter';

const origin = new URL('https://riseback.example');
const AT = '2026-03-02T08:00:00.000Z';
const NEW_YORK: Reader = { name: 'Greta Lowndes', units: 'us', timeZone: 'America/New_York' };
const KOLKATA: Reader = { name: 'Greta Lowndes', units: 'si', timeZone: 'Asia/Kolkata' };

const REVISION: RevisionData = {
  siteId: 'site-1',
  siteName: 'Tern Quay Cannery',
  networkId: 'network-1',
  networkName: 'Hall return',
  byName: 'Ines Kallan',
  revisionId: 'revision-1',
  letter: 'B',
  title: 'Header one size larger',
  note: 'See the rise over the road.',
  verdicts: { traps: 30, fail: 2, watch: 3 },
  figures: [
    { label: 'Highest back pressure', kind: 'pressure', value: 204_700, atmosphericPressurePa: 101_325 },
    { label: 'Longest rise', kind: 'length', value: 3.6576 },
    { label: 'Largest load', kind: 'massFlow', value: 0.05 },
  ],
};
const COMMENT: CommentData = {
  siteId: 'site-1',
  networkId: 'network-1',
  networkName: 'Hall return',
  byName: 'Greta Lowndes',
  revisionId: 'revision-1',
  letter: 'B',
  threadId: 'thread-1',
  elementTag: 'CR-12',
  excerpt: 'Is this the size in the plant?',
};
const INVITATION: MailMatter = {
  purpose: 'invitation',
  token: 'a'.repeat(43),
  data: {
    linkId: 'link-1',
    siteName: 'Tern Quay Cannery',
    role: 'designer',
    byName: 'Maud Ferrant',
    expiresAt: '2026-03-03T08:00:00.000Z',
  },
};
const submitted: MailMatter = { purpose: 'submitted', data: REVISION };

const letterOf = (matter: MailMatter, reader = NEW_YORK) => writeLetter(matter, { reader, origin, at: AT });
const bothOf = (matter: MailMatter, reader = NEW_YORK) => {
  const letter = letterOf(matter, reader);
  return [letterText(letter), letterHtml(letter)];
};

describe('a mail', () => {
  // By hand: (204 700 − 101 325) Pa / 6894.757 = 14.99 psi; 3.6576 m = 12 ft; 0.05 kg/s × 3600 / 0.45359237 = 397 lb/h.
  it('gives figures in US units and times in the reader’s zone', () => {
    for (const text of bothOf(submitted, NEW_YORK)) {
      expect(text).toMatch(/Highest back pressure:(?:<\/span>)? 15\.0 psig/);
      expect(text).toMatch(/Longest rise:(?:<\/span>)? 12 ft/);
      expect(text).toMatch(/Largest load:(?:<\/span>)? 397 lb\/h/);
      expect(text).toMatch(/When:(?:<\/span>)? 2 March 2026, 03:00 \(America\/New_York\)/);
    }
  });

  it('gives the same in SI units, on another clock', () => {
    for (const text of bothOf(submitted, KOLKATA)) {
      expect(text).toMatch(/Highest back pressure:(?:<\/span>)? 103\.4 kPa g/);
      expect(text).toMatch(/Longest rise:(?:<\/span>)? 3\.658 m/);
      expect(text).toMatch(/Largest load:(?:<\/span>)? 180 kg\/h/);
      expect(text).toMatch(/When:(?:<\/span>)? 2 March 2026, 13:30 \(Asia\/Kolkata\)/);
    }
    const auckland = { ...KOLKATA, timeZone: 'Pacific/Auckland' };
    expect(letterText(letterOf(INVITATION, auckland))).toContain('3 March 2026, 21:00 (Pacific/Auckland)');
  });

  it.each([
    ['submitted', 'Revision B of Hall return is issued for review'],
    ['returned', 'Revision B of Hall return was returned'],
    ['approved', 'Revision B of Hall return is approved'],
  ] as const)('tells what became of a revision, with its results and the caution: %s', (purpose, subject) => {
    const letter = letterOf({ purpose, data: REVISION });
    expect(letter.subject).toBe(subject);
    for (const text of bothOf({ purpose, data: REVISION })) {
      for (const told of ['Ines Kallan', 'Header one size larger', 'See the rise over the road.', 'Tern Quay Cannery'])
        expect(text).toContain(told);
      expect(text).toContain('30 traps: 2 fail, 3 to watch');
      expect(text).toContain(CAUTION);
      expect(text).toContain('https://riseback.example/sites/site-1/networks/network-1/revisions?revision=revision-1');
      expect(text).toContain('https://riseback.example/account');
    }
  });

  it.each([
    ['mention', 'Greta Lowndes mentions you in a comment on CR-12 in revision B of Hall return'],
    ['comment', 'Greta Lowndes commented on CR-12 in revision B of Hall return'],
  ] as const)('leads to where it is read, and needs no caution where it tells no result: %s', (purpose, subject) => {
    expect(letterOf({ purpose, data: COMMENT }).subject).toBe(subject);
    for (const text of bothOf({ purpose, data: COMMENT })) {
      expect(text).toContain('/networks/network-1/revisions?revision=revision-1');
      expect(text).toContain('Is this the size in the plant?');
      expect(text).not.toContain(CAUTION);
    }
    const present = { ...COMMENT, revisionId: undefined, letter: undefined };
    for (const text of bothOf({ purpose, data: present })) {
      expect(text).toContain('/networks/network-1/revisions?revision=working');
      expect(text).toContain('CR-12 in Hall return');
    }
    for (const text of bothOf({ purpose, data: { ...present, elementId: 'L12' } }))
      expect(text).toContain('/networks/network-1/drawing?element=L12');
  });

  it('of an invitation says who sends it, to what, until when, and keeps the token out of what a server is asked for', () => {
    for (const text of bothOf(INVITATION)) {
      for (const told of ['Maud Ferrant', 'Tern Quay Cannery', 'designer', '3 March 2026, 03:00'])
        expect(text).toContain(told);
      expect(text).toContain(`https://riseback.example/invitation#${'a'.repeat(43)}`);
    }
  });

  it('of a reset says whether somebody else wants it', () => {
    const data = { linkId: 'link-1', expiresAt: '2026-03-03T08:00:00.000Z' };
    const token = 'b'.repeat(43);
    const own = letterText(letterOf({ purpose: 'passwordReset', data, token }));
    expect(own).toContain('Somebody asked for a new password');
    expect(own).toContain('do nothing: your password stays as it is');
    expect(own).toContain(`https://riseback.example/password-reset#${token}`);
    const asked = letterText(letterOf({ purpose: 'passwordReset', data: { ...data, byName: 'Maud Ferrant' }, token }));
    expect(asked).toContain('Maud Ferrant, who administers your site, asks you');
  });
});

describe('what somebody typed', () => {
  const NASTY = `<img src=x onerror="alert('1')">&amp;`;

  it('is text in the HTML, wherever it stands', () => {
    const data = { ...REVISION, byName: NASTY, networkName: NASTY, letter: NASTY, title: NASTY, note: NASTY };
    const html = letterHtml(
      letterOf({ purpose: 'submitted', data: { ...data, siteName: NASTY } }, { ...NEW_YORK, name: NASTY }),
    );
    expect(html).not.toContain('<img');
    expect(html).toContain('&lt;img src=x onerror=&quot;alert(&#39;1&#39;)&quot;&gt;&amp;amp;');
    const tags = new Set([...html.matchAll(/<\/?([a-z0-9]+)/g)].map(([, tag]) => tag));
    const ours = ['html', 'head', 'meta', 'title', 'body', 'div', 'h1', 'p', 'span', 'blockquote', 'a'];
    expect([...tags].filter((tag) => !ours.includes(tag ?? ''))).toEqual([]);
  });

  it('cannot leave an address that the link leads to', () => {
    const data = { ...REVISION, networkId: '../../evil?x="><script>', revisionId: 'r#1' };
    const { url } = letterOf({ purpose: 'submitted', data }).action;
    expect(url).toBe(
      'https://riseback.example/sites/site-1/networks/..%2F..%2Fevil%3Fx%3D%22%3E%3Cscript%3E/revisions?revision=r%231',
    );
  });

  it('breaks no header: a subject is one line without control characters, and not endless', () => {
    const smuggled = 'B\r\nBcc: everybody@plant.example\u0000\u2028\u202E';
    for (const purpose of ['submitted', 'returned', 'approved'] as const) {
      const { subject } = letterOf({ purpose, data: { ...REVISION, letter: smuggled, networkName: smuggled } });
      expect(subject).not.toMatch(/[\p{Cc}\u2028\u2029\u202A-\u202E\u2066-\u2069]/u);
      expect(subject).toContain('B Bcc: everybody@plant.example');
    }
    const long = letterOf({ purpose: 'comment', data: { ...COMMENT, elementTag: 'x'.repeat(5_000) } }).subject;
    expect(long.length).toBeLessThanOrEqual(200);
    const { name } = letterOf(submitted, { ...NEW_YORK, name: 'Greta\r\nBcc: x@y.example' });
    expect(name).toBe('Greta Bcc: x@y.example');
  });

  it('keeps its lines in a quotation, and cannot pass for the mail’s own words', () => {
    const data = { ...COMMENT, excerpt: 'first\r\nsecond\n-- \nKind regards\u0007' };
    const [text = '', html = ''] = bothOf({ purpose: 'comment', data });
    expect(text).toContain('> first\n> second\n> --\n> Kind regards');
    expect(html).toContain('first<br>second<br>--<br>Kind regards');
    expect(text + html).not.toMatch(/[\u0000-\u0008\u000b-\u001f]/);
  });
});
