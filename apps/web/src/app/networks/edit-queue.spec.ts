import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { provideHttpClient } from '@angular/common/http';
import { TestBed } from '@angular/core/testing';
import type { Network, SavedBatch } from '@riseback/contracts';
import { type EditOp, removalOps, setOp, type NetworkDocument } from '@riseback/network';
import { beforeEach, describe, expect, it } from 'vitest';
import { EditQueue } from './edit-queue';
import { UndoStack } from './undo-stack';

const network: Network = {
  id: 'n1',
  siteId: 's1',
  siteName: 'Site',
  name: 'Trial',
  version: 7,
  role: 'designer',
  permissions: ['view', 'draw'],
  solverHash: 'hash 7',
  document: {
    name: 'Trial',
    site: { atmosphericPressurePa: 101_325, ambientTemperatureK: 293.15 },
    method: {
      staticLift: 'rule',
      liftRulePaM: 11_310.297,
      dropCredit: 0,
      friction: 'flashVapour',
      voidFraction: 'rouhaniAxelsson',
      coincidence: 'average',
      acceleration: true,
    },
    limits: {},
    nodes: [
      { ordinal: 0, value: { id: 'J1', kind: 'junction', elevationM: 1 } },
      { ordinal: 1, value: { id: 'J2', kind: 'junction', elevationM: 2 } },
    ],
    pipes: [],
    trapModels: [],
    cases: [],
    overrides: [],
    gauges: [],
  },
};
const EDITS = '/api/networks/n1/edits';
const elevation30: EditOp = { op: 'set', in: 'nodes', id: 'J1', key: 'elevationM', from: 1, to: 30 };

