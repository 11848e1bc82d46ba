import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import type { LedgerModel } from './ledger-model';

/** Width of a line's small bar, px. */
const BAR = 84;

/** A trap's back pressure as an account: opening at the vessel, an entry for each pipe, closing at the trap, hand check beside it. */
@Component({
  selector: 'app-ledger-table',
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
}
