import { DatePipe } from '@angular/common';
import {
  ChangeDetectionStrategy,
  Component,
  computed,
  type ElementRef,
  inject,
  input,
  signal,
  viewChild,
} from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import type { NetworkSummary, Problem, Site } from '@riseback/contracts';
import { emptyDocument, toFile } from '@riseback/network';
import { firstValueFrom, forkJoin, switchMap } from 'rxjs';
import { SessionStore } from '../session/session-store';
import { type Load, LOADING, loads } from '../shared/load';
import { toProblem } from '../shared/problem';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { StatusMark } from '../shared/status-mark/status-mark';
import { AppBar } from '../shell/app-bar';
import { SiteApi } from '../sites/site-api';
import { NetworkApi } from './network-api';

interface SiteNetworks {
  readonly site: Site;
  readonly networks: readonly NetworkSummary[];
}

/** The networks of one site; designers begin a new one here, on an empty sheet or from a network file. */
@Component({
  selector: 'app-network-list-page',
  imports: [AppBar, DatePipe, MatButton, ProblemBanner, RouterLink, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './network-list-page.html',
  styleUrl: '../shell/list-page.scss',
})
export class NetworkListPage {
  private readonly networkApi = inject(NetworkApi);
  private readonly siteApi = inject(SiteApi);
  private readonly router = inject(Router);

  readonly siteId = input.required<string>();

  private readonly nameBox = viewChild<ElementRef<HTMLInputElement>>('nameBox');

  protected readonly timeZone = inject(SessionStore).timeZone;
  protected readonly naming = signal(false);
  protected readonly busy = signal(false);
  protected readonly refusal = signal<Problem | null>(null);
  protected readonly load = toSignal<Load<SiteNetworks>, Load<SiteNetworks>>(
    toObservable(this.siteId).pipe(
      switchMap((siteId) =>
        loads(forkJoin({ site: this.siteApi.get(siteId), networks: this.networkApi.list(siteId) })),
      ),
    ),
    { initialValue: LOADING },
  );
  protected readonly site = computed(() => {
    const load = this.load();
    return load.status === 'ready' ? load.value.site : null;
  });
  protected readonly mayDraw = computed(() => this.site()?.permissions.includes('draw') ?? false);

  protected readonly mayReadLog = computed(() => this.site()?.permissions.includes('people') ?? false);

  protected startNaming(): void {
    this.naming.set(true);
    setTimeout(() => this.nameBox()?.nativeElement.focus());
  }

  protected async createEmpty(name: string): Promise<void> {
    const site = this.site();
    if (site === null || name.trim() === '') return;
    const { atmosphericPressurePa, ambientTemperatureK } = site;
    await this.create(toFile(emptyDocument(name.trim(), { atmosphericPressurePa, ambientTemperatureK })));
  }

  protected async createFromFile(box: HTMLInputElement): Promise<void> {
    const file = box.files?.[0];
    if (file === undefined) return;
    box.value = '';
    try {
      await this.create(JSON.parse(await file.text()));
    } catch (error) {
      if (!(error instanceof SyntaxError)) throw error;
      this.refusal.set({
        type: 'about:blank',
        title: `${file.name} is not a network file`,
        status: 400,
        detail: `It is not JSON: ${error.message}. Choose a file that a network’s “Network file” gave.`,
      });
    }
  }

  private async create(file: unknown): Promise<void> {
    this.busy.set(true);
    this.refusal.set(null);
    try {
      const { id } = await firstValueFrom(this.networkApi.create(this.siteId(), file));
      await this.router.navigate(['/sites', this.siteId(), 'networks', id, 'drawing']);
    } catch (error) {
      this.refusal.set(toProblem(error));
    } finally {
      this.busy.set(false);
    }
  }
}
