import { Injectable, signal } from '@angular/core';

/** Which tip is open: one at a time on a page. */
@Injectable({ providedIn: 'root' })
export class OpenTip {
  private readonly openId = signal<string | null>(null);
  readonly id = this.openId.asReadonly();

  show(id: string): void {
    this.openId.set(id);
  }

  /** Another may have opened meanwhile; that one stays. */
  hide(id: string): void {
    if (this.openId() === id) this.openId.set(null);
  }
}
