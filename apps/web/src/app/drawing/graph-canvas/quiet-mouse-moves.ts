import { DOCUMENT, inject, Injectable, type Provider } from '@angular/core';
import { EVENT_MANAGER_PLUGINS, EventManagerPlugin } from '@angular/platform-browser';

/**
 * Passes mouse moves over the document only while a button is down. The graph library listens to all of them, and each would have the
 * whole drawing checked anew; it needs them for panning alone. Listeners on elements are not touched.
 */
@Injectable()
export class QuietMouseMoves extends EventManagerPlugin {
  private readonly page: Document;

  constructor() {
    const page = inject(DOCUMENT);
    super(page);
    this.page = page;
  }

  override supports(eventName: string): boolean {
    return eventName === 'mousemove';
  }

  override addEventListener(element: HTMLElement, eventName: string, handler: (event: MouseEvent) => void): () => void {
    const target: EventTarget = element;
    const heard = (event: Event): void => {
      if (event instanceof MouseEvent && (target !== this.page || event.buttons !== 0)) handler(event);
    };
    target.addEventListener(eventName, heard);
    return () => {
      target.removeEventListener(eventName, heard);
    };
  }
}

/** For the application's own providers: event plugins belong to the root. */
export function provideQuietMouseMoves(): Provider {
  return { provide: EVENT_MANAGER_PLUGINS, useClass: QuietMouseMoves, multi: true };
}
