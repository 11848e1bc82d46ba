import { HttpErrorResponse } from '@angular/common/http';
import { computed, DestroyRef, effect, inject, Injectable, signal, untracked } from '@angular/core';
import { type NetworkPlan, type Plan, type PlanPlacement, type Problem, StalePlan } from '@riseback/contracts';
import { firstValueFrom, lastValueFrom, tap } from 'rxjs';
import { Company } from '../../networks/company';
import { toProblem } from '../../shared/problem';
import { PlanApi, type PlanImage } from './plan-api';

/** A row of changes in quick order, such as a slider that is drawn, is saved as one. */
const SAVE_AFTER_MS = 400;
const HIDDEN_KEY = 'riseback.plan-hidden';

/**
 * The plan under the drawing: as the server has it, and ahead of that while it is being placed. In the network page's `providers`, so that
 * its image outlives a change of view. It is none of the network's edits: undo does not touch it.
 */
@Injectable()
export class PlanStore {
  private readonly api = inject(PlanApi);

  private readonly networkId = signal('');
  private readonly stored = signal<NetworkPlan>({ version: 0 });
  private readonly ahead = signal<PlanPlacement | null>(null);
  private readonly image = signal<{ readonly fileId: string; readonly url: string } | null>(null);
  private readonly hiddenIds = signal<readonly string[]>(readHidden());
  private saving: ReturnType<typeof setTimeout> | undefined;
  private busy: Promise<unknown> = Promise.resolve();

  /** The panel is asked for from elsewhere; counted up. */
  readonly panelAsked = signal(0);
  readonly problem = signal<Problem | null>(null);
  /** Share of an upload that is under way. */
  readonly uploading = signal<number | null>(null);

  readonly plan = computed((): Plan | null => {
    const { plan } = this.stored();
    return plan === undefined ? null : { ...plan, ...withoutScale(plan, this.ahead()) };
  });
  /** For this person, in this browser. */
  readonly hidden = computed(() => this.hiddenIds().includes(this.networkId()));
  /** What lies under the drawing now. */
  readonly shown = computed(() => {
    const plan = this.plan();
    const image = this.image();
    if (plan === null || this.hidden() || image?.fileId !== plan.fileId) return null;
    const { x, y, unitsPerPixel, widthPx, heightPx, opacity } = plan;
    return { url: image.url, x, y, width: widthPx * unitsPerPixel, height: heightPx * unitsPerPixel, opacity };
  });

  constructor() {
    const company = inject(Company);
    effect(() => {
      if (company.planTold() > 0) untracked(() => this.refresh());
    });
    effect(() => {
      const fileId = this.stored().plan?.fileId;
      untracked(() => this.loadImage(fileId));
    });
    inject(DestroyRef).onDestroy(() => {
      this.flush();
      this.dropImage();
    });
  }

  /** Called by the drawing; the other views have no use for a plan. */
  open(networkId: string): void {
    if (networkId === this.networkId() || networkId === '') return;
    this.flush();
    this.networkId.set(networkId);
    this.stored.set({ version: 0 });
    this.problem.set(null);
    this.refresh();
  }

  setHidden(hidden: boolean): void {
    this.hiddenIds.update((ids) => [
      ...ids.filter((id) => id !== this.networkId()),
      ...(hidden ? [this.networkId()] : []),
    ]);
    localStorage.setItem(HIDDEN_KEY, JSON.stringify(this.hiddenIds()));
  }

  /** Shows another placement at once and saves it a little later; an undefined scale takes it out. */
  place(change: Partial<PlanPlacement> | { readonly metresPerUnit: undefined }): void {
    this.preview(change);
    clearTimeout(this.saving);
    this.saving = setTimeout(() => this.flush(), SAVE_AFTER_MS);
  }

