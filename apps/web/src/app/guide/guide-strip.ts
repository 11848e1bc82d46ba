import {
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  DOCUMENT,
  effect,
  inject,
  linkedSignal,
  untracked,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { ActivatedRoute, Router } from '@angular/router';
import { NetworkStore } from '../networks/network-store';
import { nameOf } from '../shared/element-words';
import { Guide } from './guide';
import { GuidePointer } from './guide-pointer';
import { guideSteps, type GuideTrap } from './guide-steps';
import { trapToShow } from './trap-to-show';

/** A strip under the title block that tells one thing at a time while the page shows it; nothing is covered or locked. */
@Component({
  selector: 'app-guide-strip',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '(keydown.escape)': 'end()' },
  templateUrl: './guide-strip.html',
  styleUrl: './guide-strip.scss',
})
export class GuideStrip {
  protected readonly guide = inject(Guide);
  private readonly store = inject(NetworkStore);
  private readonly router = inject(Router);
  private readonly route = inject(ActivatedRoute);
  private readonly page = inject(DOCUMENT);

  /** Chosen once: an edit on the way does not lead the person to another trap. */
  private readonly trap = linkedSignal<{ running: boolean; found: GuideTrap | null }, GuideTrap | null>({
    source: () => ({ running: this.guide.running(), found: this.found() }),
    computation: ({ running, found }, before) => (running ? (before?.value ?? found) : null),
  });
  private readonly found = computed((): GuideTrap | null => {
    const id = trapToShow(this.store.trapResults().values());
    const node = id === null ? undefined : this.store.document()?.nodes.get(id.id)?.value;
    return id === null || node === undefined
      ? null
      : { id: id.id, tag: nameOf(node), fails: id.fails, caseId: this.store.caseOf(id.id) };
  });
  protected readonly steps = computed(() => {
    const trap = this.trap();
    return trap === null ? [] : guideSteps(trap);
  });
  protected readonly step = computed(() => this.steps()[this.guide.stepIndex()] ?? null);
  protected readonly last = computed(() => this.guide.stepIndex() === this.steps().length - 1);

  constructor() {
    const pointer = new GuidePointer(this.page);
    effect(() => {
      const step = this.step();
      untracked(() => {
        if (step === null) {
          pointer.stop();
          return;
        }
        void this.router
          .navigate([step.view], { relativeTo: this.route, queryParams: step.query, queryParamsHandling: 'merge' })
          .then(() => {
            if (this.step() === step) pointer.pointAt(step.anchor);
          });
      });
    });
    inject(DestroyRef).onDestroy(() => {
      pointer.stop();
      this.guide.end();
    });
  }

  protected go(by: 1 | -1): void {
    this.guide.stepIndex.update((index) => index + by);
  }

  /** The button that had the focus goes; the menu from which the guide can be had again takes it. */
  protected end(): void {
    this.guide.end();
    this.page.querySelector<HTMLElement>('[data-help-menu]')?.focus();
  }
}
