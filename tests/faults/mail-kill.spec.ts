import { mkdtempSync, rmSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import Sqlite from 'better-sqlite3';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { checkAudit } from '../../server/src/platform/db/audit-check';
import { auditHeadLogOf, readAuditHeads } from '../../server/src/platform/db/audit-head-log';
import { openDatabase } from '../../server/src/platform/db/database';
import { demoNetwork, signIn, startServer, type ServerProcess } from './server-process';
import { FULL, randomFrom, seedOfRun } from './test-form';

const ROUNDS = FULL ? 30 : 3;
const INVITATIONS = 6;
/** Long enough for what waits to be sent after a start, also on a busy machine. */
const PATIENCE_MS = 60_000;

let folder = '';
let server: ServerProcess | undefined;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-mail-kill-'));
});
afterAll(() => {
  server?.child.kill('SIGKILL');
  rmSync(folder, { recursive: true, force: true });
});

/** A mail server that outlives the one under test, and may be told to have it killed at a moment of its own choosing. */
class Mailbox {
  /** How often each Message-ID came, with where it went. */
  readonly came = new Map<string, { readonly to: string; times: number }>();
  /** Called with a mail in hand, before (`taken` false) and after the server under test is told that it was taken. */
  meanwhile: (taken: boolean) => void = () => undefined;
  private readonly smtp = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    disableReverseLookup: true,
    logger: false,
    onData: (stream, session, done) => {
      simpleParser(stream).then(
        (mail) => {
          const id = mail.messageId ?? '';
          const to = session.envelope.rcptTo[0]?.address ?? '';
          this.came.set(id, { to, times: (this.came.get(id)?.times ?? 0) + 1 });
          this.meanwhile(false);
          done();
          this.meanwhile(true);
        },
        // killed in the middle of a mail: it has not come
        () => done(new Error('451 half a mail')),
      );
    },
  });

  async listen(): Promise<string> {
    this.smtp.on('error', () => undefined);
    const listening = await new Promise<AddressInfo>((resolve) => {
      const opened = this.smtp.listen(0, '127.0.0.1', () => resolve(opened.address() as AddressInfo));
    });
    return `smtp://127.0.0.1:${String(listening.port)}`;
  }

  close(): Promise<void> {
    return new Promise((resolve) => this.smtp.close(resolve));
  }
}

interface StoredMail {
  readonly id: string;
  readonly email: string;
  readonly state: string;
}

function storedMails(databasePath: string): StoredMail[] {
  const db = new Sqlite(databasePath, { readonly: true });
  try {
    return db.prepare('select id, email, state from mails order by created_at').all() as StoredMail[];
  } finally {
    db.close();
  }
}

async function until(done: () => boolean, what: () => string): Promise<void> {
  const begun = performance.now();
  while (!done()) {
    if (performance.now() - begun > PATIENCE_MS) throw new Error(what());
    await pause(20);
  }
}

