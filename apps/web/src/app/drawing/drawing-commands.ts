import { inject, Injectable } from '@angular/core';
import {
  type EditOp,
  newElementId,
  nextOrdinal,
  type NetworkDocument,
  type NodeKind,
  type Position,
  removalOps,
  setOp,
  withDependents,
} from '@riseback/network';
import { NetworkStore } from '../networks/network-store';
import { DrawingScene } from './drawing-scene';
import { DrawingState, IDLE } from './drawing-state';
import { bendsBeside, type Displaced, NOTHING_DISPLACED } from './model/drawn-network';
import { gaugeIdOf, gaugeKey } from './model/gauge-keys';
import { ID_PREFIXES } from './model/id-prefixes';
import { keepingLanes } from './model/keep-lanes';
import { KIND_WORDS, nameOf } from '../shared/element-words';
import { downstreamOf } from './model/navigation';

/** The edits that the drawing makes, each one batch and one step of undo. In the drawing page's `providers`. */
@Injectable()
export class DrawingCommands {
  private readonly store = inject(NetworkStore);
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);

  /** Adds an element with the fields that were asked for. Its id, or null when it was refused. */
  add(kind: NodeKind | 'pipe' | 'gauge', fields: Readonly<Record<string, unknown>>): string | null {
    const document = this.store.document();
    if (document === null) return null;
    const collection = kind === 'pipe' ? 'pipes' : kind === 'gauge' ? 'gauges' : 'nodes';
    const newId = newElementId(document, ID_PREFIXES[kind]);
    const value = { id: newId, ...(collection === 'nodes' ? { kind } : {}), ...fields };
    const tag = typeof fields['tag'] === 'string' ? fields['tag'] : newId;
    const word = kind === 'gauge' ? kind : KIND_WORDS[kind];
    const added = this.store.edit(`${word} ${tag} placed`, [
      {
        op: 'add',
        in: collection,
        ordinal: nextOrdinal(document, collection),
        value: kind === 'pipe' ? { ...value, ...this.apart(fields) } : value,
      },
    ]);
    if (!added) return null;
    const id = kind === 'gauge' ? gaugeKey(newId) : newId;
    this.state.select(id);
    this.state.focusOn(id);
    this.state.say(`${this.scene.nameOf(id)} added`);
    return id;
  }

  /** A pipe beside one that joins the same nodes already gets bends, so that neither lies on the other whatever becomes of it. */
  private apart({ from, to }: Readonly<Record<string, unknown>>): { readonly bends?: Position[] } {
    const bends = typeof from === 'string' && typeof to === 'string' ? bendsBeside(this.scene.settled(), from, to) : [];
    return bends.length === 0 ? {} : { bends };
  }

  /** Sets one key of an element: one accepted field is one step of undo. */
  set(id: string, key: string, to: unknown, what: string): boolean {
    return this.setAll(id, { [key]: to }, what);
  }

  /** Sets keys that only make sense together (a receiver's pressure and its vent). */
  setAll(id: string, values: Readonly<Record<string, unknown>>, what: string): boolean {
    const document = this.store.document();
    const place = document === null ? null : elementIn(document, id);
    if (document === null || place === null) return false;
    const ops = Object.entries(values)
      .filter(([key, to]) => !sameValue(place.value[key], to))
      .map(([key, to]) => setOp(document, place.collection, place.id, key, to));
    return this.store.edit(`${what} of ${place.name}`.slice(0, 120), ops);
  }

  /** Whether the person may delete all of this: gauges are also theirs who read them. */
  mayRemove(ids: ReadonlySet<string>): boolean {
    if (ids.size === 0) return false;
    return this.store.mayDraw() || (this.store.may('readings') && [...ids].every((id) => gaugeIdOf(id) !== undefined));
  }

  /** What would go along with a deletion, in words; empty when nothing does. */
  goingAlong(ids: ReadonlySet<string>): string[] {
    const document = this.store.document();
    if (document === null) return [];
    const going = withDependents(document, picked(document, ids));
    const named = [...going.nodes, ...going.pipes]
      .filter((id) => !ids.has(id))
      .map((id) => {
        const place = elementIn(document, id);
        return place === null ? id : `${place.collection === 'pipes' ? 'pipe' : ''} ${place.name}`.trim();
      });
    const count = (number: number, one: string, many: string) =>
      number === 0 ? [] : [`${String(number)} ${number === 1 ? one : many}`];
    return [
      ...named,
      ...count(going.overrides.length, 'value set in a case', 'values set in cases'),
      ...count(going.gauges.filter((id) => !ids.has(gaugeKey(id))).length, 'gauge', 'gauges'),
    ];
  }

  /** Deletes the elements with what hangs on them; the keyboard goes to the neighbour downstream. */
  remove(ids: ReadonlySet<string>, word: 'deleted' | 'cut' = 'deleted'): boolean {
    const document = this.store.document();
    if (document === null || ids.size === 0) return false;
    const neighbour = this.neighbourBelow(ids);
    const names = [...ids].map((id) => elementIn(document, id)?.name ?? id);
    const [first = ''] = names;
    const label = names.length === 1 ? `${first} ${word}` : `${String(names.length)} elements ${word}`;
    const ops = keepingLanes(this.scene.settled(), document, removalOps(document, picked(document, ids)));
    if (!this.store.edit(label, ops)) return false;
    this.state.select();
    this.state.focusOn(neighbour);
    this.state.say(`${label}. Undo brings it back.`);
    return true;
  }

  /** Sets down what was displaced: one batch, which changes the places of nothing else. */
  settle(label?: string): void {
    const displaced = this.state.displaced();
    this.state.mode.set(IDLE);
    this.lay(displaced, label);
    this.state.displaced.set(NOTHING_DISPLACED);
  }

  /** Puts elements and bends in new places. Without a label it says itself what moved. */
  lay({ nodes, bends }: Displaced, label = this.movedWords(nodes, bends)): boolean {
    const document = this.store.document();
    if (document === null) return false;
    const ops: EditOp[] = [
      ...[...nodes]
        .filter(([id]) => document.nodes.has(id))
        .map(([id, at]) => setOp(document, 'nodes', id, 'position', { x: at.x, y: at.y })),
      ...[...bends]
        .filter(([id]) => document.pipes.has(id))
        .map(([id, points]) => setOp(document, 'pipes', id, 'bends', points.length === 0 ? undefined : plain(points))),
    ].filter((op) => !sameValue(op.from, op.to));
    if (ops.length === 0) return false;
    const laid = this.store.edit(label, keepingLanes(this.scene.settled(), document, ops));
    this.state.say(laid ? label : `Not possible: ${this.store.lastRefusal().join(' ')}`);
    return laid;
  }

  undo(): void {
    const label = this.store.undoLabel();
    const otherwise = this.fallback();
    this.afterStep(this.store.undo(), otherwise, label === null ? 'Nothing to undo' : `Undone: ${label}`);
  }

  redo(): void {
    const label = this.store.redoLabel();
    const otherwise = this.fallback();
    this.afterStep(this.store.redo(), otherwise, label === null ? 'Nothing to redo' : `Done again: ${label}`);
  }

  /** After undo and redo the keyboard is on what changed. */
  private afterStep(touched: readonly string[] | null, otherwise: string | null, words: string): void {
    this.state.draft.set(null);
    this.state.gaugeDraft.set(null);
    this.state.say(
      touched === null && this.store.lastRefusal().length > 0
        ? `Not possible: ${this.store.lastRefusal().join(' ')}`
        : words,
    );
    const there = (touched ?? []).flatMap((id) => [id, gaugeKey(id)]).filter((id) => this.scene.has(id));
    const [first] = there;
    this.state.selection.update((selected) => new Set([...selected].filter((id) => this.scene.has(id))));
    if (first !== undefined) {
      this.state.select(...there);
      this.state.focusOn(first);
      return;
    }
    const focused = this.state.focusId();
    this.state.focusOn(focused !== null && this.scene.has(focused) ? focused : otherwise);
  }

  /** Where the keyboard goes if the element that has it vanishes. */
  private fallback(): string | null {
    const focused = this.state.focusId();
    return focused === null ? null : this.neighbourBelow(new Set([focused]));
  }

  private movedWords(nodes: ReadonlyMap<string, unknown>, bends: ReadonlyMap<string, unknown>): string {
    const [first = ''] = [...nodes.keys(), ...bends.keys()];
    const name = this.scene.tagOf(first);
    if (nodes.size > 1) return `${String(nodes.size)} elements moved`;
    return nodes.size === 0 ? `bend of ${name} moved` : `${name} moved`;
  }

  private neighbourBelow(ids: ReadonlySet<string>): string | null {
    const network = this.scene.walked();
    const focused = this.state.focusId();
    const start = focused !== null && ids.has(focused) ? focused : ([...ids][0] ?? null);
    const startsAtGauge = start !== null && gaugeIdOf(start) !== undefined;
    const seen = new Set<string>();
    for (
      let here = start;
      here !== null && !seen.has(here);
      here = downstreamOf(network, here, this.scene.reversed) ?? null
    ) {
      seen.add(here);
      // a pipe goes with its node, so the neighbour is the next node that stays; a gauge leaves its pipe as it was
      if (!ids.has(here) && (network.nodes.has(here) || startsAtGauge)) return here;
    }
    return [...network.nodes.keys()].find((id) => !ids.has(id)) ?? null;
  }
}

