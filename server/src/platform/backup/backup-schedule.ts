import { mkdirSync, readdirSync, rmSync } from 'node:fs';
import { basename, join } from 'node:path';
import type { Log } from '../log';
import type { Backups } from './backups';

export interface ScheduleSettings {
  readonly folder: string;
  readonly everyHours: number;
  /** How many are kept, the newest ones. */
  readonly keep: number;
}

const HOUR_MS = 3_600_000;
/** After a failure, such as a full disk that somebody is clearing at this moment. */
const TRY_AGAIN_MS = 600_000;

/** Takes a backup when the newest in the folder is older than the interval, also when that happened while it was down. */
export class BackupSchedule {
  private timer: NodeJS.Timeout | undefined;

  constructor(
    private readonly backups: Pick<Backups, 'make'>,
    private readonly settings: ScheduleSettings,
    private readonly databasePath: string,
    private readonly now: () => Date,
    private readonly log: Pick<Log, 'info' | 'error'>,
  ) {}

  start(): void {
    const newest = this.own().at(-1);
    const due = newest === undefined ? 0 : timeOf(newest) + this.settings.everyHours * HOUR_MS;
    this.wait(Math.max(0, due - this.now().getTime()));
  }

  stop(): void {
    clearTimeout(this.timer);
    this.timer = undefined;
  }

  /** One backup now, and those beyond the number to keep removed. */
  async takeOne(): Promise<string> {
    const { folder, keep } = this.settings;
    mkdirSync(folder, { recursive: true, mode: 0o700 });
    const path = join(folder, `${this.stem()}-${stampOf(this.now())}.db`);
    const { contentHash } = await this.backups.make(path);
    this.log.info({ path, contentHash }, 'backup taken');
    for (const name of this.own().slice(0, -keep)) rmSync(join(folder, name), { force: true });
    return path;
  }

  private wait(ms: number): void {
    this.timer = setTimeout(() => void this.run(), ms).unref();
  }

  private async run(): Promise<void> {
    let nextMs = this.settings.everyHours * HOUR_MS;
    try {
      await this.takeOne();
    } catch (error) {
      this.log.error({ err: error }, 'no backup could be taken; the older ones are as they were');
      nextMs = Math.min(nextMs, TRY_AGAIN_MS);
    }
    if (this.timer !== undefined) this.wait(nextMs);
  }

  /** Names of this schedule's own backups, the oldest first; other files in the folder are none of its business. */
  private own(): string[] {
    const start = `${this.stem()}-`;
    try {
      return readdirSync(this.settings.folder)
        .filter((name) => name.startsWith(start) && /^\d{8}T\d{6}Z\.db$/.test(name.slice(start.length)))
        .sort();
    } catch {
      return [];
    }
  }

  private stem(): string {
    return basename(this.databasePath).replace(/\.db$/, '');
  }
}

/** `2026-03-01T08:00:00.000Z` as `20260301T080000Z`: sorts by time and is a file name everywhere. */
function stampOf(time: Date): string {
  return time.toISOString().replaceAll(/[-:]|\.\d+/g, '');
}

function timeOf(name: string): number {
  const [, year, month, day, hour, minute, second] = /(\d{4})(\d\d)(\d\d)T(\d\d)(\d\d)(\d\d)Z\.db$/.exec(name) ?? [];
  return Date.parse(`${year}-${month}-${day}T${hour}:${minute}:${second}Z`);
}
