import Sqlite from 'better-sqlite3';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { conflict } from '../problem';
import { SharedCommit } from './shared-commit';

let sqlite: Sqlite.Database;
let commits: number;
let undone: number;
let shared: SharedCommit;
beforeEach(() => {
  sqlite = new Sqlite(':memory:');
  sqlite.exec('pragma foreign_keys = on; create table parent (id text primary key) strict;');
  sqlite.exec('create table line (text text unique references parent deferrable initially deferred) strict;');
  sqlite.exec("insert into parent values ('a'), ('b'), ('c')");
  [commits, undone] = [0, 0];
  const transaction = <T>(work: () => T): T => {
    const outermost = !sqlite.inTransaction;
    const result = sqlite.transaction(work)();
    if (outermost) commits += 1;
    return result;
  };
  shared = new SharedCommit(transaction, () => (undone += 1));
});
afterEach(() => {
  sqlite.close();
});

const add = (text: string) => () => {
  sqlite.prepare('insert into line values (?)').run(text);
  return text;
};
const lines = () => sqlite.prepare('select text from line order by rowid').pluck().all();

describe('work that arrives together', () => {
  it('is committed once, in its order, and each has its own answer', async () => {
    expect(await Promise.all(['a', 'b', 'c'].map((text) => shared.run(add(text))))).toEqual(['a', 'b', 'c']);
    expect(lines()).toEqual(['a', 'b', 'c']);
    expect(commits).toBe(1);
  });

  it('is answered only after the commit', async () => {
    let open = true;
    await shared.run(add('a')).then(() => (open = sqlite.inTransaction));
    expect(open).toBe(false);
  });

  it('loses nothing by a neighbour that is refused, whose own changes are undone', async () => {
    const refused = shared.run(() => {
      add('b')();
      throw conflict('no');
    });
    const [first, , last] = await Promise.allSettled([shared.run(add('a')), refused, shared.run(add('c'))]);
    expect([first.status, last.status]).toEqual(['fulfilled', 'fulfilled']);
    await expect(refused).rejects.toThrow('no');
    expect(lines()).toEqual(['a', 'c']);
    expect(undone).toBe(0);
  });

  it('is kept as a whole or not at all when a fault ends it: nobody is told of a change that is not there', async () => {
    const faulty = shared.run(() => sqlite.exec('no such statement'));
    const all = await Promise.allSettled([shared.run(add('a')), faulty, shared.run(add('c'))]);
    expect(all.map(({ status }) => status)).toEqual(['rejected', 'rejected', 'rejected']);
    expect(lines()).toEqual([]);
    expect(undone).toBe(1);
  });

  it('is not kept when the commit itself fails', async () => {
    const all = await Promise.allSettled([shared.run(add('a')), shared.run(add('points at nothing'))]);
    expect(all.map(({ status }) => status)).toEqual(['rejected', 'rejected']);
    expect(lines()).toEqual([]);
    expect(await shared.run(add('b'))).toBe('b');
  });
});
