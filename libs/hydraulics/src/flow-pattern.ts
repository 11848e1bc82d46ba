import { NonPhysicalInputError } from '@riseback/numerics';
import type { FlashingFlow } from './flash-vapour';
import { levelFlowPattern, type LevelFlowPattern } from './level-flow-pattern';
import { riseFlow, type RiseFlowPattern } from './rise-flow-pattern';
import { STRATIFIED_SLOPE_LIMIT } from './stratified-flow';

export type FlowPattern = LevelFlowPattern | RiseFlowPattern | 'liquid' | 'vapour';

/**
 * Flow pattern at a point of a pipe: Taitel and Dukler's map within 10° of level, Mishima and Ishii's in steeper rises.
 * @returns undefined where neither map answers: a still pipe, and falls steeper than 10°
 * @throws NonPhysicalInputError for NaN, and as the two maps do
 */
export function flowPattern(flow: FlashingFlow): FlowPattern | undefined {
  const { quality, massFlowKgS, fallSlope } = flow;
  if (Number.isNaN(quality + fallSlope)) throw new NonPhysicalInputError('flowPattern', { quality, fallSlope });
  if (massFlowKgS === 0) return undefined;
  if (quality <= 0) return 'liquid';
  if (quality >= 1) return 'vapour';
  if (fallSlope < -STRATIFIED_SLOPE_LIMIT) return riseFlow(flow).pattern;
  return fallSlope <= STRATIFIED_SLOPE_LIMIT ? levelFlowPattern(flow) : undefined;
}
