import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatMenu, MatMenuItem, MatMenuTrigger } from '@angular/material/menu';
import { ROLES, type SitePerson } from '@riseback/contracts';
import { timeWords } from '../account/time-words';
import { StatusMark } from '../shared/status-mark/status-mark';
import { actsOn, type PersonAct } from './person-acts';
import { roleName } from './role-words';

/** Who has a role at the site, those who may most first; what may be done stands at the end of each row. */
@Component({
  selector: 'app-person-list',
  imports: [MatButton, MatMenu, MatMenuItem, MatMenuTrigger, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './person-list.html',
  styleUrl: './person-list.scss',
})
export class PersonList {
  readonly people = input.required<readonly SitePerson[]>();
  readonly ownId = input<string>();
  readonly timeZone = input.required<string>();

  readonly roleAsked = output<SitePerson>();
  readonly acted = output<{ readonly person: SitePerson; readonly act: PersonAct }>();

  protected readonly rows = computed(() =>
    [...this.people()].sort(byRoleThenName).map((person) => ({
      person,
      own: person.id === this.ownId(),
      role: roleName(person.role),
      since: `since ${timeWords(person.grantedAt, this.timeZone())}, by ${person.grantedByName ?? 'a command'}`,
      seen: person.seenAt === undefined ? 'Never signed in' : `Last seen ${timeWords(person.seenAt, this.timeZone())}`,
      codes: person.codesOn ? 'One-time codes on' : 'One-time codes off',
      acts: actsOn(person),
    })),
  );
}

function byRoleThenName(a: SitePerson, b: SitePerson): number {
  const rank = ({ role }: SitePerson): number => ROLES.indexOf(role);
  return rank(b) - rank(a) || a.name.localeCompare(b.name);
}
