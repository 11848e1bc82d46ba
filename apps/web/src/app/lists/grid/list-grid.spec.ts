import { TestKey } from '@angular/cdk/testing';
import { UnitTestElement } from '@angular/cdk/testing/testbed';
import { ChangeDetectionStrategy, Component, computed, signal } from '@angular/core';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { applyBatch, type NetworkDocument } from '@riseback/network';
import { beforeEach, describe, expect, it } from 'vitest';
import { ELEMENT_LISTS } from '../list-definitions';
import { trialContext, trialDocument } from '../testing/trial-document';
import type { CellEdit } from './cell-editing';
import { ListGrid } from './list-grid';

@Component({
  imports: [ListGrid],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `<app-list-grid
    [table]="table()"
    label="Traps"
    elementWord="Trap"
    emptyWords="No traps"
    [mayEdit]="mayEdit()"
    [filter]="filter()"
    [units]="{ system: 'us', atmosphericPressurePa: 101325 }"
    [staffTopPa]="7e5"
    (edited)="take($event)"
    (selectedChange)="selected.set($event)"
    (told)="told.set($event)"
    (drawingWanted)="drawing.set($event)"
    (pasted)="pasted.set($event)"
  />`,
})
class Host {
  readonly document = signal<NetworkDocument>(trialDocument());
  readonly mayEdit = signal(true);
  readonly filter = signal('');
  readonly told = signal('');
  readonly drawing = signal('');
  readonly pasted = signal('');
  readonly selected = signal<readonly string[]>([]);
  readonly edits: CellEdit[] = [];
  readonly table = computed(() => {
    const [traps] = ELEMENT_LISTS;
    if (traps === undefined) throw new Error('no lists');
    return traps.table(trialContext(this.document()));
  });

  take(edit: CellEdit): void {
    this.edits.push(edit);
    const applied = applyBatch(this.document(), edit.ops);
    if (applied.ok) this.document.set(applied.document);
  }
}

