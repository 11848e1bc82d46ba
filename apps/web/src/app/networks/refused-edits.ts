import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { EditOp } from '@riseback/network';
import { StatusMark } from '../shared/status-mark/status-mark';
import { NetworkStore } from './network-store';

/** Edits that could not be kept: what was wanted and why not, until the person has read it. */
@Component({
  selector: 'app-refused-edits',
  imports: [MatButton, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (lines().length > 0) {
      <div class="refused" role="alert">
        <app-status-mark status="fail" word="Not kept" />
        <ul>
          @for (line of lines(); track $index) {
            <li>{{ line }}</li>
          }
        </ul>
        <button matButton type="button" (click)="store.dismissRefusals()">Understood</button>
      </div>
    }
  `,
  styles: `
    .refused {
      display: flex;
      flex-wrap: wrap;
      gap: 8px 16px;
      align-items: center;
      padding: 6px 16px;
      border-bottom: 1px solid var(--rb-fail);
      background: var(--rb-fail-wash);
    }
    ul {
      flex: 1;
    }
  `,
})
export class RefusedEdits {
  protected readonly store = inject(NetworkStore);

  protected readonly lines = computed(() => [
    ...this.store.lastRefusal(),
    ...this.store
      .refusedEdits()
      .map(({ batch, reasons }) => `${batch.label} (${wanted(batch.ops)}): ${reasons.join(' ')}`),
  ]);
}

/** The values that were to be set, so that they can be typed again. */
function wanted(ops: readonly EditOp[]): string {
  const shown = ops.slice(0, 3).map((op) => {
    if (op.op === 'set') return `${'id' in op ? `${op.id} ` : ''}${op.key} = ${JSON.stringify(op.to ?? null)}`;
    return op.op === 'add'
      ? `add ${JSON.stringify(op.value['tag'] ?? op.value['id'] ?? op.id ?? '')}`
      : `remove ${op.id}`;
  });
  return shown.join(', ') + (ops.length > 3 ? ` and ${String(ops.length - 3)} more` : '');
}
