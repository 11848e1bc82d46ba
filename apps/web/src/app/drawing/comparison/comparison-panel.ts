import { ChangeDetectionStrategy, Component, computed, DOCUMENT, inject, signal } from '@angular/core';
import { RouterLink } from '@angular/router';
import { MOVED_PA } from '@riseback/revisions';
import { displayUnit, formatQuantity } from '@riseback/units';
import { NetworkStore } from '../../networks/network-store';
import { ProblemBanner } from '../../shared/problem-banner/problem-banner';
import { firstFive } from '../../what-if/turns';
import { ComparisonSign } from './comparison-sign';
import { DrawingComparison } from './drawing-comparison';

const NARROW = '(width < 720px)';

/** What the marks of the comparison mean, how many there are, and the way out. */
@Component({
  selector: 'app-comparison-panel',
  imports: [ComparisonSign, ProblemBanner, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './comparison-panel.html',
  styleUrl: './comparison-panel.scss',
})
export class ComparisonPanel {
  protected readonly comparison = inject(DrawingComparison);
  private readonly store = inject(NetworkStore);

  /** On a phone the sheet is small enough. */
  protected readonly open = signal(inject(DOCUMENT).defaultView?.matchMedia(NARROW).matches !== true);
  protected readonly counts = this.comparison.counts;
  protected readonly unit = computed(() => displayUnit('pressureDifference', this.store.units().system));
  protected readonly least = computed(() =>
    formatQuantity(MOVED_PA, 'pressureDifference', this.store.units(), { withUnit: true }),
  );
  protected readonly goneNames = computed(() => firstFive(this.comparison.gone().map(({ name }) => name)));
  protected readonly caseName = this.store.caseName;

  protected toggle(): void {
    this.open.update((open) => !open);
  }
}
