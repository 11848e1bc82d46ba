import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import { RouterLink } from '@angular/router';
import type { Site } from '@riseback/contracts';
import { switchMap } from 'rxjs';
import { GuideOffer } from '../guide/guide-offer';
import { type Load, LOADING, loads } from '../shared/load';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { AppBar } from '../shell/app-bar';
import { SiteApi } from './site-api';

@Component({
  selector: 'app-site-list-page',
  imports: [AppBar, GuideOffer, ProblemBanner, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './site-list-page.html',
  styleUrl: '../shell/list-page.scss',
})
export class SiteListPage {
  private readonly api = inject(SiteApi);

  private readonly asked = signal(0);
  protected readonly load = toSignal<Load<Site[]>, Load<Site[]>>(
    toObservable(this.asked).pipe(switchMap(() => loads(this.api.list()))),
    { initialValue: LOADING },
  );
  protected readonly hasNetworks = computed(() => {
    const load = this.load();
    return load.status === 'ready' && load.value.some(({ networkCount }) => networkCount > 0);
  });

  protected ask(): void {
    this.asked.update((count) => count + 1);
  }
}
