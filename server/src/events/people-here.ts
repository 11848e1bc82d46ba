import type { PersonHere } from '@riseback/contracts';

interface Here {
  readonly name: string;
  selected: readonly string[];
  streams: number;
  /** Counts without an open stream until then, ms since the epoch. */
  until: number;
}

/** Between the end of a stream and the next one, such as at a reload, a person has not left. */
export const GRACE_MS = 3_000;
/** What someone without a stream says of themselves holds for so long. */
const SAID_HOLDS_MS = 60_000;

/** Who has one network open and what they have selected. In memory: after a restart the streams come back and tell it again. */
export class PeopleHere {
  private readonly here = new Map<string, Here>();

  constructor(private readonly now: () => Date) {}

  entered(person: { readonly id: string; readonly name: string }): void {
    this.of(person).streams += 1;
  }

  left(personId: string): void {
    const here = this.here.get(personId);
    if (here === undefined) return;
    here.streams = Math.max(0, here.streams - 1);
    here.until = this.now().getTime() + GRACE_MS;
  }

  selected(person: { readonly id: string; readonly name: string }, ids: readonly string[]): void {
    const here = this.of(person);
    here.selected = [...ids];
    here.until = this.now().getTime() + SAID_HOLDS_MS;
  }

  list(): PersonHere[] {
    const now = this.now().getTime();
    for (const [id, { streams, until }] of this.here) if (streams === 0 && until <= now) this.here.delete(id);
    return [...this.here].map(([personId, { name, selected }]) => ({ personId, name, selected: [...selected] }));
  }

  private of(person: { readonly id: string; readonly name: string }): Here {
    const here = this.here.get(person.id) ?? { name: person.name, selected: [], streams: 0, until: 0 };
    this.here.set(person.id, here);
    return here;
  }
}
