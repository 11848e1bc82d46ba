import { HttpBackend, HttpErrorResponse, HttpHeaders, type HttpRequest, HttpResponse } from '@angular/common/http';
import { EditAccepted } from '@riseback/contracts';
import { jsonEqual } from '@riseback/network';
import { type Observable, Observable as Stream } from 'rxjs';

/** Where the server listens now; after a restart it has another port. `null` while it is down. */
export interface Server {
  address: string | null;
}

/** What the server has acknowledged, over all tabs: the version of each batch. */
export interface Receipts {
  readonly sent: Map<string, unknown>;
  readonly versions: Map<string, number>;
}

/** One tab's way to the server, on which requests wait, fail and lose their answers. */
export class Wire extends HttpBackend {
  online = true;
  /** So many of the next edits are saved without the tab hearing of it. */
  answersToLose = 0;
  delayMs = 0;
  /** The tab has crashed: nothing leaves it and nothing reaches it. */
  dead = false;

  constructor(
    readonly server: Server,
    readonly headers: Readonly<Record<string, string>>,
    private readonly receipts: Receipts,
  ) {
    super();
  }

  override handle(request: HttpRequest<unknown>): Observable<HttpResponse<unknown>> {
    return new Stream((subscriber) => {
      this.exchange(request).then(
        (response) => {
          if (this.dead) return;
          subscriber.next(response);
          subscriber.complete();
        },
        (failed: unknown) => {
          if (!this.dead) subscriber.error(failed instanceof Failed ? failed.response : failed);
        },
      );
    });
  }

  /** The address for a request that leaves now; undefined when none can. */
  reachable(): string | undefined {
    return this.online && !this.dead ? (this.server.address ?? undefined) : undefined;
  }

  private async exchange(request: HttpRequest<unknown>): Promise<HttpResponse<unknown>> {
    if (this.delayMs > 0) await new Promise((resolve) => setTimeout(resolve, this.delayMs));
    const url = request.urlWithParams;
    const address = this.reachable();
    if (address === undefined) throw noAnswer(url);
    const edit = request.method === 'POST' && url.endsWith('/edits');
    if (edit) this.demandSameBody(request.body);
    const more = Object.fromEntries(request.headers.keys().map((key) => [key, request.headers.get(key) ?? '']));
    let response: Response;
    let text: string;
    try {
      response = await fetch(address + url, {
        method: request.method,
        headers: { ...this.headers, ...more },
        ...(request.body === null ? {} : { body: JSON.stringify(request.body) }),
      });
      text = await response.text();
    } catch {
      throw noAnswer(url);
    }
    const body: unknown = text === '' ? null : JSON.parse(text);
    if (edit && this.answersToLose > 0) {
      this.answersToLose -= 1;
      throw noAnswer(url);
    }
    if (!this.online) throw noAnswer(url);
    if (!response.ok) throw new Failed(new HttpErrorResponse({ status: response.status, url, error: body }));
    if (edit) this.receipts.versions.set(batchIdOf(request.body), EditAccepted.parse(body).version);
    return new HttpResponse({ status: response.status, url, body, headers: new HttpHeaders(response.headers) });
  }

  /** One id, one batch: or a doubtful send could not be repeated. */
  private demandSameBody(body: unknown): void {
    const id = batchIdOf(body);
    const before = this.receipts.sent.get(id);
    if (before !== undefined && !jsonEqual(before, body)) throw new Error(`batch ${id} was sent with two bodies`);
    this.receipts.sent.set(id, body);
  }
}

/** Angular's own error of a response is none that can be thrown. */
class Failed extends Error {
  constructor(readonly response: HttpErrorResponse) {
    super(response.message);
  }
}

function noAnswer(url: string): Failed {
  return new Failed(new HttpErrorResponse({ status: 0, url }));
}

function batchIdOf(body: unknown): string {
  return (body as { batchId: string }).batchId;
}
