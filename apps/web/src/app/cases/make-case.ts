import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatMenu, MatMenuItem, MatMenuTrigger } from '@angular/material/menu';
import { ActivatedRoute, Router } from '@angular/router';
import type { Trap } from '@riseback/network';
import { NetworkStore } from '../networks/network-store';
import { caseForTrap, type TrapSetting } from './case-for-trap';
import type { MadeCase } from './made-case';

/** Makes a case out of the present one for one trap, and opens its editor. */
@Component({
  selector: 'app-make-case',
  imports: [MatButton, MatMenu, MatMenuItem, MatMenuTrigger],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <button matButton="outlined" type="button" [matMenuTriggerFor]="menu">Make a case</button>
    <mat-menu #menu="matMenu" [aria-label]="'Make a case out of ' + fromName()">
      @for (choice of choices(); track choice.setting) {
        <button mat-menu-item type="button" (click)="make(choice.setting)">
          <span class="choice">{{ choice.word }}</span>
          <small>{{ choice.note }}</small>
        </button>
      }
    </mat-menu>
  `,
  styleUrl: './make-case.scss',
})
export class MakeCase {
  private readonly store = inject(NetworkStore);
  private readonly router = inject(Router);
  private readonly route = inject(ActivatedRoute);

  readonly trap = input.required<Trap>();

  /** The case that is looked at; where each element shows its own worst, the trap's. */
  private readonly from = computed(() => {
    const id = this.store.caseOf(this.trap().id);
    return this.store.cases().find((operatingCase) => operatingCase.id === id) ?? this.store.cases()[0] ?? null;
  });
  protected readonly fromName = computed(() => this.from()?.name ?? 'the network as drawn');
  private readonly hasOrifice = computed(() => {
    const model = this.trap().trapModel;
    return model !== undefined && this.store.document()?.trapModels.get(model)?.value.orificeDiameterM !== undefined;
  });
  protected readonly choices = computed((): { setting: TrapSetting; word: string; note: string }[] => [
    {
      setting: 'failedOpen',
      word: 'Failed open',
      note: this.hasOrifice() ? 'Live steam through its orifice' : 'Its orifice is not known: the case asks for it',
    },
    { setting: 'isolated', word: 'Isolated', note: 'Shut off, it gives nothing' },
    { setting: 'load', word: 'Own load', note: `Another load than in ${this.fromName()}` },
  ]);

  protected make(setting: TrapSetting): void {
    const document = this.store.document();
    if (document === null) return;
    const { id, label, ops } = caseForTrap(document, this.from(), this.trap(), setting);
    if (!this.store.edit(label, ops)) return;
    const state: MadeCase = { madeCase: label, loadOf: setting === 'load' ? this.trap().id : null };
    void this.router.navigate(['../cases'], {
      relativeTo: this.route,
      queryParams: { case: id, show: null },
      queryParamsHandling: 'merge',
      state: { ...state },
    });
  }
}
