import type { Comment, CommentsEvent, CommentSubject, CommentThread, NewComment } from '@riseback/contracts';
import type { NetworkDocument } from '@riseback/network';
import type { NetworkAccess } from '../platform/auth/access';
import { badRequest, forbidden, notFound, unprocessable } from '../platform/problem';
import type { CommentedRevision } from '../revisions/revision-service';
import type { CommentMails } from './comment-mails';
import type { CommentRepository, CommentRow } from './comment-repository';
import { commentableDocument, commentableFile, demandSubject, type Commentable } from './comment-subjects';

/** Told of every change of a network's comments, for those who have it open. */
export interface CommentListener {
  commentsChanged(networkId: string, changed: CommentsEvent): void;
}

export interface CommentServiceParts {
  readonly networks: {
    atVersion(access: NetworkAccess, version: undefined): { readonly document: NetworkDocument };
  };
  readonly revisions: {
    /** @throws ProblemError 404 */
    commented(access: NetworkAccess, id: string): CommentedRevision;
  };
  readonly mails: CommentMails;
  readonly listener: CommentListener;
  readonly newId: () => string;
  readonly now: () => Date;
}

/** What a new comment belongs to. */
interface Place {
  readonly threadId: string;
  readonly revisionId: string | null;
  readonly subject: CommentSubject;
}

const MOST_COMMENTS = 10_000;

/** Threads of comments on a revision, or on a network as it stands. */
export class CommentService {
  constructor(
    private readonly comments: CommentRepository,
    private readonly parts: CommentServiceParts,
  ) {}

  /** @param revisionId undefined: of the network as it stands and of all its revisions */
  list({ networkId }: NetworkAccess, revisionId: string | null | undefined): CommentThread[] {
    return this.threadsOf(this.comments.ofNetwork(networkId, revisionId));
  }

  /**
   * Begins a thread, or answers in one.
   * @throws ProblemError 400 neither or both; 404 no such revision or thread; 422 pinned to what is not there, or someone named who has no
   *   role at the site
   */
  add(access: NetworkAccess, input: NewComment): CommentThread {
    const { networkId, siteId, person } = access;
    const id = this.parts.newId();
    const place = this.placeOf(access, id, input);
    const revision = place.revisionId === null ? undefined : this.parts.revisions.commented(access, place.revisionId);
    const { name, ...commentable } = this.commentable(access, revision);
    if (input.threadId === undefined) demandSubject(place.subject, commentable);
    const at = this.parts.now();
    const mentions = [...new Set(input.mentions)];
    const comment: CommentRow = {
      ...{ id, networkId, ...place, personId: person.id, at: at.toISOString(), body: input.body, mentions },
      ...{ resolvedBy: null, resolvedAt: null },
    };
    this.comments.transaction((comments, tx) => {
      const peopleHere = comments.peopleOfSite(siteId);
      demandPeople(mentions, peopleHere);
      if (comments.countOf(networkId) >= MOST_COMMENTS) {
        throw unprocessable(`A network holds ${MOST_COMMENTS} comments at most.`);
      }
      comments.insert(comment);
      const details = { threadId: place.threadId, ...revisionOf(place), subject: place.subject };
      comments.audit({ ...this.entry(access, at), action: 'comment.add', subject: id, details });
      const elementTag = place.subject.kind === 'whole' ? undefined : commentable.tags.get(place.subject.elementId);
      this.parts.mails.added(tx, access, { comment, networkName: name, elementTag, revision, peopleHere });
    });
    return this.changed(access, place);
  }

  /**
   * Resolves a thread, or opens it again: who began it may, and designers, reviewers and administrators.
   * @throws ProblemError 403, 404
   */
  resolve(access: NetworkAccess, threadId: string, resolved: boolean): CommentThread {
    const at = this.parts.now();
    const place = this.comments.transaction((comments) => {
      const first = this.first(comments, access, threadId);
      demandMayResolve(access, first);
      // a second click, or another's, changes nothing
      if ((first.resolvedAt !== null) === resolved) return first;
      comments.setResolved(threadId, resolved ? { by: access.person.id, at: at.toISOString() } : undefined);
      const action = resolved ? 'comment.resolve' : 'comment.reopen';
      comments.audit({ ...this.entry(access, at), action, subject: threadId, details: revisionOf(first) });
      return first;
    });
    return this.changed(access, place);
  }

