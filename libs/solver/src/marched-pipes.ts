import type { MarchedPipe } from './pipe-march';

type Writable<T> = { -readonly [Key in keyof T]: T[Key] };
/** A march's figures that its keeper has filled in anew for each pipe. */
export type MarchRecord = Writable<MarchedPipe>;

/** Of nearly every pipe. */
export const NO_UPPER_PIECES: readonly number[] = [];

export function blankMarch(): MarchRecord {
  return {
    upstreamPressurePa: NaN,
    outletPressurePa: NaN,
    upperOutletsPa: NO_UPPER_PIECES,
    staticPa: NaN,
    frictionPa: NaN,
    flashPa: NaN,
  };
}

/** What the march gave for each pipe, in columns: an object for each would be a fifth of what a solve leaves to the garbage collector. */
export class MarchedPipes {
  private readonly upstreamPressurePa: Float64Array;
  private readonly outletPressurePa: Float64Array;
  private readonly staticPa: Float64Array;
  private readonly frictionPa: Float64Array;
  private readonly flashPa: Float64Array;
  /** Of the pipes that have any. */
  private readonly upperOutletsPa = new Map<number, readonly number[]>();

  constructor(count: number) {
    this.upstreamPressurePa = new Float64Array(count).fill(NaN);
    this.outletPressurePa = new Float64Array(count);
    this.staticPa = new Float64Array(count);
    this.frictionPa = new Float64Array(count);
    this.flashPa = new Float64Array(count);
  }

  set(pipe: number, marched: MarchedPipe): void {
    this.upstreamPressurePa[pipe] = marched.upstreamPressurePa;
    this.outletPressurePa[pipe] = marched.outletPressurePa;
    this.staticPa[pipe] = marched.staticPa;
    this.frictionPa[pipe] = marched.frictionPa;
    this.flashPa[pipe] = marched.flashPa;
    if (marched.upperOutletsPa.length > 0) this.upperOutletsPa.set(pipe, marched.upperOutletsPa);
  }

  has(pipe: number): boolean {
    return !Number.isNaN(this.upstreamPressurePaOf(pipe));
  }

  /** Not a number where the pipe was not marched. */
  upstreamPressurePaOf(pipe: number): number {
    return this.upstreamPressurePa[pipe] as number;
  }

  /** Fills in the figures of a pipe that was marched. */
  fill(record: MarchRecord, pipe: number): void {
    record.upstreamPressurePa = this.upstreamPressurePa[pipe] as number;
    record.outletPressurePa = this.outletPressurePa[pipe] as number;
    record.staticPa = this.staticPa[pipe] as number;
    record.frictionPa = this.frictionPa[pipe] as number;
    record.flashPa = this.flashPa[pipe] as number;
    record.upperOutletsPa = this.upperOutletsPa.get(pipe) ?? NO_UPPER_PIECES;
  }
}
