import type { ReportJob } from '@riseback/contracts';
import type { EventStream } from '../events/event-stream';
import type { NetworkAccess } from '../platform/auth/access';
import { tooManyRequests, unavailable } from '../platform/problem';

export interface ReportStreamsOptions {
  /** Whether session and role still let this person see the network. */
  readonly stillAllowed: (access: NetworkAccess) => boolean;
  readonly heartbeatMs?: number;
}

interface OpenStream {
  readonly access: NetworkAccess;
  readonly stream: EventStream;
}

const HEARTBEAT_MS = 15_000;
const STREAMS_PER_PERSON = 12;

/** Who watches which report being made. */
export class ReportStreams {
  private readonly open = new Map<string, Set<OpenStream>>();
  private heartbeat: NodeJS.Timeout | undefined;
  private closed = false;

  constructor(private readonly options: ReportStreamsOptions) {}

  /** @throws ProblemError 429, 503 before the answer begins */
  demandRoom({ person }: NetworkAccess): void {
    if (this.closed) throw unavailable('The server is stopping. Try again in a moment.');
    const own = this.all().filter(({ access }) => access.person.id === person.id);
    if (own.length < STREAMS_PER_PERSON) return;
    throw tooManyRequests(`You watch ${own.length} reports already; close some of them first.`, 15);
  }

  /** Adds a stream, which is told at once how far the report is, and of everything from then on. */
  join(access: NetworkAccess, stream: EventStream, job: ReportJob): void {
    const readers = this.open.get(job.id) ?? new Set();
    this.open.set(job.id, readers);
    const reader = { access, stream };
    readers.add(reader);
    stream.onClosed(() => {
      readers.delete(reader);
      if (readers.size === 0 && this.open.get(job.id) === readers) this.open.delete(job.id);
    });
    stream.send({ event: 'report', data: job });
    this.heartbeat ??= setInterval(() => this.beat(), this.options.heartbeatMs ?? HEARTBEAT_MS).unref();
  }

  changed(job: ReportJob): void {
    for (const { access, stream } of this.open.get(job.id) ?? []) {
      if (this.options.stillAllowed(access)) stream.send({ event: 'report', data: job });
      else stream.end();
    }
  }

  /** Ends every stream and opens no other. */
  close(): void {
    this.closed = true;
    clearInterval(this.heartbeat);
    for (const { stream } of this.all()) stream.end();
  }

  private beat(): void {
    for (const { access, stream } of this.all()) {
      if (this.options.stillAllowed(access)) stream.beat();
      else stream.end();
    }
  }

  private all(): OpenStream[] {
    return [...this.open.values()].flatMap((readers) => [...readers]);
  }
}
