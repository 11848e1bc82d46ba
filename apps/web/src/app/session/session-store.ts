import { HttpErrorResponse } from '@angular/common/http';
import { computed, effect, inject, Injectable, signal, DOCUMENT } from '@angular/core';
import type { Person, ProfileChange, SignIn } from '@riseback/contracts';
import type { UnitSystem } from '@riseback/units';
import { firstValueFrom } from 'rxjs';
import { SessionApi } from './session-api';

/** Who is signed in, and how they like to see things. One for the whole application. */
@Injectable({ providedIn: 'root' })
export class SessionStore {
  private readonly api = inject(SessionApi);
  private readonly document = inject(DOCUMENT);

  private readonly signedIn = signal<Person | null>(null);
  private asked: Promise<Person | null> | null = null;

  readonly person = this.signedIn.asReadonly();
  readonly unitSystem = computed((): UnitSystem => this.signedIn()?.units ?? 'us');
  readonly theme = computed(() => this.signedIn()?.theme ?? 'system');
  readonly timeZone = computed(() => this.signedIn()?.timeZone ?? 'UTC');

  constructor() {
    effect(() => {
      const theme = this.theme();
      const root = this.document.documentElement;
      if (theme === 'system') root.removeAttribute('data-theme');
      else root.setAttribute('data-theme', theme);
    });
  }

  /** The person behind the session cookie, asked of the server once; null when there is none. */
  restore(): Promise<Person | null> {
    // The cookie that comes with a session and that pages may read: without it there is nobody to ask about.
    if (!this.document.cookie.includes('XSRF-TOKEN=')) return Promise.resolve(null);
    this.asked ??= firstValueFrom(this.api.current()).then(
      ({ person }) => {
        this.signedIn.set(person);
        return person;
      },
      (error: unknown) => {
        this.asked = null;
        if (error instanceof HttpErrorResponse && error.status === 401) return null;
        throw error;
      },
    );
    return this.asked;
  }

  async signIn(input: SignIn): Promise<void> {
    const { person } = await firstValueFrom(this.api.signIn(input));
    this.asked = Promise.resolve(person);
    this.signedIn.set(person);
  }

  async signOut(): Promise<void> {
    await firstValueFrom(this.api.signOut());
    this.forget();
  }

  /** The server said that the session has ended. */
  forget(): void {
    this.asked = null;
    this.signedIn.set(null);
  }

  async changeProfile(change: ProfileChange): Promise<void> {
    this.signedIn.set(await firstValueFrom(this.api.changeProfile(change)));
  }
}
