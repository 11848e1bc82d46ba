import type { NewSignature, Revision, SignatureMeaning, SigningTerms, Verification } from '@riseback/contracts';
import type request from 'supertest';
import type { Who } from './test-server';
import { batchOf, makeNetwork, raise, sendBatch } from './network-samples';
import { NotingHasher, PASSWORD } from './account-people';
import { TestServer, type Client, type TestServerOptions } from './test-server';

/** A site whose people have passwords, with one network at version 1; what revisions are tried on. */
export class RevisionBench {
  readonly server: TestServer;
  readonly designer: Client;
  readonly reviewer: Client;
  networkId = '';

  constructor(options: TestServerOptions = {}) {
    this.server = new TestServer({ hasher: new NotingHasher(), ...options });
    this.server.db.$client.prepare('update people set password_hash = ?').run(`noted:${PASSWORD}`);
    this.designer = this.server.as('designer');
    this.reviewer = this.server.as('reviewer');
  }

  async begin(file?: object): Promise<void> {
    this.networkId = await makeNetwork(this.designer, this.server.siteId, file);
  }

  path(rest = ''): string {
    return `/api/networks/${this.networkId}/revisions${rest}`;
  }

  async freeze(networkVersion = 1, client = this.designer): Promise<Revision> {
    const body = { title: 'For construction', reason: 'First issue', networkVersion };
    return (await client.post(this.path(), body).expect(201)).body as Revision;
  }

  async submit({ id }: Pick<Revision, 'id'>, client = this.designer): Promise<Revision> {
    return (await client.post(this.path(`/${id}/submission`), {}).expect(200)).body as Revision;
  }

  async submitted(networkVersion = 1): Promise<Revision> {
    return this.submit(await this.freeze(networkVersion));
  }

  /** Moves the trap up, as who may draw. */
  async edit(version: number, from: number, to: number, client = this.designer): Promise<void> {
    await sendBatch(client, this.networkId, version, batchOf([raise(to, from)])).expect(200);
  }

  async terms({ id }: Pick<Revision, 'id'>, meaning: SignatureMeaning, client = this.reviewer): Promise<SigningTerms> {
    return (await client.get(this.path(`/${id}/signing?meaning=${meaning}`)).expect(200)).body as SigningTerms;
  }

  sendSignature(
    { id }: Pick<Revision, 'id'>,
    body: Partial<NewSignature> & Pick<NewSignature, 'token' | 'meaning'>,
    client = this.reviewer,
  ): request.Test {
    return client.post(this.path(`/${id}/signatures`), { password: PASSWORD, ...body });
  }

  async sign(
    revision: Pick<Revision, 'id'>,
    meaning: SignatureMeaning = 'approved',
    client = this.reviewer,
  ): Promise<Revision> {
    const { token } = await this.terms(revision, meaning, client);
    return (await this.sendSignature(revision, { meaning, token }, client).expect(201)).body as Revision;
  }

  async get({ id }: Pick<Revision, 'id'>, who: Who = 'viewer'): Promise<Revision> {
    return (
      await this.server
        .as(who)
        .get(this.path(`/${id}`))
        .expect(200)
    ).body as Revision;
  }

  async verify({ id }: Pick<Revision, 'id'>): Promise<Verification> {
    const answer = await this.server
      .as('viewer')
      .get(this.path(`/${id}/verification`))
      .expect(200);
    return answer.body as Verification;
  }

  close(): void {
    this.server.close();
  }
}
