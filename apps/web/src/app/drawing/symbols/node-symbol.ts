import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { NodeKind, TrapType } from '@riseback/network';
import { nodeSymbol } from '@riseback/figures';

/** The symbol of a node in ink on paper, about the origin of an svg group; traps fill a grid of 24, vessels more. */
@Component({
  selector: '[appNodeSymbol]',
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './node-symbol.html',
  styleUrl: './node-symbol.scss',
})
export class NodeSymbol {
  readonly kind = input.required<NodeKind>();
  readonly trapType = input<TrapType>();
  readonly vented = input(false);

  protected readonly parts = computed(() => nodeSymbol(this.kind(), this.trapType(), this.vented()));
}
