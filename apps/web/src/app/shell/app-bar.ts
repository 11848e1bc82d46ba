import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatMenu, MatMenuItem, MatMenuTrigger } from '@angular/material/menu';
import { RouterLink } from '@angular/router';
import type { ProfileChange, Role } from '@riseback/contracts';
import { Guide } from '../guide/guide';
import { SessionStore } from '../session/session-store';
import { GeneralKeyList } from './keys/general-key-list';
import { KeyHelp } from './keys/key-help';
import { RisebackMark } from './riseback-mark';
import { SignOut } from './sign-out';
import { WordList } from './word-list';

/** Row 1 of every page: the mark, the page's own links (projected), the role, the help and the person's menu. */
@Component({
  selector: 'app-bar',
  imports: [GeneralKeyList, MatMenu, MatMenuItem, MatMenuTrigger, RouterLink, RisebackMark, WordList],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './app-bar.html',
  styleUrl: './app-bar.scss',
})
export class AppBar {
  private readonly session = inject(SessionStore);
  private readonly leaving = inject(SignOut);
  protected readonly guide = inject(Guide);
  protected readonly keyHelp = inject(KeyHelp);

  /** Null or absent where no site is open. */
  readonly role = input<Role | null>();

  protected readonly person = this.session.person;
  protected readonly initials = computed(() => initialsOf(this.person()?.name ?? ''));
  protected readonly roleWord = computed(() => {
    const role = this.role();
    return role == null ? '' : role.charAt(0).toUpperCase() + role.slice(1);
  });

  protected readonly unitChoices = [
    { value: 'us', word: 'US customary: psig, ft, lb/h' },
    { value: 'si', word: 'SI: kPa, m, kg/h' },
  ] as const;
  protected readonly themeChoices = [
    { value: 'system', word: 'As the device' },
    { value: 'light', word: 'Light' },
    { value: 'dark', word: 'Dark' },
  ] as const;

  protected change(change: ProfileChange): void {
    void this.session.changeProfile(change);
  }

  protected signOut(): void {
    void this.leaving.begin();
  }
}

function initialsOf(name: string): string {
  const parts = name.split(/\s+/).filter((part) => part !== '');
  return [parts[0], parts.length > 1 ? parts.at(-1) : undefined]
    .map((part) => part?.charAt(0).toUpperCase() ?? '')
    .join('');
}
