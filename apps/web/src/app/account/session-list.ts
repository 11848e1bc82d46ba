import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { AccountStore } from './account-store';
import { deviceWords } from './device-words';
import { timeWords } from './time-words';

/** Where one is signed in, this place first; each can be ended. */
@Component({
  selector: 'app-session-list',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <ul>
      @for (session of sessions(); track session.id) {
        <li>
          <span class="device">
            <strong>{{ session.device }}</strong>
            @if (session.current) {
              <span class="here">this one</span>
            }
          </span>
          <span class="when">{{ session.words }}</span>
          @if (!session.current) {
            <button matButton="outlined" type="button" (click)="end(session.id)">
              End<span class="rb-visually-hidden"> the session of {{ session.device }}, {{ session.words }}</span>
            </button>
          }
        </li>
      }
    </ul>
    <p class="said" role="status">{{ said() }}</p>
    @if (sessions().length > 1) {
      <div class="actions">
        <button matButton="outlined" type="button" (click)="endOthers()">End all others</button>
      </div>
    }
  `,
  styleUrl: './account-panel.scss',
})
export class SessionList {
  private readonly store = inject(AccountStore);

  protected readonly said = signal('');
  protected readonly sessions = computed(() => {
    const zone = this.store.person()?.timeZone ?? 'UTC';
    const rows = (this.store.account()?.sessions ?? []).map(({ id, agent, createdAt, seenAt, current }) => {
      const since = `signed in ${timeWords(createdAt, zone)}`;
      const words = current ? since : `${since}, last seen ${timeWords(seenAt, zone)}`;
      return { id, current, device: deviceWords(agent), words };
    });
    return [...rows.filter(({ current }) => current), ...rows.filter(({ current }) => !current)];
  });

  protected async end(id: string): Promise<void> {
    const outcome = await this.store.endSession(id);
    this.said.set('problem' in outcome ? (outcome.problem.detail ?? outcome.problem.title) : 'Ended.');
  }

  protected async endOthers(): Promise<void> {
    const outcome = await this.store.endOtherSessions();
    if ('problem' in outcome) this.said.set(outcome.problem.detail ?? outcome.problem.title);
    else this.said.set(`${outcome.value.ended.toString()} ended. You are signed in here only.`);
  }
}
