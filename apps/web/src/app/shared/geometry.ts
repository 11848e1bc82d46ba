export {
  type Axis,
  type PointOnLine,
  rightAngled,
  distance,
  lineLength,
  pieces,
  pointAt,
  cutLine,
  longestPiece,
  middle,
  distanceToPiece,
} from '@riseback/figures';
