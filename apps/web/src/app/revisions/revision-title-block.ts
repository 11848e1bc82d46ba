import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { Router, RouterLink } from '@angular/router';
import { timeWords } from '../account/time-words';
import { NetworkStore } from '../networks/network-store';
import { SessionStore } from '../session/session-store';
import { WORKING } from './revision-choice';
import { RevisionHistory } from './revision-history';
import { sealWords, STATE_WORDS } from './revision-words';

/** The title block of the Revisions view: which revision, who submitted it, what it is compared with, and its seal. */
@Component({
  selector: 'app-revision-title-block',
  imports: [RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './revision-title-block.html',
  styleUrl: './revision-title-block.scss',
})
export class RevisionTitleBlock {
  protected readonly store = inject(NetworkStore);
  protected readonly history = inject(RevisionHistory);
  private readonly session = inject(SessionStore);
  private readonly router = inject(Router);

  protected readonly revision = computed(() => this.history.shown()?.revision ?? null);
  protected readonly words = computed(() => {
    const revision = this.revision();
    if (revision !== null) return `${revision.letter}, ${STATE_WORDS[revision.state].toLowerCase()}`;
    const newest = this.history.newest();
    return newest === null ? 'Working, none frozen' : `Working, after ${newest.letter}`;
  });
  protected readonly sentBy = computed(() => {
    const revision = this.revision();
    if (revision === null) return null;
    const submitted = revision.events.findLast(({ state }) => state === 'underReview');
    const zone = this.session.timeZone();
    return submitted === undefined
      ? { head: 'Frozen', words: `${revision.createdByName}, ${timeWords(revision.createdAt, zone)}` }
      : { head: 'Submitted', words: `${submitted.personName}, ${timeWords(submitted.at, zone)}` };
  });
  protected readonly reviewers = computed(() => {
    const revision = this.revision();
    if (revision === null) return '';
    const returned = revision.events.filter(({ state }) => state === 'returned');
    return [...new Set([...revision.signatures, ...returned].map(({ personName }) => personName))].join(', ');
  });
  protected readonly seal = computed(() => sealWords(this.revision()?.fileHash ?? ''));
  /** What it can be compared with: every other revision, and the network as it is drawn. */
  protected readonly choices = computed(() => {
    const shown = this.revision();
    const others = this.history
      .revisions()
      .filter(({ id }) => id !== shown?.id)
      .map(({ id, letter, state }) => ({ id, words: `${letter}, ${STATE_WORDS[state].toLowerCase()}` }));
    return shown === null ? others : [{ id: WORKING, words: 'Working' }, ...others];
  });

  protected compareWith(id: string): void {
    void this.router.navigate([], { queryParams: { with: id }, queryParamsHandling: 'merge' });
  }
}
