import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import type { Revision } from '@riseback/contracts';
import { timeWords } from '../account/time-words';
import { SessionStore } from '../session/session-store';
import { EVENT_WORDS, MEANING_WORDS, sealWords } from './revision-words';

/** What was done with a revision and by whom, and who signed it. */
@Component({
  selector: 'app-revision-course',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (signatures().length > 0) {
      <h3>Signatures</h3>
      <ul>
        @for (signature of signatures(); track signature.seq) {
          <li class="signature">
            <strong>{{ signature.word }}</strong> by {{ signature.personName }}, {{ signature.role }}
            <span class="by">{{ signature.when }}, signature {{ signature.mark }}</span>
          </li>
        }
      </ul>
    }
    <h3>Course</h3>
    <ol>
      @for (event of events(); track event.seq) {
        <li>
          <strong>{{ event.word }}</strong> <span class="by">{{ event.personName }}, {{ event.when }}</span>
          @if (event.note) {
            <p class="note">{{ event.note }}</p>
          }
        </li>
      }
    </ol>
  `,
  styles: `
    :host {
      display: grid;
      gap: 6px;
    }
    ol,
    ul {
      display: grid;
      gap: 6px;
    }
    .signature {
      padding-left: 10px;
      border-left: 3px double var(--rb-ink);
    }
    .by {
      display: block;
      color: var(--rb-ink-2);
      font:
        400 11px/14px Inter,
        sans-serif;
    }
    .note {
      white-space: pre-wrap;
      overflow-wrap: anywhere;
    }
  `,
})
export class RevisionCourse {
  private readonly session = inject(SessionStore);

  readonly revision = input.required<Revision>();

  protected readonly events = computed(() =>
    this.revision().events.map((event) => ({
      ...event,
      word: EVENT_WORDS[event.state],
      when: timeWords(event.at, this.session.timeZone()),
    })),
  );
  protected readonly signatures = computed(() =>
    this.revision().signatures.map((signature) => ({
      ...signature,
      word: MEANING_WORDS[signature.meaning],
      when: timeWords(signature.at, this.session.timeZone()),
      mark: sealWords(signature.statementHash),
    })),
  );
}
