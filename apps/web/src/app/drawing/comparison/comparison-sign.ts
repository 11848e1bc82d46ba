import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';

export type ComparisonSignKind = 'added' | 'changed' | 'removed' | 'up' | 'down';

const SIGNS: Readonly<Record<ComparisonSignKind, string>> = {
  added: 'M1 1H11V11H1ZM6 3.2v5.6M3.2 6h5.6',
  removed: 'M1 1H11V11H1ZM3.6 3.6l4.8 4.8M8.4 3.6 3.6 8.4',
  changed: 'M6 .8 11.2 6 6 11.2 .8 6ZM4 6h4',
  up: 'M6 1.5 10.5 10h-9Z',
  down: 'M6 10.5 1.5 2h9Z',
};

/** A sign of the comparison on 12 × 12: square with plus, square with cross, diamond with a bar, solid triangles. */
@Component({
  selector: '[appComparisonSign]',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `<svg:path [class.solid]="solid()" [attr.d]="d()" />`,
  styles: `
    path {
      fill: var(--rb-sheet);
      stroke: var(--rb-ink);
      stroke-width: 1.3;
    }

    .solid {
      fill: var(--rb-ink);
      stroke: none;
    }
  `,
})
export class ComparisonSign {
  readonly kind = input.required<ComparisonSignKind>({ alias: 'appComparisonSign' });

  protected readonly d = computed(() => SIGNS[this.kind()]);
  protected readonly solid = computed(() => this.kind() === 'up' || this.kind() === 'down');
}
