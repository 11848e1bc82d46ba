import {
  afterRenderEffect,
  ChangeDetectionStrategy,
  Component,
  computed,
  type ElementRef,
  inject,
  viewChild,
} from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { ActivatedRoute, RouterLink } from '@angular/router';
import type { Method } from '@riseback/network';
import { formatQuantity } from '@riseback/units';
import { limitGroups } from '../networks/limit-rows';
import {
  COINCIDENCE_WORDS,
  FRICTION_WORDS,
  type MethodChoice,
  methodSectionId,
  STATIC_LIFT_WORDS,
  VOID_FRACTION_WORDS,
} from '../networks/method-words';
import { NetworkStore } from '../networks/network-store';
import { Formula } from './formula/formula';
import { METHOD_GROUPS, SUBSCRIPTS, SYMBOLS, type MethodSection } from '@riseback/methods';
import { MethodText } from './method-text';

/** Method: the equations, ranges, sources and limits of all that is computed, and which of it this network uses. */
@Component({
  selector: 'app-method-page',
  imports: [Formula, MatButton, MethodText, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './method-page.html',
  styleUrl: './method-page.scss',
})
export class MethodPage {
  protected readonly store = inject(NetworkStore);
  private readonly fragment = toSignal(inject(ActivatedRoute).fragment, { initialValue: null });

  private readonly article = viewChild.required<ElementRef<HTMLElement>>('article');
  private readonly contents = viewChild.required<ElementRef<HTMLDetailsElement>>('contents');

  /** Under this width the contents lie above the text, and are closed until they are asked for. */
  protected readonly narrow = globalThis.innerWidth < 960;
  protected readonly symbols = SYMBOLS;
  protected readonly subscripts = SUBSCRIPTS;
  protected readonly groups = computed(() => {
    const method = this.store.document()?.method;
    return METHOD_GROUPS.map((group) => ({
      ...group,
      sections: group.sections.map((section) => ({
        ...section,
        used: method !== undefined && isUsed(section, method),
      })),
    }));
  });
  /** What the network is computed by, each with the way to its section. */
  protected readonly chosen = computed(() => {
    const method = this.store.document()?.method;
    if (method === undefined) return [];
    const credit =
      method.dropCredit === 0
        ? 'not credited'
        : `credited at ${formatQuantity(method.dropCredit, 'fraction', this.store.units(), { withUnit: true })}`;
    return [
      choice('Friction', 'friction', method.friction, FRICTION_WORDS[method.friction]),
      choice('Static lift', 'staticLift', method.staticLift, STATIC_LIFT_WORDS[method.staticLift]),
      ...(method.staticLift === 'twoPhase'
        ? [choice('Void fraction', 'voidFraction', method.voidFraction, VOID_FRACTION_WORDS[method.voidFraction])]
        : []),
      { name: 'Falls', words: credit, section: 'drop-credit' },
      { name: 'Acceleration', words: accelerationWords(method), section: 'acceleration' },
      choice('Intermittent traps', 'coincidence', method.coincidence, COINCIDENCE_WORDS[method.coincidence]),
    ];
  });
  /** The limits of each check, by its section. */
  protected readonly limits = computed(() => {
    const units = this.store.units();
    return new Map(
      limitGroups(this.store.document()?.limits ?? {}).map(({ code, rows }) => [
        `check-${code}`,
        rows.map(({ key, label, kind, defaultSi, own, source }) => ({
          key,
          label,
          standard: formatQuantity(defaultSi, kind, units, { withUnit: true }),
          own: own === undefined ? '' : formatQuantity(own, kind, units, { withUnit: true }),
          source,
        })),
      ]),
    );
  });

  constructor() {
    afterRenderEffect(() => {
      const fragment = this.fragment();
      if (fragment === null || fragment === '') return;
      const section = this.article().nativeElement.querySelector(`#${CSS.escape(fragment)}`);
      section?.scrollIntoView({ block: 'start' });
      // the keyboard goes on from there, as after any link within a page
      section?.querySelector<HTMLElement>('h3, h2')?.focus({ preventScroll: true });
    });
  }

  /** Where the contents lie above the text, they make room for what was chosen. */
  protected closeContents(): void {
    if (globalThis.innerWidth < 960) this.contents().nativeElement.open = false;
  }

  protected print(): void {
    globalThis.print();
  }
}

function isUsed({ choice: of }: MethodSection, method: Method): boolean {
  if (of === undefined) return false;
  if (of.key === 'voidFraction' && method.staticLift !== 'twoPhase') return false;
  return method[of.key] === of.value;
}

function choice(name: string, key: MethodChoice, value: string, words: string) {
  return { name, words, section: methodSectionId(key, value) };
}

function accelerationWords({ friction, acceleration }: Method): string {
  if (friction === 'flashVapour') return 'none by this friction method';
  return acceleration ? 'counted' : 'left out';
}
