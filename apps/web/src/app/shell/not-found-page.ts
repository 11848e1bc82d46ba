import { ChangeDetectionStrategy, Component } from '@angular/core';
import { RouterLink } from '@angular/router';
import { LiftPicture } from '../sign-in/lift-picture';
import { RisebackMark } from './riseback-mark';

@Component({
  selector: 'app-not-found-page',
  imports: [LiftPicture, RouterLink, RisebackMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <main>
      <app-riseback-mark />
      <h1>There is nothing at this address</h1>
      <p>It may have been mistyped, or you may have no role where it leads.</p>
      <p><a routerLink="/sites">To your sites</a></p>
    </main>
    <app-lift-picture />
  `,
  styleUrl: './entry-page.scss',
})
export class NotFoundPage {}
