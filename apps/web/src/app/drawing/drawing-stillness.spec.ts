import { signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { applyBatch, type EditOp, type NetworkDocument } from '@riseback/network';
import fc from 'fast-check';
import { beforeEach, describe, expect, it } from 'vitest';
import { NetworkStore } from '../networks/network-store';
import { DrawingClipboard } from './drawing-clipboard';
import { DrawingCommands } from './drawing-commands';
import { DrawingScene } from './drawing-scene';
import { DrawingState } from './drawing-state';
import { ALIGNMENTS, DISTRIBUTIONS } from './model/arrange';
import { gripsOf, shiftGrip, shiftNodes } from './model/displacement';
import type { DrawnNetwork } from './model/drawn-network';
import { documentOf, sampleDocument, samplePipe } from './model/sample-network';
import { NodeArranging } from './node-arranging';
import { DeletePrompt } from './sheet/delete-prompt';
import { SystemClipboard } from './system-clipboard';

/** What the drawing needs of the store: a document, edits by the one reducer, undo by its inverses. */
class StoreInMemory {
  readonly document = signal<NetworkDocument | null>(null);
  readonly network = signal({ siteId: 'site' });
  readonly lastRefusal = signal<readonly string[]>([]);
  readonly undoLabel = signal('last');
  readonly outcomes = signal(new Map());
  readonly units = signal({ system: 'us', atmosphericPressurePa: 101_325 });
  readonly result = signal(null);
  readonly trapResults = signal(new Map());
  readonly nodeResults = signal(new Map());
  readonly pipeResults = signal(new Map());
  readonly showsWorst = signal(false);
  private readonly inverses: EditOp[][] = [];

  edit(_label: string, ops: readonly EditOp[]): boolean {
    const document = this.document();
    const applied = document === null ? undefined : applyBatch(document, ops);
    this.lastRefusal.set(applied?.ok === false ? applied.errors.map(({ detail }) => detail) : []);
    if (applied?.ok !== true) return false;
    this.document.set(applied.document);
    this.inverses.push([...applied.inverse]);
    return true;
  }

  undo(): readonly string[] | null {
    const ops = this.inverses.pop();
    const document = this.document();
    const applied = ops === undefined || document === null ? undefined : applyBatch(document, ops);
    if (applied?.ok === true) this.document.set(applied.document);
    return [];
  }

  get steps(): number {
    return this.inverses.length;
  }
}

class ClipboardInMemory {
  private text = '';
  write(text: string): Promise<void> {
    this.text = text;
    return Promise.resolve();
  }
  read(): Promise<string> {
    return Promise.resolve(this.text);
  }
}

/** The sample with two parallel pipes and one that has bends. */
function start(): NetworkDocument {
  const sample = sampleDocument();
  return documentOf(
    [...sample.nodes.values()].map(({ value }) => value),
    [
      ...[...sample.pipes.values()].map(({ value }) => value),
      samplePipe('L5', 'J1', 'J2'),
      samplePipe('L6', 'T2', 'J1', {
        bends: [
          { x: 240, y: 0 },
          { x: 240, y: 160 },
          { x: 0, y: 160 },
        ],
      }),
    ],
  );
}

const DEEDS = ['place', 'pipe', 'delete', 'move', 'bend', 'align', 'distribute', 'duplicate', 'paste', 'undo'] as const;
type Deed = { readonly what: (typeof DEEDS)[number]; readonly pick: number; readonly by: number };

const anyDeed: fc.Arbitrary<Deed> = fc.record({
  what: fc.constantFrom(...DEEDS),
  pick: fc.nat(1_000),
  by: fc.integer({ min: -9, max: 9 }),
});

describe('the drawing', () => {
  let store: StoreInMemory;
  let scene: DrawingScene;

  beforeEach(() => {
    TestBed.configureTestingModule({
      providers: [
        DrawingClipboard,
        DrawingCommands,
        DrawingScene,
        DrawingState,
        NodeArranging,
        { provide: NetworkStore, useClass: StoreInMemory },
        { provide: SystemClipboard, useClass: ClipboardInMemory },
        { provide: DeletePrompt, useValue: { ask: () => Promise.resolve(false) } },
      ],
    });
    store = TestBed.inject(NetworkStore) as unknown as StoreInMemory;
    scene = TestBed.inject(DrawingScene);
  });

  it('never moves what an edit does not touch, and takes every edit back whole', async () => {
    await fc.assert(
      fc.asyncProperty(fc.array(anyDeed, { minLength: 1, maxLength: 25 }), async (deeds) => {
        const first = start();
        store.document.set(first);
        const stepsBefore = store.steps;
        for (const deed of deeds) {
          const before = scene.settled();
          const touched = deed.what === 'undo' ? null : await doIt(deed, before);
          if (touched !== null) expectStill(before, scene.settled(), touched);
        }
        while (store.steps > stepsBefore) store.undo();
        expect(store.document()).toEqual(first);
      }),
      { numRuns: 60 },
    );
  });

  /** Does it, and says which elements may have moved by it. */
  async function doIt({ what, pick, by }: Deed, network: DrawnNetwork): Promise<ReadonlySet<string>> {
    const commands = TestBed.inject(DrawingCommands);
    const state = TestBed.inject(DrawingState);
    const nodes = [...network.nodes.keys()];
    const [a = '', b = ''] = [nodes[pick % nodes.length], nodes[(pick + Math.abs(by)) % nodes.length]];
    const pipe = [...network.pipes.values()][pick % Math.max(1, network.pipes.size)];
    switch (what) {
      case 'place':
        commands.add('junction', { elevationM: 0, position: { x: 20 * by, y: 20 * (pick % 40) } });
        return new Set();
      case 'pipe':
        if (a !== b) commands.add('pipe', { from: a, to: b, lengthM: 1, insideDiameterM: 0.05 });
        return new Set();
      case 'delete':
        if (nodes.length > 2) commands.remove(new Set(pipe !== undefined && by > 0 ? [pipe.id] : [a]));
        return new Set();
      case 'move':
        state.displaced.set(shiftNodes(network, [a, b], 20 * by, 20 * (pick % 7)));
        commands.settle();
        return new Set([a, b]);
      case 'bend': {
        const grips = pipe === undefined ? [] : gripsOf(pipe);
        const grip = grips[pick % Math.max(1, grips.length)];
        if (pipe === undefined || grip === undefined) return new Set();
        state.displaced.set(shiftGrip(pipe, grip, 20 * by, -20 * by));
        commands.settle();
        return new Set([pipe.id]);
      }
      case 'align':
      case 'distribute': {
        const c = nodes[(pick + 1) % nodes.length] ?? '';
        state.select(a, b, c);
        const arranging = TestBed.inject(NodeArranging);
        if (what === 'align') arranging.align(ALIGNMENTS[pick % ALIGNMENTS.length] ?? 'left');
        else arranging.distribute(DISTRIBUTIONS[pick % DISTRIBUTIONS.length] ?? 'vertically');
        return new Set([a, b, c]);
      }
      case 'duplicate':
        TestBed.inject(DrawingClipboard).duplicate(new Set([a, b]));
        return new Set();
      case 'paste':
        await TestBed.inject(DrawingClipboard).copy(new Set([a, b]));
        await TestBed.inject(DrawingClipboard).paste();
        return new Set();
      case 'undo':
        return new Set();
    }
  }

  function expectStill(before: DrawnNetwork, after: DrawnNetwork, touched: ReadonlySet<string>): void {
    for (const [id, { at }] of before.nodes) {
      const now = after.nodes.get(id);
      if (now !== undefined && !touched.has(id)) expect(now.at, id).toEqual(at);
    }
    for (const [id, { pipe, points }] of before.pipes) {
      const now = after.pipes.get(id);
      if (now === undefined || [id, pipe.from, pipe.to].some((part) => touched.has(part))) continue;
      expect(now.points, id).toEqual(points);
    }
    for (const { id, points } of after.pipes.values()) {
      for (const [i, { x, y }] of points.entries()) {
        const last = points[i - 1] ?? { x, y };
        expect(last.x === x || last.y === y, `${id} keeps right angles`).toBe(true);
      }
    }
  }
});
