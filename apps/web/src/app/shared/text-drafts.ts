import { inject, Injectable } from '@angular/core';
import { SessionStore } from '../session/session-store';

const PREFIX = 'riseback.text';

/** What a person is typing and has not sent: kept for the tab, so that neither another view nor a failed request nor a reload loses it. */
@Injectable({ providedIn: 'root' })
export class TextDrafts {
  private readonly session = inject(SessionStore);

  read(about: string): string {
    try {
      return sessionStorage.getItem(this.keyOf(about)) ?? '';
    } catch {
      return '';
    }
  }

  /** An empty text is forgotten. */
  keep(about: string, text: string): void {
    try {
      if (text === '') sessionStorage.removeItem(this.keyOf(about));
      else sessionStorage.setItem(this.keyOf(about), text);
    } catch {
      // no storage, or it is full: the text is still in its field
    }
  }

  /** Of the person alone: another may sign in within the same tab. */
  private keyOf(about: string): string {
    return `${PREFIX}/${this.session.person()?.id ?? ''}/${about}`;
  }
}
