import { randomUUID } from 'node:crypto';
import type { NewReading, NewRound, Reading, Round, RoundSummary } from '@riseback/contracts';
import type request from 'supertest';
import { makeNetwork, SMALL } from './network-samples';
import { TestServer, type Client, type Who } from './test-server';

/** SMALL with a gauge at its junction, one on its pipe, and one that is retired. */
export const GAUGED = {
  ...SMALL,
  name: 'Gauged',
  cases: [{ id: 'night', name: 'Night', loadFactor: 0.5 }],
  gauges: [
    { id: 'G1', tag: 'PI-1', node: 'J1', elevationM: 3.5, rangeLowPa: 0, rangeHighPa: 200_000, accuracy: 0.01 },
    { id: 'G2', tag: 'PI-2', pipe: 'L2', distanceM: 10, elevationM: 4, waterLeg: true },
    { id: 'G3', tag: 'PI-3', node: 'T1', elevationM: 1, retired: true },
  ],
};

/** A site with one network that has gauges, and one device in the hands of who commissions it. */
export class ReadingBench {
  readonly server = new TestServer({ config: { requestsPerMinute: 1e6 } });
  readonly staff = this.server.as('commissioning');
  readonly deviceId = randomUUID();
  networkId = '';
  private seq = 0;

  async begin(): Promise<void> {
    this.networkId = await makeNetwork(this.server.as('designer'), this.server.siteId, GAUGED);
  }

  path(rest = ''): string {
    return `/api/networks/${this.networkId}${rest}`;
  }

  newRound(given: Partial<NewRound> = {}): NewRound {
    return {
      ...{ id: randomUUID(), networkVersion: 1, caseId: 'night', title: 'Monday' },
      startedAt: this.at(),
      ...given,
    };
  }

  sendRound(body: object, client = this.staff): request.Test {
    return client.post(this.path('/rounds'), body);
  }

  async round(given?: Partial<NewRound>): Promise<Round> {
    return (await this.sendRound(this.newRound(given)).expect(201)).body as Round;
  }

  /** The next reading of the device. */
  newReading(given: Partial<NewReading> = {}): NewReading {
    this.seq += 1;
    const { whyNot } = given;
    return {
      ...{
        id: randomUUID(),
        gaugeId: 'G1',
        note: '',
        takenAt: this.at(),
        deviceId: this.deviceId,
        deviceSeq: this.seq,
      },
      ...(whyNot === undefined ? { valuePa: 48_000 } : {}),
      ...given,
    };
  }

  send(roundId: string, body: NewReading, client = this.staff, key = body.id): request.Test {
    return client.post(this.path(`/rounds/${roundId}/readings`), body).set('Idempotency-Key', key);
  }

  async take(roundId: string, given?: Partial<NewReading>): Promise<Reading> {
    return (await this.send(roundId, this.newReading(given)).expect(201)).body as Reading;
  }

  close(roundId: string, client = this.staff, closedAt = this.at()): request.Test {
    return client.post(this.path(`/rounds/${roundId}/closing`), { closedAt });
  }

  async get(roundId: string, who: Who = 'viewer'): Promise<Round> {
    return (
      await this.as(who)
        .get(this.path(`/rounds/${roundId}`))
        .expect(200)
    ).body as Round;
  }

  async list(): Promise<RoundSummary[]> {
    return (await this.as('viewer').get(this.path('/rounds')).expect(200)).body as RoundSummary[];
  }

  as(who: Who): Client {
    return this.server.as(who);
  }

  /** A time on the clock of server and device alike, so much later. */
  at(laterMs = 0): string {
    return new Date(this.server.now().getTime() + laterMs).toISOString();
  }

  end(): void {
    this.server.close();
  }
}
