import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { encode } from 'uqr';

/** Four modules of quiet around the code (ISO/IEC 18004). */
const BORDER = 4;

/** A text as a QR code, drawn dark on white in both themes: not every telephone reads it the other way round. */
@Component({
  selector: 'app-qr-picture',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <svg [attr.viewBox]="box()" role="img" [attr.aria-label]="label()">
      <path class="paper" [attr.d]="paper()" />
      <path class="dark" [attr.d]="dark()" />
    </svg>
  `,
  styles: `
    :host {
      display: block;
      width: 232px;
      height: 232px;
    }
    svg {
      width: 100%;
      height: 100%;
      shape-rendering: crispEdges;
    }
    .paper {
      fill: white;
    }
    .dark {
      fill: black;
    }
  `,
})
export class QrPicture {
  readonly text = input.required<string>();
  readonly label = input.required<string>();

  private readonly code = computed(() => encode(this.text(), { ecc: 'L', border: BORDER }));
  protected readonly box = computed(() => `0 0 ${String(this.code().size)} ${String(this.code().size)}`);
  protected readonly paper = computed(() => `M0 0h${String(this.code().size)}v${String(this.code().size)}H0z`);
  protected readonly dark = computed(() =>
    this.code()
      .data.flatMap((row, y) => row.map((isDark, x) => (isDark ? `M${String(x)} ${String(y)}h1v1h-1z` : '')))
      .join(''),
  );
}
