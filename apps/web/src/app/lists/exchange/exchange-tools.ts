import { ChangeDetectionStrategy, Component, inject, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatMenu, MatMenuItem, MatMenuTrigger } from '@angular/material/menu';
import { NetworkFiles } from '../../networks/network-files';
import { NetworkStore } from '../../networks/network-store';
import { toProblem } from '../../shared/problem';
import type { CellEdit } from '../grid/cell-editing';
import type { AcceptedBlock } from './block-dialog';
import { ListExchange, type OpenList, type Refused, type SpreadsheetKind } from './list-exchange';

/** The buttons by which rows come into the open list and go out of it. Who may not change it gets those that go out. */
@Component({
  selector: 'app-exchange-tools',
  imports: [MatButton, MatMenu, MatMenuItem, MatMenuTrigger],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (mayEdit()) {
      <button matButton="outlined" type="button" (click)="paste(null)">Paste rows</button>
    }
    <button matButton="outlined" type="button" [matMenuTriggerFor]="files">CSV or XLSX</button>
    <mat-menu #files="matMenu">
      <button mat-menu-item type="button" (click)="save('xlsx')">Save this list as XLSX</button>
      <button mat-menu-item type="button" (click)="save('csv')">Save this list as CSV</button>
      @if (mayEdit()) {
        <button mat-menu-item type="button" (click)="box.click()">Take in rows of a file</button>
      }
      <button mat-menu-item type="button" (click)="saveNetwork()">Save the network as a file</button>
    </mat-menu>
    <input
      #box
      class="rb-visually-hidden"
      type="file"
      accept=".csv,.xlsx,text/csv"
      tabindex="-1"
      aria-label="CSV or XLSX file"
      (change)="takeFile(box)"
    />
  `,
  styles: `
    :host {
      display: contents;
    }
  `,
})
export class ExchangeTools {
  private readonly exchange = inject(ListExchange);
  private readonly networkFiles = inject(NetworkFiles);
  private readonly store = inject(NetworkStore);

  readonly mayEdit = input.required<boolean>();
  /** The list as it stands when something is asked of it. */
  readonly openList = input.required<() => OpenList | null>();
  readonly edited = output<CellEdit>();
  readonly told = output<string>();
  /** Why nothing came of it; '' takes back what was said before. */
  readonly refused = output<string>();
  readonly left = output();

  /** @param text what the clipboard held; null to be pasted into the dialog */
  async paste(text: string | null): Promise<void> {
    const list = this.openList()();
    if (list !== null) this.take('paste', await this.exchange.paste(text, list));
  }

  protected async takeFile(box: HTMLInputElement): Promise<void> {
    const file = box.files?.[0];
    const list = this.openList()();
    if (file !== undefined && list !== null) this.take('take in', await this.exchange.read(file, list));
    // the same file may be chosen again once it is mended
    box.value = '';
  }

  protected async save(kind: SpreadsheetKind): Promise<void> {
    const list = this.openList()();
    if (list !== null) this.told.emit(`Saved as ${await this.exchange.save(kind, list)}`);
  }

  protected async saveNetwork(): Promise<void> {
    const network = this.store.network();
    if (network === null) return;
    try {
      this.told.emit(`Saved as ${await this.networkFiles.save(network)}`);
    } catch (error) {
      this.refused.emit(toProblem(error).title);
    }
  }

  private take(how: string, taken: AcceptedBlock | Refused | undefined): void {
    this.refused.emit(taken !== undefined && 'refused' in taken ? taken.refused : '');
    if (taken !== undefined && 'ops' in taken) this.edited.emit({ label: `${how}: ${taken.words}`, ops: taken.ops });
    else this.left.emit();
  }
}
