import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  linkedSignal,
  output,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { OperatingCase, OverrideKey } from '@riseback/network';
import { NetworkStore } from '../networks/network-store';
import { TextField } from '../shared/fields/text-field';
import { QuantityField } from '../shared/quantity-field/quantity-field';
import { type CaseEdit, renameCase, setFactor } from './case-edits';
import { ChangeForm } from './change-form';
import { ChangeTable } from './change-table';
import { refusalOf } from './case-comparison';

/** One case: its name and factors, and what it sets for itself. Each accepted field is one edit; a refusal stays at its field. */
@Component({
  selector: 'app-case-editor',
  imports: [ChangeForm, ChangeTable, MatButton, QuantityField, RouterLink, TextField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './case-editor.html',
  styleUrl: './case-editor.scss',
})
export class CaseEditor {
  protected readonly store = inject(NetworkStore);

  readonly operatingCase = input.required<OperatingCase>();
  readonly edited = output<CaseEdit>();
  readonly copyWanted = output();
  readonly deleteWanted = output();

  private readonly nameField = viewChild.required(TextField);
  private readonly changes = viewChild.required(ChangeTable);

  protected readonly fixed = computed(() => !this.store.mayDraw());
  protected readonly noResult = computed(() => refusalOf(this.store.outcomes().get(this.operatingCase().id)));
  /** Forgotten when another case is looked at. */
  protected readonly nameRefusal = linkedSignal<string, string>({
    source: () => this.operatingCase().id,
    computation: () => '',
  });

  focusName(): void {
    this.nameField().focus();
  }

  focusSetting(nodeId: string, key: OverrideKey): void {
    this.changes().focus(nodeId, key);
  }

  protected rename(name: string | undefined): void {
    const document = this.store.document();
    if (document === null) return;
    const edit = renameCase(document, this.operatingCase(), name);
    const refused = 'refusal' in edit;
    this.nameRefusal.set(refused ? edit.refusal : '');
    if (!refused) this.edited.emit(edit);
  }

  protected setFactor(key: 'loadFactor' | 'inletPressureFactor', to: number | undefined): void {
    const document = this.store.document();
    if (document !== null && to !== undefined) this.edited.emit(setFactor(document, this.operatingCase(), key, to));
  }
}
