import { ChangeDetectionStrategy, Component, computed, ElementRef, inject, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import { formatQuantity } from '@riseback/units';
import { NetworkStore } from '../networks/network-store';
import { StatusMark } from '../shared/status-mark/status-mark';
import { countChanges } from './case-changes';
import type { CaseHead } from './case-comparison';

/** The cases, a row each: factors, how much each sets for itself, and what came out. */
@Component({
  selector: 'app-case-list',
  imports: [RouterLink, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './case-list.html',
  styleUrl: './case-list.scss',
})
export class CaseList {
  private readonly store = inject(NetworkStore);
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);

  readonly heads = input.required<readonly CaseHead[]>();
  readonly currentId = input('');
  readonly stale = input(false);

  protected readonly rows = computed(() => {
    const document = this.store.document();
    const heads = new Map(this.heads().map((head) => [head.id, head]));
    return this.store.cases().map(({ id, name, loadFactor, inletPressureFactor }) => ({
      id,
      name,
      load: formatQuantity(loadFactor, 'fraction', this.store.units(), { withUnit: true }),
      inlet: formatQuantity(inletPressureFactor, 'factor', this.store.units()),
      settings: document === null ? 0 : countChanges(document, id),
      counts: heads.get(id)?.counts ?? null,
      refusal: heads.get(id)?.refusal ?? '',
      current: id === this.currentId(),
    }));
  });

  focus(): void {
    this.host.nativeElement.querySelector<HTMLElement>('a')?.focus();
  }
}
