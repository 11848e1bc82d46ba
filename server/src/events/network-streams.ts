import type {
  CommentsEvent,
  PeopleEvent,
  PlanEvent,
  RevisionsEvent,
  RoundsEvent,
  SavedBatch,
  SolveEvent,
} from '@riseback/contracts';
import { jsonEqual } from '@riseback/network';
import type { NetworkAccess } from '../platform/auth/access';
import { tooManyRequests, unavailable } from '../platform/problem';
import type { EventStream, ServerEvent } from './event-stream';
import { GRACE_MS, PeopleHere } from './people-here';

export interface NetworkStreamsOptions {
  /** Whether session and role still let this person see the network. */
  readonly stillAllowed: (access: NetworkAccess) => boolean;
  readonly now: () => Date;
  readonly heartbeatMs?: number;
}

interface OpenStream {
  readonly access: NetworkAccess;
  readonly stream: EventStream;
}

/** One network that somebody has open. */
interface Room {
  readonly open: Set<OpenStream>;
  readonly people: PeopleHere;
  /** As last told. */
  told: PeopleEvent['people'];
  version: number;
  solverHash: string;
}

const HEARTBEAT_MS = 15_000;
/** A browser opens six connections to a host over HTTP/1.1; more streams than that are not a person's. */
export const STREAMS_PER_SESSION = 6;
/** Some computers, some tabs each. */
export const STREAMS_PER_PERSON = 24;
const STREAMS_IN_ALL = 2_000;

/** The open streams of every network: who is told what, and for how long. */
export class NetworkStreams {
  private readonly rooms = new Map<string, Room>();
  private heartbeat: NodeJS.Timeout | undefined;
  private closed = false;

  constructor(private readonly options: NetworkStreamsOptions) {}

  /**
   * Makes room for one more stream before its answer begins.
   * @throws ProblemError 429 the session or the person has as many as they may; 503 the server has, or is stopping
   */
  demandRoom(access: NetworkAccess): void {
    if (this.closed) throw unavailable('The server is stopping. Try again in a moment.');
    const streams = [...this.rooms.values()].flatMap(({ open }) => [...open]);
    const own = streams.filter((other) => other.access.person.sessionId === access.person.sessionId);
    if (own.length >= STREAMS_PER_SESSION) {
      throw tooManyRequests(`This session has ${own.length} streams open already; close one of them first.`, 15);
    }
    const ofPerson = streams.filter((other) => other.access.person.id === access.person.id);
    if (ofPerson.length >= STREAMS_PER_PERSON) {
      throw tooManyRequests(`You have ${ofPerson.length} streams open already; close some of them first.`, 15);
    }
    if (streams.length >= STREAMS_IN_ALL) throw unavailable('Too many people are connected. Try again later.');
  }

  /** Adds a stream, which is told of everything from now on; `head` is what it has been told so far. */
  join(access: NetworkAccess, stream: EventStream, head: { version: number; solverHash: string }): void {
    const room = this.roomOf(access.networkId, head);
    const entry = { access, stream };
    room.open.add(entry);
    room.people.entered(access.person);
    stream.onClosed(() => {
      room.open.delete(entry);
      room.people.left(access.person.id);
      setTimeout(() => this.sweep(access.networkId, room), GRACE_MS + 1).unref();
    });
    if (!this.tellPeople(room)) stream.send(peopleEvent(room));
    this.heartbeat ??= setInterval(() => this.beat(), this.options.heartbeatMs ?? HEARTBEAT_MS).unref();
  }

  edited(networkId: string, batch: SavedBatch): void {
    const room = this.rooms.get(networkId);
    if (room === undefined) return;
    room.version = batch.version;
    room.solverHash = batch.solverHash;
    this.tell(room, editEvent(batch));
  }

  /** Of a solve that has ended; nobody is told of one that a newer version has overtaken. */
  solveEnded(networkId: string, solverHash: string, state: 'finished' | 'failed'): void {
    const room = this.rooms.get(networkId);
    if (room?.solverHash !== solverHash) return;
    this.tell(room, solveEvent({ version: room.version, solverHash, state }));
  }

  planChanged(networkId: string, version: number): void {
    const room = this.rooms.get(networkId);
    if (room !== undefined) this.tell(room, { event: 'plan', data: { version } satisfies PlanEvent });
  }

  revisionsChanged(networkId: string, revisionId: string): void {
    const room = this.rooms.get(networkId);
    if (room !== undefined) this.tell(room, { event: 'revisions', data: { revisionId } satisfies RevisionsEvent });
  }

  commentsChanged(networkId: string, changed: CommentsEvent): void {
    const room = this.rooms.get(networkId);
    if (room !== undefined) this.tell(room, { event: 'comments', data: changed });
  }

  roundsChanged(networkId: string, roundId: string): void {
    const room = this.rooms.get(networkId);
    if (room !== undefined) this.tell(room, { event: 'rounds', data: { roundId } satisfies RoundsEvent });
  }

  selected(access: NetworkAccess, ids: readonly string[]): void {
    const room = this.rooms.get(access.networkId);
    // without a stream nobody is there to be told
    if (room === undefined) return;
    room.people.selected(access.person, ids);
    this.tellPeople(room);
  }

  /** Ends every stream and opens no other; browsers ask again when the next server is up. */
  close(): void {
    this.closed = true;
    clearInterval(this.heartbeat);
    for (const { open } of this.rooms.values()) for (const { stream } of open) stream.end();
  }

  private roomOf(networkId: string, head: { version: number; solverHash: string }): Room {
    const present = this.rooms.get(networkId);
    if (present !== undefined) return present;
    const room = { open: new Set<OpenStream>(), people: new PeopleHere(this.options.now), told: [], ...head };
    this.rooms.set(networkId, room);
    return room;
  }

  private tell(room: Room, event: ServerEvent): void {
    for (const { access, stream } of room.open) {
      if (this.options.stillAllowed(access)) stream.send(event);
      else stream.end();
    }
  }

  /** @returns whether anything had changed */
  private tellPeople(room: Room): boolean {
    const people = room.people.list();
    if (jsonEqual(people, room.told)) return false;
    room.told = people;
    this.tell(room, peopleEvent(room));
    return true;
  }

  private beat(): void {
    for (const [networkId, room] of this.rooms) {
      for (const { access, stream } of room.open) {
        if (this.options.stillAllowed(access)) stream.beat();
        else stream.end();
      }
      this.sweep(networkId, room);
    }
  }

  private sweep(networkId: string, room: Room): void {
    this.tellPeople(room);
    if (room.open.size > 0 || room.told.length > 0 || this.rooms.get(networkId) !== room) return;
    this.rooms.delete(networkId);
    if (this.rooms.size > 0) return;
    clearInterval(this.heartbeat);
    this.heartbeat = undefined;
  }
}

export function editEvent(batch: SavedBatch): ServerEvent {
  return { event: 'edit', id: batch.version, data: batch };
}

export function solveEvent(solve: SolveEvent): ServerEvent {
  return { event: 'solve', data: solve };
}

function peopleEvent(room: Room): ServerEvent {
  return { event: 'people', data: { people: room.told } satisfies PeopleEvent };
}
