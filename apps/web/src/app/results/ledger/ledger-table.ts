import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { broughtForward, sheetBreaks, type LedgerModel } from '@riseback/figures';
import { Term } from '../../shared/term/term';

/** Width of a line's small bar, px. */
const BAR = 84;

/** A trap's back pressure as an account: opening at the vessel, an entry for each pipe, closing at the trap, hand check beside it. */
@Component({
  selector: 'app-ledger-table',
  imports: [Term],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './ledger-table.html',
  styleUrl: './ledger-table.scss',
})
export class LedgerTable {
  readonly ledger = input.required<LedgerModel>();
  readonly trapName = input.required<string>();
  readonly endName = input.required<string>();
  /** "vessel held at", "receiver, vented". */
  readonly openingWords = input.required<string>();

  protected readonly BAR = BAR;
  protected readonly FORWARD_WORDS = ['Carried forward', 'Brought forward'] as const;
  /** By the index of the line that begins a new sheet of paper: what is carried over to it. */
  protected readonly forwards = computed(() => {
    const ledger = this.ledger();
    return new Map(sheetBreaks(ledger.rows.length).map((index) => [index, broughtForward(ledger, index)]));
  });
}
