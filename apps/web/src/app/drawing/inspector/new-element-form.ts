import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  Injector,
  input,
  linkedSignal,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { PipeSize } from '@riseback/network';
import { NetworkStore } from '../../networks/network-store';
import { HeldSiteSettings } from '../../sites/held-site-settings';
import { DrawingCommands } from '../drawing-commands';
import { type Draft, DrawingState } from '../drawing-state';
import { KIND_WORDS, nameOf } from '../../shared/element-words';
import { ElementIcon } from '../symbols/element-icon';
import { type DraftDefaults, nodeDefaults, pipeDefaults } from './draft-defaults';
import { ASKED_FIELDS, PIPE_FIELDS_BEFORE_SIZE } from './element-fields';
import { type ChosenSize, PipeSizeField } from './pipe-size-field';
import { type FieldChange, PropertyFields } from './property-fields';

const NO_DEFAULTS: DraftDefaults = { values: {}, hints: {} };

/** Asks for what a new element cannot be computed without. It joins the network as one step of undo when all of it is given. */
@Component({
  selector: 'app-new-element-form',
  imports: [ElementIcon, MatButton, PipeSizeField, PropertyFields],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '(keydown.escape)': 'giveUp()' },
  templateUrl: './new-element-form.html',
  styleUrl: './new-element-form.scss',
})
export class NewElementForm {
  private readonly commands = inject(DrawingCommands);
  private readonly state = inject(DrawingState);
  private readonly siteSettings = inject(HeldSiteSettings);
  protected readonly store = inject(NetworkStore);

  readonly draft = input.required<Draft>();

  private readonly fields = viewChild.required(PropertyFields);

  protected readonly kind = computed(() => {
    const draft = this.draft();
    return draft.kind === 'pipe' ? 'pipe' : draft.what;
  });
  protected readonly title = computed(() => `New ${KIND_WORDS[this.kind()]}`);
  protected readonly ends = computed(() => {
    const draft = this.draft();
    if (draft.kind !== 'pipe') return '';
    const name = (id: string) => {
      const node = this.store.document()?.nodes.get(id)?.value;
      return node === undefined ? id : nameOf(node);
    };
    return `From ${name(draft.from)} to ${name(draft.to)}`;
  });
  protected readonly specs = computed(() => {
    const draft = this.draft();
    return draft.kind === 'pipe' ? PIPE_FIELDS_BEFORE_SIZE : ASKED_FIELDS[draft.what];
  });
  private readonly defaults = computed((): DraftDefaults => {
    const draft = this.draft();
    const document = untracked(() => this.store.document());
    if (document === null) return NO_DEFAULTS;
    const patterns = untracked(() => this.siteSettings.tagPatterns(this.store.network()?.siteId ?? ''));
    return draft.kind === 'pipe' ? pipeDefaults(document, patterns) : nodeDefaults(draft.what, document, patterns);
  });
  protected readonly values = linkedSignal(() => this.defaults().values);
  /** Where a value was filled in from, until it is changed. */
  protected readonly hints = computed(() => {
    const { values, hints } = this.defaults();
    return Object.fromEntries(Object.entries(hints).filter(([key]) => this.values()[key] === values[key]));
  });
  protected readonly size = computed(() => this.values()['size'] as PipeSize | undefined);
  protected readonly bore = computed(() => this.values()['insideDiameterM'] as number | undefined);
  protected readonly refusal = signal('');

  constructor() {
    const injector = inject(Injector);
    afterNextRender(() => this.fields().focusFirst(), { injector });
  }

  protected set({ key, to }: FieldChange): void {
    this.values.update((values) => ({ ...values, [key]: to }));
  }

  protected setSize({ size, insideDiameterM }: ChosenSize): void {
    this.values.update((values) => ({ ...values, size, insideDiameterM }));
  }

  protected submit(event: Event): void {
    event.preventDefault();
    if (!this.fields().commit()) {
      this.refusal.set('');
      return;
    }
    const draft = this.draft();
    const values = given(this.values());
    if (draft.kind === 'pipe' && values['size'] === undefined && values['insideDiameterM'] === undefined) {
      this.refusal.set('Choose the pipe’s size, or give its bore.');
      return;
    }
    const added =
      draft.kind === 'pipe'
        ? this.commands.add('pipe', { ...values, from: draft.from, to: draft.to })
        : this.commands.add(draft.what, { ...values, ...this.vent(draft.what, values), position: draft.at });
    if (added === null) this.refusal.set(this.store.lastRefusal().join(' '));
    else this.state.draft.set(null);
  }

  protected giveUp(): void {
    this.state.draft.set(null);
    this.state.say('Nothing placed');
    this.state.focusOn(this.state.focusId());
  }

  /** A receiver without a pressure of its own is vented. */
  private vent(kind: string, values: Readonly<Record<string, unknown>>): { vented?: true } {
    return kind === 'receiver' && values['pressurePa'] === undefined ? { vented: true } : {};
  }
}

function given(values: Readonly<Record<string, unknown>>): Record<string, unknown> {
  return Object.fromEntries(Object.entries(values).filter(([, value]) => value !== undefined));
}
