import { computed, inject, Injectable, linkedSignal } from '@angular/core';
import type { SolveWarning } from '@riseback/contracts';
import { jsonEqual, overrideId } from '@riseback/network';
import { NetworkStore } from '../networks/network-store';
import { isPipe, KIND_WORDS, nameOf } from '../shared/element-words';
import { DrawingState } from './drawing-state';
import { colourScale, sheetAround, crossings } from '@riseback/figures';
import {
  type DrawnNetwork,
  type DrawnNode,
  type DrawnPipe,
  drawnNetwork,
  EMPTY_DRAWING,
  pipesAt,
  withDisplaced,
} from './model/drawn-network';
import { type DrawnGauge, drawnGauges, type Sliding } from './model/drawn-gauges';
import { type NodeView, nodeView, type PipeView, pipeView, type SceneResults } from './model/element-views';
import { gaugeName } from './model/gauge-name';
import { type GaugeView, gaugeView } from './model/gauge-views';
import { keptDrawing } from './model/kept-drawing';
import type { Walked } from './model/navigation';
import { ViewCache } from './model/view-cache';

/** The network as it is drawn: document, results and what the person does to it, joined. In the drawing page's `providers`. */
@Injectable()
export class DrawingScene {
  private readonly store = inject(NetworkStore);
  private readonly state = inject(DrawingState);
  private readonly knownNodes = new ViewCache<DrawnNode, NodeView>();
  private readonly knownPipes = new ViewCache<DrawnPipe, PipeView>();
  private readonly knownGauges = new ViewCache<DrawnGauge, GaugeView>();

  private readonly drawn = linkedSignal<DrawnNetwork, DrawnNetwork>({
    source: () => {
      const document = this.store.document();
      return document === null ? EMPTY_DRAWING : drawnNetwork(document);
    },
    computation: (now, before) => (before === undefined ? now : keptDrawing(now, before.value)),
  });
  /** As the document has it. */
  readonly settled = this.drawn.asReadonly();
  /** The pipes of it: most edits move none. */
  private readonly lines = computed(() => this.settled().pipes);
  /** With what is being moved in its new place. */
  readonly network = computed(() => {
    const displaced = this.state.displaced();
    const still = displaced.nodes.size === 0 && displaced.bends.size === 0;
    return still ? this.settled() : withDisplaced(this.settled(), displaced);
  });
  /** By their names on the sheet (gauge-keys). */
  readonly gauges = computed(() => this.gaugesOn(this.settled()));
  /** All that the keyboard can go to. */
  readonly walked = computed((): Walked => ({ ...this.settled(), gauges: this.gauges() }));
  readonly empty = computed(() => this.settled().nodes.size === 0);
  readonly sheet = computed(() => {
    const { nodes, pipes } = this.settled();
    return sheetAround([
      ...[...nodes.values()].map(({ at }) => at),
      ...[...pipes.values()].flatMap(({ points }) => points),
    ]);
  });

  readonly scale = computed(
    () => colourScale(this.state.colouredBy(), [...this.store.outcomes().values()], this.store.units()),
    { equal: jsonEqual },
  );

  private readonly results = computed((): SceneResults => {
    const warnings = new Map<string, SolveWarning[]>();
    for (const warning of this.store.result()?.warnings ?? []) {
      warnings.set(warning.element, [...(warnings.get(warning.element) ?? []), warning]);
    }
    const isolated = new Set<string>();
    for (const [id, { value }] of this.store.document()?.overrides ?? []) {
      if (value.state === 'isolated' && id === overrideId(this.store.caseOf(value.node), value.node))
        isolated.add(value.node);
    }
    return {
      traps: this.store.trapResults(),
      nodes: this.store.nodeResults(),
      pipes: this.store.pipeResults(),
      warnings,
      isolated,
      caseNameOf: this.store.showsWorst() ? (id) => this.store.nameOfCase(this.store.caseOf(id)) : () => '',
    };
  });

