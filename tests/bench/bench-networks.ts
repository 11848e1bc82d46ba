import type { EditBatch } from '@riseback/network';
import type { BenchServer, Headers } from './bench-server';

const SMALL_NODES = 20;

/** A header with a trap at each of some junctions, as many as a small plant has. */
export function smallNetwork(name: string): object {
  return headers(name, SMALL_NODES);
}

/** Halls of 40 pipes, each a header with a trap at every junction and a riser at its end, all led to one receiver. */
export function headers(name: string, pipeCount: number): object {
  const nodes: object[] = [{ id: 'R', kind: 'receiver', elevationM: 4, pressurePa: 120_000 }];
  const pipes: object[] = [];
  for (let i = 0; i < pipeCount / 2; i++) {
    nodes.push({ id: `J${i}`, kind: 'junction', elevationM: 0.5 });
    nodes.push({
      id: `T${i}`,
      kind: 'trap',
      elevationM: 1,
      position: { x: 40 * i, y: 0 },
      inletPressurePa: 6e5 + (i % 7) * 1e5,
      loadKgS: 0.01,
    });
    const next = i % 20 === 0 ? { to: 'R', lengthM: 20 } : { to: `J${i - 1}`, lengthM: 8 };
    pipes.push({ id: `H${i}`, from: `J${i}`, insideDiameterM: 0.08, ...next });
    pipes.push({ id: `B${i}`, from: `T${i}`, to: `J${i}`, lengthM: 3, size: { nps: '1', schedule: '80' } });
  }
  return { format: 'riseback-network', version: 1, name, nodes, pipes };
}

export async function makeNetwork(server: BenchServer, person: Headers, siteId: string, file: object): Promise<string> {
  const body = JSON.stringify(file);
  const answer = await fetch(`${server.address}/api/sites/${siteId}/networks`, {
    method: 'POST',
    headers: person,
    body,
  });
  if (answer.status !== 201) throw new Error(`a network was answered ${answer.status}: ${await answer.text()}`);
  return ((await answer.json()) as { id: string }).id;
}

/** The edits of one person on a network of their own: each is made on the version that the one before it led to. */
export class Writer {
  private version = 1;
  private elevationM = 1;
  private nextElevationM = 1;
  private x = 0;
  private nextX = 0;

  constructor(
    readonly networkId: string,
    private readonly person: Headers,
    /** What may change nothing but the drawing starts no solve. */
    private readonly changes: 'elevation' | 'position' = 'elevation',
  ) {}

  get path(): string {
    return `/api/networks/${this.networkId}/edits`;
  }

  headers(): Record<string, string> {
    return { ...this.person, 'If-Match': `"${this.version}"` };
  }

  body(): string {
    this.nextElevationM = 1 + ((this.version * 7) % 100) / 1000;
    this.nextX = this.version;
    const [key, from, to] =
      this.changes === 'elevation'
        ? (['elevationM', this.elevationM, this.nextElevationM] as const)
        : (['position', { x: this.x, y: 0 }, { x: this.nextX, y: 0 }] as const);
    const ops: EditBatch['ops'] = [{ op: 'set', in: 'nodes', id: 'T0', key, from, to }];
    return JSON.stringify({ batchId: crypto.randomUUID(), label: 'move T0', ops } satisfies EditBatch);
  }

  answered(status: number, body: string): void {
    if (status !== 200) return;
    this.version = (JSON.parse(body) as { version: number }).version;
    this.elevationM = this.nextElevationM;
    this.x = this.nextX;
  }
}
