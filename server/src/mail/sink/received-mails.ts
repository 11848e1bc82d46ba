import { createHash } from 'node:crypto';
import { mkdirSync, readdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { ReceivedMailContent } from '@riseback/contracts';
import * as z from 'zod';

/** A mail as the sink keeps it: one file a Message-ID. */
const Kept = z.object({ ...ReceivedMailContent.shape, siteId: z.string().optional() });
type Kept = z.infer<typeof Kept>;
export type IncomingMail = Omit<Kept, 'id' | 'times'>;

const MOST_KEPT = 500;
const FILE = /^[0-9a-f]{32}\.json$/;

/** What the sink took in, grouped by Message-ID, so that a mail that was sent twice shows as such. */
export class ReceivedMails {
  private readonly kept = new Map<string, Kept>();

  /** @param folder absent = in memory alone */
  constructor(private readonly folder?: string) {
    if (folder === undefined) return;
    mkdirSync(folder, { recursive: true, mode: 0o700 });
    const mails = readdirSync(folder).filter((name) => FILE.test(name));
    for (const mail of mails.flatMap((name) => readKept(join(folder, name))).sort(earlierFirst)) {
      this.kept.set(mail.id, mail);
    }
  }

  /** Kept when it returns. */
  take(incoming: IncomingMail): void {
    const id = createHash('sha256').update(incoming.messageId).digest('hex').slice(0, 32);
    const before = this.kept.get(id);
    const mail = before === undefined ? { ...incoming, id, times: 1 } : { ...before, times: before.times + 1 };
    this.write(mail);
    this.kept.set(id, mail);
    const oldest = this.kept.size > MOST_KEPT ? this.kept.keys().next().value : undefined;
    if (oldest !== undefined) this.forget(oldest);
  }

  /** The newest first. */
  ofSite(siteId: string): ReceivedMailContent[] {
    return [...this.kept.values()].filter((mail) => mail.siteId === siteId).reverse();
  }

  find(siteId: string, id: string): ReceivedMailContent | undefined {
    const mail = this.kept.get(id);
    return mail?.siteId === siteId ? mail : undefined;
  }

  private write(mail: Kept): void {
    if (this.folder === undefined) return;
    const path = join(this.folder, `${mail.id}.json`);
    // Whole or not at all, under its name.
    writeFileSync(`${path}.part`, JSON.stringify(mail), { mode: 0o600 });
    renameSync(`${path}.part`, path);
  }

  private forget(id: string): void {
    this.kept.delete(id);
    if (this.folder !== undefined) rmSync(join(this.folder, `${id}.json`), { force: true });
  }
}

/** A file that is not one of ours, or not whole, is passed over. */
function readKept(path: string): Kept[] {
  try {
    return [Kept.parse(JSON.parse(readFileSync(path, 'utf8')))];
  } catch {
    return [];
  }
}

function earlierFirst(a: Kept, b: Kept): number {
  return a.receivedAt < b.receivedAt ? -1 : a.receivedAt > b.receivedAt ? 1 : 0;
}
