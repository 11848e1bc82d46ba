import { DatePipe } from '@angular/common';
import { ChangeDetectionStrategy, Component, computed, input, linkedSignal, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { LibraryModel, Problem } from '@riseback/contracts';
import type { DisplayUnits } from '@riseback/units';
import { TRAP_TYPE_WORDS } from '../shared/element-words';
import { ChoiceField } from '../shared/fields/choice-field';
import type { Load } from '../shared/load';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { StatusMark } from '../shared/status-mark/status-mark';
import { CapacityChart } from './capacity-chart';
import { DifferenceTable } from './difference-table';
import { modelDifferences, ratingRows } from './model-facts';

/** One model of the library as it is now, and how it came to be so. */
@Component({
  selector: 'app-model-view',
  imports: [CapacityChart, ChoiceField, DatePipe, DifferenceTable, MatButton, ProblemBanner, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './model-view.html',
  styleUrl: './model-view.scss',
})
export class ModelView {
  readonly model = input.required<LibraryModel>();
  readonly versions = input.required<Load<readonly LibraryModel[]>>();
  readonly units = input.required<DisplayUnits>();
  readonly timeZone = input.required<string>();
  readonly mayEdit = input(false);
  readonly saving = input(false);
  readonly rejection = input<Problem | null>(null);
  readonly editWanted = output();
  /** True to retire the model, false to take it into use again. */
  readonly retireWanted = output<boolean>();

  protected readonly type = computed(() => {
    const { trapType } = this.model();
    return trapType === undefined ? 'Type not given' : TRAP_TYPE_WORDS[trapType];
  });
  protected readonly rows = computed(() => ratingRows(this.model(), this.units()));
  protected readonly all = computed(() => {
    const versions = this.versions();
    return versions.status === 'ready' ? versions.value : [];
  });
  protected readonly choices = computed(() =>
    this.all().map(({ version }) => ({ value: String(version), words: `Version ${String(version)}` })),
  );
  /** The newest beside the one before it, until others are chosen; another model begins anew. */
  protected readonly from = linkedSignal(() => String(this.all()[1]?.version ?? ''));
  protected readonly to = linkedSignal(() => String(this.all()[0]?.version ?? ''));
  protected readonly compared = computed(() => {
    const of = (version: string) => this.all().find((one) => String(one.version) === version);
    const [before, after] = [of(this.from()), of(this.to())];
    return before === undefined || after === undefined
      ? null
      : { before, after, differences: modelDifferences(before, after, this.units()) };
  });
}
