import type { CommentThread, NewComment } from '@riseback/contracts';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { EventReader, listening } from './event-reader';
import { batchOf, EVERY_KEY, makeNetwork, sendBatch } from './network-samples';
import { RevisionBench } from './revision-samples';
import type { Client, Who } from './test-server';

let bench: RevisionBench;
beforeEach(async () => {
  bench = new RevisionBench();
  await bench.begin();
});
afterEach(() => bench.close());

const sqlite = () => bench.server.db.$client;
const path = (rest = '') => `/api/networks/${bench.networkId}/comments${rest}`;
const WHOLE = { kind: 'whole' } as const;
const T1 = { kind: 'element', elementId: 'T1' } as const;

const send = (body: Partial<NewComment>, client: Client = bench.designer) => client.post(path(), body);
async function add(body: Partial<NewComment>, client?: Client): Promise<CommentThread> {
  return (await send(body, client).expect(201)).body as CommentThread;
}
async function threads(query = '', who: Who = 'viewer'): Promise<CommentThread[]> {
  return (await bench.server.as(who).get(path(query)).expect(200)).body as CommentThread[];
}
const mails = () =>
  (
    sqlite().prepare('select purpose, recipient_id, data from mails order by rowid').all() as Record<string, string>[]
  ).map(({ purpose, recipient_id, data }) => ({ purpose, to: recipient_id, data: JSON.parse(data ?? '') as unknown }));
const resolve = (client: Client, { id }: CommentThread, resolved = true) =>
  client.post(path(`/${id}/resolution`), { resolved });

describe('a thread', () => {
  it('is begun on the whole, an element or a result, of a revision or of the network as it stands', async () => {
    const revision = await bench.submitted();
    const result = { kind: 'result', elementId: 'T1', caseId: '', code: 'differential' } as const;
    const whole = await add({ subject: WHOLE, body: 'Good.' });
    const element = await add({ subject: T1, body: 'Too high?', revisionId: revision.id });
    await add({ subject: result, body: 'Fails.', revisionId: revision.id });
    expect(whole).toMatchObject({
      subject: WHOLE,
      comments: [{ personName: 'designer', body: 'Good.', mentions: [] }],
    });
    expect(whole.revisionId).toBeUndefined();
    expect(element).toMatchObject({ subject: T1, revisionId: revision.id });
    expect((await threads()).map(({ subject }) => subject.kind)).toEqual(['whole', 'element', 'result']);
    expect((await threads(`?revision=${revision.id}`)).map(({ subject }) => subject)).toEqual([T1, result]);
    expect((await threads('?revision=none')).map(({ id }) => id)).toEqual([whole.id]);
    expect((await bench.get(revision)).openComments).toBe(2);
  });

  it('is answered where it is, and keeps what it is about', async () => {
    const revision = await bench.submitted();
    const { id } = await add({ subject: T1, body: 'Too high?', revisionId: revision.id });
    const answered = await add({ threadId: id, body: 'It is the old pit.' }, bench.reviewer);
    expect(answered.comments.map(({ personName, body }) => `${personName}: ${body}`)).toEqual([
      'designer: Too high?',
      'reviewer: It is the old pit.',
    ]);
    expect(answered).toMatchObject({ subject: T1, revisionId: revision.id });
    await send({ threadId: id, subject: T1, body: 'x' }).expect(400);
    await send({ threadId: id, revisionId: revision.id, body: 'x' }).expect(400);
    await send({ threadId: 'none', body: 'x' }).expect(404);
    await send({ body: 'x' }).expect(400);
  });

  it('is pinned to what is there, in the revision as it was frozen and in the network as it stands', async () => {
    const revision = await bench.freeze();
    const remove = batchOf([
      { op: 'remove', in: 'pipes', id: 'L1' },
      { op: 'remove', in: 'nodes', id: 'T1' },
    ]);
    await sendBatch(bench.designer, bench.networkId, 1, remove).expect(200);
    const refused = await send({ subject: T1, body: 'x' }).expect(422);
    expect(refused.body).toMatchObject({ errors: [{ pointer: '/subject/elementId' }] });
    await add({ subject: T1, body: 'x', revisionId: revision.id });
    await send({ subject: { kind: 'result', elementId: 'R1', caseId: 'no' }, body: 'x' }).expect(422);
    await send({ subject: WHOLE, body: 'x', revisionId: 'none' }).expect(404);
    await send({ subject: WHOLE, body: '  ' }).expect(400);
  });

  it('of another network is not there', async () => {
    const { id } = await add({ subject: WHOLE, body: 'x' });
    const other = await makeNetwork(bench.designer, bench.server.siteId, EVERY_KEY);
    await bench.designer.post(`/api/networks/${other}/comments`, { threadId: id, body: 'x' }).expect(404);
    await bench.designer.post(`/api/networks/${other}/comments/${id}/resolution`, { resolved: true }).expect(404);
  });
});

