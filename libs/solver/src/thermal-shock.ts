import type { LimitsInForce } from './check-limits';
import { amount, findingWords, say } from './finding-text';
import type { SolveWarning } from './solve-result';

/** What comes to a junction by one of its pipes, before it mixes. */
export interface Stream {
  readonly pipe: string;
  readonly temperatureK: number;
}

/**
 * Streams of different temperature that meet at a junction: flash steam that comes upon colder condensate collapses at once.
 * @param streams all that flow into one junction
 * @returns a finding at the pipe of the hottest stream
 */
export function thermalShock(streams: readonly Stream[], limits: LimitsInForce): SolveWarning | undefined {
  const [first] = streams;
  if (first === undefined) return undefined;
  let [hottest, coldest] = [first, first];
  for (const stream of streams) {
    if (stream.temperatureK > hottest.temperatureK) hottest = stream;
    if (stream.temperatureK < coldest.temperatureK) coldest = stream;
  }
  const value = hottest.temperatureK - coldest.temperatureK;
  const limit = limits.thermalShock.limitK;
  if (value <= limit) return undefined;
  const text = say`Where this pipe ends its flow, at ${amount('temperature', hottest.temperatureK)}, meets that of ${coldest.pipe}, ${amount('temperatureDifference', value)} colder: above ${amount('temperatureDifference', limit)} its steam collapses with hammer, and the metal is strained.`;
  const remedy = say`Bring the hot stream in from above through a sparge or a flash vessel, or give it a return of its own.`;
  return { code: 'thermalShock', element: hottest.pipe, verdict: 'watch', value, limit, ...findingWords(text, remedy) };
}
