import { ChangeDetectionStrategy, Component, computed, inject, input, output } from '@angular/core';
import { ActivatedRoute, Router } from '@angular/router';
import type { CommentSubject } from '@riseback/contracts';
import type { Position } from '@riseback/network';
import { BANDS_TO_COME } from '../../shared/bands-to-come';
import { type Status, StatusMark } from '../../shared/status-mark/status-mark';
import { Term } from '../../shared/term/term';
import { BANDED_CHECKS } from '../bands-before';
import type { Finding, FindingSeverity } from '../finding-list';
import { checkName } from '../finding-words';
import { type TryParams, tryParams } from '../../what-if/try-params';

const MARKS: Readonly<Record<FindingSeverity, { readonly status: Status; readonly word: string }>> = {
  fail: { status: 'fail', word: 'Fail' },
  watch: { status: 'watch', word: 'Watch' },
  note: { status: 'none', word: 'Note' },
};

/** The findings of a case as a table, each leading to its element. */
@Component({
  selector: 'app-findings-list',
  imports: [StatusMark, Term],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './findings-list.html',
  styleUrl: './findings-list.scss',
})
export class FindingsList {
  readonly findings = input.required<readonly Finding[]>();
  /** The sheet's zone of a place; left out where no drawing is shown. */
  readonly zoneOf = input<(position: Position) => string>();
  /** What a case is called; needed where findings of several cases stand together. */
  readonly caseName = input<(caseId: string) => string>();
  /** How many cases there are, so that what holds in all of them can say so. */
  readonly caseCount = input(0);
  /** The element looked at now; its findings are marked. */
  readonly currentId = input('');
  /** No case has been solved yet, so that silence means nothing. */
  readonly unsolved = input(false);
  /** Findings can be commented on from here. */
  readonly commentable = input(false);
  readonly commented = output<CommentSubject>();
  /** The id of the element that a finding leads to. */
  readonly opened = output<string>();

  private readonly bandsToCome = inject(BANDS_TO_COME, { optional: true });
  private readonly router = inject(Router);
  private readonly route = inject(ActivatedRoute, { optional: true });
  protected readonly rows = computed(() => {
    const zoneOf = this.zoneOf();
    return this.findings().map((finding) => ({
      finding,
      ...MARKS[finding.severity],
      final: !BANDED_CHECKS.has(finding.code),
      name: checkName(finding.code),
      zone: finding.position === null || zoneOf === undefined ? '' : zoneOf(finding.position),
      cases: this.caseWords(finding),
      trial: tryParams(finding),
      current: finding.element !== null && finding.element.id === this.currentId(),
    }));
  });
  protected readonly byCase = computed(() => this.caseName() !== undefined);
  protected readonly counts = computed(() => {
    const count = (severity: FindingSeverity) =>
      this.findings().filter((finding) => finding.severity === severity).length;
    const parts = [
      `${count('fail').toString()} fail`,
      `${count('watch').toString()} watch${this.bandsToCome?.() === true ? ' so far' : ''}`,
      ...(count('note') > 0 ? [`${count('note').toString()} ${count('note') === 1 ? 'note' : 'notes'}`] : []),
    ];
    return parts.join(', ');
  });

  /** The view beside the one that shows the findings, with the mending filled in. */
  protected openTrial(queryParams: TryParams): void {
    void this.router.navigate(['../try'], { relativeTo: this.route, queryParams, queryParamsHandling: 'merge' });
  }

  protected comment({ element, code, cases }: Finding): void {
    if (element === null) return;
    const caseId = cases?.[0];
    this.commented.emit({ kind: 'result', elementId: element.id, code, ...(caseId === undefined ? {} : { caseId }) });
  }

  private caseWords({ cases }: Finding): string {
    const caseName = this.caseName();
    if (caseName === undefined) return '';
    if (cases === undefined) return 'Any';
    return cases.length > 1 && cases.length === this.caseCount() ? 'All cases' : cases.map(caseName).join(', ');
  }
}
