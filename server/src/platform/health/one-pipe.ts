import { readNetworkFile } from '@riseback/network';
import type { SolvePort } from '../../solve/solve-port';

/** The smallest network there is, in the form of the network file. */
const ONE_PIPE = {
  format: 'riseback-network',
  version: 1,
  name: 'readiness',
  site: { atmosphericPressurePa: 101_325, ambientTemperatureK: 293.15 },
  nodes: [
    { id: 'T', kind: 'trap', elevationM: 0, inletPressurePa: 500_000, loadKgS: 0.01 },
    { id: 'R', kind: 'receiver', elevationM: 0, pressurePa: 101_325 },
  ],
  pipes: [{ id: 'P', from: 'T', to: 'R', lengthM: 1, insideDiameterM: 0.025 }],
};

/** Whether the solver can still solve it. */
export async function solvesOnePipe(solver: SolvePort): Promise<boolean> {
  const read = readNetworkFile(ONE_PIPE);
  if (!read.ok) return false;
  const ended = await solver.solve('readiness', { file: read.file, caseIds: [''], partial: false, bands: false });
  const outcome = ended.end === 'finished' ? ended.outcomes[0] : undefined;
  return outcome?.status === 'solved' && outcome.result.converged;
}
