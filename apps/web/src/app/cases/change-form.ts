import {
  ChangeDetectionStrategy,
  Component,
  computed,
  type ElementRef,
  inject,
  input,
  linkedSignal,
  output,
  signal,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { inOrder, type NetworkNode, type OperatingCase, OVERRIDE_KEYS, type OverrideKey } from '@riseback/network';
import { findByTag } from '../drawing/model/navigation';
import { NetworkStore } from '../networks/network-store';
import { KIND_WORDS, nameOf } from '../shared/element-words';
import { ChoiceField } from '../shared/fields/choice-field';
import { QuantityField } from '../shared/quantity-field/quantity-field';
import { CHANGE_FACTS, freeKeys, keyWord, STATE_CHOICES } from './case-changes';
import { type CaseEdit, setChange } from './case-edits';

/** Asks for one more value of a case: which element, what of it, and how much. */
@Component({
  selector: 'app-change-form',
  imports: [ChoiceField, MatButton, QuantityField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './change-form.html',
  styleUrl: './change-form.scss',
})
export class ChangeForm {
  protected readonly store = inject(NetworkStore);

  readonly operatingCase = input.required<OperatingCase>();
  readonly edited = output<CaseEdit>();

  private readonly elementBox = viewChild.required<ElementRef<HTMLInputElement>>('box');
  private readonly quantityField = viewChild(QuantityField);

  protected readonly stateChoices = STATE_CHOICES;
  protected readonly typed = signal('');
  protected readonly complaint = signal('');

  /** What a case can change something at. */
  private readonly elements = computed((): NetworkNode[] =>
    inOrder(this.store.document()?.nodes ?? new Map<string, never>())
      .map(([, { value }]: [string, { value: NetworkNode }]) => value)
      .filter(({ kind }) => OVERRIDE_KEYS[kind].length > 0),
  );
  protected readonly suggestions = computed(() =>
    this.elements().map((element) => ({ tag: nameOf(element), word: KIND_WORDS[element.kind] })),
  );
  protected readonly element = computed(() => {
    const id = findByTag(this.elements(), this.typed());
    return this.elements().find((element) => element.id === id) ?? null;
  });
  protected readonly found = computed(() => {
    const element = this.element();
    if (element === null) return this.typed().trim() === '' ? '' : 'No such trap, vessel, receiver or pumped inlet';
    const note = this.keys().length === 0 ? ': all that a case can set is set' : '';
    return `${nameOf(element)}, ${KIND_WORDS[element.kind]}${note}`;
  });
  private readonly keys = computed((): OverrideKey[] => {
    const [document, element] = [this.store.document(), this.element()];
    return document === null || element === null ? [] : freeKeys(document, this.operatingCase().id, element);
  });
  protected readonly choices = computed(() => this.keys().map((value) => ({ value, words: keyWord(value) })));
  /** Kept from one element to the next as long as it fits. */
  protected readonly key = linkedSignal<readonly OverrideKey[], OverrideKey | undefined>({
    source: this.keys,
    computation: (keys, previous) => {
      const before = previous?.value;
      return before !== undefined && keys.includes(before) ? before : keys[0];
    },
  });
  protected readonly quantity = computed(() => {
    const key = this.key();
    return key === undefined || key === 'state' ? null : CHANGE_FACTS[key].quantity;
  });
  protected readonly word = computed(() => {
    const key = this.key();
    return key === undefined ? '' : keyWord(key);
  });
  /** A number fits only what it was typed for. */
  protected readonly number = linkedSignal<string, number | undefined>({
    source: () => `${this.element()?.id ?? ''}/${this.key() ?? ''}`,
    computation: () => undefined,
  });
  protected readonly state = signal('isolated');

  protected chooseKey(value: string | undefined): void {
    this.key.set(this.keys().find((key) => key === value));
  }

  protected add(event: Event): void {
    event.preventDefault();
    const [document, element, key] = [this.store.document(), this.element(), this.key()];
    if (document === null || element === null || key === undefined) {
      this.complaint.set(element === null ? 'Name an element first.' : 'Nothing is left to set there.');
      this.elementBox().nativeElement.focus();
      return;
    }
    const field = this.quantityField();
    if (key !== 'state' && field?.commit() !== true) {
      field?.focus();
      return;
    }
    const value = key === 'state' ? this.state() : this.number();
    if (value === undefined) return;
    this.edited.emit(setChange(document, this.operatingCase(), element.id, key, value));
    const refused = this.store.lastRefusal().join(' ');
    this.complaint.set(refused);
    if (refused !== '') return;
    this.typed.set('');
    this.elementBox().nativeElement.value = '';
    this.elementBox().nativeElement.focus();
  }
}
