import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import {
  MAT_DIALOG_DATA,
  MatDialogActions,
  MatDialogClose,
  MatDialogContent,
  MatDialogTitle,
} from '@angular/material/dialog';

export interface AtmosphereQuestion {
  /** With their unit, absolute. */
  readonly from: string;
  readonly to: string;
  /** How many pressures of the network were given by gauge. */
  readonly count: number;
}

export type KeptPressures = 'gauge' | 'absolute';

/** Asks which values of pressure stay when the atmosphere of the site is changed; closes with nothing to leave all as it is. */
@Component({
  selector: 'app-atmosphere-dialog',
  imports: [MatButton, MatDialogActions, MatDialogClose, MatDialogContent, MatDialogTitle],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h2 mat-dialog-title>Which pressures stay?</h2>
    <mat-dialog-content>
      <p>
        The atmosphere goes from {{ data.from }} to {{ data.to }}. {{ data.count }} pressures of traps, vessels, models
        and cases stand in this network.
      </p>
      <p>
        <strong>Gauge values stay</strong> if they were read off dials or drawings: 75 psig remains 75 psig.
        <strong>Absolute values stay</strong> if only the atmosphere was given wrongly: gauge values then change by the
        difference.
      </p>
    </mat-dialog-content>
    <mat-dialog-actions align="end">
      <button matButton type="button" [mat-dialog-close]="undefined">Leave it</button>
      <button matButton="outlined" type="button" [mat-dialog-close]="'absolute'">Absolute values stay</button>
      <button matButton="filled" type="button" [mat-dialog-close]="'gauge'">Gauge values stay</button>
    </mat-dialog-actions>
  `,
  styles: `
    mat-dialog-content {
      display: grid;
      gap: 8px;
    }
    mat-dialog-actions {
      flex-wrap: wrap;
      gap: 4px;
    }
  `,
})
export class AtmosphereDialog {
  protected readonly data = inject<AtmosphereQuestion>(MAT_DIALOG_DATA);
}
