import { ChangeDetectionStrategy, Component, inject, viewChild } from '@angular/core';
import { MatMenu, MatMenuItem } from '@angular/material/menu';
import { MatDivider } from '@angular/material/divider';
import { NodeArranging } from '../node-arranging';

const ALIGN_WORDS = [
  ['left', 'Left'],
  ['centre', 'Centre'],
  ['right', 'Right'],
  ['top', 'Top'],
  ['middle', 'Middle'],
  ['bottom', 'Bottom'],
] as const;

/** Aligning and distributing, as a menu that the tray and the sheet's own menu open. */
@Component({
  selector: 'app-arrange-menu',
  imports: [MatDivider, MatMenu, MatMenuItem],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <mat-menu #menu="matMenu">
      @for (choice of choices; track choice[0]) {
        <button mat-menu-item type="button" [disabled]="!arranging.canAlign()" (click)="arranging.align(choice[0])">
          Align {{ choice[1].toLowerCase() }}
        </button>
      }
      <mat-divider />
      <button
        mat-menu-item
        type="button"
        [disabled]="!arranging.canDistribute()"
        (click)="arranging.distribute('horizontally')"
      >
        Distribute horizontally
      </button>
      <button
        mat-menu-item
        type="button"
        [disabled]="!arranging.canDistribute()"
        (click)="arranging.distribute('vertically')"
      >
        Distribute vertically
      </button>
    </mat-menu>
  `,
  styles: `
    button[mat-menu-item] {
      min-height: 30px;
    }
    @media (pointer: coarse) {
      button[mat-menu-item] {
        min-height: 44px;
      }
    }
  `,
})
export class ArrangeMenu {
  protected readonly arranging = inject(NodeArranging);
  protected readonly choices = ALIGN_WORDS;

  /** For a trigger elsewhere. */
  readonly menu = viewChild.required(MatMenu);
}
