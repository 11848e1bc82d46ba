import { ChangeDetectionStrategy, Component, computed, type ElementRef, input, signal, viewChild } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { Trap } from '@riseback/network';
import { type DisplayUnits, displayUnit } from '@riseback/units';
import { StatusMark } from '../../shared/status-mark/status-mark';
import { Staff } from '../staff/staff';
import { endWords } from '@riseback/figures';
import type { GroupedTraps } from './trap-groups';
import { nameOf } from '../../shared/element-words';

/** The traps of a network by where they drain to, worst first, each a link to its account. */
@Component({
  selector: 'app-trap-list',
  imports: [RouterLink, Staff, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './trap-list.html',
  styleUrl: './trap-list.scss',
})
export class TrapList {
  readonly grouped = input.required<GroupedTraps>();
  readonly units = input.required<DisplayUnits>();
  readonly currentId = input('');
  /** Results of an earlier state of the network: kept on screen, but greyed. */
  readonly stale = input(false);

  private readonly list = viewChild.required<ElementRef<HTMLElement>>('list');
  protected readonly search = signal('');

  protected readonly unit = computed(() => displayUnit('pressure', this.units().system));
  protected readonly groups = computed(() => {
    const wanted = this.search().trim().toLowerCase();
    return this.grouped()
      .groups.map((group) => ({
        ...group,
        traps: group.traps
          .filter(({ tag }) => tag.toLowerCase().includes(wanted))
          .map((item) => ({ ...item, receiverName: capital(endWords(item.end)) })),
      }))
      .filter(({ traps }) => traps.length > 0);
  });
  protected readonly unsolved = computed(() => {
    const wanted = this.search().trim().toLowerCase();
    return this.grouped()
      .unsolved.map((trap: Trap) => ({ id: trap.id, tag: nameOf(trap) }))
      .filter(({ tag }) => tag.toLowerCase().includes(wanted));
  });

  /** Up and down go from trap to trap; Tab goes through them too, as through any links. */
  protected step(event: Event, by: 1 | -1): void {
    const links = [...this.list().nativeElement.querySelectorAll<HTMLAnchorElement>('a')];
    const at = links.findIndex((link) => link === event.currentTarget);
    const next = links[at + by];
    if (at === -1 || next === undefined) return;
    event.preventDefault();
    next.focus();
  }
}

function capital(words: string): string {
  return words.charAt(0).toUpperCase() + words.slice(1);
}
