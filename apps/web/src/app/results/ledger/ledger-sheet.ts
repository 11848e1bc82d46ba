import {
  ApplicationRef,
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  output,
  signal,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatMenu, MatMenuItem, MatMenuTrigger } from '@angular/material/menu';
import { RouterLink } from '@angular/router';
import type { NodeResult } from '@riseback/contracts';
import type { NetworkDocument } from '@riseback/network';
import type { LedgerEntry, ProfileBand, ProfilePoint } from '@riseback/solver';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { ElementIcon } from '../../drawing/symbols/element-icon';
import { FRICTION_WORDS, STATIC_LIFT_WORDS } from '../../networks/method-words';
import { BANDS_TO_COME } from '../../shared/bands-to-come';
import { StatusMark } from '../../shared/status-mark/status-mark';
import {
  bandNumbers,
  type PressureRamp,
  boreWords,
  endWords,
  trapTypeWords,
  gaugesOnWay,
  ledgerModel,
} from '@riseback/figures';
import { ledgerRows, saveRows } from './ledger-file';
import { LedgerTable } from './ledger-table';
import { LiftProfile } from './lift-profile';
import type { TrapItem } from './trap-groups';
import { nameOf } from '../../shared/element-words';
import { plainName, saveFile } from '../../shared/save-file';

/** One trap's page, A4 landscape: head, lift profile, ledger, foot. What is seen is what prints. */
@Component({
  selector: 'app-ledger-sheet',
  imports: [
    ElementIcon,
    LedgerTable,
    LiftProfile,
    MatButton,
    MatMenu,
    MatMenuItem,
    MatMenuTrigger,
    RouterLink,
    StatusMark,
  ],
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
  /** The bands at each point; undefined where they are known at the trap alone. */
  readonly alongWay = input<readonly ProfileBand[]>();
  readonly nodeResult = input<NodeResult>();
  readonly units = input.required<DisplayUnits>();
  readonly ramp = input.required<PressureRamp>();
  readonly siteName = input('');
  readonly caseName = input('');
  /** The case is the trap's own worst, not one chosen for all. */
  readonly worstOfAll = input(false);
  readonly solvedAt = input('');
  /** Why this must be neither printed nor saved now; '' when it may be. */
  readonly staleReason = input('');
  /** What was done, to be said aloud. */
  readonly told = output<string>();

  private readonly profile = viewChild(LiftProfile);
  private readonly application = inject(ApplicationRef);

  protected readonly bandsToCome = inject(BANDS_TO_COME, { optional: true }) ?? (() => false);
  /** For the time of one print. */
  protected readonly inBlack = signal(false);
  /** What a print or a file would say that is not so, or not yet; '' when it may be made. */
  protected readonly whyNoPrint = computed(() => {
    if (this.staleReason() !== '') return `No print and no file while the ledger is stale. ${this.staleReason()}`;
    return this.bandsToCome() ? 'No print and no file before its spread is there.' : '';
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
  protected readonly sizeOfPipe = computed(() => {
    const { pipes } = this.document();
    const units = this.units();
    return (id: string) => {
      const pipe = pipes.get(id)?.value;
      return pipe === undefined ? '' : boreWords(pipe, units);
    };
  });
  protected readonly gauges = computed(() => {
    const { id, result } = this.item();
    return gaugesOnWay(this.document(), id, result.walk, this.points());
  });
  protected readonly decimalsWords = computed(() => `a hundredth of a ${this.units().system === 'us' ? 'psi' : 'kPa'}`);
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
  protected readonly caution = CAUTION;
  protected readonly exceeded = computed(() => {
    const { limit, result } = this.item();
    return limit !== null && result.backPressurePa > limit.pressurePa;
  });

  protected print(inBlack: boolean): void {
    this.inBlack.set(inBlack);
    this.application.tick();
    globalThis.print();
    this.inBlack.set(false);
  }

  protected async save(kind: 'csv' | 'xlsx'): Promise<void> {
    if (this.whyNoPrint() !== '') return;
    const rows = ledgerRows(this.model(), {
      trapName: this.item().tag,
      endName: this.endName(),
      openingWords: this.openingWords(),
      notes: [
        ['Place', this.place()],
        ['Case', this.caseName()],
        ['Verdict', this.item().status],
        ['Method', this.methodWords()],
        ['Solved', this.solvedAt()],
        ['Hand check', this.model().handCheck],
        [
          'Rounding',
          `To ${this.decimalsWords()} as the column runs, so that every column adds up to its closing line.`,
        ],
        ['Caution', CAUTION],
      ],
    });
    await saveRows(kind, this.fileName('ledger'), rows);
    this.told.emit(`Saved as ${this.fileName('ledger')}.${kind}`);
  }

  protected saveProfile(): void {
    const svg = this.whyNoPrint() === '' ? this.profile()?.svg() : undefined;
    if (svg === undefined) return;
    const name = `${this.fileName('lift')}.svg`;
    saveFile(name, new Blob([svg], { type: 'image/svg+xml' }));
    this.told.emit(`Saved as ${name}`);
  }

  private fileName(what: string): string {
    return plainName(`${this.document().name} ${this.item().tag} ${this.caseName()} ${what}`, 'ledger');
  }
}

const CAUTION =
  'Steam and hot condensate burn, and water hammer breaks pipes. Does not replace local codes or a licensed engineer’s judgement.';

function lengthDecimals({ system }: DisplayUnits): number {
  return system === 'us' ? 0 : 1;
}
