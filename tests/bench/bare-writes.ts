import { join } from 'node:path';
import Sqlite from 'better-sqlite3';

/** What an edit of a small network writes, about. */
const EDIT_BYTES = 600;
const AUDIT_BYTES = 400;
const ELEMENT_BYTES = 200;

/** Committed transactions of an edit's size without a server around them: so many a second are as fast as the disk lets it. */
export class BareWrites {
  private readonly sqlite: Sqlite.Database;
  private readonly commit: () => void;

  constructor(folder: string) {
    this.sqlite = new Sqlite(join(folder, 'bare.db'));
    this.sqlite.pragma('journal_mode = WAL');
    this.sqlite.exec(
      'create table rows (seq integer primary key, content text not null) strict; create table element (id text primary key, content text not null) strict;',
    );
    // the driver's build falls back to NORMAL at the first write
    this.sqlite.pragma('synchronous = FULL');
    const insert = this.sqlite.prepare('insert into rows (content) values (?)');
    const upsert = this.sqlite.prepare(
      'insert into element (id, content) values (?, ?) on conflict do update set content = excluded.content',
    );
    this.commit = this.sqlite.transaction(() => {
      insert.run('e'.repeat(EDIT_BYTES));
      insert.run('a'.repeat(AUDIT_BYTES));
      upsert.run('network', 'n'.repeat(ELEMENT_BYTES));
      upsert.run('node', 'e'.repeat(ELEMENT_BYTES));
    });
    this.commit();
  }

  /** @returns commits a second */
  rate(commits: number): number {
    const start = performance.now();
    for (let i = 0; i < commits; i++) this.commit();
    const level: unknown = this.sqlite.pragma('synchronous', { simple: true });
    if (level !== 2) throw new Error(`the bare commits are not at synchronous = FULL but ${String(level)}`);
    return (1000 * commits) / (performance.now() - start);
  }

  close(): void {
    this.sqlite.close();
  }
}
