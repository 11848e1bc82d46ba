import { HttpClient, HttpErrorResponse } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { Round, RoundSummary } from '@riseback/contracts';
import { firstValueFrom, map, type Observable, retry, throwError, timer } from 'rxjs';
import { isTransient, toProblem } from '../shared/problem';
import type { OutboxItem } from './kept-items';
import type { Answer } from './send-in-order';

const TOO_MANY = 429;
const SIGNED_OUT = 401;
const SERVER_FAULT = 500;

@Injectable({ providedIn: 'root' })
export class RoundApi {
  private readonly http = inject(HttpClient);

  /** The newest first. */
  list(networkId: string): Observable<RoundSummary[]> {
    return this.http.get<unknown>(roundsOf(networkId)).pipe(
      retryTransient(),
      map((body) => RoundSummary.array().parse(body)),
    );
  }

  get(networkId: string, roundId: string): Observable<Round> {
    return this.http.get<unknown>(oneOf(networkId, roundId)).pipe(
      retryTransient(),
      map((body) => Round.parse(body)),
    );
  }

  photoUrl(networkId: string, readingId: string, photoId: string): string {
    return `/api/networks/${networkId}/readings/${readingId}/photos/${photoId}`;
  }

  /** Sends one thing that was kept on the device. It carries its own id: sent again, it is the same. */
  async send(item: OutboxItem): Promise<Answer> {
    try {
      await firstValueFrom(this.request(item));
      return { kind: 'taken' };
    } catch (error) {
      return answerOf(error);
    }
  }

  private request(item: OutboxItem): Observable<unknown> {
    const { networkId, roundId } = item;
    switch (item.kind) {
      case 'round':
        return this.http.post(roundsOf(networkId), item.body);
      case 'reading':
        return this.http.post(`${oneOf(networkId, roundId)}/readings`, item.body, {
          headers: { 'Idempotency-Key': item.body.id },
        });
      case 'closing':
        return this.http.post(`${oneOf(networkId, roundId)}/closing`, item.body);
      case 'photo':
        return this.http.put(
          this.photoUrl(networkId, item.readingId, item.photoId),
          new Blob([item.content], { type: item.mediaType }),
          { headers: { 'Content-Type': item.mediaType } },
        );
    }
  }
}

/** A server that fails is asked again later: what was read in the plant is not given up for its fault. */
function answerOf(error: unknown): Answer {
  if (!(error instanceof HttpErrorResponse)) throw error;
  if (error.status === SIGNED_OUT) return { kind: 'signedOut' };
  if (error.status === 0 || error.status === TOO_MANY || error.status >= SERVER_FAULT) return { kind: 'noAnswer' };
  return { kind: 'refused', problem: toProblem(error) };
}

function roundsOf(networkId: string): string {
  return `/api/networks/${networkId}/rounds`;
}

function oneOf(networkId: string, roundId: string): string {
  return `${roundsOf(networkId)}/${encodeURIComponent(roundId)}`;
}

function retryTransient<T>() {
  return retry<T>({
    count: 2,
    delay: (error: unknown, attempt) => (isTransient(error) ? timer(250 * 2 ** attempt) : throwError(() => error)),
  });
}