  private placeOf(access: NetworkAccess, id: string, { threadId, revisionId, subject }: NewComment): Place {
    if (threadId === undefined) {
      if (subject !== undefined) return { threadId: id, revisionId: revisionId ?? null, subject };
      const detail = 'say what the comment is about: the whole, an element or a result';
      throw badRequest('A new thread needs a subject.', [{ pointer: '/subject', detail }]);
    }
    const given = [
      ...(subject === undefined ? [] : ['/subject']),
      ...(revisionId === undefined ? [] : ['/revisionId']),
    ];
    if (given.length > 0) {
      const detail = 'leave it out: an answer has that of its thread';
      throw badRequest(
        'An answer belongs where its thread does.',
        given.map((pointer) => ({ pointer, detail })),
      );
    }
    const first = this.first(this.comments, access, threadId);
    return { threadId, revisionId: first.revisionId, subject: first.subject };
  }

  private first(comments: CommentRepository, { networkId }: NetworkAccess, threadId: string): CommentRow {
    const [first] = comments.ofThread(networkId, threadId);
    if (first === undefined) throw notFound('The network has no such comment.');
    return first;
  }

  private commentable(
    access: NetworkAccess,
    revision: CommentedRevision | undefined,
  ): Commentable & { readonly name: string } {
    if (revision !== undefined) return { ...commentableFile(revision.file), name: revision.file.name };
    const { document } = this.parts.networks.atVersion(access, undefined);
    return { ...commentableDocument(document), name: document.name };
  }

  private changed(access: NetworkAccess, place: Place): CommentThread {
    const { networkId } = access;
    const { threadId } = place;
    this.parts.listener.commentsChanged(networkId, { threadId, ...revisionOf(place) });
    const [thread] = this.threadsOf(this.comments.ofThread(networkId, threadId));
    if (thread === undefined) throw new Error('a thread that was just written is not there');
    return thread;
  }

  private threadsOf(rows: readonly CommentRow[]): CommentThread[] {
    const names = this.comments.names(
      rows.flatMap(({ personId, mentions, resolvedBy }) => [
        personId,
        ...mentions,
        ...(resolvedBy === null ? [] : [resolvedBy]),
      ]),
    );
    const named = (personId: string) => ({ personId, personName: names.get(personId) ?? '' });
    const threads = new Map<string, CommentThread>();
    for (const row of rows) {
      const { id, threadId, at, body, mentions, subject, resolvedBy, resolvedAt } = row;
      const comment: Comment = { id, ...named(row.personId), at, body, mentions: mentions.map(named) };
      const thread = threads.get(threadId);
      if (thread !== undefined) {
        thread.comments.push(comment);
        continue;
      }
      const resolved =
        resolvedBy === null || resolvedAt === null ? {} : { resolved: { ...named(resolvedBy), at: resolvedAt } };
      threads.set(threadId, { id: threadId, ...revisionOf(row), subject, comments: [comment], ...resolved });
    }
    return [...threads.values()];
  }

  private entry({ person, siteId }: NetworkAccess, at: Date) {
    return { at, personId: person.id, sessionId: person.sessionId, siteId };
  }
}

function revisionOf({ revisionId }: Pick<Place, 'revisionId'>): { revisionId?: string } {
  return revisionId === null ? {} : { revisionId };
}

function demandPeople(mentions: readonly string[], here: ReadonlySet<string>): void {
  const mistakes = mentions.flatMap((id, i) =>
    here.has(id) ? [] : [{ pointer: `/mentions/${i}`, detail: 'This person has no role at the site.' }],
  );
  if (mistakes.length > 0) throw unprocessable('A comment names people of the site only.', mistakes);
}

function demandMayResolve(access: NetworkAccess, first: CommentRow): void {
  const judges = access.may('draw') || access.may('sign');
  if (judges || first.personId === access.person.id) return;
  throw forbidden('Who began a thread resolves it, or a designer, reviewer or administrator of the site.');
}
