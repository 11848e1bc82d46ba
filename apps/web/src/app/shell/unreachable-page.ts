import { ChangeDetectionStrategy, Component, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router } from '@angular/router';
import { LiftPicture } from '../sign-in/lift-picture';
import { RisebackMark } from './riseback-mark';

/** Stands at the address that was asked for while the server cannot say who is asking. */
@Component({
  selector: 'app-unreachable-page',
  imports: [LiftPicture, MatButton, RisebackMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <main>
      <app-riseback-mark />
      <h1>The server cannot be reached</h1>
      <p>Nothing is lost: edits that were not saved are kept on this device. Check the network, then try again.</p>
      <p><button matButton="filled" type="button" (click)="tryAgain()">Try again</button></p>
    </main>
    <app-lift-picture />
  `,
  styleUrl: './entry-page.scss',
})
export class UnreachablePage {
  private readonly router = inject(Router);

  /** The address that was asked for. */
  readonly return = input('/sites');

  protected tryAgain(): void {
    void this.router.navigateByUrl(this.return(), { onSameUrlNavigation: 'reload' });
  }
}
