import { ChangeDetectionStrategy, Component, computed, effect, inject, input, signal } from '@angular/core';
import { RouterLink } from '@angular/router';
import { checkName, type SiteSettingsChange, TAGGED_KINDS, type TaggedKind, TagPattern } from '@riseback/contracts';
import { KIND_WORDS } from '../shared/element-words';
import { TextField } from '../shared/fields/text-field';
import { type LimitChange, LimitForm } from '../shared/limit-form/limit-form';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { QuantityField } from '../shared/quantity-field/quantity-field';
import { StatusMark } from '../shared/status-mark/status-mark';
import { patternedTag } from '../shared/tag-pattern';
import { AppBar } from '../shell/app-bar';
import { SiteSettingsStore } from './site-settings-store';

const PATTERN_MISTAKE =
  'Use letters, digits and signs, one run of # for the number and at most one * before it, as in TR-### or *-##.';
const WORDS: Readonly<Record<TaggedKind, string>> = { ...KIND_WORDS, gauge: 'gauge' };
/** A tag of each kind, to show what a pattern makes of it. */
const SAMPLES: Readonly<Record<TaggedKind, string>> = {
  trap: 'TR-5',
  junction: 'J-5',
  receiver: 'R-5',
  flashVessel: 'V-5',
  pumpedInlet: 'P-5',
  pipe: 'CR-5',
  gauge: 'PI-5',
};

/** What new networks of a site begin with and how its elements are tagged: read by all, set by designers and administrators. Each field is saved when it is left. */
@Component({
  selector: 'app-site-settings-page',
  imports: [AppBar, LimitForm, ProblemBanner, QuantityField, RouterLink, StatusMark, TextField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  providers: [SiteSettingsStore],
  templateUrl: './site-settings-page.html',
  styleUrl: './site-settings-page.scss',
})
export class SiteSettingsPage {
  protected readonly store = inject(SiteSettingsStore);

  readonly siteId = input.required<string>();

  protected readonly said = signal('');
  private readonly refusal = signal<{ readonly at: string; readonly reason: string } | null>(null);
  protected readonly limitRefusal = signal<{ code: string; key: string; reason: string } | null>(null);
  protected readonly tagRows = computed(() => {
    const patterns = this.store.settings()?.tagPatterns ?? {};
    return TAGGED_KINDS.map((kind) => {
      const pattern = patterns[kind];
      const sample = SAMPLES[kind];
      const made = pattern === undefined ? '' : patternedTag(pattern, sample, new Set([sample]));
      return { kind, label: sentence(WORDS[kind]), pattern, hint: made === '' ? '' : `After ${sample}: ${made}` };
    });
  });

  constructor() {
    effect(() => this.store.siteId.set(this.siteId()));
  }

  protected refusalAt(at: string): string {
    const refusal = this.refusal();
    return refusal?.at === at ? refusal.reason : '';
  }

  protected async setCondition(
    key: 'atmosphericPressurePa' | 'ambientTemperatureK',
    to: number | undefined,
  ): Promise<void> {
    if (to !== undefined)
      await this.change(key, key === 'ambientTemperatureK' ? 'Air temperature' : 'Atmosphere', { [key]: to });
  }

  protected async setPattern(kind: TaggedKind, to: string | undefined): Promise<void> {
    if (to !== undefined && !TagPattern.safeParse(to).success) this.refusal.set({ at: kind, reason: PATTERN_MISTAKE });
    else await this.change(kind, `Tags of ${WORDS[kind]}s`, { tagPatterns: { [kind]: to ?? null } });
  }

  protected async setLimit({ code, key, to }: LimitChange): Promise<void> {
    const reason = await this.store.change({ limits: { [code]: { [key]: to ?? null } } });
    this.limitRefusal.set(reason === '' ? null : { code, key, reason });
    this.said.set(reason === '' ? `Limit of ${checkName(code).toLowerCase()} saved` : '');
  }

  private async change(at: string, what: string, change: SiteSettingsChange): Promise<void> {
    const reason = await this.store.change(change);
    this.refusal.set(reason === '' ? null : { at, reason });
    this.said.set(reason === '' ? `${what} saved` : '');
  }
}

function sentence(words: string): string {
  return words.charAt(0).toUpperCase() + words.slice(1);
}
