import { provideHttpClient, withXsrfConfiguration } from '@angular/common/http';
import {
  type ApplicationConfig,
  provideBrowserGlobalErrorListeners,
  provideZonelessChangeDetection,
} from '@angular/core';
import { MATERIAL_ANIMATIONS } from '@angular/material/core';
import { provideRouter, withComponentInputBinding } from '@angular/router';
import { routes } from './app.routes';
import { provideQuietMouseMoves } from './drawing/graph-canvas/quiet-mouse-moves';

export const appConfig: ApplicationConfig = {
  providers: [
    provideBrowserGlobalErrorListeners(),
    provideZonelessChangeDetection(),
    provideQuietMouseMoves(),
    // A dialog that is still opening does not hear Escape, and a person at the keyboard is faster than its animation.
    { provide: MATERIAL_ANIMATIONS, useValue: { animationsDisabled: true } },
    provideRouter(routes, withComponentInputBinding()),
    provideHttpClient(withXsrfConfiguration({ cookieName: 'XSRF-TOKEN', headerName: 'X-XSRF-TOKEN' })),
  ],
};
