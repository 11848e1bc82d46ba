import type { NetworkFile } from '@riseback/network';
import { amount, findingWords, say } from './finding-text';
import type { NetworkState } from './network-state';
import type { SolveWarning } from './solve-result';

/** A pressure difference below this shuts no check valve. */
const SHUT_PA = 1;

/** Check valves that stand shut because the pressure beyond is higher, so that what comes to them takes another way. */
export function shutValves(file: NetworkFile, { tree, flows, walk }: NetworkState): SolveWarning[] {
  return tree.chords.flatMap((chord) => {
    const pipe = file.pipes[chord];
    if (pipe?.checkValve !== true || flows.pipeFlowKgS[chord] !== 0) return [];
    const before = walk.pressurePa[tree.from[chord] as number] as number;
    const beyond = walk.pressurePa[tree.to[chord] as number] as number;
    const value = beyond - before;
    if (value <= SHUT_PA) return [];
    const text = say`The check valve in this pipe stands shut: the pressure beyond it is ${amount('pressureDifference', value)} higher than before it, so everything takes the other way.`;
    const remedy = say`If this pipe is meant to carry condensate, bring down the pressure beyond it, or keep lines of such different pressure apart.`;
    return [{ code: 'checkValveShut', element: pipe.id, verdict: 'watch', value, ...findingWords(text, remedy) }];
  });
}
