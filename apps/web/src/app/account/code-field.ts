import { ChangeDetectionStrategy, Component, type ElementRef, input, viewChild } from '@angular/core';
import { type FormControl, ReactiveFormsModule } from '@angular/forms';

let fieldCount = 0;

/** Six digits of an authenticator; where `recovery` is allowed, a recovery code as well. */
@Component({
  selector: 'app-code-field',
  imports: [ReactiveFormsModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <label [attr.for]="id">{{ label() }}</label>
    <span class="box">
      <input
        #box
        type="text"
        class="code"
        [id]="id"
        autocomplete="one-time-code"
        [attr.inputmode]="recovery() ? 'text' : 'numeric'"
        autocapitalize="none"
        spellcheck="false"
        maxlength="64"
        [formControl]="control()"
        [attr.aria-invalid]="refusal() !== ''"
        [attr.aria-describedby]="id + '-note'"
      />
    </span>
    <span class="note" [id]="id + '-note'">
      @if (refusal(); as wrong) {
        <span class="complaint" role="alert">{{ wrong }}</span>
      } @else {
        {{ recovery() ? 'Six digits, or one of your recovery codes.' : 'Six digits; they change every half minute.' }}
      }
    </span>
  `,
  styleUrl: './account-field.scss',
})
export class CodeField {
  readonly label = input.required<string>();
  readonly control = input.required<FormControl<string>>();
  readonly recovery = input(false);
  readonly refusal = input('');

  private readonly box = viewChild.required<ElementRef<HTMLInputElement>>('box');
  protected readonly id = `code-${String(++fieldCount)}`;

  focus(): void {
    this.box().nativeElement.focus();
  }
}
