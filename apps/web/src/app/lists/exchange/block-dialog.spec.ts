import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { MAT_DIALOG_DATA, MatDialogRef } from '@angular/material/dialog';
import { applyBatch } from '@riseback/network';
import { beforeEach, describe, expect, it } from 'vitest';
import { ELEMENT_LISTS } from '../list-definitions';
import { trialContext, trialDocument } from '../testing/trial-document';
import { type AcceptedBlock, BlockDialog, type BlockDialogData } from './block-dialog';
import { readCopiedCells } from './block-text';

describe('BlockDialog', () => {
  let fixture: ComponentFixture<BlockDialog>;
  let closed: (AcceptedBlock | undefined)[];

  const open = async (text: string | null): Promise<void> => {
    const [traps] = ELEMENT_LISTS;
    const context = trialContext();
    const target = traps?.block(context);
    if (target === undefined) throw new Error('no lists');
    const read = text === null ? null : readCopiedCells(text);
    const data: BlockDialogData = {
      title: 'Paste rows into Traps',
      one: 'trap',
      many: 'traps',
      block: read?.ok === true ? read.block : null,
      target,
      units: context.units,
      grid: { keys: ['tag', 'area', 'loadKgS'], fromKey: 'loadKgS', ids: ['T1', 'T2'], fromRow: 0 },
    };
    TestBed.configureTestingModule({
      providers: [
        { provide: MAT_DIALOG_DATA, useValue: data },
        { provide: MatDialogRef, useValue: { close: (accepted?: AcceptedBlock) => closed.push(accepted) } },
      ],
    });
    fixture = TestBed.createComponent(BlockDialog);
    document.body.append(fixture.nativeElement as HTMLElement);
    await fixture.whenStable();
  };
  const host = (): HTMLElement => fixture.nativeElement as HTMLElement;
  const words = (): string => host().querySelector('.counts')?.textContent ?? '';
  const submit = async (): Promise<void> => {
    host()
      .querySelector('form')
      ?.dispatchEvent(new Event('submit', { cancelable: true }));
    await fixture.whenStable();
  };
  const give = async (selector: string, value: string, event: string): Promise<void> => {
    const box = host().querySelector<HTMLInputElement | HTMLTextAreaElement>(selector);
    if (box === null) throw new Error(`no ${selector}`);
    box.value = value;
    box.dispatchEvent(new Event(event));
    await fixture.whenStable();
  };

  beforeEach(() => {
    closed = [];
  });

  it('takes nothing while a cell is bad, and all of it once that is mended', async () => {
    await open('Tag\tLoad\nTR-2\tabc\nTR-10\t36 kg/h');
    expect(words()).toContain('2 rows: 1 changed, 1 not taken.');
    await submit();
    expect(closed).toEqual([]);
    await give('.bad input', '72 kg/h', 'change');
    expect(words()).toContain('2 rows: 2 changed.');
    await submit();
    const [accepted] = closed;
    expect(accepted?.words).toBe('change 2 traps');
    const applied = applyBatch(trialDocument(), accepted?.ops ?? []);
    // a kilogram an hour is 1/3600 kg/s
    expect(applied.ok && applied.document.nodes.get('T1')?.value).toMatchObject({ loadKgS: 0.02 });
  });

  it('is for the rows from the active one down where no column names them', async () => {
    await open('36 kg/h\n108 kg/h');
    expect(words()).toContain('2 rows: 2 changed.');
    await submit();
    expect(closed[0]?.ops).toMatchObject([
      { id: 'T1', key: 'loadKgS', to: 0.01 },
      { id: 'T2', key: 'loadKgS', to: 0.03 },
    ]);
  });

  it('lets a row be left out', async () => {
    await open('Tag\tLoad\nTR-2\tabc\nTR-10\t36 kg/h');
    host().querySelector<HTMLButtonElement>('[aria-label="Leave out row 2"]')?.click();
    await fixture.whenStable();
    expect(words()).toContain('2 rows: 1 changed, 1 left out.');
  });

  it('takes what is pasted into it', async () => {
    await open(null);
    await give('textarea', 'Tag\tLoad\nTR-2\t36 kg/h', 'input');
    expect(words()).toContain('1 row: 1 changed.');
  });

  it('reads a column as what the person says it is', async () => {
    await open('TR-2\t5\nTR-10\t6');
    const [first, second] = host().querySelectorAll<HTMLSelectElement>('.heads select');
    for (const [select, key] of [
      [first, 'tag'],
      [second, 'elevationM'],
    ] as const) {
      if (select === undefined) throw new Error('no column');
      select.value = key;
      select.dispatchEvent(new Event('change'));
      await fixture.whenStable();
    }
    expect(words()).toContain('2 rows: 2 changed.');
    await submit();
    // 5 ft
    expect(closed[0]?.ops[0]).toMatchObject({ id: 'T1', key: 'elevationM', to: 1.524 });
  });
});
