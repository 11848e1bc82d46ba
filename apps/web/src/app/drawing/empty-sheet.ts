import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { NetworkStore } from '../networks/network-store';
import { NodePlacing } from './sheet/node-placing';

/** What an empty drawing offers to begin with: the receiver first, since every pressure is counted up from it. */
@Component({
  selector: 'app-empty-sheet',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <div>
      <h2>Nothing is drawn yet</h2>
      @if (store.mayDraw()) {
        <p>Begin where the condensate ends: back pressure is counted up from there.</p>
        <p class="ways">
          <button matButton="filled" type="button" (click)="placing.besideFocus('receiver')">Place a receiver</button>
          <button matButton="outlined" type="button" (click)="placing.besideFocus('trap')">Place a trap</button>
        </p>
      } @else {
        <p>A designer of this site can draw here.</p>
      }
    </div>
  `,
  styles: `
    :host {
      position: absolute;
      inset: 120px 0 0;
      display: grid;
      place-content: center;
      pointer-events: none;
    }
    div {
      display: grid;
      gap: 10px;
      max-width: 380px;
      padding: 20px;
      border: 1px dashed var(--rb-rule-strong);
      background: var(--rb-sheet);
      pointer-events: auto;
    }
    .ways {
      display: flex;
      flex-wrap: wrap;
      gap: 8px;
    }
  `,
})
export class EmptySheet {
  protected readonly store = inject(NetworkStore);
  protected readonly placing = inject(NodePlacing);
}
