import type { FileSolver, SolveEnd, SolveJob, SolvePort, TextEnd } from './solve-port';
import type { TextJob } from './solve-text';
import { SolveThread, type SolveThreadOptions } from './solve-thread';

/**
 * Two threads: pressures never wait for anyone's bands. A newer job of a network calls off the bands of its former version, whose end
 * nobody would see.
 */
export class SolveThreads implements SolvePort, FileSolver {
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

  /** Beside the bands: what one person tries out holds up nobody's pressures. */
  solveText(key: string, job: TextJob): Promise<TextEnd> {
    return this.bands.solveText(key, job);
  }

  async close(): Promise<void> {
    await Promise.all([this.pressures.close(), this.bands.close()]);
  }
}
