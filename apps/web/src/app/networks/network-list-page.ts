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
import { emptyDocument, readNetworkFile, toFile } from '@riseback/network';
import { firstValueFrom, forkJoin, switchMap } from 'rxjs';
import { SessionStore } from '../session/session-store';
import { type Load, LOADING, loads } from '../shared/load';
import { outcomeOf } from '../shared/outcome';
import { toProblem } from '../shared/problem';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { StatusMark } from '../shared/status-mark/status-mark';
import { AppBar } from '../shell/app-bar';
import { SiteApi } from '../sites/site-api';
import { NetworkApi } from './network-api';
import { type PlacedMistake, placedMistakes } from './network-file-mistakes';
import { NetworkFiles } from './network-files';

/** With its blanks, which are not sent; the server's own limit, without them, is a quarter of it. */
const LARGEST_FILE_BYTES = 8 * 1024 * 1024;

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
  styleUrls: ['../shell/list-page.scss', './network-list-page.scss'],
})
export class NetworkListPage {
  private readonly networkApi = inject(NetworkApi);
  private readonly networkFiles = inject(NetworkFiles);
  private readonly siteApi = inject(SiteApi);
  private readonly router = inject(Router);

  readonly siteId = input.required<string>();

  private readonly nameBox = viewChild<ElementRef<HTMLInputElement>>('nameBox');

  protected readonly timeZone = inject(SessionStore).timeZone;
  protected readonly naming = signal(false);
  protected readonly busy = signal(false);
  protected readonly refusal = signal<Problem | null>(null);
  /** Of the file that was refused. */
  protected readonly mistakes = signal<readonly PlacedMistake[]>([]);
  protected readonly told = signal('');
  private readonly asked = signal(0);
  protected readonly load = toSignal<Load<SiteNetworks>, Load<SiteNetworks>>(
    toObservable(computed(() => ({ siteId: this.siteId(), asked: this.asked() }))).pipe(
      switchMap(({ siteId }) =>
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

  protected readonly administers = computed(() => this.site()?.permissions.includes('people') ?? false);

  protected ask(): void {
    this.asked.update((count) => count + 1);
  }

  protected startNaming(): void {
    this.naming.set(true);
    setTimeout(() => this.nameBox()?.nativeElement.focus());
  }

  protected async createEmpty(name: string): Promise<void> {
    if (name.trim() === '') return;
    this.refusal.set(null);
    const settings = await outcomeOf(this.siteApi.settings(this.siteId()));
    if ('problem' in settings) {
      this.refusal.set(settings.problem);
      return;
    }
    const { atmosphericPressurePa, ambientTemperatureK, limits } = settings.value;
    const empty = emptyDocument(name.trim(), { atmosphericPressurePa, ambientTemperatureK });
    await this.create(toFile({ ...empty, limits }));
  }

  protected async createFromFile(box: HTMLInputElement): Promise<void> {
    const file = box.files?.[0];
    if (file === undefined) return;
    box.value = '';
    this.refusal.set(null);
    this.mistakes.set([]);
    if (file.size > LARGEST_FILE_BYTES) {
      this.refuse(
        file.name,
        `It has ${(file.size / 1e6).toFixed(1)} MB; ${String(Math.floor(LARGEST_FILE_BYTES / 1e6))} MB are the most.`,
      );
      return;
    }
    let json: unknown;
    try {
      json = JSON.parse(await file.text());
    } catch (error) {
      if (!(error instanceof SyntaxError)) throw error;
      this.refuse(file.name, `It is not JSON: ${error.message}. Choose a file that “Save as a file” gave.`);
      return;
    }
    const read = readNetworkFile(json);
    if (read.ok) await this.create(json);
    else {
      this.refuse(file.name, 'Mend these places in the file and choose it once more; nothing was made of it.');
      this.mistakes.set(placedMistakes(read.errors, json));
    }
  }

  protected async saveAsFile(network: NetworkSummary): Promise<void> {
    try {
      this.told.set(`Saved as ${await this.networkFiles.save(network)}`);
    } catch (error) {
      this.refusal.set(toProblem(error));
    }
  }

  private refuse(fileName: string, detail: string): void {
    this.refusal.set({ type: 'about:blank', title: `${fileName} cannot be taken in`, status: 400, detail });
  }

  private async create(file: unknown): Promise<void> {
    this.busy.set(true);
    this.refusal.set(null);
    this.mistakes.set([]);
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
