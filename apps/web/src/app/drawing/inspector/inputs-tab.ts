import { ChangeDetectionStrategy, Component, computed, inject, input, linkedSignal, viewChild } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { Fitting, NetworkNode, PipeRun, Position, RoutePiece, Trap } from '@riseback/network';
import { caseChangeWords } from '../../cases/case-changes';
import { NetworkStore } from '../../networks/network-store';
import { DrawingCommands } from '../drawing-commands';
import { isPipe, nameOf } from '../../shared/element-words';
import { nodeFields, PIPE_FIELDS_AFTER_SIZE, PIPE_FIELDS_BEFORE_SIZE, PIPE_FIELDS_LAST } from './element-fields';
import { BendsEditor } from './bends-editor';
import { FittingsEditor } from './fittings-editor';
import { type ChosenSize, PipeSizeField } from './pipe-size-field';
import { type FieldChange, PropertyFields } from './property-fields';
import { RouteEditor } from './route-editor';
import { ServiceEditor } from './service-editor';

/** Every property of one element. Each accepted field is one edit and one step of undo; a refusal stays at its field. */
@Component({
  selector: 'app-inputs-tab',
  imports: [BendsEditor, FittingsEditor, PipeSizeField, PropertyFields, RouteEditor, RouterLink, ServiceEditor],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './inputs-tab.html',
  styleUrl: './inspector-tabs.scss',
})
export class InputsTab {
  private readonly commands = inject(DrawingCommands);
  protected readonly store = inject(NetworkStore);

  readonly element = input.required<NetworkNode | PipeRun>();

  private readonly first = viewChild(PropertyFields);

  protected readonly beforeSize = PIPE_FIELDS_BEFORE_SIZE;
  protected readonly afterSize = PIPE_FIELDS_AFTER_SIZE;
  protected readonly last = PIPE_FIELDS_LAST;
  protected readonly fixed = computed(() => !this.store.mayDraw());
  protected readonly pipe = computed((): PipeRun | null => {
    const element = this.element();
    return isPipe(element) ? element : null;
  });
  protected readonly trap = computed((): Trap | null => {
    const element = this.element();
    return !isPipe(element) && element.kind === 'trap' ? element : null;
  });
  protected readonly fields = computed(() => {
    const element = this.element();
    const document = this.store.document();
    return isPipe(element) || document === null ? [] : nodeFields(element, document);
  });
  protected readonly values = computed((): Readonly<Record<string, unknown>> => ({ ...this.element() }));
  protected readonly riseM = computed(() => {
    const pipe = this.pipe();
    const nodes = this.store.document()?.nodes;
    if (pipe === null || nodes === undefined) return 0;
    return (nodes.get(pipe.to)?.value.elevationM ?? 0) - (nodes.get(pipe.from)?.value.elevationM ?? 0);
  });
  protected readonly ends = computed(() => {
    const pipe = this.pipe();
    const nodes = this.store.document()?.nodes;
    if (pipe === null || nodes === undefined) return '';
    const name = (id: string) => {
      const node = nodes.get(id)?.value;
      return node === undefined ? id : nameOf(node);
    };
    return `From ${name(pipe.from)} to ${name(pipe.to)}`;
  });
  protected readonly drawnEnds = computed(() => {
    const pipe = this.pipe();
    const nodes = this.store.document()?.nodes;
    const [from, to] = [nodes?.get(pipe?.from ?? '')?.value, nodes?.get(pipe?.to ?? '')?.value];
    if (from?.position === undefined || to?.position === undefined) return null;
    return { start: from.position, end: to.position, startName: nameOf(from) };
  });
  /** What the case whose result is shown sets at this element in place of what stands here; '' when nothing. */
  protected readonly inCase = computed(() => {
    const document = this.store.document();
    const { id } = this.element();
    const caseId = this.store.caseOf(id);
    const changes = document === null ? [] : caseChangeWords(document, caseId, id, this.store.units());
    return changes.length === 0 ? null : { caseId, name: this.store.nameOfCase(caseId), changes: changes.join(', ') };
  });
  /** Forgotten when another element is looked at. */
  protected readonly refusal = linkedSignal<string, { key: string; reason: string } | null>({
    source: () => this.element().id,
    computation: () => null,
  });

  focusFirst(): void {
    this.first()?.focusFirst();
  }

  protected set({ key, what, to }: FieldChange): void {
    // a receiver without a pressure of its own is vented, and one with it is not
    const element = this.element();
    const vent = !isPipe(element) && element.kind === 'receiver' && key === 'pressurePa';
    this.accept(key, vent ? { pressurePa: to, vented: to === undefined ? true : undefined } : { [key]: to }, what);
  }

  protected setSize({ size, insideDiameterM }: ChosenSize): void {
    this.accept('size', { size, insideDiameterM }, 'size');
  }

  protected setFittings(fittings: Fitting[]): void {
    this.accept('fittings', { fittings }, 'fittings');
  }

  protected setRoute(route: RoutePiece[] | undefined): void {
    this.accept('route', { route }, 'route');
  }

  protected setBends(bends: Position[] | undefined): void {
    this.accept('bends', { bends }, 'bends');
  }

  protected setService(service: Trap['service']): void {
    this.accept('service', { service }, 'service');
  }

  protected refusalAt(key: string): string {
    const refusal = this.refusal();
    return refusal?.key === key ? refusal.reason : '';
  }

  private accept(key: string, values: Readonly<Record<string, unknown>>, what: string): void {
    const taken = this.commands.setAll(this.element().id, values, what);
    this.refusal.set(taken ? null : { key, reason: this.store.lastRefusal().join(' ') });
  }
}
