import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  linkedSignal,
  output,
  viewChildren,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { OperatingCase, OverrideKey } from '@riseback/network';
import { NetworkStore } from '../networks/network-store';
import { ChoiceField } from '../shared/fields/choice-field';
import { QuantityField } from '../shared/quantity-field/quantity-field';
import { CHANGE_FACTS, changesOf, keyWord, STATE_CHOICES } from './case-changes';
import { type CaseEdit, clearChange, setChange } from './case-edits';

/** What a case sets for itself, a row for each value, with what would hold there otherwise. */
@Component({
  selector: 'app-change-table',
  imports: [ChoiceField, MatButton, QuantityField, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './change-table.html',
  styleUrl: './change-table.scss',
})
export class ChangeTable {
  protected readonly store = inject(NetworkStore);

  readonly operatingCase = input.required<OperatingCase>();
  readonly edited = output<CaseEdit>();

  private readonly quantityFields = viewChildren(QuantityField);

  protected readonly stateChoices = STATE_CHOICES;
  protected readonly fixed = computed(() => !this.store.mayDraw());
  protected readonly rows = computed(() => {
    const document = this.store.document();
    if (document === null) return [];
    return changesOf(document, this.operatingCase(), this.store.units()).map((change) => ({
      ...change,
      id: `${change.nodeId}/${change.key}`,
      label: `${keyWord(change.key)} of ${change.tag}`,
      quantity: change.key === 'state' ? null : CHANGE_FACTS[change.key].quantity,
      number: typeof change.value === 'number' ? change.value : undefined,
      text: typeof change.value === 'string' ? change.value : undefined,
    }));
  });
  /** Of the value that was not taken last; forgotten when another case is looked at. */
  protected readonly refusal = linkedSignal<string, { readonly id: string; readonly reason: string } | null>({
    source: () => this.operatingCase().id,
    computation: () => null,
  });

  /** To the field of a number that the case sets. */
  focus(nodeId: string, key: OverrideKey): void {
    const numbers = this.rows().filter(({ quantity }) => quantity !== null);
    this.quantityFields()[numbers.findIndex(({ id }) => id === `${nodeId}/${key}`)]?.focus();
  }

  protected set(nodeId: string, key: OverrideKey, to: number | string | undefined): void {
    const document = this.store.document();
    if (document === null || to === undefined) return;
    this.edited.emit(setChange(document, this.operatingCase(), nodeId, key, to));
    const reason = this.store.lastRefusal().join(' ');
    this.refusal.set(reason === '' ? null : { id: `${nodeId}/${key}`, reason });
  }

  protected clear(nodeId: string, key: OverrideKey): void {
    const document = this.store.document();
    if (document !== null) this.edited.emit(clearChange(document, this.operatingCase(), nodeId, key));
  }
}
