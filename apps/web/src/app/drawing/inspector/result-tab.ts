import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import type { CaseOutcome } from '@riseback/contracts';
import type { NetworkNode, PipeRun, Trap, TrapModel } from '@riseback/network';
import { formatQuantity } from '@riseback/units';
import { caseChangeWords } from '../../cases/case-changes';
import { NetworkStore } from '../../networks/network-store';
import { backPressureLimit } from '@riseback/figures';
import { StallChart } from '../../results/stall/stall-chart';
import { stallFacts } from '../../results/stall/stall-facts';
import { Staff } from '../../results/staff/staff';
import { isPipe, nameOf } from '../../shared/element-words';
import { Term } from '../../shared/term/term';
import { TermRow } from '../../shared/term/term-row';
import type { TermKey } from '../../shared/term/terms';
import { CheckList } from './check-list';
import { dropRows, nodeRows, pipeRows, type ResultRow, trapNotes, trapRows } from './result-rows';

/** The words written beside the staff, which is a picture. */
const STAFF_TERMS: readonly TermKey[] = [
  'backPressure',
  'differential',
  'lift',
  'friction',
  'flash',
  'limit',
  'spread',
  'credibleBand',
];

/** What came out for one element in the chosen case. */
@Component({
  selector: 'app-result-tab',
  imports: [CheckList, Staff, StallChart, Term, TermRow],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './result-tab.html',
  styleUrl: './inspector-tabs.scss',
})
export class ResultTab {
  protected readonly store = inject(NetworkStore);

  readonly element = input.required<NetworkNode | PipeRun>();

  protected readonly staffTerms = STAFF_TERMS;

  protected readonly trap = computed((): Trap | null => {
    const element = this.element();
    return !isPipe(element) && element.kind === 'trap' ? element : null;
  });
  protected readonly trapResult = computed(() => this.store.trapResults().get(this.element().id) ?? null);
  /** The inlet in the chosen case, whose factors and overrides the result already carries. */
  protected readonly inletPressurePa = computed(() => {
    const result = this.trapResult();
    return result === null ? 0 : result.backPressurePa + result.differentialPa;
  });
  protected readonly limit = computed(() => {
    const [trap, result] = [this.trap(), this.trapResult()];
    return trap === null || result === null
      ? null
      : backPressureLimit(result, trap, this.modelOf(trap), this.store.units());
  });
  protected readonly receiverName = computed(() => {
    const last = this.trapResult()?.walk.at(-1);
    const document = this.store.document();
    const end = last === undefined ? undefined : document?.pipes.get(last)?.value;
    const node = [end?.to, end?.from]
      .map((id) => (id === undefined ? undefined : document?.nodes.get(id)?.value))
      .find((candidate) => candidate?.kind === 'receiver' || candidate?.kind === 'flashVessel');
    return node === undefined ? 'Receiver' : nameOf(node);
  });
  protected readonly byCase = computed(() =>
    this.store.caseOutcomes().map((outcome) => ({
      id: outcome.caseId,
      name: this.store.nameOfCase(outcome.caseId),
      current: outcome.caseId === this.store.caseOf(this.element().id),
      value: this.backPressureIn(outcome),
      changes: this.changesIn(outcome.caseId),
    })),
  );
  /** Which case the result is of, where each element shows its own worst. */
  protected readonly worstCase = computed(() =>
    this.store.showsWorst() ? this.store.nameOfCase(this.store.caseOf(this.element().id)) : '',
  );
  protected readonly warnings = computed(() =>
    (this.store.result()?.warnings ?? []).filter(({ element }) => element === this.element().id),
  );
  protected readonly parts = computed((): ResultRow[] => {
    const result = this.trapResult();
    return result === null ? [] : trapRows(result, this.receiverName(), this.store.units(), this.store.bandsToCome());
  });
  protected readonly stall = computed(() => {
    const [document, trap, result] = [this.store.document(), this.trap(), this.trapResult()];
    if (document === null || trap === null || result === null) return null;
    return stallFacts(document, this.store.caseOf(trap.id), trap, result);
  });
  protected readonly notes = computed(() => {
    const result = this.trapResult();
    return result === null ? [] : trapNotes(result, this.store.units());
  });
  protected readonly nodeRows = computed((): ResultRow[] => {
    const result = this.store.nodeResults().get(this.element().id);
    return result === undefined || this.trap() !== null ? [] : nodeRows(result, this.store.units());
  });
  private readonly pipeResult = computed(() => this.store.pipeResults().get(this.element().id) ?? null);
  protected readonly pipeRows = computed((): ResultRow[] => {
    const result = this.pipeResult();
    return result === null ? [] : pipeRows(result, this.store.units());
  });
  protected readonly dropRows = computed((): ResultRow[] => {
    const result = this.pipeResult();
    return result === null ? [] : dropRows(result, this.store.units());
  });
  protected readonly refusal = computed(() => {
    const outcome = this.store.outcome();
    return outcome?.status === 'refused' ? (outcome.problem.detail ?? outcome.problem.title) : '';
  });

  private modelOf(trap: Trap): TrapModel | undefined {
    return trap.trapModel === undefined ? undefined : this.store.document()?.trapModels.get(trap.trapModel)?.value;
  }

  /** What a case sets apart at this element, in words; '' where it takes it as drawn. */
  private changesIn(caseId: string): string {
    const document = this.store.document();
    return document === null ? '' : caseChangeWords(document, caseId, this.element().id, this.store.units()).join(', ');
  }

  private backPressureIn(outcome: CaseOutcome): string {
    if (outcome.status !== 'solved') return '–';
    const { id } = this.element();
    const pressurePa =
      outcome.result.traps.find((trap) => trap.id === id)?.backPressurePa ??
      outcome.result.nodes.find((node) => node.id === id)?.pressurePa;
    return pressurePa === undefined ? '–' : formatQuantity(pressurePa, 'pressure', this.store.units());
  }
}
