export {
  type DrawnNode,
  type DrawnPipe,
  type DrawnNetwork,
  type Displaced,
  EMPTY_DRAWING,
  NOTHING_DISPLACED,
  drawnNetwork,
  withDisplaced,
  bendsBeside,
  pipesAt,
  shownBends,
  leavingAxis,
} from '@riseback/figures';
