import { createPublicKey, verify } from 'node:crypto';
import type { Revision, SignatureMeaning, SigningTerms } from '@riseback/contracts';
import { eq } from 'drizzle-orm';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { memberships } from '../../server/src/platform/db/schema';
import { codeAt, NotingHasher, PASSWORD, turnCodesOn } from './account-people';
import { RevisionBench } from './revision-samples';
import { Client } from './test-server';

let bench: RevisionBench;
beforeEach(async () => {
  bench = new RevisionBench();
  await bench.begin();
});
afterEach(() => bench.close());

const sqlite = () => bench.server.db.$client;
const signatureCount = () => sqlite().prepare('select count(*) from signatures').pluck().get();
const detailOf = ({ body }: { readonly body: unknown }) => (body as { readonly detail: string }).detail;

/** Untouched by triggers, as somebody with the file in hand. */
function tamper(sql: string): void {
  const triggers = sqlite().prepare("select name from sqlite_schema where type = 'trigger'").pluck().all();
  for (const name of triggers.map(String)) sqlite().exec(`drop trigger "${name}"`);
  sqlite().exec(sql);
}

function giveRole(personId: string, role: 'designer' | 'reviewer'): void {
  bench.server.db.update(memberships).set({ role }).where(eq(memberships.personId, personId)).run();
}

describe('a signature', () => {
  it('is one that another program verifies with the public key alone', async () => {
    const signed = await bench.sign(await bench.submitted());
    const [signature] = signed.signatures;
    if (signature === undefined) throw new Error('it was signed');
    const pem = (await bench.server.as('anonymous').get('/api/signing-key').expect(200)).text;
    const bytes = Buffer.from(signature.signature, 'base64');
    expect(verify(null, Buffer.from(signature.statement), createPublicKey(pem), bytes)).toBe(true);
    expect(verify(null, Buffer.from(`${signature.statement} `), createPublicKey(pem), bytes)).toBe(false);
  });

  it('binds person, role, time, meaning and its words, inputs, results, engine, what was before, and the head of the log', async () => {
    const submitted = await bench.submitted();
    const head = sqlite().prepare('select seq, hash from audit order by seq desc').get();
    const { sentences } = await bench.terms(submitted, 'approved');
    const { signatures, ...signed } = await bench.sign(submitted);
    const statement = JSON.parse(signatures[0]?.statement ?? '{}') as unknown;
    expect(statement).toEqual({
      format: 'riseback-signature',
      version: 1,
      revision: {
        id: signed.id,
        networkId: bench.networkId,
        letter: 'A',
        title: 'For construction',
        reason: 'First issue',
        networkVersion: 1,
        fileHash: signed.fileHash,
        solverHash: signed.solverHash,
        resultsHash: signed.resultsHash,
        engineVersion: signed.engineVersion,
        createdBy: 'designer',
        createdAt: signed.createdAt,
      },
      events: signed.events.slice(0, 2).map(({ personName: _, ...event }) => event),
      person: { id: 'reviewer', name: 'reviewer', role: 'reviewer' },
      at: bench.server.now().toISOString(),
      meaning: 'approved',
      sentences,
      audit: head,
    });
    const entries = sqlite().prepare('select action, person_id, details from audit order by seq desc').all();
    const [approve, sign] = entries as { action: string; details: string }[];
    expect(approve).toMatchObject({ action: 'revision.approve', person_id: 'reviewer' });
    expect(sign).toMatchObject({ action: 'revision.sign', person_id: 'reviewer' });
    expect(sign?.details).toContain(signatures[0]?.statementHash ?? '-');
  });

  it('that says reviewed leaves it under review; approved ends it and is told to who froze it', async () => {
    const revision = await bench.submitted();
    expect((await bench.sign(revision, 'reviewed')).state).toBe('underReview');
    const again = await bench.reviewer.get(bench.path(`/${revision.id}/signing?meaning=reviewed`)).expect(409);
    expect(detailOf(again)).toContain('already');
    const approved = await bench.sign(revision, 'approved');
    expect(approved.state).toBe('approved');
    expect(approved.signatures.map(({ seq, meaning }) => [seq, meaning])).toEqual([
      [1, 'reviewed'],
      [2, 'approved'],
    ]);
    expect(await bench.verify(revision)).toMatchObject({ sound: true });
    const mails = sqlite().prepare('select purpose, recipient_id from mails order by rowid').raw().all();
    expect(mails.at(-1)).toEqual(['approved', 'designer']);
  });
});

