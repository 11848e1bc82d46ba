import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  computed,
  input,
  linkedSignal,
  output,
  signal,
  viewChild,
  viewChildren,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { LibraryModel, Problem, SavedLibraryModel } from '@riseback/contracts';
import { TRAP_TYPES, type TrapType } from '@riseback/network';
import type { DisplayUnits } from '@riseback/units';
import { TRAP_TYPE_WORDS } from '../shared/element-words';
import { ChoiceField } from '../shared/fields/choice-field';
import { TextField } from '../shared/fields/text-field';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { QuantityField } from '../shared/quantity-field/quantity-field';
import { StatusMark } from '../shared/status-mark/status-mark';
import { DifferenceTable } from './difference-table';
import { draftOf, judgeDraft, type ModelDraft } from './model-draft';
import { modelDifferences, RATINGS } from './model-facts';
import { PointsEditor } from './points-editor';

/** Every property of a library model; saving makes a version. What someone else saved meanwhile stands beside one's own. */
@Component({
  selector: 'app-model-form',
  imports: [ChoiceField, DifferenceTable, MatButton, PointsEditor, ProblemBanner, QuantityField, StatusMark, TextField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './model-form.html',
  styleUrl: './model-form.scss',
})
export class ModelForm {
  /** What editing began with; null for a new model. */
  readonly model = input.required<LibraryModel | null>();
  readonly units = input.required<DisplayUnits>();
  readonly saving = input(false);
  readonly rejection = input<Problem | null>(null);
  readonly overtaken = input<LibraryModel | null>(null);
  /** `on`: the version that it is saved upon, when it is not the one that editing began with. */
  readonly saved = output<{ readonly model: SavedLibraryModel; readonly on: LibraryModel | null }>();
  readonly dropped = output();

  private readonly nameField = viewChild.required<TextField>('name');
  private readonly quantityFields = viewChildren(QuantityField);
  private readonly pointsEditor = viewChild.required(PointsEditor);

  protected readonly ratings = RATINGS;
  protected readonly types = TRAP_TYPES.map((value) => ({ value, words: TRAP_TYPE_WORDS[value] }));
  protected readonly draft = linkedSignal((): ModelDraft => {
    const model = this.model();
    return model === null ? {} : draftOf(withoutOrigin(model));
  });
  protected readonly capacity = computed(() => this.model()?.capacity ?? []);
  protected readonly refusals = signal<ReadonlyMap<string, string>>(new Map());
  /** What would be saved now, as far as it can be read. */
  private readonly mine = signal<SavedLibraryModel | null>(null);
  protected readonly clash = computed(() => {
    const [theirs, mine] = [this.overtaken(), this.mine()];
    return theirs === null || mine === null
      ? null
      : { theirs, differences: modelDifferences(theirs, mine, this.units()) };
  });

  constructor() {
    afterNextRender(() => this.nameField().focus());
  }

  protected set(key: keyof ModelDraft, value: string | number | undefined): void {
    this.draft.update((draft) => ({ ...draft, [key]: value }));
  }

  protected setType(type: string | undefined): void {
    this.set(
      'trapType',
      TRAP_TYPES.find((known): known is TrapType => known === type),
    );
  }

  protected submit(on: LibraryModel | null): void {
    this.nameField().commit();
    // every field says what is wrong with it, not only the first
    const fields = this.quantityFields().map((field) => field.commit());
    const points = this.pointsEditor().points();
    const { saved, refusals } = judgeDraft(this.draft(), points ?? []);
    this.refusals.set(points === null ? new Map([...refusals, ['capacity', POINTS_WRONG]]) : refusals);
    if (saved === null || points === null || fields.includes(false)) return;
    this.mine.set(saved);
    this.saved.emit({ model: saved, on });
  }
}

const POINTS_WRONG = 'A row of the capacities cannot be read: mend it or remove it.';

function withoutOrigin({ id: _i, version: _v, createdBy: _b, createdAt: _a, ...content }: LibraryModel) {
  return content;
}
