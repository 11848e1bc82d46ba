import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import type { CaseOutcome, TrapResult } from '@riseback/contracts';
import type { NetworkNode, PipeRun, Trap, TrapModel } from '@riseback/network';
import { formatQuantity, type QuantityKind } from '@riseback/units';
import { caseChangeWords } from '../../cases/case-changes';
import { NetworkStore } from '../../networks/network-store';
import { backPressureLimit } from '../../results/back-pressure-limit';
import { Staff } from '../../results/staff/staff';
import { isPipe, nameOf } from '../../shared/element-words';
import { CheckList } from './check-list';

interface Row {
  readonly name: string;
  readonly value: string;
}

/** What came out for one element in the chosen case. */
@Component({
  selector: 'app-result-tab',
  imports: [CheckList, Staff],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './result-tab.html',
  styleUrl: './inspector-tabs.scss',
})
export class ResultTab {
  protected readonly store = inject(NetworkStore);

  readonly element = input.required<NetworkNode | PipeRun>();

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
  protected readonly parts = computed((): Row[] => {
    const result = this.trapResult();
    return result === null ? [] : this.breakdown(result);
  });
  protected readonly nodeRows = computed((): Row[] => {
    const result = this.store.nodeResults().get(this.element().id);
    if (result === undefined || this.trap() !== null) return [];
    return [
      this.row('Pressure', result.pressurePa, 'pressure'),
      this.row('Temperature', result.temperatureK, 'temperature'),
      this.row('Flash share', result.quality, 'quality'),
      this.row('Flow', result.massFlowKgS, 'massFlow'),
    ];
  });
  protected readonly pipeRows = computed((): Row[] => {
    const result = this.store.pipeResults().get(this.element().id);
    if (result === undefined) return [];
    return [
      this.row('Flow', result.massFlowKgS, 'massFlow'),
      this.row('Pressure at its start', result.upstreamPressurePa, 'pressure'),
      this.row('Pressure at its end', result.downstreamPressurePa, 'pressure'),
      this.row('Flash share at its start', result.upstreamQuality, 'quality'),
      this.row('Flash share at its end', result.downstreamQuality, 'quality'),
      this.row('Velocity, as liquid', result.liquidVelocityMS, 'velocity'),
      this.row('Velocity, with flash steam', result.mixtureVelocityMS, 'velocity'),
    ];
  });
  protected readonly dropRows = computed((): Row[] => {
    const result = this.store.pipeResults().get(this.element().id);
    if (result === undefined) return [];
    return [
      this.row('Lift', result.staticPa, 'pressureDifference'),
      this.row('Friction of the liquid', result.frictionPa, 'pressureDifference'),
      this.row('Added by flash steam', result.flashPa, 'pressureDifference'),
      this.row('Drop together', result.upstreamPressurePa - result.downstreamPressurePa, 'pressureDifference'),
    ];
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

  private breakdown(result: TrapResult): Row[] {
    return [
      this.row(this.receiverName(), result.receiverPressurePa, 'pressure'),
      this.row('Lift', result.staticPa, 'pressureDifference'),
      this.row('Friction of the liquid', result.frictionPa, 'pressureDifference'),
      this.row('Added by flash steam', result.flashPa, 'pressureDifference'),
      this.row('Back pressure', result.backPressurePa, 'pressure'),
    ];
  }

  private row(name: string, si: number, kind: QuantityKind): Row {
    return { name, value: formatQuantity(si, kind, this.store.units(), { withUnit: true }) };
  }
}
