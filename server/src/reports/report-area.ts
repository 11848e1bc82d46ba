import { NetworkRepository } from '../networks/network-repository';
import type { PeopleRepository } from '../people/people-repository';
import type { MembershipLookup } from '../platform/auth/access';
import type { Database } from '../platform/db/database';
import type { Route } from '../platform/routes/route-table';
import { RevisionRepository } from '../revisions/revision-repository';
import type { LiveSolves } from '../solve/live-solves';
import { FrozenStates } from './frozen-states';
import { ReportRepository } from './report-repository';
import { reportRoutes } from './report-routes';
import { ReportRunner } from './report-runner';
import { ReportService } from './report-service';
import { ReportSources } from './report-sources';
import { ReportStreams, type ReportStreamsOptions } from './report-streams';
import type { ReportPort } from './report-threads';

export interface ReportAreaParts extends ReportStreamsOptions {
  readonly db: Database;
  readonly live: LiveSolves;
  readonly people: PeopleRepository;
  readonly memberships: MembershipLookup;
  readonly port: ReportPort;
  readonly engineVersion: string;
  readonly newId: () => string;
  readonly now: () => Date;
  /** Told of what broke. */
  readonly report: (error: unknown) => void;
}

export interface ReportArea {
  readonly routes: readonly Route[];
  readonly runner: ReportRunner;
  readonly endStreams: () => void;
}

/** Orders for reports, from the route to the thread that makes them. */
export function buildReportArea(parts: ReportAreaParts): ReportArea {
  const { db, live, people, memberships, port, engineVersion, newId, now, report } = parts;
  const networks = new NetworkRepository(db);
  const frozen = new FrozenStates(new RevisionRepository(db));
  const reports = new ReportRepository(db);
  const streams = new ReportStreams(parts);
  const sources = new ReportSources({ networks, live, frozen, people, memberships, engineVersion, now });
  const gather = sources.gather.bind(sources);
  const runner = new ReportRunner(reports, { gather, port, now, changed: (job) => streams.changed(job), report });
  const service = new ReportService({
    ...{ reports, frozen, runner, streams, newId, now },
    networkName: (networkId) => networks.head(networkId)?.name,
  });
  return { routes: reportRoutes(service), runner, endStreams: () => streams.close() };
}
