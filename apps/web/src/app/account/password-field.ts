import { ChangeDetectionStrategy, Component, type ElementRef, input, signal, viewChild } from '@angular/core';
import { type FormControl, ReactiveFormsModule } from '@angular/forms';

let fieldCount = 0;

/** A password, hidden until its owner asks to see it. The note below keeps its place, so that nothing jumps. */
@Component({
  selector: 'app-password-field',
  imports: [ReactiveFormsModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[class.advised]': "hint() !== ''" },
  template: `
    <label [attr.for]="id">{{ label() }}</label>
    <span class="box">
      <input
        #box
        [id]="id"
        [type]="shown() ? 'text' : 'password'"
        [autocomplete]="autocomplete()"
        [formControl]="control()"
        [attr.aria-invalid]="refusal() !== ''"
        [attr.aria-describedby]="id + '-note'"
        spellcheck="false"
        autocapitalize="none"
      />
      <button type="button" [attr.aria-pressed]="shown()" (click)="shown.set(!shown())">
        {{ shown() ? 'Hide' : 'Show' }}<span class="rb-visually-hidden"> what is typed: {{ label() }}</span>
      </button>
    </span>
    <span class="note" [id]="id + '-note'">
      @if (refusal(); as wrong) {
        <span class="complaint" role="alert">{{ wrong }}</span>
      } @else {
        {{ hint() }}
      }
    </span>
  `,
  styleUrl: './account-field.scss',
})
export class PasswordField {
  readonly label = input.required<string>();
  readonly control = input.required<FormControl<string>>();
  readonly autocomplete = input.required<'current-password' | 'new-password'>();
  readonly hint = input('');
  readonly refusal = input('');

  private readonly box = viewChild.required<ElementRef<HTMLInputElement>>('box');
  protected readonly id = `password-${String(++fieldCount)}`;
  protected readonly shown = signal(false);

  focus(): void {
    this.box().nativeElement.focus();
  }
}
