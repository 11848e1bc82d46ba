import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  ElementRef,
  inject,
  Injector,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { PLAN_LIMITS } from '@riseback/contracts';
import { NetworkStore } from '../../networks/network-store';
import { TextField } from '../../shared/fields/text-field';
import { GRID } from '@riseback/figures';
import { ProblemBanner } from '../../shared/problem-banner/problem-banner';
import { QuantityField } from '../../shared/quantity-field/quantity-field';
import { bytesOf, isPdf, PlanFileError, prepareImage, type PreparedImage } from './plan-file';
import { firstPlace, resized, samePlace, scaleOf } from './plan-geometry';
import { PlanPages } from './plan-pages';
import { PlanStore } from './plan-store';
import { PlanTool } from './plan-tool';

type Placed = 'x' | 'y' | 'width';
const FARTHEST_UNITS = 1e6;

/** What lies under the drawing: choosing its file, placing it, its scale, how strongly it shows. */
@Component({
  selector: 'app-plan-panel',
  imports: [MatButton, PlanPages, ProblemBanner, QuantityField, TextField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './plan-panel.html',
  styleUrl: './plan-panel.scss',
})
export class PlanPanel {
  protected readonly store = inject(PlanStore);
  protected readonly tool = inject(PlanTool);
  protected readonly network = inject(NetworkStore);
  private readonly injector = inject(Injector);
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);

  private readonly distanceField = viewChild<QuantityField>('distanceField');

  protected readonly mayPlace = this.network.mayDraw;
  protected readonly told = signal('');
  protected readonly fileRefusal = signal('');
  protected readonly reading = signal(false);
  protected readonly pdf = signal<{ readonly bytes: Uint8Array<ArrayBuffer>; readonly name: string } | null>(null);
  protected readonly removing = signal(false);
  protected readonly refusal = signal<{ readonly at: Placed | 'scale'; readonly reason: string } | null>(null);

  protected readonly fields = computed(() => {
    const plan = this.store.plan();
    if (plan === null) return [];
    return [
      { at: 'x' as const, label: 'Left edge', value: shortNumber(plan.x) },
      { at: 'y' as const, label: 'Top edge', value: shortNumber(plan.y) },
      { at: 'width' as const, label: 'Width', value: shortNumber(plan.widthPx * plan.unitsPerPixel) },
    ];
  });
  protected readonly metresPerStep = computed(() => {
    const metresPerUnit = this.store.plan()?.metresPerUnit;
    return metresPerUnit === undefined ? undefined : metresPerUnit * GRID;
  });
  /** By the scale that there is already. */
  protected readonly measuredM = computed(() => {
    const measured = this.tool.measured();
    const metresPerUnit = this.store.plan()?.metresPerUnit;
    return measured === null || metresPerUnit === undefined ? undefined : measured.units * metresPerUnit;
  });
  protected readonly opacityPercent = computed(() => Math.round((this.store.plan()?.opacity ?? 0) * 100));
  protected readonly uploadedPercent = computed(() => {
    const share = this.store.uploading();
    return share === null ? null : Math.round(share * 100);
  });

  constructor() {
    effect(() => {
      if (this.tool.measured() !== null)
        afterNextRender(() => this.distanceField()?.focus(), { injector: this.injector });
    });
    effect(() => {
      if (this.store.panelAsked() === 0) return;
      // asked for once: a panel that is made later shall not take the keyboard
      untracked(() => this.store.panelAsked.set(0));
      afterNextRender(() => this.focusHead(), { injector: this.injector });
    });
  }

  protected async choose(box: HTMLInputElement): Promise<void> {
    const file = box.files?.[0];
    box.value = '';
    if (file === undefined) return;
    this.pdf.set(null);
    this.fileRefusal.set('');
    this.reading.set(true);
    try {
      const bytes = await bytesOf(file);
      if (isPdf(bytes)) this.pdf.set({ bytes, name: file.name });
      else await this.put(await prepareImage(bytes), file.name);
    } catch (error) {
      this.refuseFile(file.name, error);
    } finally {
      this.reading.set(false);
    }
  }

  protected async putPage({ image, page }: { image: PreparedImage; page: number }): Promise<void> {
    const name = this.pdf()?.name ?? 'Plan';
    this.pdf.set(null);
    await this.put({ ...image, note: '' }, `${name}, page ${String(page)}`);
  }

  protected refuseFile(name: string, error: unknown): void {
    this.pdf.set(null);
    const reason = error instanceof PlanFileError ? error.message : 'It cannot be read here. Choose another.';
    this.fileRefusal.set(`${name}: ${reason}`);
  }

  protected leavePdf(): void {
    this.pdf.set(null);
    this.focusHead();
  }

  protected setPlace(at: Placed, text: string | undefined): void {
    const plan = this.store.plan();
    const value = Number((text ?? '').replace(/[−–]/, '-').replace(',', '.'));
    if (plan === null) return;
    if (
      text === undefined ||
      !Number.isFinite(value) ||
      Math.abs(value) > FARTHEST_UNITS ||
      (at === 'width' && value < 1)
    ) {
      this.refusal.set({
        at,
        reason: at === 'width' ? 'A number of units, at least 1.' : 'A number of units, such as −120.',
      });
      return;
    }
    this.refusal.set(null);
    if (at === 'width') this.store.place(resized(plan, value));
    else this.store.place({ [at]: value });
  }

  protected setOpacity(percent: string): void {
    this.store.place({ opacity: Number(percent) / 100 });
  }

  protected setDistance(metres: number | undefined): void {
    const measured = this.tool.measured();
    if (measured === null || metres === undefined) return;
    const scale = scaleOf(measured.from, measured.to, metres);
    if (scale === undefined) {
      this.refusal.set({ at: 'scale', reason: 'A distance above zero, between two different points.' });
      return;
    }
    this.refusal.set(null);
    this.store.place({ metresPerUnit: scale });
    this.told.set('The scale is set. No element has moved.');
    this.tool.done();
    this.focusHead();
  }

  protected setStep(metres: number | undefined): void {
    if (metres !== undefined && metres <= 0) {
      this.refusal.set({ at: 'scale', reason: 'A distance above zero.' });
      return;
    }
    this.refusal.set(null);
    this.store.place({ metresPerUnit: metres === undefined ? undefined : metres / GRID });
  }

  protected async remove(): Promise<void> {
    this.removing.set(false);
    if (await this.store.remove()) this.told.set('The plan is gone.');
    this.focusHead();
  }

  protected refusalAt(at: Placed | 'scale'): string {
    const refusal = this.refusal();
    return refusal?.at === at ? refusal.reason : '';
  }

  private async put(image: PreparedImage, fileName: string): Promise<void> {
    const before = this.store.plan();
    const nodes = [...(this.network.document()?.nodes.values() ?? [])];
    const drawn = nodes.flatMap(({ value }) => value.position ?? []);
    const place = before === null ? firstPlace(image, drawn) : samePlace(image, before);
    const lies = await this.store.upload({ content: image.content, name: plainName(fileName), ...place });
    this.told.set(lies ? `The plan lies under the drawing. ${image.note}` : '');
  }

  private focusHead(): void {
    const head = this.host.nativeElement.querySelector<HTMLElement>('h3');
    head?.scrollIntoView({ block: 'nearest' });
    head?.focus();
  }
}

/** What the server takes for a name: nothing that leads anywhere, nothing that cannot be seen. */
function plainName(fileName: string): string {
  const plain = fileName
    .replaceAll(/[\\/\p{C}]+/gu, ' ')
    .trim()
    .slice(0, PLAN_LIMITS.nameLength)
    .trim();
  return plain === '' ? 'Plan' : plain;
}

function shortNumber(value: number): string {
  return String(Math.round(value * 10) / 10).replace('-', '−');
}
