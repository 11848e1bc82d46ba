import type { NodeKind, TrapType } from '@riseback/network';
import { circlePath, type PathShape, rectanglePath } from './shapes';
import { TRAP_MECHANISMS, UNKNOWN_MECHANISM } from './trap-mechanisms';

/** A part of a symbol: `paper` hides what lies under it, `mark` is filled with ink. */
export interface SymbolPart {
  readonly d: string;
  readonly look: 'paper' | 'ink' | 'thin' | 'water' | 'mark';
}

const ROUND = { d: circlePath(10), look: 'paper' } as const;
const VESSEL = rectanglePath(-32, -13, 64, 27, 6);
const TOWER = rectanglePath(-13, -26, 26, 52, 9);

/** The symbol of a node about its middle; traps fill a grid of 24, vessels more. */
export function nodeSymbol(kind: NodeKind, trapType: TrapType | undefined, vented: boolean): readonly SymbolPart[] {
  switch (kind) {
    case 'trap': {
      const mechanism = trapType === undefined ? UNKNOWN_MECHANISM : TRAP_MECHANISMS[trapType];
      const foot: SymbolPart = { d: 'M-8.4 5.4A10 10 0 0 0 8.4 5.4Z', look: 'mark' };
      return [ROUND, foot, ...mechanism.map((d): SymbolPart => ({ d, look: 'ink' }))];
    }
    case 'junction':
      return [{ d: circlePath(3.4), look: 'paper' }];
    case 'pumpedInlet':
      return [ROUND, { d: 'M-5.6 4.6 0 -6 5.6 4.6Z', look: 'ink' }];
    case 'receiver':
      return [
        { d: VESSEL, look: 'paper' },
        {
          d: 'M-31.2 0q4 -2.4 8 0t8 0t8 0t8 0t8 0t8 0t8 0t7.4 -0.4V8a5.2 5.2 0 0 1 -5.2 5.2H-26A5.2 5.2 0 0 1 -31.2 8Z',
          look: 'water',
        },
        { d: VESSEL, look: 'ink' },
        ...(vented ? [{ d: 'M16 -13V-24M11.5 -24H20.5M12.5 -19.5 16 -24 19.5 -19.5', look: 'ink' } as const] : []),
      ];
    case 'flashVessel':
      return [
        { d: TOWER, look: 'paper' },
        {
          d: 'M-12.2 6q3 -2 6.1 0t6.1 0t6.1 0t6.1 0V16.5A8.6 8.6 0 0 1 3.6 25.2H-3.6A8.6 8.6 0 0 1 -12.2 16.5Z',
          look: 'water',
        },
        { d: TOWER, look: 'ink' },
        { d: 'M0 -26V-37M-3.4 -33 0 -37 3.4 -33', look: 'ink' },
        { d: 'M-4 -10q1.6 -2.4 0 -4.8t0 -4.8M4 -10q1.6 -2.4 0 -4.8t0 -4.8', look: 'thin' },
      ];
  }
}

/** The same as shapes to be painted. */
export function symbolShapes(kind: NodeKind, trapType: TrapType | undefined, vented: boolean): PathShape[] {
  return nodeSymbol(kind, trapType, vented).map(({ d, look }): PathShape => {
    switch (look) {
      case 'paper':
        return { kind: 'path', d, fill: 'paper', stroke: 'ink', width: 1.5 };
      case 'mark':
        return { kind: 'path', d, fill: 'ink' };
      case 'water':
        return { kind: 'path', d, fill: 'water', stroke: 'ink', width: 0.9 };
      case 'ink':
      case 'thin':
        return { kind: 'path', d, stroke: 'ink', width: look === 'thin' ? 1.1 : 1.5, round: true };
    }
  });
}

/** A status by its shape, 10 wide about the origin: never by colour alone. */
export function verdictShapes(verdict: 'fail' | 'watch' | 'pass'): PathShape[] {
  switch (verdict) {
    case 'fail':
      return [{ kind: 'path', d: 'M0 -5 5 0 0 5 -5 0Z', fill: 'fail' }];
    case 'watch':
      return [{ kind: 'path', d: 'M0 -4.6 5 4.2H-5Z', fill: 'paper', stroke: 'watch', width: 1.4 }];
    case 'pass':
      return [
        { kind: 'path', d: circlePath(4.4), stroke: 'pass', width: 1.2 },
        { kind: 'path', d: 'M-2 0.2 -0.6 1.7 2.2 -1.6', stroke: 'pass', width: 1.2, round: true },
      ];
  }
}
