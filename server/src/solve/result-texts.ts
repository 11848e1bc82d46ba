import { createHash } from 'node:crypto';
import type { NetworkResults } from '@riseback/contracts';
import type { ReadyJson } from '../platform/http/ready-json';
import type { StoredSolve } from './solve-repository';

type Finished = Extract<NetworkResults, { state: 'finished' }>;
type Head = Omit<Finished, 'cases'>;

/** Some hundred plants' results; those of one large network are kept whatever their size. */
const MOST_BYTES = 32 * 1024 * 1024;

/**
 * Answers with finished results, ready to be sent: those that were asked for last. Results are stored as the JSON that goes over the
 * wire and never change, so that neither is taken apart for a reader.
 */
export class ResultTexts {
  private readonly answers = new Map<string, ReadyJson>();
  private bytes = 0;

  of(head: Head, solve: Extract<StoredSolve, { state: 'finished' }>): ReadyJson {
    const key = `${solve.id} ${head.version} ${head.finishedAt} ${String(head.solveMs)}`;
    const answer = this.answers.get(key) ?? readyAnswer(head, solve.casesText());
    this.remember(key, answer);
    return answer;
  }

  private remember(key: string, answer: ReadyJson): void {
    if (this.answers.delete(key)) this.bytes -= answer.json.length;
    this.answers.set(key, answer);
    this.bytes += answer.json.length;
    for (const [oldest, { json }] of this.answers) {
      if (oldest === key || this.bytes <= MOST_BYTES) break;
      this.answers.delete(oldest);
      this.bytes -= json.length;
    }
  }
}

function readyAnswer(head: Head, casesText: string): ReadyJson {
  const json = Buffer.from(`${JSON.stringify(head).slice(0, -1)},"cases":${casesText}}`);
  return { json, etag: `"${createHash('sha256').update(json).digest('base64url')}"` };
}