describe('a server that is killed around sending', () => {
  it('loses no mail, whenever the kill comes, and a repeat bears the same Message-ID', async () => {
    const databasePath = join(folder, 'riseback.db');
    const random = randomFrom(seedOfRun('kills around mails'));
    const mailbox = new Mailbox();
    const env = { RISEBACK_SMTP_URL: await mailbox.listen(), RISEBACK_MAIL_FROM: 'Riseback <riseback@plant.example>' };
    const acknowledged: string[] = [];
    const kills = { beforeTaken: 0, afterTaken: 0, anywhere: 0 };

    for (let round = 0; round < ROUNDS; round += 1) {
      server = await startServer(databasePath, { env });
      const { child, address, ended } = server;
      // Every third round at any moment; the others between the mail server's taking a mail and its mark in the database.
      const kind = (['beforeTaken', 'afterTaken', 'anywhere'] as const)[round % 3] ?? 'anywhere';
      const nth = 1 + Math.floor(random() * 3);
      let seen = 0;
      const kill = () => {
        mailbox.meanwhile = () => undefined;
        kills[kind] += 1;
        child.kill('SIGKILL');
      };
      mailbox.meanwhile = (taken) => {
        if (taken !== (kind === 'afterTaken')) return;
        seen += 1;
        if (kind !== 'anywhere' && seen === nth) kill();
      };
      const headers = await signIn(address, 'admin').catch(() => undefined);
      if (headers !== undefined) {
        const { siteId } = await demoNetwork(address, headers);
        for (let i = 0; i < INVITATIONS; i += 1) {
          const email = `r${String(round)}-${String(i)}@works.example`;
          const body = JSON.stringify({ email, role: 'viewer' });
          const invite = fetch(`${address}/api/sites/${siteId}/invitations`, { method: 'POST', headers, body });
          if (kind === 'anywhere' && i === INVITATIONS - 1) setTimeout(kill, random() * 12);
          const answer = await invite.catch(() => undefined);
          if (answer?.status === 201) acknowledged.push(email);
        }
      }
      await Promise.race([ended(), pause(2_000)]);
      if (child.exitCode === null && child.signalCode === null) kill();
      await ended();
    }

    mailbox.meanwhile = () => undefined;
    // What failed while it was killed is tried again after a minute; the test does not wait for that.
    const db = new Sqlite(databasePath);
    db.exec(`update mails set next_try_at = created_at where state = 'waiting'`);
    db.close();
    server = await startServer(databasePath, { env });
    const waiting = () => storedMails(databasePath).filter(({ state }) => state !== 'sent');
    await until(
      () => waiting().length === 0,
      () => `still waiting: ${JSON.stringify(waiting())}`,
    );
    server.child.kill('SIGTERM');
    expect(await server.ended()).toBe(0);
    await mailbox.close();

    // Every mail that is stored came, and every invitation that was answered is stored.
    const stored = storedMails(databasePath);
    for (const { id, email } of stored) expect(mailbox.came.get(`<${id}@localhost>`)).toMatchObject({ to: email });
    expect(stored.map(({ email }) => email)).toEqual(expect.arrayContaining(acknowledged));
    // And nothing else came: a repeat has the Message-ID of the first.
    expect(mailbox.came.size).toBe(stored.length);
    expect(acknowledged.length).toBeGreaterThan(ROUNDS);
    expect(kills.beforeTaken + kills.afterTaken).toBeGreaterThan(1);
    expect([...mailbox.came.values()].some(({ times }) => times > 1)).toBe(true);

    const opened = openDatabase(databasePath);
    expect(checkAudit(opened, readAuditHeads(auditHeadLogOf(databasePath))).mismatch).toBeUndefined();
    opened.$client.close();
  }, 600_000);

  it('has every mail in the sink of the demo too', async () => {
    const databasePath = join(folder, 'demo', 'riseback.db');
    const emails = ['s-1@works.example', 's-2@works.example', 's-3@works.example'];
    server = await startServer(databasePath);
    const before = await signIn(server.address, 'admin');
    const { siteId } = await demoNetwork(server.address, before);
    for (const email of emails) {
      const body = JSON.stringify({ email, role: 'viewer' });
      await fetch(`${server.address}/api/sites/${siteId}/invitations`, { method: 'POST', headers: before, body });
    }
    server.child.kill('SIGKILL');
    await server.ended();
    server = await startServer(databasePath);
    const headers = await signIn(server.address, 'admin');
    await until(
      () => storedMails(databasePath).every(({ state }) => state === 'sent'),
      () => JSON.stringify(storedMails(databasePath)),
    );
    const received = await fetch(`${server.address}/api/sites/${siteId}/received-mails`, { headers });
    const mails = (await received.json()) as { to: string; messageId: string }[];
    expect(mails.map(({ to }) => to).sort()).toEqual(emails.sort());
    expect(new Set(mails.map(({ messageId }) => messageId)).size).toBe(emails.length);
    server.child.kill('SIGTERM');
    expect(await server.ended()).toBe(0);
  }, 120_000);
});