interface PlaceInDocument {
  readonly collection: 'nodes' | 'pipes' | 'gauges';
  readonly id: string;
  readonly name: string;
  readonly value: Readonly<Record<string, unknown>>;
}

function elementIn(document: NetworkDocument, id: string): PlaceInDocument | null {
  const gaugeId = gaugeIdOf(id);
  const gauge = gaugeId === undefined ? undefined : document.gauges.get(gaugeId)?.value;
  if (gauge !== undefined) return { collection: 'gauges', id: gauge.id, name: nameOf(gauge), value: { ...gauge } };
  const node = document.nodes.get(id)?.value;
  if (node !== undefined) return { collection: 'nodes', id, name: nameOf(node), value: { ...node } };
  const pipe = document.pipes.get(id)?.value;
  return pipe === undefined ? null : { collection: 'pipes', id, name: nameOf(pipe), value: { ...pipe } };
}

function picked(
  document: NetworkDocument,
  ids: ReadonlySet<string>,
): { nodes: string[]; pipes: string[]; gauges: string[] } {
  return {
    gauges: [...ids].flatMap((key) => gaugeIdOf(key) ?? []).filter((id) => document.gauges.has(id)),
    nodes: [...ids].filter((id) => document.nodes.has(id)),
    pipes: [...ids].filter((id) => document.pipes.has(id)),
  };
}

function plain(points: readonly Position[]): Position[] {
  return points.map(({ x, y }) => ({ x, y }));
}

function sameValue(a: unknown, b: unknown): boolean {
  return a === b || JSON.stringify(a) === JSON.stringify(b);
}
