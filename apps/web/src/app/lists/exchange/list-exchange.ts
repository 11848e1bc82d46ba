import { inject, Injectable } from '@angular/core';
import { MatDialog } from '@angular/material/dialog';
import type { DisplayUnits } from '@riseback/units';
import { firstValueFrom } from 'rxjs';
import { plainName, saveFile } from '../../shared/save-file';
import type { GridInSight } from '../grid/list-grid';
import type { ListFacts } from '../list-definitions';
import type { AcceptedBlock, BlockDialogData } from './block-dialog';
import { readBlockFile } from './block-file';
import type { BlockTarget } from './block-target';
import { type Block, readCopiedCells, type ReadBlock, writeCsv } from './block-text';

/** The list that is open, for what goes out of it and comes in. */
export interface OpenList {
  readonly facts: ListFacts;
  readonly target: BlockTarget;
  readonly units: DisplayUnits;
  readonly grid: GridInSight;
  readonly networkName: string;
}

export type SpreadsheetKind = 'csv' | 'xlsx';

/** Lists to and from spreadsheets: by the clipboard and by files. */
@Injectable({ providedIn: 'root' })
export class ListExchange {
  private readonly dialog = inject(MatDialog);

  /** What is shown, in the order shown. */
  async save(kind: SpreadsheetKind, { facts, target, grid, networkName }: OpenList): Promise<string> {
    const rows = target.sheet(grid.keys, grid.ids);
    const name = `${plainName(networkName, 'network')}-${facts.id}.${kind}`;
    if (kind === 'csv') saveFile(name, new Blob([writeCsv(rows)], { type: 'text/csv;charset=utf-8' }));
    else {
      const { writeXlsx, XLSX_TYPE } = await import('./xlsx-file');
      saveFile(name, new Blob([writeXlsx(facts.word, rows)], { type: XLSX_TYPE }));
    }
    return name;
  }

  /** @param text cells from the clipboard; null to be pasted into the dialog */
  paste(text: string | null, list: OpenList): Promise<AcceptedBlock | undefined | Refused> {
    const title = `Paste rows into ${list.facts.word}`;
    return text === null ? this.preview(title, null, list) : this.previewed(title, readCopiedCells(text), list);
  }

  async read(file: File, list: OpenList): Promise<AcceptedBlock | undefined | Refused> {
    // a file has the rows of its own list, wherever the person stands in this one
    const grid = { ...list.grid, fromKey: '', fromRow: 0 };
    return this.previewed(`Rows of ${file.name} into ${list.facts.word}`, await readBlockFile(file), { ...list, grid });
  }

  private async previewed(
    title: string,
    read: ReadBlock,
    list: OpenList,
  ): Promise<AcceptedBlock | undefined | Refused> {
    return read.ok ? this.preview(title, read.block, list) : { refused: `${read.title}. ${read.detail}` };
  }

  private async preview(title: string, block: Block | null, list: OpenList): Promise<AcceptedBlock | undefined> {
    const { BlockDialog } = await import('./block-dialog');
    const { target, units, grid, facts } = list;
    const data: BlockDialogData = { title, block, target, units, grid, one: facts.one, many: facts.many };
    const reference = this.dialog.open<InstanceType<typeof BlockDialog>, BlockDialogData, AcceptedBlock>(BlockDialog, {
      data,
      width: '1100px',
      maxWidth: '96vw',
      maxHeight: '92vh',
    });
    return firstValueFrom(reference.afterClosed());
  }
}

export interface Refused {
  readonly refused: string;
}
