import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  output,
  signal,
  untracked,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { LibraryModel } from '@riseback/contracts';
import { inOrder, type Trap, type TrapModel } from '@riseback/network';
import { formatQuantity } from '@riseback/units';
import { NetworkStore } from '../networks/network-store';
import { nameOf, TRAP_TYPE_WORDS } from '../shared/element-words';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { type Status, StatusMark } from '../shared/status-mark/status-mark';
import { chooseFromLibraryOps, chooseOps, notCopied } from './library-copies';
import { judgeModel, trapDemand } from './model-judgement';
import { SiteLibrary } from './site-library';

/** A model that may be chosen: the network's own, or one of the library that it has no copy of. */
interface Candidate {
  readonly key: string;
  readonly model: TrapModel | LibraryModel;
  readonly source: 'network' | 'library';
  readonly type: LibraryModel['trapType'];
}

const RANK: Readonly<Record<Status, number>> = { pass: 0, watch: 1, none: 2, fail: 3 };

/** Every model that a trap might have, with what each would pass at the trap's own differential beside what it needs. */
@Component({
  selector: 'app-model-choice',
  imports: [MatButton, ProblemBanner, RouterLink, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { role: 'group', 'aria-label': 'Models to choose from' },
  templateUrl: './model-choice.html',
  styleUrl: './model-choice.scss',
})
export class ModelChoice {
  private readonly library = inject(SiteLibrary);
  protected readonly store = inject(NetworkStore);

  readonly trap = input.required<Trap>();
  /** Told the model's name. */
  readonly chosen = output<string>();

  /** Off: only models of the trap's own type, where both types are known. */
  protected readonly everyType = signal(false);
  protected readonly siteId = computed(() => this.store.network()?.siteId ?? '');
  protected readonly load = computed(() => this.library.of(this.siteId())());
  protected readonly typeWord = computed(() => {
    const { trapType } = this.trap();
    return trapType === undefined ? '' : TRAP_TYPE_WORDS[trapType].toLowerCase();
  });
  /** What the trap asks of its model in the case that is shown; null without a result. */
  private readonly demand = computed(() => {
    const [document, trap] = [this.store.document(), this.trap()];
    const result = this.store.trapResults().get(trap.id);
    if (document === null || result === undefined) return null;
    return trapDemand(document, this.store.caseOf(trap.id), trap, result);
  });
  protected readonly demandWords = computed(() => {
    const demand = this.demand();
    if (demand === null) return 'No result yet: capacities cannot be judged.';
    const { differentialPa, needKgS, trap } = demand;
    const units = this.store.units();
    const across = formatQuantity(differentialPa, 'pressureDifference', units, { withUnit: true });
    const need = formatQuantity(needKgS, 'massFlow', units, { withUnit: true });
    const factor = formatQuantity(trap.sizingFactor, 'factor', units);
    const caseName = this.store.nameOfCase(this.store.caseOf(trap.id));
    return `${caseName === '' ? '' : `${caseName}: `}${across} across ${nameOf(trap)}, ${need} needed (load times ${factor}).`;
  });
  private readonly candidates = computed((): Candidate[] => {
    const document = this.store.document();
    if (document === null) return [];
    const load = this.load();
    const models = load.status === 'ready' ? load.value : [];
    const typeOf = (libraryId: string | undefined) => models.find(({ id }) => id === libraryId)?.trapType;
    return [
      ...inOrder(document.trapModels).map(([, { value: model }]): Candidate => ({
        key: `network ${model.id}`,
        model,
        source: 'network',
        type: typeOf(model.libraryId),
      })),
      ...notCopied(document, models).map((model): Candidate => ({
        key: `library ${model.id}`,
        model,
        source: 'library',
        type: model.trapType,
      })),
    ];
  });
  private readonly wanted = computed(() => {
    const { trapType } = this.trap();
    return this.candidates().filter(
      ({ type, model }) =>
        this.everyType() || type === undefined || trapType === undefined || type === trapType || this.isPresent(model),
    );
  });
  /** Those of another type, which are left out at first. */
  protected readonly othersCount = computed(() => {
    const { trapType } = this.trap();
    return trapType === undefined
      ? 0
      : this.candidates().filter(({ type, model }) => type !== undefined && type !== trapType && !this.isPresent(model))
          .length;
  });
  protected readonly rows = computed(() => {
    const [demand, units] = [this.demand(), this.store.units()];
    return this.wanted()
      .map((candidate) => {
        const judged = demand === null ? null : judgeModel(candidate.model, demand, units);
        const capacity = judged?.capacityKgS ?? null;
        return {
          ...candidate,
          present: this.isPresent(candidate.model),
          origin: originOf(candidate),
          otherType:
            candidate.type === undefined ||
            this.trap().trapType === undefined ||
            candidate.type === this.trap().trapType
              ? ''
              : TRAP_TYPE_WORDS[candidate.type].toLowerCase(),
          status: judged?.verdict ?? ('none' as const),
          words: judged?.words ?? '',
          capacityKgS: capacity,
          capacity: capacity === null ? '' : formatQuantity(capacity, 'massFlow', units, { withUnit: true }),
        };
      })
      .sort(
        (a, b) =>
          RANK[a.status] - RANK[b.status] ||
          // of those that do, the smallest: a trap too large wears and is slow to close
          (a.capacityKgS ?? Infinity) - (b.capacityKgS ?? Infinity) ||
          a.model.name.localeCompare(b.model.name, 'en'),
      );
  });

  constructor() {
    effect(() => {
      const siteId = this.siteId();
      if (siteId !== '') untracked(() => this.library.ask(siteId));
    });
  }

  protected choose({ model, source }: Candidate): void {
    const document = this.store.document();
    if (document === null) return;
    const trap = this.trap();
    const ops =
      source === 'network'
        ? chooseOps(document, trap.id, model.id)
        : 'createdBy' in model
          ? chooseFromLibraryOps(document, trap.id, model)
          : [];
    if (this.store.edit(`model of ${nameOf(trap)}: ${model.name}`.slice(0, 120), ops)) this.chosen.emit(model.name);
  }

  private isPresent(model: TrapModel | LibraryModel): boolean {
    return model.id === this.trap().trapModel;
  }
}

function originOf({ model, source }: Candidate): string {
  if (source === 'library') return 'Library, version ' + ('version' in model ? String(model.version) : '');
  const version = 'libraryVersion' in model ? model.libraryVersion : undefined;
  return version === undefined ? 'Only in this network' : `In this network, version ${String(version)}`;
}
