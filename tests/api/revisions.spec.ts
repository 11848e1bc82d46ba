import type { CaseOutcome, NetworkResults, Revision, RevisionSummary } from '@riseback/contracts';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { solveCases } from '../../server/src/solve/solve-cases';
import type { SolvePort } from '../../server/src/solve/solve-port';
import { EVERY_KEY, makeNetwork, SMALL } from './network-samples';
import { RevisionBench } from './revision-samples';

let bench: RevisionBench;
beforeEach(async () => {
  bench = new RevisionBench();
  await bench.begin();
});
afterEach(() => bench.close());

const BODY = { title: 'For construction', reason: 'First issue', networkVersion: 1 };
const sqlite = () => bench.server.db.$client;
const actions = () => sqlite().prepare("select action from audit where action like 'revision.%'").pluck().all();
const mails = () => sqlite().prepare('select purpose, recipient_id from mails order by rowid').raw().all();

describe('freezing', () => {
  it('keeps the network and its results as they were, under a letter, whatever becomes of the network', async () => {
    const made = await bench.designer.post(bench.path(), BODY).expect(201);
    const revision = made.body as Revision;
    expect(revision).toMatchObject({ letter: 'A', name: 'A: For construction', state: 'draft', networkVersion: 1 });
    expect(made.headers['location']).toBe(bench.path(`/${revision.id}`));
    const results = async (path: string) =>
      ((await bench.designer.get(path).expect(200)).body as Extract<NetworkResults, { state: 'finished' }>).cases;
    const then = await results(`/api/networks/${bench.networkId}/results?version=1`);

    await bench.edit(1, 0, 1.5);
    const later = await bench.get(revision);
    expect(later.file).toEqual(revision.file);
    expect(later.file.nodes.find(({ id }) => id === 'T1')?.elevationM).toBe(0);
    expect(await results(bench.path(`/${revision.id}/results`))).toEqual(then);
    expect(await results(`/api/networks/${bench.networkId}/results`)).not.toEqual(then);
    expect(actions()).toEqual(['revision.freeze']);
  });

  it('takes the inputs and the results of the very version that is named, also an older one', async () => {
    await bench.edit(1, 0, 1.5);
    await bench.edit(2, 1.5, 3);
    const old = await bench.freeze(2);
    const present = await bench.freeze(3);
    const elevation = ({ file }: Revision) => file.nodes.find(({ id }) => id === 'T1')?.elevationM;
    expect([elevation(old), elevation(present)]).toEqual([1.5, 3]);
    expect(old.solverHash).not.toBe(present.solverHash);
    for (const { id, letter, networkVersion, solverHash } of [old, present]) {
      const results = (await bench.designer.get(bench.path(`/${id}/results`)).expect(200)).body as NetworkResults;
      expect(results).toMatchObject({ state: 'finished', version: networkVersion, solverHash });
      expect(letter).toBe(networkVersion === 2 ? 'A' : 'B');
    }
    const summaries = (await bench.server.as('viewer').get(bench.path()).expect(200)).body as RevisionSummary[];
    expect(summaries.map(({ letter, networkVersion }) => [letter, networkVersion])).toEqual([
      ['B', 3],
      ['A', 2],
    ]);
  });

  it('keeps every kind of element, and the cases in their order', async () => {
    await bench.begin(EVERY_KEY);
    const { file, id } = await bench.freeze();
    const stored = (await bench.designer.get(`/api/networks/${bench.networkId}/file`).expect(200)).body as typeof file;
    const byId = <T extends { readonly id: string }>(list: readonly T[]) =>
      list.toSorted((a, b) => (a.id < b.id ? -1 : 1));
    expect(file.cases.map((each) => each.id)).toEqual(['start-up', 'design']);
    for (const list of ['nodes', 'pipes', 'trapModels', 'gauges'] as const)
      expect(file[list]).toEqual(byId<{ readonly id: string }>(stored[list]));
    expect({ method: file.method, limits: file.limits, site: file.site }).toEqual({
      method: stored.method,
      limits: stored.limits,
      site: stored.site,
    });
    expect(await bench.verify({ id })).toMatchObject({ sound: true, solvedAgain: { sameEngine: true } });
  });

  it('is refused for a version that is not there yet, and a bad body by its place', async () => {
    const refused = await bench.designer.post(bench.path(), { ...BODY, networkVersion: 2 }).expect(409);
    expect(refused.body).toMatchObject({ detail: 'The network has no version 2 yet; its newest is 1.' });
    await bench.designer.post(bench.path(), { ...BODY, title: ' ' }).expect(400);
    await bench.designer.post(bench.path(), { ...BODY, title: 'two\nlines' }).expect(400);
    expect(sqlite().prepare('select count(*) from revisions').pluck().get()).toBe(0);
  });

  it('is for those who draw', async () => {
    for (const who of ['viewer', 'commissioning', 'reviewer'] as const) {
      await bench.server.as(who).post(bench.path(), BODY).expect(403);
    }
    await bench.server.as('administrator').post(bench.path(), BODY).expect(201);
  });

  it('holds a case without a solution and says so before it is signed', async () => {
    const cases = [
      { id: 'design', name: 'Design' },
      // 40 times the load through one inch: the choked pipe would stand above the trap's inlet
      { id: 'flood', name: 'Flood', overrides: [{ node: 'T1', loadKgS: 60 }] },
    ];
    await bench.begin({ ...SMALL, cases });
    const revision = await bench.submitted();
    const results = await bench.designer.get(bench.path(`/${revision.id}/results`)).expect(200);
    const outcomes = (results.body as { cases: CaseOutcome[] }).cases;
    const flood = outcomes.find(({ caseId }) => caseId === 'flood');
    expect(flood?.status === 'solved' && flood.result.converged).toBe(false);
    const { sentences } = await bench.terms(revision, 'approved');
    expect(sentences.join(' ')).toContain('No solution was found for 1 case: “Flood”.');
  });
});

