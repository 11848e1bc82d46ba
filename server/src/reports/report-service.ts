import type { ReportJob, ReportRequest } from '@riseback/contracts';
import type { EventStream } from '../events/event-stream';
import type { NetworkAccess } from '../platform/auth/access';
import { conflict, notFound, tooManyRequests } from '../platform/problem';
import type { FrozenStates } from './frozen-states';
import { FILE_KINDS, reportFileName } from './report-formats';
import type { ReportRepository } from './report-repository';
import type { ReportRunner } from './report-runner';
import type { ReportStreams } from './report-streams';

export interface ReportServiceParts {
  readonly reports: ReportRepository;
  readonly frozen: FrozenStates;
  readonly runner: ReportRunner;
  readonly streams: ReportStreams;
  readonly networkName: (networkId: string) => string | undefined;
  readonly newId: () => string;
  readonly now: () => Date;
}

/** One thread makes them all: what one person orders may not keep the others waiting. */
export const MOST_OF_A_PERSON = 3;

/** Orders for reports. Whoever may see a network may have its report; the orders are each person's own. */
export class ReportService {
  constructor(private readonly parts: ReportServiceParts) {}

  /** @throws ProblemError 404 no such revision; 429 as many are being made for this person as may be */
  order({ networkId, siteId, person }: NetworkAccess, request: ReportRequest): ReportJob {
    const { reports, frozen, runner, networkName, newId, now } = this.parts;
    const { revisionId, format } = request;
    const letter = revisionId === undefined ? undefined : frozen.letterOf(networkId, revisionId);
    if (revisionId !== undefined && letter === undefined) throw notFound('There is no such revision of this network.');
    const under = reports.countUnfinished(person.id);
    if (under >= MOST_OF_A_PERSON) {
      throw tooManyRequests(`${under} reports of yours are being made; wait for one of them or call it off.`, 5);
    }
    const input = { ...request, name: reportFileName(networkName(networkId) ?? '', letter, format) };
    const order = { id: newId(), siteId, networkId, personId: person.id, input };
    reports.insert({ ...order, createdAt: now().toISOString() });
    runner.add({ ...order, attempt: 0 });
    return this.own(networkId, person.id, order.id);
  }

  list({ networkId, person }: NetworkAccess): ReportJob[] {
    return this.parts.reports.list(networkId, person.id).map((job) => this.parts.runner.present(job));
  }

  /** @throws ProblemError 404 */
  find({ networkId, person }: NetworkAccess, jobId: string): ReportJob {
    return this.own(networkId, person.id, jobId);
  }

  /** Calls an order off; one that has ended stays as it is. @throws ProblemError 404 */
  cancel({ networkId, person }: NetworkAccess, jobId: string): ReportJob {
    this.own(networkId, person.id, jobId);
    this.parts.runner.cancel(jobId);
    return this.own(networkId, person.id, jobId);
  }

  /** @throws ProblemError 404; 409 it is not made, in words that say how far it is */
  content({ networkId, person }: NetworkAccess, jobId: string) {
    const job = this.own(networkId, person.id, jobId);
    const content = this.parts.reports.content(jobId);
    if (content === undefined) throw conflict(notMade(job));
    return { name: job.name, mediaType: FILE_KINDS[job.format].mediaType, content };
  }

  /** Opens a stream that says how far the report is, now and at each step. @throws ProblemError 404, 429, 503 before the answer begins */
  watch(access: NetworkAccess, jobId: string, begin: () => EventStream): void {
    const job = this.own(access.networkId, access.person.id, jobId);
    this.parts.streams.demandRoom(access);
    this.parts.streams.join(access, begin(), job);
  }

  private own(networkId: string, personId: string, jobId: string): ReportJob {
    const job = this.parts.reports.find(networkId, personId, jobId);
    if (job === undefined) throw notFound('There is no such report of yours; reports are kept for a day.');
    return this.parts.runner.present(job);
  }
}

function notMade({ state }: ReportJob): string {
  if (state === 'cancelled') return 'This report was called off; order it again.';
  if (state === 'failed') return 'This report could not be made; its problem says why.';
  return 'This report is still being made.';
}
