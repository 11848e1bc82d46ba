import type { Band } from '@riseback/contracts';
import type { StaffModel, StaffPartKind } from './staff-model';

/** The bands lie under the tube: a thin line for the spread, a broad one on it for the credible part. */
export const FLAT = { height: 18, tubeTop: 5, tubeHeight: 6, bandY: 15.5 } as const;

/** A stretch of the staff, from and to, px. */
export interface FlatStretch {
  readonly from: number;
  readonly to: number;
}

export interface FlatStaff {
  readonly parts: readonly { readonly kind: StaffPartKind; readonly x: number; readonly width: number }[];
  readonly tubeWidth: number;
  readonly inletX: number;
  readonly backX: number;
  readonly limitX: number | null;
  readonly spread: FlatStretch | null;
  readonly credible: FlatStretch | null;
}

/** Where everything of a flat staff stands: pressure runs to the right, from the foot to the scale's maximum. */
export function flatStaff(model: StaffModel, width: number, scaleMaximumPa: number | undefined): FlatStaff {
  const maximumPa = Math.max(scaleMaximumPa ?? model.topPa, model.footPa + 1);
  // half the back pressure's tick is kept free at both ends
  const xOf = (pa: number) => {
    const share = (pa - model.footPa) / (maximumPa - model.footPa);
    return 1 + Math.min(1, Math.max(0, share)) * (width - 2);
  };
  return {
    parts: model.parts.map(({ kind, fromPa, toPa }) => ({ kind, x: xOf(fromPa), width: xOf(toPa) - xOf(fromPa) })),
    tubeWidth: xOf(Math.max(model.inletPa, model.backPa)) - xOf(model.footPa),
    inletX: xOf(model.inletPa),
    backX: xOf(model.backPa),
    limitX: model.limitPa === undefined ? null : xOf(model.limitPa),
    spread: stretch(model.spread, xOf),
    credible: stretch(model.credible, xOf),
  };
}

function stretch(band: Band | undefined, xOf: (pa: number) => number): FlatStretch | null {
  return band === undefined ? null : { from: xOf(band.lowPa), to: xOf(band.highPa) };
}
