import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { SolveWarning, TrapCheck } from '@riseback/contracts';
import type { DisplayUnits } from '@riseback/units';
import { BANDED_CHECKS } from '../../results/bands-before';
import { checkName, findingWords } from '../../results/finding-words';
import { type Status, StatusMark } from '../../shared/status-mark/status-mark';

interface CheckRow {
  readonly key: string;
  readonly status: Status;
  /** Whether no band can change it. */
  readonly final: boolean;
  readonly name: string;
  readonly words: string;
  readonly remedy: string;
}

const ORDER: Readonly<Record<Status, number>> = { fail: 0, watch: 1, pass: 2, none: 3 };

/** Checks and warnings in words, worst first, and after them what could not be checked and why. */
@Component({
  selector: 'app-check-list',
  imports: [StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <ul class="checks">
      @for (row of rows(); track row.key) {
        <li>
          <app-status-mark [status]="row.status" [final]="row.final" />
          <h4>{{ row.name }}</h4>
          <p>{{ row.words }}</p>
          @if (row.remedy) {
            <p>{{ row.remedy }}</p>
          }
        </li>
      }
    </ul>
  `,
  styleUrl: './check-list.scss',
})
export class CheckList {
  readonly checks = input.required<readonly (TrapCheck | SolveWarning)[]>();
  readonly unmade = input<readonly { readonly code: string; readonly reason: string }[]>([]);
  readonly units = input.required<DisplayUnits>();

  protected readonly rows = computed((): CheckRow[] => [
    ...this.checks()
      .map((check, i) => ({
        key: `${check.code}/${String(i)}`,
        status: check.verdict,
        final: !BANDED_CHECKS.has(check.code),
        name: checkName(check.code),
        words: findingWords(check.text, this.units()),
        remedy: check.remedy === undefined ? '' : findingWords(check.remedy, this.units()),
      }))
      .sort((a, b) => ORDER[a.status] - ORDER[b.status]),
    ...this.unmade().map(({ code, reason }) => ({
      key: `unmade/${code}`,
      status: 'none' as const,
      final: true,
      name: checkName(code),
      words: reason,
      remedy: '',
    })),
  ]);
}
