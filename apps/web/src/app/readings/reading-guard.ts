import { EnvironmentInjector, inject, runInInjectionContext } from '@angular/core';
import type { CanActivateFn, GuardResult } from '@angular/router';
import { firstValueFrom, isObservable } from 'rxjs';
import { SessionStore } from '../session/session-store';
import { signedInGuard } from '../session/signed-in-guard';
import { DeviceStore } from './device-store';

/** Lets in with no signal too, where the device has what the walk needs; whose session it is, the server is asked when it can be. */
export const readingGuard: CanActivateFn = async (route, state): Promise<GuardResult> => {
  const [session, device, injector] = [inject(SessionStore), inject(DeviceStore), inject(EnvironmentInjector)];
  const answered = await session.restore().then(
    () => true,
    () => false,
  );
  if (!answered && (await device.lastSheetOf(route.paramMap.get('networkId') ?? '')) !== undefined) return true;
  const usual = await runInInjectionContext(injector, () => signedInGuard(route, state));
  return isObservable(usual) ? firstValueFrom(usual) : usual;
};
