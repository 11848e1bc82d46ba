import { DecimalPipe } from '@angular/common';
import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  type ElementRef,
  inject,
  input,
  output,
  signal,
  untracked,
  viewChild,
  DestroyRef,
} from '@angular/core';
import { PHOTO_LIMITS, WHY_NOT_READ, type WhyNotRead } from '@riseback/contracts';
import type { DisplayUnits } from '@riseback/units';
import { clockWords } from '../account/time-words';
import { StatusMark } from '../shared/status-mark/status-mark';
import type { PhotoToKeep } from './device-store';
import { ExpectedStaff } from './expected-staff';
import type { ExpectedReading, GaugeCard } from './field-sheet';
import { Keypad } from './keypad';
import type { KnownReading } from './kept-items';
import { shrinkPhoto } from './photo-shrinking';
import { doubtAbout, isAskedAbout } from './plausibility';
import { judgement, plateWords, readingWords, WHY_NOT_WORDS } from './reading-words';
import { DIAL_UNITS, type DialUnit, keyFor, type KeypadKey, pressed, readingPa, readingRefusal } from './typed-reading';
import type { GivenReading } from './walk-store';

/** So long after the last key a number is taken to be in. */
const IN_AFTER_MS = 900;

/** One gauge: its number by the keypad, what was expected once it is in, and what speaks against it. */
@Component({
  selector: 'app-gauge-entry',
  imports: [DecimalPipe, ExpectedStaff, Keypad, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '(keydown)': 'type($event)' },
  templateUrl: './gauge-entry.html',
  styleUrl: './gauge-entry.scss',
})
export class GaugeEntry {
  readonly card = input.required<GaugeCard>();
  readonly units = input.required<DisplayUnits>();
  readonly unit = input.required<DialUnit>();
  readonly timeZone = input.required<string>();
  readonly expected = input<ExpectedReading>();
  /** The reading that a new one would replace. */
  readonly former = input<KnownReading>();
  /** What the walk goes to; '' when this is the last. */
  readonly nextName = input('');
  /** A closed round takes corrections only. */
  readonly closed = input(false);
  readonly kept = output<GivenReading>();
  readonly skipped = output();
  readonly listWanted = output();
  readonly unitChosen = output<DialUnit>();

  private readonly box = viewChild<ElementRef<HTMLInputElement>>('box');

  protected readonly text = signal('');
  /** The number is in: what was expected may be seen. */
  protected readonly revealed = signal(false);
  protected readonly panel = signal<'none' | 'whyNot' | 'note'>('none');
  protected readonly note = signal('');
  protected readonly photos = signal<readonly PhotoToKeep[]>([]);
  protected readonly photoProblem = signal('');
  private timer: ReturnType<typeof setTimeout> | undefined;

  protected readonly dialUnits = DIAL_UNITS;
  protected readonly reasons = WHY_NOT_READ;
  protected readonly WHY_NOT_WORDS = WHY_NOT_WORDS;
  protected readonly mostPhotos = PHOTO_LIMITS.ofAReading;

  protected readonly valuePa = computed(() => readingPa(this.text(), this.unit(), this.units()));
  protected readonly refusal = computed(() => readingRefusal(this.text(), this.unit(), this.units()));
  protected readonly plate = computed(() => plateWords(this.card().gauge, this.unit()));
  private readonly doubt = computed(() => {
    const valuePa = this.valuePa();
    return valuePa === undefined ? null : doubtAbout(valuePa, this.card().gauge, this.expected());
  });
  protected readonly verdict = computed(() =>
    this.revealed() && this.valuePa() !== undefined ? judgement(this.doubt(), this.expected()) : null,
  );
  /** Read it again, or keep it as it is? */
  protected readonly asks = computed(() => {
    const doubt = this.doubt();
    return this.verdict() !== null && doubt !== null && isAskedAbout(doubt);
  });
  protected readonly formerWords = computed(() => {
    const former = this.former();
    if (former === undefined) return '';
    const at = clockWords(new Date(former.takenAt), this.timeZone());
    return `${readingWords(former, this.unit())}, at ${at}`;
  });
  protected readonly disabled = computed(() => this.closed() && this.former() === undefined);
  protected readonly keepWord = computed(() => {
    const next = this.nextName() === '' ? '' : `, next ${this.nextName()}`;
    return `${this.former() === undefined ? 'Keep' : 'Correct'}${next}`;
  });

  constructor() {
    effect(() => {
      this.card();
      untracked(() => this.clear());
    });
    inject(DestroyRef).onDestroy(() => clearTimeout(this.timer));
  }

  protected press(key: KeypadKey): void {
    if (this.disabled()) return;
    this.text.update((text) => pressed(text, key));
    this.hideForNow();
  }

  /** A keyboard works as the keypad does, wherever on this gauge the focus is but in the note. */
  protected type(event: KeyboardEvent): void {
    if (event.target instanceof HTMLTextAreaElement || event.ctrlKey || event.metaKey || event.altKey) return;
    const onField = event.target === this.box()?.nativeElement;
    const key = keyFor(event.key);
    if (key !== undefined) {
      event.preventDefault();
      this.press(key);
    } else if (event.key === 'Enter' && onField) {
      event.preventDefault();
      this.keep();
    }
  }

  /** Whatever else puts text into the field: what makes no number is left out. */
  protected takeText(box: HTMLInputElement): void {
    const keys = [...box.value].flatMap((typed) => keyFor(typed.replace('−', '-')) ?? []);
    this.text.set(keys.reduce(pressed, ''));
    box.value = this.text();
    this.hideForNow();
  }

  /** Keeps the number; one that there is something to say of is shown first. */
  protected keep(): void {
    const valuePa = this.valuePa();
    if (valuePa === undefined || this.disabled()) return;
    if (this.doubt() !== null && !this.revealed()) this.reveal();
    else this.give({ valuePa });
  }

  protected keepAsItIs(): void {
    const valuePa = this.valuePa();
    if (valuePa !== undefined) this.give({ valuePa });
  }

  protected readAgain(): void {
    this.text.set('');
    this.hideForNow();
    this.box()?.nativeElement.focus();
  }

  protected cannotRead(whyNot: WhyNotRead): void {
    this.give({ whyNot });
  }

  protected show(panel: 'whyNot' | 'note'): void {
    this.panel.update((shown) => (shown === panel ? 'none' : panel));
  }

  protected async addPhoto(box: HTMLInputElement): Promise<void> {
    const [file] = box.files ?? [];
    if (file === undefined) return;
    const shrunk = await shrinkPhoto(file);
    box.value = '';
    this.photoProblem.set(shrunk.ok ? '' : shrunk.reason);
    if (!shrunk.ok) return;
    const { mediaType, content } = shrunk;
    this.photos.update((photos) => [...photos, { photoId: crypto.randomUUID(), mediaType, content }]);
  }

  protected dropPhoto(photoId: string): void {
    this.photos.update((photos) => photos.filter((photo) => photo.photoId !== photoId));
  }

  private give(answer: GivenReading['answer']): void {
    this.kept.emit({ answer, note: this.note().trim(), photos: this.photos() });
  }

  private hideForNow(): void {
    this.revealed.set(false);
    clearTimeout(this.timer);
    this.timer = setTimeout(() => this.reveal(), IN_AFTER_MS);
  }

  private reveal(): void {
    clearTimeout(this.timer);
    this.revealed.set(true);
  }

  private clear(): void {
    clearTimeout(this.timer);
    this.text.set('');
    this.revealed.set(false);
    this.panel.set('none');
    this.note.set('');
    this.photos.set([]);
    this.photoProblem.set('');
  }
}
