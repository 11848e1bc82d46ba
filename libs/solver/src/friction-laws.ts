import {
  byPatternGradient,
  flashVapourLiquidGradient,
  flashVapourSteamGradient,
  friedelGradient,
  homogeneousGradient,
  liquidOnlyGradient,
  lockhartMartinelliGradient,
  mullerSteinhagenHeckGradient,
  voidFractionChisholm,
  voidFractionHomogeneous,
  voidFractionRouhaniAxelsson,
  voidFractionZivi,
  type FlashingFlow,
  type LiquidSurface,
  type VoidFraction,
} from '@riseback/hydraulics';
import type { FrictionMethod, Method } from '@riseback/network';

/** The methods a network may choose, and the wavy surface that only the credible band looks at. */
export type FrictionLawName = FrictionMethod | 'byPatternWavy';

/** Where a gradient writes its parts. */
export const STATIC = 0;
export const FRICTION = 1;
export const FLASH = 2;
export const PARTS = 3;

/** How the march lets a friction method answer at a point where liquid and vapour flow together. */
export interface FrictionLaw {
  /**
   * Writes what the liquid costs and what flash adds [Pa/m].
   * @returns the share of the flow that takes the whole bore: it is sped up, and gives its head back in a fall; what runs
   *   stratified does neither
   */
  readonly write: (flow: FlashingFlow, parts: Float64Array) => number;
  /** The vapour has the bore to itself: it chokes by its own flux, and there is no acceleration term. */
  readonly vapourAlone: boolean;
}

type FrictionLaws = Readonly<Record<FrictionLawName, FrictionLaw>>;

export const FRICTION_LAWS: FrictionLaws = lawsThat(writeAboveLiquid);

/** The same for whoever asks for the whole gradient alone, which stands as friction: what the liquid would cost is not looked for. */
export const UNDIVIDED_FRICTION_LAWS: FrictionLaws = lawsThat(writeWhole);

export const VOID_FRACTION_LAWS: Readonly<Record<Method['voidFraction'], VoidFraction>> = {
  homogeneous: voidFractionHomogeneous,
  zivi: voidFractionZivi,
  chisholm: voidFractionChisholm,
  rouhaniAxelsson: voidFractionRouhaniAxelsson,
};

function writeFlashVapour(flow: FlashingFlow, parts: Float64Array): number {
  parts[FRICTION] = flashVapourLiquidGradient(flow);
  parts[FLASH] = flashVapourSteamGradient(flow);
  return 1;
}

/** How a gradient of both phases together is written in parts. */
type Divide = (flow: FlashingFlow, totalPaM: number, parts: Float64Array) => void;

function lawsThat(divide: Divide): FrictionLaws {
  return {
    flashVapour: { write: writeFlashVapour, vapourAlone: true },
    homogeneous: fullBore(homogeneousGradient, divide),
    lockhartMartinelli: fullBore(lockhartMartinelliGradient, divide),
    friedel: fullBore(friedelGradient, divide),
    mullerSteinhagenHeck: fullBore(mullerSteinhagenHeckGradient, divide),
    byPattern: patterned('smooth', divide),
    byPatternWavy: patterned('wavy', divide),
  };
}

function fullBore(gradient: (flow: FlashingFlow) => number, divide: Divide): FrictionLaw {
  return {
    write: (flow, parts) => {
      divide(flow, gradient(flow), parts);
      return 1;
    },
    vapourAlone: false,
  };
}

function patterned(surface: LiquidSurface, divide: Divide): FrictionLaw {
  return {
    write: (flow, parts) => {
      const { gradientPaM, fullBoreShare } = byPatternGradient(flow, surface);
      divide(flow, gradientPaM, parts);
      return fullBoreShare;
    },
    vapourAlone: false,
  };
}

/** Friction is what the whole flow would cost as liquid, but never more than all of it; flash is the rest. */
function writeAboveLiquid(flow: FlashingFlow, totalPaM: number, parts: Float64Array): void {
  const liquidPaM = Math.min(liquidOnlyGradient(flow), totalPaM);
  parts[FRICTION] = liquidPaM;
  parts[FLASH] = totalPaM - liquidPaM;
}

function writeWhole(_flow: FlashingFlow, totalPaM: number, parts: Float64Array): void {
  parts[FRICTION] = totalPaM;
  parts[FLASH] = 0;
}
