import { ChangeDetectionStrategy, Component, computed, inject, output, signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { Role } from '@riseback/contracts';
import { ChoiceField } from '../shared/fields/choice-field';
import { refusalsOf } from '../shared/outcome';
import { type AddressLine, addressLines } from './address-lines';
import { PeopleStore } from './people-store';
import { ROLE_CHOICES, roleMeaning } from './role-words';

/** So many at once; a list that is longer was pasted by mistake. */
const MOST_AT_ONCE = 50;

/** Invites one person or a pasted list; what cannot be sent stays in the box with the reason. */
@Component({
  selector: 'app-invite-form',
  imports: [ChoiceField, MatButton, ReactiveFormsModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './invite-form.html',
  styleUrl: './invite-form.scss',
})
export class InviteForm {
  private readonly store = inject(PeopleStore);

  /** What came of it, in a sentence. */
  readonly told = output<string>();

  protected readonly form = inject(NonNullableFormBuilder).group({ addresses: '' });
  protected readonly choices = ROLE_CHOICES;
  protected readonly role = signal<Role>('viewer');
  protected readonly meaning = computed(() => roleMeaning(this.role()));
  private readonly typed = toSignal(this.form.controls.addresses.valueChanges, { initialValue: '' });
  protected readonly count = computed(() => addressLines(this.typed()).length);
  protected readonly busy = signal(false);
  protected readonly mistakes = signal<readonly AddressLine[]>([]);

  protected choose(value: string | undefined): void {
    const role = Role.safeParse(value);
    if (role.success) this.role.set(role.data);
  }

  protected async submit(): Promise<void> {
    const lines = addressLines(this.form.getRawValue().addresses);
    const refusal = lines.length === 0 ? 'Give an e-mail address.' : tooMany(lines.length);
    if (refusal !== undefined) {
      this.mistakes.set([{ line: 0, text: '', email: '', mistake: refusal }]);
      return;
    }
    this.busy.set(true);
    this.mistakes.set([]);
    const left: AddressLine[] = [];
    // one after the other: the first refusal of a server that has had enough must not come fifty times at once
    for (const line of lines) {
      const mistake = line.mistake ?? (await this.send(line.email));
      if (mistake !== undefined) left.push({ ...line, mistake });
    }
    this.form.setValue({ addresses: left.map(({ text }) => text).join('\n') });
    this.mistakes.set(left.map((line, index) => ({ ...line, line: index + 1 })));
    this.busy.set(false);
    if (left.length < lines.length) this.store.reload();
    this.told.emit(sentWords(lines.length - left.length, left.length));
  }

  private async send(email: string): Promise<string | undefined> {
    const outcome = await this.store.invite({ email, role: this.role() });
    if ('value' in outcome) return undefined;
    const { fields, rest } = refusalsOf(outcome.problem);
    return [...fields.values(), rest].filter((words) => words !== '').join(' ');
  }
}

function tooMany(count: number): string | undefined {
  return count > MOST_AT_ONCE
    ? `${String(count)} addresses are too many at once; ${String(MOST_AT_ONCE)} go.`
    : undefined;
}

function sentWords(sent: number, left: number): string {
  const gone = sent === 1 ? '1 invitation is on its way.' : `${String(sent)} invitations are on their way.`;
  if (left === 0) return gone;
  return `${gone} ${left === 1 ? '1 line needs' : `${String(left)} lines need`} mending.`;
}
