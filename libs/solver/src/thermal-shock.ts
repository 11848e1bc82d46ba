import type { LimitsInForce } from './check-limits';
import { amount, findingWords, say } from './finding-text';
import type { SolveWarning } from './solve-result';

/** The hottest and the coldest of the streams that come to each junction, before they mix. */
export class MeetingStreams {
  private readonly hottestK: Float64Array;
  private readonly coldestK: Float64Array;
  /** By node: the pipe that the hottest comes by. */
  private readonly hottestPipe: Int32Array;

  constructor(nodeCount: number) {
    this.hottestK = new Float64Array(nodeCount).fill(-Infinity);
    this.coldestK = new Float64Array(nodeCount).fill(Infinity);
    this.hottestPipe = new Int32Array(nodeCount);
  }

  add(node: number, pipe: number, temperatureK: number): void {
    if (temperatureK > (this.hottestK[node] as number)) {
      this.hottestK[node] = temperatureK;
      this.hottestPipe[node] = pipe;
    }
    if (temperatureK < (this.coldestK[node] as number)) this.coldestK[node] = temperatureK;
  }

  /**
   * Streams of different temperature that meet at a junction: flash steam that comes upon colder condensate collapses at once.
   * @param pipes of the file, by index
   * @returns a finding at the pipe of the hottest stream
   */
  thermalShock(
    node: number,
    pipes: readonly { readonly id: string }[],
    limits: LimitsInForce,
  ): SolveWarning | undefined {
    const hottestK = this.hottestK[node] as number;
    const value = hottestK - (this.coldestK[node] as number);
    const limit = limits.thermalShock.limitK;
    // nothing that flows in leaves −∞ and ∞
    if (!(value > limit)) return undefined;
    const text = say`Where this pipe ends, its flow of ${amount('temperature', hottestK)} meets another that is ${amount('temperatureDifference', value)} colder: above ${amount('temperatureDifference', limit)} its steam collapses with hammer, and the metal is strained.`;
    const remedy = say`Bring the hot stream in from above through a sparge or a flash vessel, or give it a return of its own.`;
    const element = (pipes[this.hottestPipe[node] as number] as { readonly id: string }).id;
    return { code: 'thermalShock', element, verdict: 'watch', value, limit, ...findingWords(text, remedy) };
  }
}
