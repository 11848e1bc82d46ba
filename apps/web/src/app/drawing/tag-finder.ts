import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  effect,
  type ElementRef,
  inject,
  Injector,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { DrawingScene } from './drawing-scene';
import { DrawingState } from './drawing-state';
import { findByTag } from './model/navigation';

/** A field over the sheet, opened with "/": type a tag, Enter goes there. */
@Component({
  selector: 'app-tag-finder',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (open()) {
      <form (submit)="go($event, box.value)">
        <label for="tag-finder">Find a tag</label>
        <input
          #box
          id="tag-finder"
          type="text"
          autocomplete="off"
          spellcheck="false"
          (keydown.escape)="leave()"
          (blur)="open.set(false)"
        />
        <span role="status">{{ missing() }}</span>
      </form>
    }
  `,
  styles: `
    form {
      display: flex;
      flex-wrap: wrap;
      align-items: center;
      gap: 8px;
      padding: 8px 10px;
      border: 1px solid var(--rb-ink);
      background: var(--rb-panel);
      box-shadow: var(--rb-lift);
    }
    input {
      height: 28px;
      width: 120px;
      padding: 0 6px;
      border: 1px solid var(--rb-rule-strong);
      border-radius: 2px;
      background: var(--rb-well);
      color: var(--rb-ink);
      font: inherit;
    }
    span:empty {
      display: none;
    }
  `,
})
export class TagFinder {
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);

  private readonly box = viewChild<ElementRef<HTMLInputElement>>('box');
  protected readonly open = signal(false);
  protected readonly missing = signal('');

  constructor() {
    const injector = inject(Injector);
    effect(() => {
      if (this.state.tagAsked() === 0) return;
      untracked(() => {
        this.open.set(true);
        this.missing.set('');
        afterNextRender(() => this.box()?.nativeElement.focus(), { injector });
      });
    });
  }

  protected go(event: Event, typed: string): void {
    event.preventDefault();
    const { nodes, pipes } = this.scene.settled();
    const elements = [
      ...[...nodes.values()].map(({ node }) => node),
      ...[...pipes.values()].map(({ pipe }) => pipe),
      ...[...this.scene.gauges().values()].map(({ id, gauge }) => ({ id, tag: gauge.tag ?? gauge.id })),
    ];
    const found = findByTag(
      elements.map(({ id, tag }) => ({ id, tag })),
      typed,
    );
    if (found === undefined) {
      this.missing.set(`No tag starts with ${typed}`);
      return;
    }
    this.state.select(found);
    this.state.focusOn(found);
    this.open.set(false);
  }

  protected leave(): void {
    this.open.set(false);
    this.state.focusOn(this.state.focusId());
  }
}
