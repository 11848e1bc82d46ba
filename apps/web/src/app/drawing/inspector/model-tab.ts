import { ChangeDetectionStrategy, Component, computed, inject, input, linkedSignal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { Trap, TrapModel } from '@riseback/network';
import { CapacityChart } from '../../library/capacity-chart';
import { CopyNews } from '../../library/copy-news';
import { ModelChoice } from '../../library/model-choice';
import { ratingRows } from '../../library/model-facts';
import { trapDemand } from '../../library/model-judgement';
import { NetworkStore } from '../../networks/network-store';
import { DrawingState } from '../drawing-state';

/** The model of the chosen trap as the network holds it, what the trap needs of it, and the models it might have instead. */
@Component({
  selector: 'app-model-tab',
  imports: [CapacityChart, CopyNews, MatButton, ModelChoice],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './model-tab.html',
  styleUrl: './inspector-tabs.scss',
})
export class ModelTab {
  protected readonly store = inject(NetworkStore);
  private readonly state = inject(DrawingState);

  /** Null where the trap has none yet. */
  readonly model = input.required<TrapModel | null>();

  protected readonly trap = computed((): Trap | null => {
    const element = this.store.document()?.nodes.get(this.state.chosenId() ?? '')?.value;
    return element?.kind === 'trap' ? element : null;
  });
  /** Without a model there is nothing else to do here than to choose one. */
  protected readonly choosing = linkedSignal({ source: this.state.chosenId, computation: () => this.model() === null });
  protected readonly rows = computed(() => {
    const model = this.model();
    return model === null ? [] : ratingRows(model, this.store.units());
  });
  protected readonly need = computed(() => {
    const [document, trap] = [this.store.document(), this.trap()];
    const result = trap === null ? undefined : this.store.trapResults().get(trap.id);
    if (document === null || trap === null || result === undefined) return null;
    return trapDemand(document, this.store.caseOf(trap.id), trap, result);
  });

  protected took(name: string): void {
    this.choosing.set(false);
    this.state.say(`${name} chosen`);
  }
}
