import { DOCUMENT, inject, Injectable } from '@angular/core';

const KEY = 'riseback-guide-offered';

/** Who has been offered the guide on this device. A browser that keeps nothing offers it again; no harm. */
@Injectable({ providedIn: 'root' })
export class GuideMemory {
  private readonly window = inject(DOCUMENT).defaultView;

  wasOffered(personId: string): boolean {
    return this.offered().includes(personId);
  }

  remember(personId: string): void {
    if (this.wasOffered(personId)) return;
    try {
      this.window?.localStorage.setItem(KEY, JSON.stringify([...this.offered(), personId]));
    } catch (error) {
      // storage may be full or forbidden
      if (!(error instanceof DOMException)) throw error;
    }
  }

  private offered(): readonly string[] {
    try {
      const kept: unknown = JSON.parse(this.window?.localStorage.getItem(KEY) ?? '[]');
      return Array.isArray(kept) ? kept.filter((id) => typeof id === 'string') : [];
    } catch (error) {
      if (error instanceof DOMException || error instanceof SyntaxError) return [];
      throw error;
    }
  }
}