  readonly nodeViews = computed((): ReadonlyMap<string, NodeView> => {
    const [network, results, scale, units, selection] = [
      this.network(),
      this.results(),
      this.scale(),
      this.store.units(),
      this.state.selection(),
    ];
    return this.knownNodes.all(network.nodes, (node) => {
      const selected = selection.has(node.id);
      const around = pipesAt(network, node.id).map((id) => network.pipes.get(id));
      return {
        basis: [node, ...saidOf(node.id, results), scale, units, selected, ...around],
        make: () => nodeView(node, network, results, scale, units, selected),
      };
    });
  });
  readonly pipeViews = computed((): ReadonlyMap<string, PipeView> => {
    const [network, results, scale, units, selection] = [
      this.network(),
      this.results(),
      this.scale(),
      this.store.units(),
      this.state.selection(),
    ];
    return this.knownPipes.all(network.pipes, (pipe) => {
      const selected = selection.has(pipe.id);
      return {
        basis: [pipe, ...saidOf(pipe.id, results), ...endsOf(pipe, network, results), scale, units, selected],
        make: () => pipeView(pipe, network, results, scale, units, selected),
      };
    });
  });
  readonly gaugeViews = computed((): ReadonlyMap<string, GaugeView> => {
    const [document, units, selection, sliding] = [
      this.store.document(),
      this.store.units(),
      this.state.selection(),
      this.state.mode(),
    ];
    if (document === null) return NO_GAUGES;
    const gauges = this.gaugesOn(this.network(), sliding.kind === 'sliding' ? sliding : undefined);
    return this.knownGauges.all(gauges, (drawn) => {
      const { gauge, tap, towards, stemStart } = drawn;
      const selected = selection.has(drawn.id);
      const name = gaugeName(gauge, document, selected, units);
      return {
        basis: [gauge, tap.x, tap.y, towards.x, towards.y, stemStart, name],
        make: () => gaugeView(drawn, name),
      };
    });
  });
  /** Where pipes cross without a junction; while something is moved, as before it. */
  readonly crossings = computed(() => crossings(this.lines().values()));

  /** Pipes on the way of the one selected trap. */
  readonly way = computed((): ReadonlySet<string> => {
    const chosen = this.state.chosenId();
    return new Set(chosen === null ? [] : this.store.trapResults().get(chosen)?.walk);
  });

  readonly reversed = (pipeId: string): boolean => (this.store.pipeResults().get(pipeId)?.massFlowKgS ?? 0) < 0;

  /** The element with the keyboard, or the first where none had it: the drawing's one tab stop. */
  readonly tabStop = computed(() => {
    const focused = this.state.focusId();
    if (focused !== null && this.has(focused)) return focused;
    return trapsFirst(this.nodeViews()) ?? null;
  });

  has(id: string): boolean {
    return this.settled().nodes.has(id) || this.settled().pipes.has(id) || this.gauges().has(id);
  }

  /** What a sentence calls an element: its tag, or its kind and id. */
  tagOf(id: string): string {
    const { nodes, pipes } = this.settled();
    const gauge = this.gauges().get(id)?.gauge;
    if (gauge !== undefined) return gauge.tag ?? `gauge ${gauge.id}`;
    const element = nodes.get(id)?.node ?? pipes.get(id)?.pipe;
    if (element === undefined) return id;
    if (isPipe(element)) return `pipe ${nameOf(element)}`;
    return element.tag ?? `${KIND_WORDS[element.kind]} ${element.id}`;
  }

  nameOf(id: string): string {
    return this.nodeViews().get(id)?.name ?? this.pipeViews().get(id)?.name ?? this.gaugeViews().get(id)?.name ?? id;
  }

  private gaugesOn(network: DrawnNetwork, sliding?: Sliding): ReadonlyMap<string, DrawnGauge> {
    const document = this.store.document();
    return document === null || document.gauges.size === 0 ? NO_GAUGES : drawnGauges(document, network, sliding);
  }
}

const NO_GAUGES: ReadonlyMap<string, never> = new Map<string, never>();

/** All that results say of an element. What says the same after a solve as before it is the same object. */
function saidOf(id: string, { traps, nodes, pipes, warnings, isolated, caseNameOf }: SceneResults): readonly unknown[] {
  return [traps.get(id), nodes.get(id), pipes.get(id), isolated.has(id), caseNameOf(id), ...(warnings.get(id) ?? [])];
}

/** What a pipe shows of the nodes that it joins. */
function endsOf({ pipe }: DrawnPipe, { nodes }: DrawnNetwork, { isolated }: SceneResults): readonly unknown[] {
  return [nodes.get(pipe.from)?.node, nodes.get(pipe.to)?.node, isolated.has(pipe.from)];
}

function trapsFirst(views: ReadonlyMap<string, NodeView>): string | undefined {
  const all = [...views.values()];
  return (all.find(({ node }) => node.kind === 'trap') ?? all[0])?.id;
}
