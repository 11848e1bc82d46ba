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
import { NetworkStore } from '../../networks/network-store';
import { HeldSiteSettings } from '../../sites/held-site-settings';
import { DrawingCommands } from '../drawing-commands';
import { DrawingState } from '../drawing-state';
import type { GaugeDraft } from '../model/gauge-draft';
import { gaugePlaceName } from '../../shared/gauge-place';
import { ElementIcon } from '../symbols/element-icon';
import type { DraftDefaults } from './draft-defaults';
import { gaugeDefaults } from './gauge-defaults';
import { accuracyOfGrade, askedGaugeFields, GRADE_KEY } from './gauge-fields';
import { type FieldChange, PropertyFields } from './property-fields';

const NO_DEFAULTS: DraftDefaults = { values: {}, hints: {} };

/** Asks for what a new gauge's readings are judged by. It joins the network as one step of undo. */
@Component({
  selector: 'app-new-gauge-form',
  imports: [ElementIcon, MatButton, PropertyFields],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '(keydown.escape)': 'giveUp()' },
  template: `
    <form aria-label="New gauge" (submit)="submit($event)">
      <h2><app-element-icon kind="gauge" [size]="28" /> New gauge</h2>
      <p class="ends">On {{ place() }}</p>
      <app-property-fields
        [specs]="specs()"
        [values]="values()"
        [units]="store.units()"
        [hints]="hints()"
        (changed)="set($event)"
      />
      @if (refusal(); as wrong) {
        <p class="complaint" role="alert">{{ wrong }}</p>
      }
      <p class="actions">
        <button matButton="filled" type="submit">Place</button>
        <button matButton="outlined" type="button" (click)="giveUp()">Leave it</button>
      </p>
    </form>
  `,
  styleUrl: './new-element-form.scss',
})
export class NewGaugeForm {
  private readonly commands = inject(DrawingCommands);
  private readonly state = inject(DrawingState);
  private readonly siteSettings = inject(HeldSiteSettings);
  protected readonly store = inject(NetworkStore);

  readonly draft = input.required<GaugeDraft>();

  private readonly fields = viewChild.required(PropertyFields);

  protected readonly place = computed(() => {
    const document = this.store.document();
    return document === null ? '' : gaugePlaceName(this.draft(), document);
  });
  protected readonly specs = computed(() => askedGaugeFields('pipe' in this.draft()));
  private readonly defaults = computed((): DraftDefaults => {
    const draft = this.draft();
    const document = untracked(() => this.store.document());
    if (document === null) return NO_DEFAULTS;
    const patterns = untracked(() => this.siteSettings.tagPatterns(this.store.network()?.siteId ?? ''));
    return gaugeDefaults(draft, document, patterns.gauge);
  });
  protected readonly values = linkedSignal(() => this.defaults().values);
  /** Where a value was filled in from, until it is changed. */
  protected readonly hints = computed(() => {
    const { values, hints } = this.defaults();
    return Object.fromEntries(Object.entries(hints).filter(([key]) => this.values()[key] === values[key]));
  });
  protected readonly refusal = signal('');

  constructor() {
    const injector = inject(Injector);
    afterNextRender(() => this.fields().focusFirst(), { injector });
  }

  protected set({ key, to }: FieldChange): void {
    const change = key === GRADE_KEY ? { accuracy: accuracyOfGrade(to) } : { [key]: to };
    this.values.update((values) => ({ ...values, ...change }));
  }

  protected submit(event: Event): void {
    event.preventDefault();
    this.refusal.set('');
    if (!this.fields().commit()) return;
    const given = Object.fromEntries(Object.entries(this.values()).filter(([, value]) => value !== undefined));
    const added = this.commands.add('gauge', { waterLeg: false, retired: false, ...this.draft(), ...given });
    if (added === null) this.refusal.set(this.store.lastRefusal().join(' '));
    else this.state.gaugeDraft.set(null);
  }

  protected giveUp(): void {
    this.state.gaugeDraft.set(null);
    this.state.say('Nothing placed');
    this.state.focusOn(this.state.focusId());
  }
}
