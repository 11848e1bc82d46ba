import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { RouterLink } from '@angular/router';
import { onlineSignal } from '../shared/online';
import { Sender } from './sender';

/** Whether what was read has arrived: what lies on the device, and why. */
@Component({
  selector: 'app-signal-line',
  imports: [RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[class.calm]': 'calm()' },
  template: `
    <p role="status">
      @if (!online()) {
        <strong>No signal{{ waiting() === '' ? '.' : ': ' + waiting() + ' kept.' }}</strong>
        {{ waiting() === '' ? 'Go on: readings are kept on this device.' : 'Sent when it returns.' }}
      } @else if (sender.signedOut()) {
        <strong>Signed out: {{ waiting() || 'nothing' }} kept.</strong>
        <a [routerLink]="['/sign-in']" [queryParams]="{ return: here() }">Sign in</a> to send them.
      } @else if (waiting() === '') {
        {{ sender.waitingItems() === 0 ? 'All readings sent.' : 'All readings sent; photographs follow.' }}
      } @else if (sender.unanswered()) {
        <strong>No answer: {{ waiting() }} kept.</strong> Sent as soon as the server answers.
      } @else {
        Sending {{ waiting() }}
      }
    </p>
    @if (sender.refused()[0]; as first) {
      <p class="refused" role="alert">
        <strong>{{ sender.refused().length }} not taken by the server.</strong>
        {{ first.refused?.detail ?? first.refused?.title }} It stays on this device.
        <button type="button" (click)="sender.tryRefusedAgain()">Try again</button>
      </p>
    }
  `,
  styleUrl: './signal-line.scss',
})
export class SignalLine {
  protected readonly sender = inject(Sender);
  protected readonly online = onlineSignal();
  /** '' when none waits. */
  protected readonly waiting = computed(() => {
    const count = this.sender.waitingReadings();
    return count === 0 ? '' : count === 1 ? '1 reading' : `${String(count)} readings`;
  });
  protected readonly calm = computed(() => this.online() && this.waiting() === '' && !this.sender.signedOut());
  protected readonly here = () => location.pathname + location.search;
}