describe('commenting', () => {
  it('is for all but viewers, who read', async () => {
    await add({ subject: WHOLE, body: 'x' });
    expect(await threads()).toHaveLength(1);
    await send({ subject: WHOLE, body: 'x' }, bench.server.as('viewer')).expect(403);
    for (const who of ['commissioning', 'reviewer', 'administrator'] as const) {
      await add({ subject: WHOLE, body: 'x' }, bench.server.as(who));
    }
  });

  it('names people of the site only, and tells them once', async () => {
    const refused = await send({ subject: WHOLE, body: 'x', mentions: ['reviewer', 'outsider'] }).expect(422);
    expect(refused.body).toMatchObject({ errors: [{ pointer: '/mentions/1' }] });
    sqlite().exec("update people set disabled_at = created_at where id = 'viewer'");
    await send({ subject: WHOLE, body: 'x', mentions: ['viewer'] }).expect(422);
    expect(sqlite().prepare('select count(*) from comments').pluck().get()).toBe(0);
    const thread = await add({ subject: T1, body: 'Look.', mentions: ['reviewer', 'reviewer', 'designer'] });
    expect(thread.comments[0]?.mentions.map(({ personName }) => personName)).toEqual(['reviewer', 'designer']);
    expect(mails().map(({ purpose, to }) => `${purpose ?? ''} ${to ?? ''}`)).toEqual(['mention reviewer']);
    expect(mails()[0]?.data).toMatchObject({
      byName: 'designer',
      elementId: 'T1',
      elementTag: 'TR-1',
      excerpt: 'Look.',
    });
  });

  it('on a revision is told to who froze and who submitted it, but not to who comments', async () => {
    const revision = await bench.submit(await bench.freeze(), bench.server.as('administrator'));
    sqlite().exec('delete from mails');
    const on = { subject: WHOLE, revisionId: revision.id };
    await add({ ...on, body: 'Why?' }, bench.reviewer);
    expect(mails().map(({ purpose, to }) => `${purpose ?? ''} ${to ?? ''}`)).toEqual([
      'comment designer',
      'comment administrator',
    ]);
    expect(mails()[0]?.data).toMatchObject({ revisionId: revision.id, letter: 'A', title: 'For construction' });
    sqlite().exec('delete from mails');
    await add({ ...on, body: 'Because.', mentions: ['administrator'] });
    expect(mails().map(({ purpose, to }) => `${purpose ?? ''} ${to ?? ''}`)).toEqual(['mention administrator']);
  });

  it('leaves a trace in the log', async () => {
    const thread = await add({ subject: T1, body: 'x' });
    await resolve(bench.designer, thread).expect(200);
    await resolve(bench.designer, thread, false).expect(200);
    const entries = sqlite().prepare("select action, subject from audit where action like 'comment.%'").raw().all();
    expect(entries).toEqual([
      ['comment.add', thread.id],
      ['comment.resolve', thread.id],
      ['comment.reopen', thread.id],
    ]);
  });
});

describe('resolving', () => {
  it('is for who began it, and for designers, reviewers and administrators; and opens again', async () => {
    const commissioning = bench.server.as('commissioning');
    const own = await add({ subject: WHOLE, body: 'x' }, commissioning);
    const others = await add({ subject: WHOLE, body: 'y' });
    const resolved = (await resolve(commissioning, own).expect(200)).body as CommentThread;
    expect(resolved.resolved).toMatchObject({ personName: 'commissioning', at: bench.server.now().toISOString() });
    await resolve(commissioning, others).expect(403);
    await resolve(bench.server.as('viewer'), others).expect(403);
    for (const who of ['designer', 'reviewer', 'administrator'] as const) {
      const client = bench.server.as(who);
      expect((await resolve(client, others).expect(200)).body).toMatchObject({ resolved: { personName: who } });
      expect(((await resolve(client, others, false).expect(200)).body as CommentThread).resolved).toBeUndefined();
    }
  });

  it('once more changes nothing, and an unknown thread is not there', async () => {
    const thread = await add({ subject: WHOLE, body: 'x' });
    await resolve(bench.designer, thread).expect(200);
    const again = await resolve(bench.reviewer, thread).expect(200);
    expect(again.body).toMatchObject({ resolved: { personName: 'designer' } });
    await bench.designer.post(path('/none/resolution'), { resolved: true }).expect(404);
  });
});

describe('those who have the network open', () => {
  it('are told of comments and revisions as they come', async () => {
    const { http, origin } = await listening(bench.server);
    const reader = await EventReader.open(origin, bench.server.as('viewer'), bench.networkId);
    try {
      const revision = await bench.submitted();
      const thread = await add({ subject: WHOLE, body: 'x', revisionId: revision.id });
      await reader.until(() => reader.of('comments').length > 0, 'the comment is told');
      expect(reader.of('revisions').map(({ data }) => data)).toEqual([
        { revisionId: revision.id },
        { revisionId: revision.id },
      ]);
      expect(reader.of('comments').map(({ data }) => data)).toEqual([{ threadId: thread.id, revisionId: revision.id }]);
    } finally {
      reader.close();
      bench.server.app.endStreams();
      http.close();
    }
  });
});
