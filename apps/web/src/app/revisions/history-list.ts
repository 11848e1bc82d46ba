import { ChangeDetectionStrategy, Component, computed, inject, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { RevisionSummary } from '@riseback/contracts';
import { timeWords } from '../account/time-words';
import { SessionStore } from '../session/session-store';
import { WORKING } from './revision-choice';
import { openCommentWords, sealWords, STATE_WORDS } from './revision-words';

/** The network's revisions one under the other, the newest first, and above them what is being drawn. */
@Component({
  selector: 'app-history-list',
  imports: [MatButton, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './history-list.html',
  styleUrl: './history-list.scss',
})
export class HistoryList {
  private readonly session = inject(SessionStore);

  /** The newest first. */
  readonly revisions = input.required<readonly RevisionSummary[]>();
  readonly shownId = input.required<string>();
  /** The network's version as it is drawn now. */
  readonly version = input.required<number>();
  readonly mayFreeze = input(false);
  readonly freezeAsked = output();

  protected readonly working = WORKING;
  protected readonly rows = computed(() =>
    this.revisions().map((revision) => ({
      ...revision,
      word: STATE_WORDS[revision.state],
      when: timeWords(revision.changedAt, this.session.timeZone()),
      seal: revision.state === 'approved' || revision.state === 'superseded' ? sealWords(revision.fileHash) : '',
      comments: openCommentWords(revision.openComments),
    })),
  );
  protected readonly workingWords = computed(() => {
    const newest = this.revisions()[0];
    if (newest === undefined) return 'nothing frozen yet';
    const edits = this.version() - newest.networkVersion;
    if (edits <= 0) return `no change since ${newest.letter}`;
    return `${String(edits)} ${edits === 1 ? 'edit' : 'edits'} since ${newest.letter}`;
  });
}
