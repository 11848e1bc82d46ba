import type { ProfileBand, ProfilePoint } from '@riseback/solver';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import type { GaugeOnWay } from '@riseback/figures';

/** A place of the profile as a line of its table. */
export interface ProfileRow {
  readonly place: string;
  readonly pipe: string;
  readonly size: string;
  readonly distance: string;
  readonly elevation: string;
  readonly pressure: string;
  readonly credible: string;
  readonly spread: string;
}

export interface ProfileTable {
  readonly points: readonly ProfilePoint[];
  readonly bands: readonly ProfileBand[] | undefined;
  readonly gauges: readonly GaugeOnWay[];
  readonly nameOfPipe: (pipeId: string) => string;
  readonly sizeOf: (pipeId: string) => string;
  readonly trapName: string;
  readonly endName: string;
  readonly units: DisplayUnits;
}

/** The numbers that the figure is drawn from, in its own order, gauges among them. */
export function profileRows(table: ProfileTable): readonly ProfileRow[] {
  const { points, bands, gauges, nameOfPipe, sizeOf, trapName, endName, units } = table;
  const length = (metres: number) => formatQuantity(metres, 'length', units);
  const pressure = (pa: number) => formatQuantity(pa, 'pressure', units, { decimals: 2 });
  const last = points.length - 1;
  const rows = points.map(({ distanceM, elevationM, pressurePa, pipeId }, i): ProfileRow & { distanceM: number } => {
    const band = bands?.[i];
    const endsPipe = points[i + 1]?.pipeId !== pipeId;
    return {
      distanceM,
      place: i === 0 ? trapName : i === last ? endName : endsPipe ? 'End of pipe' : 'Turn of its route',
      pipe: nameOfPipe(pipeId),
      size: sizeOf(pipeId),
      distance: length(distanceM),
      elevation: length(elevationM),
      pressure: pressure(pressurePa),
      credible: band === undefined ? '' : `${pressure(band.credibleLowPa)} to ${pressure(band.credibleHighPa)}`,
      spread: band === undefined ? '' : `${pressure(band.spreadLowPa)} to ${pressure(band.spreadHighPa)}`,
    };
  });
  const taps = gauges.map(({ tag, distanceM, tapElevationM, pressurePa }) => {
    const pipeId = points.find((point) => point.distanceM >= distanceM - 1e-9)?.pipeId ?? '';
    return {
      distanceM,
      place: `Gauge ${tag}, at its tap`,
      pipe: nameOfPipe(pipeId),
      size: sizeOf(pipeId),
      distance: length(distanceM),
      elevation: length(tapElevationM),
      pressure: pressure(pressurePa),
      credible: '',
      spread: '',
    };
  });
  return [...rows, ...taps].sort((a, b) => a.distanceM - b.distanceM);
}
