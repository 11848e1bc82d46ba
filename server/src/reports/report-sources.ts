import { createHash } from 'node:crypto';
import { fileCanonicalText, toFile } from '@riseback/network';
import type { NetworkHead, NetworkRepository } from '../networks/network-repository';
import type { PeopleRepository, PersonRow } from '../people/people-repository';
import type { MembershipLookup } from '../platform/auth/access';
import { forbidden, notFound, ProblemError, unavailable } from '../platform/problem';
import type { LiveSolves } from '../solve/live-solves';
import type { FrozenStates } from './frozen-states';
import type { ReportMaterial } from './report-material';
import type { ReportOrderRow } from './report-repository';

export interface ReportSourcesParts {
  readonly networks: NetworkRepository;
  readonly live: LiveSolves;
  readonly frozen: FrozenStates;
  readonly people: PeopleRepository;
  readonly memberships: MembershipLookup;
  readonly engineVersion: string;
  readonly now: () => Date;
  /** How long a report waits for the network to be solved. */
  readonly waitMs?: number;
}

type Common = Pick<ReportMaterial, 'siteName' | 'paper' | 'ledgersOf' | 'reader' | 'madeAt'>;

const WAIT_MS = 30_000;

/** Gathers what a report is made of. Nothing in it is computed here but the hash of a file that is not frozen. */
export class ReportSources {
  constructor(private readonly parts: ReportSourcesParts) {}

  /**
   * @throws ProblemError 403 the person's role was taken meanwhile; 404 the revision is not there; 503 the network has no results in time:
   *   what does not belong to its inputs is never reported as if it did
   */
  async gather({ siteId, networkId, personId, input }: ReportOrderRow): Promise<ReportMaterial> {
    const { memberships, people, networks, now } = this.parts;
    const person = people.find(personId);
    const role = memberships.roleAtSite(personId, siteId);
    if (person === undefined || role === undefined) throw forbidden('You have no role at this site any longer.');
    const head = networks.head(networkId);
    if (head === undefined) throw notFound('There is no such network, or you have no role at its site.');
    const { paper, ledgersOf, revisionId } = input;
    const common: Common = {
      siteName: head.siteName,
      ...{ paper, ledgersOf },
      reader: readerOf(person),
      madeAt: now().toISOString(),
    };
    return revisionId === undefined ? this.working(head, common) : this.revision(head, revisionId, common);
  }

  private revision(head: NetworkHead, revisionId: string, common: Common): ReportMaterial {
    const { frozen, engineVersion } = this.parts;
    const found = frozen.find(head.id, revisionId);
    if (found === undefined) throw notFound('There is no such revision of this network.');
    const { state, ...texts } = found;
    const previous = frozen.before(head.id, revisionId);
    return {
      ...common,
      ...texts,
      networkName: head.name,
      state: { ...state, editsSince: head.version - state.version, presentEngineVersion: engineVersion },
      ...(previous === undefined ? {} : { previous }),
    };
  }

  private async working(head: NetworkHead, common: Common): Promise<ReportMaterial> {
    const { networks, live, frozen, engineVersion } = this.parts;
    const document = networks.document(head.id);
    const [edit] = networks.editsSince(head.id, head.version - 1, head.version);
    if (document === undefined || edit === undefined) throw new Error(`network ${head.id} has no newest version`);
    const { solverHash } = head;
    const input = { networkId: head.id, solverHash, document };
    const solved = await live.results(input, 'whole', this.parts.waitMs ?? WAIT_MS);
    if (solved?.state === 'failed') throw new ProblemError(solved.problem);
    if (solved?.state !== 'finished') {
      throw unavailable('The network is still being solved. Ask for the report again when its results are there.');
    }
    const file = toFile(document);
    const previous = frozen.before(head.id);
    return {
      ...common,
      networkName: head.name,
      state: { kind: 'working', version: head.version, changedAt: edit.at, changedByName: edit.personName },
      fileHash: createHash('sha256').update(fileCanonicalText(file)).digest('hex'),
      ...{ solverHash, engineVersion },
      fileText: JSON.stringify(file),
      outcomesText: solved.casesText(),
      ...(previous === undefined ? {} : { previous }),
    };
  }
}

function readerOf({ name, units, timeZone }: PersonRow): ReportMaterial['reader'] {
  return { name, units, timeZone };
}