describe('EditQueue', () => {
  let queue: EditQueue;
  let server: HttpTestingController;

  beforeEach(() => {
    TestBed.configureTestingModule({
      providers: [EditQueue, UndoStack, provideHttpClient(), provideHttpClientTesting()],
    });
    queue = TestBed.inject(EditQueue);
    server = TestBed.inject(HttpTestingController);
    queue.open(network);
  });

  const present = (): NetworkDocument => {
    const document = queue.present();
    if (document === null) throw new Error('not open');
    return document;
  };
  const elevation = (id: string, toM: number): EditOp => setOp(present(), 'nodes', id, 'elevationM', toM);
  const elevationOf = (id: string) => present().nodes.get(id)?.value.elevationM;
  /** Lets the queue's awaits run. */
  const settle = () => new Promise((resolve) => setTimeout(resolve));

  it('shows an edit at once and says saved only after the server’s word', async () => {
    expect(queue.add('elevation of J1', [elevation('J1', 3)]).ok).toBe(true);
    expect(elevationOf('J1')).toBe(3);
    expect(queue.saveState()).toBe('saving');
    const request = server.expectOne(EDITS);
    expect(request.request.headers.get('If-Match')).toBe('"7"');
    request.flush({ version: 8, solverHash: 'hash 8' });
    await settle();
    expect(queue.saveState()).toBe('saved');
    expect(queue.version()).toBe(8);
    expect(queue.solverHash()).toBe('hash 8');
  });

  it('keeps the very document on the screen when the last edit is saved, and says so at once', async () => {
    const told: (string | undefined)[] = [];
    queue.saved.subscribe(() => told.push(queue.solverHash()));
    queue.add('elevation of J1', [elevation('J1', 3)]);
    const drawn = present();
    server.expectOne(EDITS).flush({ version: 8, solverHash: 'hash 8' });
    await settle();
    expect(present()).toBe(drawn);
    expect(told).toEqual(['hash 8']);
    // what comes next is made on it
    queue.add('elevation of J2', [elevation('J2', 5)]);
    expect([elevationOf('J1'), elevationOf('J2')]).toEqual([3, 5]);
  });

  it('keeps one batch in flight and sends the next on the new version', async () => {
    queue.add('first', [elevation('J1', 3)]);
    queue.add('second', [elevation('J2', 4)]);
    server.expectOne(EDITS).flush({ version: 8, solverHash: 'h' });
    await settle();
    const second = server.expectOne(EDITS);
    expect(second.request.headers.get('If-Match')).toBe('"8"');
    second.flush({ version: 9, solverHash: 'h' });
    await settle();
    expect(queue.pendingCount()).toBe(0);
  });

  it('puts another person’s edit under ours when they touched something else', async () => {
    queue.add('mine', [elevation('J1', 3)]);
    server
      .expectOne(EDITS)
      .flush(staleAnswer([{ op: 'set', in: 'nodes', id: 'J2', key: 'elevationM', from: 2, to: 20 }]), {
        status: 412,
        statusText: 'Precondition Failed',
      });
    await settle();
    expect([elevationOf('J1'), elevationOf('J2')]).toEqual([3, 20]);
    const again = server.expectOne(EDITS);
    expect(again.request.headers.get('If-Match')).toBe('"8"');
    again.flush({ version: 9, solverHash: 'h' });
    await settle();
    expect(queue.saveState()).toBe('saved');
  });

  it('asks when another changed the same thing, and sends nothing of it before the choice', async () => {
    queue.add('mine', [elevation('J1', 3)]);
    server.expectOne(EDITS).flush(staleAnswer([elevation30]), { status: 412, statusText: 'Precondition Failed' });
    await settle();
    expect(elevationOf('J1')).toBe(30);
    expect(queue.conflicts()).toMatchObject([{ who: 'Ada Other', before: { value: 1 }, mine: { value: 3 } }]);
    expect(queue.unsaved()?.conflicts).toHaveLength(1);
    expect(queue.solverHash()).toBe('hash 8');
    server.expectNone(EDITS);
    queue.add('mine after all', [elevation('J1', 3)]);
    expect(queue.conflicts()).toEqual([]);
    server.expectOne(EDITS).flush({ version: 9, solverHash: 'h' });
    await settle();
    expect(queue.unsaved()).toBeNull();
  });

  it('keeps an open choice open when another one arises at its place', async () => {
    const stale = (version: number, op: EditOp) => {
      const [batch] = staleAnswer([op]).batches;
      return { ...staleAnswer([]), currentVersion: version, batches: [{ ...batch, version }] };
    };
    const conflict = { status: 412, statusText: 'Precondition Failed' };
    queue.add('mine', [elevation('J1', 3)]);
    server.expectOne(EDITS).flush(stale(8, elevation30), conflict);
    await settle();
    queue.add('mine again', [elevation('J1', 4)]);
    server.expectOne(EDITS).flush(stale(9, { ...elevation30, from: 30, to: 31 } as EditOp), conflict);
    await settle();
    expect(queue.conflicts()).toMatchObject([
      { before: { value: 1 }, mine: { value: 3 } },
      { before: { value: 1 }, mine: { value: 4 } },
    ]);
    queue.dropConflicts(queue.conflicts().slice(0, 1));
    expect(queue.conflicts()).toMatchObject([{ mine: { value: 4 } }]);
  });

  it('does not skip what others saved between when its batch turns out to have been saved long ago', async () => {
    queue.add('mine', [elevation('J1', 3)]);
    const request = server.expectOne(EDITS);
    const { batchId, ops } = request.request.body as { batchId: string; ops: EditOp[] };
    request.flush({ version: 9, solverHash: 'hash 9' });
    await settle();
    const [theirs] = staleAnswer([{ op: 'set', in: 'nodes', id: 'J2', key: 'elevationM', from: 2, to: 20 }]).batches;
    server.expectOne(`${EDITS}?since=7`).flush([theirs, { ...theirs, version: 9, batchId, ops }]);
    await settle();
    expect([queue.version(), elevationOf('J1'), elevationOf('J2')]).toEqual([9, 3, 20]);
    expect(queue.saveState()).toBe('saved');
  });

  it('does not send again and again what a server that was put back to an earlier state cannot take', async () => {
    queue.add('mine', [elevation('J1', 3)]);
    const behind = { ...staleAnswer([]), currentVersion: 5, batches: [] };
    server.expectOne(EDITS).flush(behind, { status: 412, statusText: 'Precondition Failed' });
    await settle();
    server.expectNone(EDITS);
    expect([queue.saveState(), elevationOf('J1')]).toEqual(['notSaved', 3]);
  });

  it('takes another person’s edit from the stream at once, and knows who changed what', async () => {
    await queue.receive(staleAnswer([elevation30]).batches);
    expect([elevationOf('J1'), queue.version(), queue.solverHash()]).toEqual([30, 8, 'hash 8']);
    expect(queue.heard().map(({ label }) => label)).toEqual(['theirs']);
    expect(queue.changedBy([elevation('J1', 2)], 7)).toBe('Ada Other');
    expect(queue.changedBy([elevation('J1', 2)], 8)).toBeUndefined();
  });

  it('hears of its own edit from the stream before the answer comes, and applies it once', async () => {
    queue.add('mine', [elevation('J1', 3)]);
    const request = server.expectOne(EDITS);
    const [saved] = staleAnswer([elevation('J1', 3)]).batches;
    if (saved === undefined) throw new Error('no batch');
    const { batchId, ops } = request.request.body as { batchId: string; ops: EditOp[] };
    await queue.receive([{ ...saved, batchId, ops }]);
    expect([queue.version(), queue.pendingCount(), elevationOf('J1')]).toEqual([8, 0, 3]);
    request.flush({ version: 8, solverHash: 'hash 8' });
    await settle();
    expect([queue.version(), queue.saveState(), queue.heard().length]).toEqual([8, 'saved', 0]);
  });

  it('asks for what is missing when the stream has skipped a version', async () => {
    const [last] = staleAnswer([{ op: 'set', in: 'nodes', id: 'J2', key: 'elevationM', from: 2, to: 9 }]).batches;
    const [first] = staleAnswer([elevation30]).batches;
    if (first === undefined || last === undefined) throw new Error('no batch');
    const received = queue.receive([{ ...last, version: 9 }]);
    server.expectOne(`${EDITS}?since=7`).flush([first, { ...last, version: 9 }]);
    await received;
    expect([elevationOf('J1'), elevationOf('J2'), queue.version()]).toEqual([30, 9, 9]);
  });

  it('brings in work that was left behind, saves it once, and asks where it no longer fits', async () => {
    const base = present();
    const batch = (ops: EditOp[]) => ({ batchId: crypto.randomUUID(), label: 'left behind', ops });
    const arrived = batch([elevation('J2', 4)]);
    const pending = [arrived, batch([elevation('J1', 5)]), batch([{ ...elevation('J2', 6), from: 4 } as EditOp])];
    const [saved] = staleAnswer([elevation30]).batches;
    if (saved === undefined) throw new Error('no batch');
    const brought = queue.bringIn({ networkId: 'n1', base, version: 7, pending, conflicts: [] }, []);
    server.expectOne(`${EDITS}?since=7`).flush([
      { ...saved, batchId: arrived.batchId, ops: arrived.ops },
      { ...saved, version: 9 },
    ]);
    await brought;
    const sent = server.expectOne(EDITS);
    expect(sent.request.headers.get('If-Match')).toBe('"9"');
    expect(sent.request.body).toEqual(pending[2]);
    expect([elevationOf('J1'), elevationOf('J2')]).toEqual([30, 6]);
    expect(queue.conflicts()).toMatchObject([{ mine: { value: 5 } }]);
  });

  it('asks before work that is brought in removes what was changed here just now', async () => {
    const base = present();
    const removal = { batchId: crypto.randomUUID(), label: 'left behind', ops: removalOps(base, { nodes: ['J1'] }) };
    queue.add('just now', [elevation('J1', 5)]);
    server.expectOne(EDITS);
    const brought = queue.bringIn({ networkId: 'n1', base, version: 7, pending: [removal], conflicts: [] }, []);
    server.expectOne(`${EDITS}?since=7`).flush([]);
    await brought;
    expect(elevationOf('J1')).toBe(5);
    expect(queue.conflicts()).toMatchObject([{ who: 'You, since', place: { id: 'J1' }, mine: { there: false } }]);
  });

  it('keeps the edit through a failing server and sends the same batch again', async () => {
    queue.add('mine', [elevation('J1', 3)]);
    const first = server.expectOne(EDITS);
    const { batchId } = first.request.body as { batchId: string };
    first.flush({ type: 'about:blank', title: 'Broken', status: 500 }, { status: 500, statusText: 'Error' });
    await settle();
    expect(queue.saveState()).toBe('notSaved');
    expect(elevationOf('J1')).toBe(3);
    queue.retry();
    const second = server.expectOne(EDITS);
    expect((second.request.body as { batchId: string }).batchId).toBe(batchId);
    second.flush({ version: 8, solverHash: 'h' });
    await settle();
    expect(queue.saveState()).toBe('saved');
  });

  it('takes an edit that the server refuses out again and says why', async () => {
    queue.add('mine', [elevation('J1', 3)]);
    server
      .expectOne(EDITS)
      .flush(
        { type: '/problems/forbidden', title: 'Forbidden', status: 403, detail: 'Ask a designer.' },
        { status: 403, statusText: 'Forbidden' },
      );
    await settle();
    expect(elevationOf('J1')).toBe(1);
    expect(queue.refused()[0]?.reasons).toEqual(['Ask a designer.']);
  });

  it('refuses on the spot what the reducer refuses, and sends nothing', () => {
    expect(queue.add('bad', [{ op: 'set', in: 'nodes', id: 'J9', key: 'elevationM', from: 1, to: 2 }]).ok).toBe(false);
    server.expectNone(EDITS);
  });
});

function staleAnswer(ops: EditOp[]) {
  const batch: SavedBatch = {
    version: 8,
    batchId: crypto.randomUUID(),
    personId: 'p2',
    personName: 'Ada Other',
    at: '2026-03-01T08:00:00.000Z',
    label: 'theirs',
    ops,
    solverHash: 'hash 8',
  };
  return {
    type: '/problems/stale-version',
    title: 'Changed meanwhile',
    status: 412,
    currentVersion: 8,
    batches: [batch],
  };
}