describe('a result that is not there', () => {
  const frozenBy = async (solver: SolvePort) => {
    const own = new RevisionBench({ solver });
    await own.begin();
    const answer = await own.designer.post(own.path(), BODY);
    const count = own.server.db.$client.prepare('select count(*) from revisions').pluck().get();
    own.close();
    return { status: answer.status, detail: (answer.body as { detail: string }).detail, count };
  };
  const never = new Promise<never>(() => undefined);
  const pressuresAlone: SolvePort = {
    solve: (_key, job) =>
      job.bands ? never : Promise.resolve({ end: 'finished', outcomes: solveCases(job), solveMs: 1 }),
  };

  it('is waited for and then asked for in words, never frozen; and so is one whose bands are to come', async () => {
    const answers = await Promise.all([frozenBy({ solve: () => never }), frozenBy(pressuresAlone)]);
    for (const answer of answers) {
      expect(answer).toMatchObject({ status: 409, count: 0 });
      expect(answer.detail).toContain('Version 1 is still being solved');
    }
  }, 15_000);

  it('because the solver gave up is told with its reason', async () => {
    const answer = await frozenBy({ solve: () => Promise.resolve({ end: 'failed', detail: 'It took over 10 s.' }) });
    expect(answer).toMatchObject({ status: 409, count: 0 });
    expect(answer.detail).toContain('It took over 10 s.');
  });
});

