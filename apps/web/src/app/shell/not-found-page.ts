import { ChangeDetectionStrategy, Component } from '@angular/core';
import { RouterLink } from '@angular/router';
import { RisebackMark } from './riseback-mark';

@Component({
  selector: 'app-not-found-page',
  imports: [RouterLink, RisebackMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <main>
      <app-riseback-mark />
      <h1>There is nothing at this address</h1>
      <p>It may have been mistyped, or you may have no role where it leads.</p>
      <p><a routerLink="/sites">To your sites</a></p>
    </main>
  `,
  styles: `
    main {
      display: grid;
      gap: 12px;
      max-width: 480px;
      padding: 48px 24px;
    }
  `,
})
export class NotFoundPage {}
