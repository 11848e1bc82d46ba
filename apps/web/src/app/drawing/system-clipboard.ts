import { DOCUMENT, inject, Injectable } from '@angular/core';

const KEY = 'riseback.piece';

/** What was put into the clipboard last, kept for browsers that let nobody read it. */
interface Kept {
  readonly text: string;
  /** The system's clipboard took it too, and may hold something newer since. */
  readonly shared: boolean;
}

/** The system's clipboard; where the browser refuses it, the browser's own storage, which at least other tabs of the program share. */
@Injectable({ providedIn: 'root' })
export class SystemClipboard {
  private readonly window = inject(DOCUMENT).defaultView;
  /** For a browser that refuses storage too. */
  private kept: Kept | null = null;

  async write(text: string): Promise<void> {
    const shared = await this.share(text);
    this.kept = { text, shared };
    try {
      this.window?.localStorage.setItem(KEY, JSON.stringify(this.kept));
    } catch {
      // full or forbidden: this tab still has it
      this.forget();
    }
  }

  async read(): Promise<string> {
    const kept = this.keptText();
    if (kept !== null && !kept.shared) return kept.text;
    try {
      return (await this.window?.navigator.clipboard.readText()) ?? '';
    } catch {
      return kept?.text ?? '';
    }
  }

  private async share(text: string): Promise<boolean> {
    try {
      await this.window?.navigator.clipboard.writeText(text);
      return this.window !== null;
    } catch {
      return false;
    }
  }

  private keptText(): Kept | null {
    try {
      const stored = this.window?.localStorage.getItem(KEY);
      if (stored === null || stored === undefined) return this.kept;
      const { text, shared } = JSON.parse(stored) as Partial<Kept>;
      return typeof text === 'string' ? { text, shared: shared === true } : this.kept;
    } catch {
      return this.kept;
    }
  }

  /** An older piece must not be taken for the newest. */
  private forget(): void {
    try {
      this.window?.localStorage.removeItem(KEY);
    } catch {
      // nothing is stored where nothing may be stored
    }
  }
}