describe('ListGrid', () => {
  let fixture: ComponentFixture<Host>;
  let grid: HTMLElement;

  beforeEach(async () => {
    fixture = TestBed.createComponent(Host);
    document.body.append(fixture.nativeElement as HTMLElement);
    await fixture.whenStable();
    grid = element('[role=grid]');
    grid.focus();
  });

  const element = (selector: string): HTMLElement => {
    const found = (fixture.nativeElement as HTMLElement).querySelector<HTMLElement>(selector);
    if (found === null) throw new Error(`no ${selector}`);
    return found;
  };
  const press = async (key: string, init: KeyboardEventInit = {}, target: Element = grid): Promise<void> => {
    target.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true, ...init }));
    await fixture.whenStable();
  };
  /** Keys with all that Material's own key handling looks at. */
  const keysTo = (target: HTMLElement, ...keys: TestKey[]): Promise<void> =>
    new UnitTestElement(target, () => fixture.whenStable().then(() => undefined)).sendKeys(...keys);
  const active = (): string => {
    const id = grid.getAttribute('aria-activedescendant') ?? '';
    return document.getElementById(id)?.textContent.trim() ?? '';
  };
  const type = async (text: string): Promise<HTMLInputElement> => {
    const box = element('app-cell-text-editor input') as HTMLInputElement;
    box.value = text;
    box.dispatchEvent(new Event('input'));
    await fixture.whenStable();
    return box;
  };
  const goToLoad = async (): Promise<void> => {
    await press('Home');
    // tick, tag, drawing, area, type, model, inlet, load
    for (let step = 0; step < 7; step += 1) await press('ArrowRight');
  };

  it('is one tab stop and names its size and its active cell', () => {
    expect(grid.getAttribute('aria-rowcount')).toBe('4');
    expect(active()).toBe('TR-2');
    const stops = [...(fixture.nativeElement as HTMLElement).querySelectorAll<HTMLElement>('*')].filter(
      ({ tabIndex }) => tabIndex >= 0,
    );
    expect(stops).toEqual([grid]);
  });

  it('moves by arrows, up to the heads, where Enter sorts', async () => {
    await press('ArrowDown');
    expect(active()).toBe('TR-10');
    await press('ArrowUp');
    await press('ArrowUp');
    await press('Enter');
    await press('Enter');
    expect(element('[aria-sort=descending]').textContent).toContain('Tag');
    await press('ArrowDown');
    expect(active()).toBe('TR-10');
  });

  it('types over a cell, accepts with Enter and goes down', async () => {
    await goToLoad();
    await press('3');
    const box = await type('36 kg/h');
    expect(document.activeElement).toBe(box);
    await press('Enter', {}, box);
    const host = fixture.componentInstance;
    expect(host.edits).toMatchObject([
      { label: 'set load of TR-2', ops: [{ op: 'set', id: 'T1', key: 'loadKgS', from: 0.05, to: 0.01 }] },
    ]);
    expect(document.activeElement).toBe(grid);
    // 0.02 kg/s of the second trap, in lb/h
    expect(active()).toBe('159');
  });

  it('keeps a refused text in the box with the reason, and Escape restores', async () => {
    await goToLoad();
    await press('F2');
    const box = await type('5 psig');
    await press('Enter', {}, box);
    expect(document.querySelector('.hint [role=alert]')?.textContent).toContain('psig is a pressure');
    expect(box.value).toBe('5 psig');
    await press('Escape', {}, box);
    expect(fixture.componentInstance.edits).toEqual([]);
    expect(active()).toBe('397');
  });

  it('leaves a refused text standing in its cell when the person goes elsewhere', async () => {
    await goToLoad();
    await press('F2');
    const box = await type('5 psig');
    box.dispatchEvent(new FocusEvent('blur'));
    await fixture.whenStable();
    expect(element('[aria-invalid=true]').textContent).toContain('5 psig');
    grid.focus();
    await press('Escape');
    expect(active()).toBe('397');
  });

  it('accepts with Tab and goes right', async () => {
    await goToLoad();
    await press('F2');
    const box = await type('100');
    await press('Tab', {}, box);
    expect(fixture.componentInstance.edits).toHaveLength(1);
    expect(active()).toBe('3');
  });

  it('ticks rows with Space, extends with Shift, and forgets rows that the filter hides', async () => {
    await press(' ');
    await press('ArrowDown', { shiftKey: true });
    const { selected, filter } = fixture.componentInstance;
    expect(selected()).toEqual(['T1', 'T2']);
    filter.set('hall');
    await fixture.whenStable();
    expect(selected()).toEqual(['T1']);
  });

  it('empties an optional cell with Delete and says when it cannot', async () => {
    await goToLoad();
    await press('Delete');
    expect(fixture.componentInstance.told()).toBe('Load cannot be empty.');
    await press('Home');
    for (let step = 0; step < 3; step += 1) await press('ArrowRight');
    await press('Delete');
    expect(fixture.componentInstance.edits).toMatchObject([{ ops: [{ key: 'area', from: 'Hall' }] }]);
  });

  it('chooses a word from a list, and keeps the old one on Escape', async () => {
    await press('Home');
    for (let step = 0; step < 4; step += 1) await press('ArrowRight');
    await press('Enter');
    const select = element('mat-select');
    await keysTo(select, TestKey.DOWN_ARROW, TestKey.ESCAPE);
    expect(document.querySelector('mat-option')).toBeNull();
    expect(fixture.componentInstance.edits).toEqual([]);
    await press('Enter');
    const again = element('mat-select');
    await keysTo(again, TestKey.DOWN_ARROW, TestKey.ENTER);
    expect(fixture.componentInstance.edits).toMatchObject([{ ops: [{ key: 'trapType', to: 'invertedBucket' }] }]);
    expect(element('[role=grid]').querySelector('mat-select')).toBeNull();
  });

  it('opens the drawing at the row', async () => {
    await press('ArrowRight');
    await press('Enter');
    expect(fixture.componentInstance.drawing()).toBe('T1');
  });

  it('hands cells on that are pasted on it, unless a cell is being edited or nothing may be changed', async () => {
    const { pasted, mayEdit } = fixture.componentInstance;
    // jsdom has no clipboard event of its own
    const paste = (text: string): void => {
      const event = Object.assign(new Event('paste', { bubbles: true, cancelable: true }), {
        clipboardData: { getData: () => text },
      });
      grid.dispatchEvent(event);
    };
    await goToLoad();
    paste('1\t2');
    expect(pasted()).toBe('1\t2');
    await press('F2');
    paste('3');
    mayEdit.set(false);
    await fixture.whenStable();
    paste('4');
    expect(pasted()).toBe('1\t2');
  });

  it('changes nothing for who may only look', async () => {
    fixture.componentInstance.mayEdit.set(false);
    await fixture.whenStable();
    await press('3');
    await press('Enter');
    await press(' ');
    expect(grid.getAttribute('aria-readonly')).toBe('true');
    expect(grid.querySelector('input')).toBeNull();
    expect(fixture.componentInstance.selected()).toEqual([]);
  });
});
