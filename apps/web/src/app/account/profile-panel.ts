import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { type Person, type ProfileChange, THEMES, UNIT_SYSTEMS } from '@riseback/contracts';
import { ChoiceField } from '../shared/fields/choice-field';
import { TextField } from '../shared/fields/text-field';
import { refusalsOf } from '../shared/outcome';
import { AccountStore } from './account-store';
import { clockWords, deviceTimeZone, timeZoneChoices } from './time-words';

const UNIT_WORDS: Readonly<Record<Person['units'], string>> = {
  us: 'US customary: psig, ft, lb/h',
  si: 'SI: kPa, m, kg/h',
};
const THEME_WORDS: Readonly<Record<Person['theme'], string>> = {
  system: 'As the device',
  light: 'Light',
  dark: 'Dark',
};

/** Name and how one likes to see things. Each choice counts at once. */
@Component({
  selector: 'app-profile-panel',
  imports: [ChoiceField, TextField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (store.person(); as person) {
      <app-text-field
        label="Name, as others read it"
        [value]="person.name"
        [hint]="'You sign in as ' + person.email"
        [refusal]="nameRefusal()"
        (accepted)="rename($event)"
      />
      <app-choice-field
        label="Units"
        hint="Nothing that is stored changes."
        [choices]="units"
        [value]="person.units"
        (accepted)="choose({ units: unitsOf($event) })"
      />
      <app-choice-field
        label="Theme"
        [choices]="themes"
        [value]="person.theme"
        (accepted)="choose({ theme: themeOf($event) })"
      />
      <app-choice-field
        label="Time zone"
        [hint]="zoneHint()"
        [choices]="zones()"
        [value]="person.timeZone"
        (accepted)="choose({ timeZone: $event ?? person.timeZone })"
      />
    }
    <p class="said" role="status">{{ said() }}</p>
  `,
  styleUrl: './account-panel.scss',
})
export class ProfilePanel {
  protected readonly store = inject(AccountStore);

  protected readonly said = signal('');
  protected readonly nameRefusal = signal('');
  protected readonly units = UNIT_SYSTEMS.map((value) => ({ value, words: UNIT_WORDS[value] }));
  protected readonly themes = THEMES.map((value) => ({ value, words: THEME_WORDS[value] }));
  protected readonly zones = computed(() => timeZoneChoices(this.store.person()?.timeZone ?? 'UTC'));
  protected readonly zoneHint = computed(() => {
    const zone = this.store.person()?.timeZone ?? 'UTC';
    const device = deviceTimeZone();
    const elsewhere = device === zone ? '' : ` This device is in ${device.replaceAll('_', ' ')}.`;
    return `It is ${clockWords(new Date(), zone)} there.${elsewhere}`;
  });

  protected async rename(name: string | undefined): Promise<void> {
    this.nameRefusal.set('');
    if (name === undefined) {
      this.nameRefusal.set('Give a name.');
      return;
    }
    const outcome = await this.store.changeProfile({ name });
    if ('problem' in outcome) {
      const { fields, rest } = refusalsOf(outcome.problem);
      this.nameRefusal.set(fields.get('/name') ?? rest);
    } else {
      this.said.set('Your name is changed.');
    }
  }

  protected async choose(change: ProfileChange): Promise<void> {
    const outcome = await this.store.changeProfile(change);
    this.said.set('problem' in outcome ? `Not kept: ${outcome.problem.detail ?? outcome.problem.title}` : 'Kept.');
  }

  protected unitsOf(value: string | undefined): Person['units'] {
    return value === 'si' ? 'si' : 'us';
  }

  protected themeOf(value: string | undefined): Person['theme'] {
    return THEMES.find((theme) => theme === value) ?? 'system';
  }
}