describe('nobody signs', () => {
  const refusal = async (client: Client, { id }: Revision, meaning: SignatureMeaning = 'approved') => {
    const shown = await client.get(bench.path(`/${id}/signing?meaning=${meaning}`));
    const token = (shown.body as Partial<SigningTerms>).token ?? 'x';
    const answer = await bench.sendSignature({ id }, { meaning, token }, client);
    expect(signatureCount()).toBe(0);
    return `${answer.status} ${detailOf(answer)}`;
  };

  it('by another role than reviewer', async () => {
    const revision = await bench.submitted();
    for (const who of ['viewer', 'commissioning', 'designer', 'administrator'] as const) {
      expect(await refusal(bench.server.as(who), revision)).toContain('403 Your role here is');
    }
    expect(await refusal(bench.server.as('stranger'), revision)).toContain('404');
  });

  it('what is a draft, or ended', async () => {
    expect(await refusal(bench.reviewer, await bench.freeze())).toContain('409 Revision A is a draft');
  });

  it('or returns what they edited since the last approved revision, whatever their role is by now', async () => {
    giveRole('reviewer', 'designer');
    await bench.edit(1, 0, 1, bench.reviewer);
    giveRole('reviewer', 'reviewer');
    const revision = await bench.submitted(2);
    expect(await refusal(bench.reviewer, revision)).toMatch(/^403 You edited the network.*in revision A/);
    expect(await refusal(bench.reviewer, revision, 'reviewed')).toContain('403');
    await bench.reviewer.post(bench.path(`/${revision.id}/return`), { note: 'x' }).expect(403);
    const { editedBy } = await bench.get(revision);
    expect(editedBy.map(({ personId }) => personId)).toEqual(['designer', 'reviewer']);
  });

  it('what they submitted or froze, without an edit of theirs', async () => {
    const made = await bench.submitted();
    giveRole('reviewer', 'designer');
    const frozen = await bench.freeze(1, bench.reviewer);
    const draft = await bench.freeze();
    const submitted = await bench.submit(draft, bench.reviewer);
    giveRole('reviewer', 'reviewer');
    expect(await refusal(bench.reviewer, submitted)).toContain('403 You submitted');
    expect(await refusal(bench.reviewer, await bench.submit(frozen))).toContain('403 You froze');
    await bench.terms(made, 'approved');
  });

  it('what a later approved revision has overtaken', async () => {
    const first = await bench.submitted();
    await bench.edit(1, 0, 1);
    await bench.sign(await bench.submitted(2));
    const refused = await bench.reviewer.get(bench.path(`/${first.id}/signing?meaning=approved`)).expect(409);
    expect(detailOf(refused)).toContain('Revision B, which is later, is approved already');
  });

  it('stale results: those of another engine than the present one', async () => {
    const revision = await bench.submitted();
    tamper("update revisions set engine_version = '0.0.1+1'");
    expect(await refusal(bench.reviewer, revision)).toContain('409 Its results are stale');
  });

  it('what is not what its hashes say', async () => {
    const revision = await bench.submitted();
    tamper("update revisions set file = replace(file, 'TR-1', 'TR-2')");
    expect(await refusal(bench.reviewer, revision)).toContain('409 The frozen inputs of revision A are not those');
  });

  it('their own edits in an earlier, approved revision do not count any more', async () => {
    giveRole('reviewer', 'designer');
    await bench.edit(1, 0, 1, bench.reviewer);
    giveRole('reviewer', 'reviewer');
    const first = await bench.submitted(2);
    bench.server.addPerson('other', `noted:${PASSWORD}`);
    const grantedAt = bench.server.now().toISOString();
    bench.server.db
      .insert(memberships)
      .values({ personId: 'other', siteId: bench.server.siteId, role: 'reviewer', grantedAt })
      .run();
    await bench.sign(first, 'approved', new Client(bench.server, bench.server.session('other')));
    await bench.edit(2, 1, 2);
    expect((await bench.sign(await bench.submitted(3))).state).toBe('approved');
    // what was signed by then stays as it was judged
    expect((await bench.get(first)).editedBy.map(({ personId }) => personId)).toEqual(['designer', 'reviewer']);
  });
});