describe('what becomes of a revision', () => {
  it('is submitted, returned with a reason, and then is no more to be moved', async () => {
    const revision = await bench.submitted();
    expect(revision.state).toBe('underReview');
    const path = bench.path(`/${revision.id}`);
    await bench.reviewer.post(`${path}/return`, {}).expect(400);
    const returned = await bench.reviewer.post(`${path}/return`, { note: 'CR-1 is too small.' }).expect(200);
    expect(returned.body).toMatchObject({
      state: 'returned',
      events: [
        { seq: 1, state: 'draft', personName: 'designer' },
        { seq: 2, state: 'underReview', personName: 'designer' },
        { seq: 3, state: 'returned', personName: 'reviewer', note: 'CR-1 is too small.' },
      ],
    });
    for (const [client, deed] of [
      [bench.designer, 'submission'],
      [bench.designer, 'withdrawal'],
      [bench.reviewer, 'return'],
    ] as const) {
      const refused = await client.post(`${path}/${deed}`, { note: 'again' }).expect(409);
      expect(refused.body).toMatchObject({ detail: expect.stringContaining('Revision A is returned') as string });
    }
    expect(actions()).toEqual(['revision.freeze', 'revision.submit', 'revision.return']);
    expect(mails()).toEqual([
      ['submitted', 'reviewer'],
      ['returned', 'designer'],
    ]);
  });

  it('tells in the mail what came out, in SI for whoever reads it in their units', async () => {
    const { id } = await bench.submitted();
    const frozen = await bench.reviewer.get(bench.path(`/${id}/results`)).expect(200);
    const { cases } = frozen.body as Extract<NetworkResults, { state: 'finished' }>;
    const highest = Math.max(
      ...cases
        .flatMap((outcome) => (outcome.status === 'refused' ? [] : outcome.result.traps))
        .map((trap) => trap.backPressurePa),
    );
    const data: unknown = JSON.parse(String(sqlite().prepare('select data from mails').pluck().get()));
    expect(data).toMatchObject({
      verdicts: { traps: 1 },
      figures: [
        { kind: 'pressure', value: highest, label: expect.stringContaining('Highest back pressure') as string },
      ],
    });
  });

  it('goes on while the network does', async () => {
    const revision = await bench.submitted();
    await bench.edit(1, 0, 2);
    const next = await bench.freeze(2);
    expect([next.letter, next.state]).toEqual(['B', 'draft']);
    expect(await bench.get(revision)).toMatchObject({ state: 'underReview', networkVersion: 1 });
  });

  it('is withdrawn with a reason, also once it is approved', async () => {
    const draft = await bench.freeze();
    const approved = await bench.sign(await bench.submitted());
    for (const { id } of [draft, approved]) {
      await bench.designer.post(bench.path(`/${id}/withdrawal`), {}).expect(400);
      await bench.reviewer.post(bench.path(`/${id}/withdrawal`), { note: 'no' }).expect(403);
      const refused = await bench.designer.post(bench.path(`/${id}/withdrawal`), { note: 'Plant sold.' }).expect(200);
      expect(refused.body).toMatchObject({ state: 'withdrawn' });
    }
  });

  it('is superseded when a later one is approved, and by that alone', async () => {
    const first = await bench.sign(await bench.submitted());
    await bench.edit(1, 0, 1);
    const second = await bench.submitted(2);
    expect((await bench.get(first)).state).toBe('approved');
    await bench.sign(second);
    const superseded = await bench.get(first);
    expect(superseded.state).toBe('superseded');
    expect(superseded.events.at(-1)).toMatchObject({ note: 'Superseded by revision B.', personName: 'reviewer' });
    for (const { id } of [first, second]) expect(await bench.verify({ id })).toMatchObject({ sound: true });
  });

  it('is told to the reader: what they may do, and if not, why', async () => {
    const revision = await bench.submitted();
    expect((await bench.get(revision, 'reviewer')).deeds).toMatchObject({
      sign: { allowed: true },
      return: { allowed: true },
      submit: { allowed: false, why: expect.stringContaining('your role here does not') as string },
    });
    expect((await bench.get(revision, 'designer')).deeds).toMatchObject({
      withdraw: { allowed: true },
      sign: { allowed: false, why: expect.stringContaining('Reviewers sign revisions') as string },
    });
  });
});

describe('a revision', () => {
  it('is found under its own network only', async () => {
    const { id } = await bench.freeze();
    const other = await makeNetwork(bench.designer, bench.server.siteId);
    for (const rest of ['', '/results', '/verification', '/signing?meaning=approved']) {
      await bench.reviewer.get(`/api/networks/${other}/revisions/${id}${rest}`).expect(404);
    }
    for (const rest of ['submission', 'withdrawal']) {
      await bench.designer.post(`/api/networks/${other}/revisions/${id}/${rest}`, { note: 'x' }).expect(404);
    }
  });

  it.each(['revisions', 'revision_results', 'revision_events', 'signatures'])(
    'is never changed nor deleted: %s refuses it',
    async (table) => {
      await bench.sign(await bench.submitted());
      const first = table === 'revisions' ? 'title' : 'revision_id';
      expect(() => sqlite().exec(`update ${table} set ${first} = 'x'`)).toThrow('never changed');
      sqlite().pragma('foreign_keys = off');
      expect(() => sqlite().exec(`delete from ${table}`)).toThrow('never deleted');
    },
  );
});
