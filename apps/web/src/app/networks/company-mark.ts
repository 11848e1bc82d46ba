import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { Company } from './company';

/** Initials of the others who have an element selected, for a row of a list; said with their names. */
@Component({
  selector: 'app-company-mark',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @for (other of others(); track other.personId) {
      <span class="mark" aria-hidden="true" [title]="'Also selected by ' + other.name">{{ other.initials }}</span>
    }
    @if (words() !== '') {
      <span class="rb-visually-hidden">, {{ words() }}</span>
    }
  `,
  styles: `
    :host {
      display: contents;
    }
    .mark {
      flex: none;
      margin-left: 4px;
      padding: 0 3px;
      border: 1px dashed var(--rb-ink-3);
      color: var(--rb-ink-2);
      font:
        500 11px/14px Inter,
        sans-serif;
    }
  `,
})
export class CompanyMark {
  /** A table without a network page around it has no company. */
  private readonly company = inject(Company, { optional: true });

  readonly elementId = input.required<string>();

  protected readonly others = computed(() => this.company?.selecting().get(this.elementId()) ?? []);
  protected readonly words = computed(() => this.company?.wordsFor(this.elementId()) ?? '');
}
