import { statfsSync } from 'node:fs';
import { dirname } from 'node:path';
import type { Database } from '../db/database';
import type { SolverProbe } from './solver-probe';

/** Room for some thousands of edits and their write-ahead log. */
const LEAST_FREE_BYTES = 64 * 1024 * 1024;

export interface Readiness {
  readonly database: boolean;
  readonly disk: boolean;
  readonly worker: boolean;
}

/** Whether work handed to this server would be kept and computed. */
export class ReadinessCheck {
  constructor(
    private readonly db: Database,
    private readonly solver: Pick<SolverProbe, 'isAlive'>,
  ) {}

  async check(): Promise<Readiness> {
    return { database: this.canWrite(), disk: this.hasRoom(), worker: await this.solver.isAlive() };
  }

  /** Takes the write lock and rolls back: a database that is full, locked or read-only says so here. */
  private canWrite(): boolean {
    const client = this.db.$client;
    try {
      client.exec('begin immediate');
      try {
        client.pragma('user_version = 1');
        return true;
      } finally {
        client.exec('rollback');
      }
    } catch {
      return false;
    }
  }

  private hasRoom(): boolean {
    if (this.db.$client.memory) return true;
    const { bavail, bsize } = statfsSync(dirname(this.db.$client.name));
    return bavail * bsize >= LEAST_FREE_BYTES;
  }
}
