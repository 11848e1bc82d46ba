import type { SolveEnd, SolveJob, SolvePort } from './solve-port';
import { SolveThread, type SolveThreadOptions } from './solve-thread';

/**
 * Two threads: pressures never wait for anyone's bands. A newer job of a network calls off the bands of its former version, whose end
 * nobody would see.
 */
export class SolveThreads implements SolvePort {
  private readonly pressures: SolveThread;
  private readonly bands: SolveThread;

  constructor(options: SolveThreadOptions) {
    this.pressures = new SolveThread(options);
    this.bands = new SolveThread(options);
  }

  solve(key: string, job: SolveJob): Promise<SolveEnd> {
    this.bands.drop(key);
    return (job.bands ? this.bands : this.pressures).solve(key, job);
  }

  async close(): Promise<void> {
    await Promise.all([this.pressures.close(), this.bands.close()]);
  }
}
