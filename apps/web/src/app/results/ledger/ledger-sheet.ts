import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { NodeResult } from '@riseback/contracts';
import type { NetworkDocument } from '@riseback/network';
import type { LedgerEntry, ProfilePoint } from '@riseback/solver';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { ElementIcon } from '../../drawing/symbols/element-icon';
import { FRICTION_WORDS, STATIC_LIFT_WORDS } from '../../networks/method-words';
import { BANDS_TO_COME } from '../../shared/bands-to-come';
import { StatusMark } from '../../shared/status-mark/status-mark';
import { bandNumbers } from '../bands';
import type { PressureRamp } from '../pressure-ramp';
import { endWords, trapTypeWords } from './element-text';
import { ledgerModel } from './ledger-model';
import { LedgerTable } from './ledger-table';
import { LiftProfile } from './lift-profile';
import type { TrapItem } from './trap-groups';
import { nameOf } from '../../shared/element-words';

/** One trap's page, A4 landscape: head, lift profile, ledger, foot. What is seen is what prints. */
@Component({
  selector: 'app-ledger-sheet',
  imports: [ElementIcon, LedgerTable, LiftProfile, MatButton, RouterLink, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './ledger-sheet.html',
  styleUrl: './ledger-sheet.scss',
})
export class LedgerSheet {
  readonly item = input.required<TrapItem>();
  /** The network that was solved, which may be older than the one drawn. */
  readonly document = input.required<NetworkDocument>();
  readonly entries = input.required<readonly LedgerEntry[]>();
  readonly points = input.required<readonly ProfilePoint[]>();
  readonly nodeResult = input<NodeResult>();
  readonly units = input.required<DisplayUnits>();
  readonly ramp = input.required<PressureRamp>();
  readonly siteName = input('');
  readonly caseName = input('');
  /** The case is the trap's own worst, not one chosen for all. */
  readonly worstOfAll = input(false);
  readonly solvedAt = input('');
  /** Why this must not be printed now; '' when it may be. */
  readonly staleReason = input('');

  protected readonly bandsToCome = inject(BANDS_TO_COME, { optional: true }) ?? (() => false);
  /** What a print would say that is not so, or not yet; '' when it may be printed. */
  protected readonly whyNoPrint = computed(() => {
    if (this.staleReason() !== '') return `Not while the ledger is stale. ${this.staleReason()}`;
    return this.bandsToCome() ? 'Not before its spread is there.' : '';
  });
  protected readonly model = computed(() =>
    ledgerModel(this.entries(), this.item().result, this.document(), this.units()),
  );
  protected readonly nameOfPipe = computed(() => {
    const { pipes } = this.document();
    return (id: string) => {
      const pipe = pipes.get(id)?.value;
      return pipe === undefined ? id : nameOf(pipe);
    };
  });
  protected readonly endName = computed(() => {
    const { end } = this.item();
    return end === undefined ? 'Receiver' : nameOf(end);
  });
  protected readonly openingWords = computed(() => {
    const { end } = this.item();
    if (end?.kind === 'flashVessel') return 'vessel held at';
    return end?.kind === 'receiver' && end.vented === true ? 'receiver, vented' : 'receiver held at';
  });
  protected readonly note = computed(() => (this.item().trap.note ?? '').split('\n')[0] ?? '');
  /** Site and network, once where they bear one name. */
  protected readonly place = computed(() =>
    [...new Set([this.siteName(), this.document().name])].filter((name) => name !== '').join(', '),
  );
  protected readonly duty = computed(() => {
    const { trap, inletPa } = this.item();
    const model = trap.trapModel === undefined ? undefined : this.document().trapModels.get(trap.trapModel)?.value.name;
    const load = this.nodeResult()?.massFlowKgS ?? trap.loadKgS;
    return (
      `${trapTypeWords(trap.trapType)}${model === undefined ? ', no model given' : ` ${model}`}, ` +
      `${formatQuantity(load, 'massFlow', this.units(), { withUnit: true })} from ` +
      formatQuantity(inletPa, 'pressure', this.units(), { withUnit: true })
    );
  });
  protected readonly way = computed(() => {
    const count = this.entries().length;
    const lengthM = this.entries().reduce((sum, entry) => sum + entry.lengthM, 0);
    const length = formatQuantity(lengthM, 'length', this.units(), {
      withUnit: true,
      decimals: lengthDecimals(this.units()),
    });
    return `Way to ${endWords(this.item().end)}: ${count.toString()} ${count === 1 ? 'pipe' : 'pipes'}, ${length}`;
  });
  protected readonly numbers = computed(() => {
    const { result } = this.item();
    return {
      differential: formatQuantity(result.differentialPa, 'pressureDifference', this.units(), {
        withUnit: true,
        decimals: 1,
      }),
      back: formatQuantity(result.backPressurePa, 'pressure', this.units()),
      unit: this.model().titles.running,
    };
  });
  protected readonly bands = computed(() => {
    const { spread, credible } = this.item().result;
    return [
      ...(spread === undefined ? [] : [{ name: 'Spread', numbers: bandNumbers(spread, this.units()) }]),
      ...(credible === undefined ? [] : [{ name: 'Credible', numbers: bandNumbers(credible, this.units()) }]),
    ];
  });
  protected readonly methodWords = computed(() => {
    const { friction, staticLift, dropCredit } = this.document().method;
    const credit =
      dropCredit === 0
        ? 'falls not credited'
        : `falls credited at ${formatQuantity(dropCredit, 'fraction', this.units(), { withUnit: true })}`;
    return `Friction: ${FRICTION_WORDS[friction]}; static: ${STATIC_LIFT_WORDS[staticLift]}, ${credit}`;
  });
  protected readonly exceeded = computed(() => {
    const { limit, result } = this.item();
    return limit !== null && result.backPressurePa > limit.pressurePa;
  });

  protected print(): void {
    globalThis.print();
  }
}

function lengthDecimals({ system }: DisplayUnits): number {
  return system === 'us' ? 0 : 1;
}