  /** Shows another placement that is not to be saved yet. */
  preview(change: Partial<PlanPlacement> | { readonly metresPerUnit: undefined }): void {
    const plan = this.plan();
    if (plan === null) return;
    const { x, y, unitsPerPixel, metresPerUnit, opacity } = { ...plan, ...change };
    this.ahead.set({ x, y, unitsPerPixel, opacity, ...(metresPerUnit === undefined ? {} : { metresPerUnit }) });
  }

  /** @returns whether it lies there now; if not, `problem` says why */
  upload(image: PlanImage): Promise<boolean> {
    this.uploading.set(0);
    return this.inTurn(async (networkId, version) => {
      const steps = this.api.upload(networkId, version, image).pipe(
        tap((step) => {
          if (step.kind === 'underWay') this.uploading.set(step.share);
        }),
      );
      const last = await lastValueFrom(steps);
      if (last.kind === 'done') this.stored.set(last.state);
      this.setHidden(false);
    }).finally(() => this.uploading.set(null));
  }

  remove(): Promise<boolean> {
    return this.inTurn(async (networkId, version) => {
      this.stored.set(await firstValueFrom(this.api.remove(networkId, version)));
    });
  }

  /** Sends what is shown but not saved. */
  private flush(): void {
    clearTimeout(this.saving);
    this.saving = undefined;
    const placement = this.ahead();
    if (placement === null) return;
    void this.inTurn(async (networkId, version) => {
      const saved = await firstValueFrom(this.api.place(networkId, version, placement));
      this.stored.set(saved);
      // what was moved on meanwhile stays ahead
      if (this.ahead() === placement) this.ahead.set(null);
    });
  }

  /** One change after another, each on the version that the one before led to. */
  private inTurn(change: (networkId: string, version: number) => Promise<void>): Promise<boolean> {
    const networkId = this.networkId();
    const turn = this.busy.then(async () => {
      if (networkId !== this.networkId()) return false;
      try {
        await change(networkId, this.stored().version);
        this.problem.set(null);
        return true;
      } catch (error) {
        this.refused(error);
        return false;
      }
    });
    this.busy = turn;
    return turn;
  }

  /** What someone else did meanwhile is what counts; this person sees it and may go on from there. */
  private refused(error: unknown): void {
    this.problem.set(toProblem(error));
    this.ahead.set(null);
    const stale = error instanceof HttpErrorResponse ? StalePlan.safeParse(error.error) : undefined;
    if (stale?.success === true) this.stored.set(stale.data.current);
  }

  private refresh(): void {
    const networkId = this.networkId();
    if (networkId === '') return;
    this.api.get(networkId).subscribe({
      next: (state) => {
        if (networkId === this.networkId() && state.version > this.stored().version) this.stored.set(state);
      },
      error: (error: unknown) => this.problem.set(toProblem(error)),
    });
  }

  private loadImage(fileId: string | undefined): void {
    if (fileId === this.image()?.fileId) return;
    this.dropImage();
    if (fileId === undefined) return;
    this.api.image(this.networkId(), fileId).subscribe({
      next: (content) => {
        if (this.stored().plan?.fileId !== fileId) return;
        this.image.set({ fileId, url: URL.createObjectURL(content) });
      },
      error: (error: unknown) => this.problem.set(toProblem(error)),
    });
  }

  private dropImage(): void {
    const image = this.image();
    if (image !== null) URL.revokeObjectURL(image.url);
    this.image.set(null);
  }
}

/** The placement ahead as a whole: a scale that it lacks is lacking. */
function withoutScale(plan: Plan, ahead: PlanPlacement | null): Partial<Plan> {
  return ahead === null ? {} : { metresPerUnit: undefined, ...ahead };
}

function readHidden(): readonly string[] {
  try {
    const kept: unknown = JSON.parse(localStorage.getItem(HIDDEN_KEY) ?? '[]');
    return Array.isArray(kept) ? kept.filter((id): id is string => typeof id === 'string') : [];
  } catch {
    return [];
  }
}
