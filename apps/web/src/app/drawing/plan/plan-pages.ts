import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  effect,
  type ElementRef,
  inject,
  input,
  output,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { PdfPages } from './pdf-pages';
import { imageOfCanvas, PAGE_SIDE_PX, PlanFileError, type PreparedImage } from './plan-file';

const PREVIEW_SIDE_PX = 664;

/** The pages of a chosen PDF: one is looked at and then drawn as the image that lies under the drawing. */
@Component({
  selector: 'app-plan-pages',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <p class="name">{{ name() }}</p>
    <canvas #preview width="1" height="1" role="img" [attr.aria-label]="'Page ' + page() + ' of ' + name()"></canvas>
    <div class="pages">
      <button matButton type="button" [disabled]="page() <= 1 || working()" (click)="turn(page() - 1)">Previous</button>
      <label>
        Page
        <input
          #box
          type="number"
          min="1"
          [max]="count()"
          [value]="page()"
          [disabled]="working()"
          (change)="turn(box.valueAsNumber); box.value = '' + page()"
        />
      </label>
      <span>of {{ count() }}</span>
      <button matButton type="button" [disabled]="page() >= count() || working()" (click)="turn(page() + 1)">
        Next
      </button>
    </div>
    <div class="pages">
      <button matButton="filled" type="button" [disabled]="working()" (click)="take()">Put this page there</button>
      <button matButton type="button" (click)="left.emit()">Leave it</button>
    </div>
    <p role="status" class="state">{{ working() ? words() : '' }}</p>
  `,
  styleUrl: './plan-pages.scss',
})
export class PlanPages {
  readonly bytes = input.required<Uint8Array<ArrayBuffer>>();
  readonly name = input.required<string>();
  readonly chosen = output<{ readonly image: PreparedImage; readonly page: number }>();
  readonly failed = output<unknown>();
  readonly left = output();

  private readonly preview = viewChild.required<ElementRef<HTMLCanvasElement>>('preview');
  private pdf: PdfPages | null = null;

  protected readonly page = signal(1);
  protected readonly count = signal(1);
  protected readonly working = signal(true);
  protected readonly words = signal('Opening the PDF');

  constructor() {
    let gone = false;
    effect(() => {
      const bytes = this.bytes();
      void untracked(async () => {
        await this.attempt(async () => {
          const pdf = await PdfPages.open(bytes);
          if (gone) {
            pdf.close();
            return;
          }
          this.pdf = pdf;
          this.count.set(pdf.count);
          await pdf.draw(1, PREVIEW_SIDE_PX, this.preview().nativeElement);
        });
      });
    });
    inject(DestroyRef).onDestroy(() => {
      gone = true;
      this.pdf?.close();
    });
  }

  protected turn(page: number): void {
    const { pdf } = this;
    if (pdf === null || !Number.isInteger(page) || page < 1 || page > pdf.count || this.working()) return;
    this.page.set(page);
    this.words.set(`Drawing page ${String(page)}`);
    void this.attempt(() => pdf.draw(page, PREVIEW_SIDE_PX, this.preview().nativeElement));
  }

  protected take(): void {
    const { pdf } = this;
    if (pdf === null) return;
    this.words.set('Drawing the page');
    void this.attempt(async () => {
      const canvas = document.createElement('canvas');
      await pdf.draw(this.page(), PAGE_SIDE_PX, canvas);
      this.chosen.emit({ image: await imageOfCanvas(canvas), page: this.page() });
    });
  }

  private async attempt(work: () => Promise<void>): Promise<void> {
    this.working.set(true);
    try {
      await work();
    } catch (error) {
      this.failed.emit(error instanceof PlanFileError ? error : new PlanFileError(whyNot(error)));
    } finally {
      this.working.set(false);
    }
  }
}

/** The reader tells its refusals apart by their names. */
function whyNot(error: unknown): string {
  const name = error instanceof Error ? error.name : '';
  if (name === 'PasswordException')
    return 'It is locked with a password. Save it without one, or print the page to a new PDF.';
  if (name === 'InvalidPDFException')
    return 'It is damaged and cannot be read as a PDF. Export it again, or choose another.';
  return 'This page cannot be drawn here. Export it as a PNG, or choose another.';
}
