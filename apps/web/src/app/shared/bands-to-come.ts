import { InjectionToken, type Signal } from '@angular/core';

/**
 * Whether the results on screen still lack their bands. Until those are there a pass may become a watch, so that no verdict but a fail is
 * the last word. Provided by the page of a network; nothing is to come elsewhere.
 */
export const BANDS_TO_COME = new InjectionToken<Signal<boolean>>('bands to come');