describe('who signs', () => {
  it('proves anew who they are: a copied cookie is not enough', async () => {
    const revision = await bench.submitted();
    const { token } = await bench.terms(revision, 'approved');
    const meaning = 'approved' as const;
    await bench.sendSignature(revision, { meaning, token, password: '' }).expect(400);
    const wrong = await bench.sendSignature(revision, { meaning, token, password: 'not the password' }).expect(422);
    expect(wrong.body).toMatchObject({ errors: [{ pointer: '/password' }] });
    expect(signatureCount()).toBe(0);
    expect((await bench.get(revision)).state).toBe('underReview');
  });

  it('is slowed down when guessing, together with sign-in', async () => {
    const revision = await bench.submitted();
    const { token } = await bench.terms(revision, 'approved');
    const guess = (password: string) => bench.sendSignature(revision, { meaning: 'approved', token, password });
    for (let i = 0; i < 5; i += 1) await guess(`guess ${i}`).expect(422);
    const { headers } = await guess(PASSWORD).expect(429);
    expect(headers['retry-after']).toBeDefined();
    bench.server.pass(5_000);
    await guess(PASSWORD).expect(201);
  });

  it('gives a code as well, where codes are turned on, and each counts once', async () => {
    const { secret } = await turnCodesOn(bench.server, bench.reviewer);
    const revision = await bench.submitted();
    const terms = await bench.terms(revision, 'reviewed');
    expect(terms.asksForCode).toBe(true);
    const sign = (meaning: SignatureMeaning, token: string, code?: string) =>
      bench.sendSignature(revision, { meaning, token, ...(code === undefined ? {} : { code }) });
    const none = await sign('reviewed', terms.token).expect(422);
    expect(none.body).toMatchObject({ errors: [{ pointer: '/code' }] });
    const right = codeAt(secret, bench.server.now());
    const other = right === '000000' ? '000001' : '000000';
    await sign('reviewed', terms.token, other).expect(422);
    await sign('reviewed', terms.token, right).expect(201);
    const { token } = await bench.terms(revision, 'approved');
    await sign('approved', token, right).expect(422);
    expect(signatureCount()).toBe(1);
  });

  it('signs what was shown: another state, another comment or another text needs another look', async () => {
    const revision = await bench.submitted();
    const { token, openComments } = await bench.terms(revision, 'approved');
    expect(openComments).toBe(0);
    const approve = (given: string, despiteOpenComments = false) =>
      bench.sendSignature(revision, { meaning: 'approved', token: given, despiteOpenComments });
    await bench.sendSignature(revision, { meaning: 'reviewed', token }).expect(409);
    const comment = { revisionId: revision.id, subject: { kind: 'whole' }, body: 'Why 1 in?' };
    await bench.designer.post(`/api/networks/${bench.networkId}/comments`, comment).expect(201);
    expect(detailOf(await approve(token, true).expect(409))).toContain('has changed since it was shown');
    const anew = await bench.terms(revision, 'approved');
    expect(anew.openComments).toBe(1);
    expect(anew.sentences.join(' ')).toContain('1 comment on this revision is still open.');
    expect(detailOf(await approve(anew.token).expect(409))).toContain('still open');
    await approve(anew.token, true).expect(201);
  });

  it('is asked for nothing once the revision was returned meanwhile', async () => {
    const revision = await bench.submitted();
    const { token } = await bench.terms(revision, 'approved');
    await bench.reviewer.post(bench.path(`/${revision.id}/return`), { note: 'no' }).expect(200);
    await bench.sendSignature(revision, { meaning: 'approved', token }).expect(409);
    expect(signatureCount()).toBe(0);
  });

  it.each([
    { what: 'the role was taken', change: () => giveRole('reviewer', 'designer'), status: 403 },
    {
      what: 'the password was changed',
      change: () => sqlite().exec("update people set password_hash = 'noted:x' where id = 'reviewer'"),
      status: 409,
    },
    {
      what: 'the person was disabled',
      change: () => sqlite().exec("update people set disabled_at = created_at where id = 'reviewer'"),
      status: 403,
    },
  ])('signs nothing when $what while the password was being compared', async ({ change, status }) => {
    let during = (): unknown => undefined;
    class SlowHasher extends NotingHasher {
      override async matches(text: string, hash: string): Promise<boolean> {
        const matches = await super.matches(text, hash);
        during();
        return matches;
      }
    }
    bench.close();
    bench = new RevisionBench({ hasher: new SlowHasher() });
    await bench.begin();
    const revision = await bench.submitted();
    const { token } = await bench.terms(revision, 'approved');
    during = change;
    await bench.sendSignature(revision, { meaning: 'approved', token }).expect(status);
    expect(signatureCount()).toBe(0);
  });
});
