import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { CommentThread } from '@riseback/contracts';
import type { NetworkDocument } from '@riseback/network';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { CommentStore } from './comment-store';
import { elementOf, openFirst } from './comment-subjects';
import { CommentThreadView } from './comment-thread-view';

/** Threads, the open ones first; resolved ones are folded away until they are asked for. */
@Component({
  selector: 'app-comment-list',
  imports: [CommentThreadView, MatButton, ProblemBanner],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @switch (store.load().status) {
      @case ('loading') {
        <p role="status" class="aside">Loading the comments</p>
      }
      @case ('failed') {
        @if (problem(); as problem) {
          <app-problem-banner [problem]="problem" [canRetry]="true" (retried)="store.reload()" />
        }
      }
      @default {
        @for (thread of shown(); track thread.id) {
          <app-comment-thread-view
            [thread]="thread"
            [document]="document()"
            [zone]="zoneOf(thread)"
            [drawing]="drawing()"
            [letter]="letterOf()(thread)"
          />
        } @empty {
          @if (resolvedCount() === 0) {
            <p class="aside">{{ none() }}</p>
          }
        }
        @if (resolvedCount() > 0) {
          <button matButton type="button" [attr.aria-expanded]="unfolded()" (click)="unfolded.set(!unfolded())">
            {{ unfolded() ? 'Hide' : 'Show' }} {{ resolvedCount() }} resolved
          </button>
        }
      }
    }
  `,
  styles: `
    :host {
      display: grid;
      justify-items: start;
    }
    app-comment-thread-view {
      width: 100%;
    }
    .aside {
      color: var(--rb-ink-2);
      font:
        400 12px/16px Inter,
        sans-serif;
    }
  `,
})
export class CommentList {
  protected readonly store = inject(CommentStore);

  readonly threads = input.required<readonly CommentThread[]>();
  readonly document = input.required<NetworkDocument | null>();
  readonly zones = input<ReadonlyMap<string, string>>(new Map());
  readonly drawing = input<readonly string[] | null>(null);
  /** What stands where there is no thread. */
  readonly none = input('No comments.');
  readonly letterOf = input<(thread: CommentThread) => string>(() => '');

  protected readonly unfolded = signal(false);
  protected readonly resolvedCount = computed(
    () => this.threads().filter(({ resolved }) => resolved !== undefined).length,
  );
  protected readonly shown = computed(() =>
    openFirst(
      this.threads().filter(({ resolved }) => this.unfolded() || resolved === undefined),
      this.store.numbers(),
    ),
  );
  protected readonly problem = computed(() => {
    const load = this.store.load();
    return load.status === 'failed' ? load.problem : null;
  });

  protected zoneOf({ subject }: CommentThread): string {
    const element = elementOf(subject);
    return element === null ? '' : (this.zones().get(element) ?? '');
  }
}
