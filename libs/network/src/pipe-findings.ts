import type { NetworkNode, PipeRun, RoutePiece } from './network-file';
import { nameOf, type DrawnElements, type FindingText, type TopologyFinding } from './topology';

/** Lengths and rises agree within a millimetre or a thousandth: as good as a tape measure and a rounded foot. */
export const ROUTE_TOLERANCE = { absoluteM: 1e-3, relative: 1e-3 } as const;

/** Every solve looks at every pipe: a sound one costs no list of its own. */
const NONE: readonly TopologyFinding[] = [];

/** What is wrong with a pipe by itself, between its two elevations. */
export function pipeFindings(pipe: PipeRun, from: NetworkNode, to: NetworkNode): readonly TopologyFinding[] {
  if (pipe.from === pipe.to) return [selfPipe(pipe)];
  const riseM = to.elevationM - from.elevationM;
  if (pipe.lengthM === 0) return [zeroLength(pipe)];
  const tooShort = Math.abs(riseM) > pipe.lengthM + tolerance(pipe.lengthM);
  if (!tooShort && pipe.route === undefined) return NONE;
  const found = pipe.route === undefined ? [] : routeFindings(pipe, pipe.route, riseM);
  return tooShort ? [shorterThanRise(pipe, riseM), ...found] : found;
}

function selfPipe(pipe: PipeRun): TopologyFinding {
  return {
    ...error(pipe, 'selfPipe', 'to'),
    what: `Pipe ${nameOf(pipe)} leads from ${pipe.from} back to ${pipe.from}`,
    why: 'A pipe carries condensate from one node to another.',
    remedy: 'Lead one of its ends to another node, or delete it.',
  };
}

function zeroLength(pipe: PipeRun): TopologyFinding {
  return {
    ...error(pipe, 'zeroLength', 'lengthM'),
    what: `Pipe ${nameOf(pipe)} has no length`,
    why: 'Friction and rise are counted along the pipe, so a pipe of no length cannot be computed.',
    remedy: 'Give its length; for two nodes at one place, join them into one.',
  };
}

function shorterThanRise(pipe: PipeRun, riseM: number): TopologyFinding {
  const verb = riseM > 0 ? 'rises' : 'falls';
  return {
    ...error(pipe, 'shorterThanRise', 'lengthM'),
    ...said([`Pipe ${nameOf(pipe)} ${verb} `, metres(Math.abs(riseM)), ' but is only ', metres(pipe.lengthM), ' long']),
    why: 'A pipe is at least as long as the difference of its two elevations.',
    remedy: `Correct its length, or the elevation of ${pipe.from} or ${pipe.to}.`,
  };
}

function routeFindings(pipe: PipeRun, route: readonly RoutePiece[], riseM: number): TopologyFinding[] {
  const found: TopologyFinding[] = [];
  for (const [index, piece] of route.entries()) {
    const place = `Piece ${index + 1} of the route of pipe ${nameOf(pipe)}`;
    if (piece.lengthM === 0) {
      found.push({
        ...error(pipe, 'zeroLength', 'route'),
        what: `${place} has no length`,
        why: 'Friction and rise are counted along the pipe, so a piece of no length cannot be computed.',
        remedy: 'Give its length, or take the piece out of the route.',
      });
    } else if (Math.abs(piece.riseM) > piece.lengthM + tolerance(piece.lengthM)) {
      found.push({
        ...error(pipe, 'shorterThanRise', 'route'),
        ...said([
          `${place} ${piece.riseM > 0 ? 'rises' : 'falls'} `,
          metres(Math.abs(piece.riseM)),
          ' over only ',
          metres(piece.lengthM),
        ]),
        why: 'A piece of pipe is at least as long as its rise or fall.',
        remedy: 'Correct the length or the rise of this piece.',
      });
    }
  }
  const lengthM = sum(route.map((piece) => piece.lengthM));
  if (Math.abs(lengthM - pipe.lengthM) > tolerance(pipe.lengthM)) {
    found.push({
      ...error(pipe, 'routeLength', 'route'),
      ...said([
        `The route of pipe ${nameOf(pipe)} adds up to `,
        metres(lengthM),
        ', but the pipe is ',
        metres(pipe.lengthM),
        ' long',
      ]),
      why: `The pieces of a route add up to the pipe's length ${WITHIN}.`,
      remedy: 'Correct a piece of the route, or the length of the pipe.',
    });
  }
  const routeRiseM = sum(route.map((piece) => piece.riseM));
  const climbedM = sum(route.map((piece) => Math.abs(piece.riseM)));
  if (Math.abs(routeRiseM - riseM) > tolerance(Math.max(climbedM, Math.abs(riseM)))) {
    found.push({
      ...error(pipe, 'routeRise', 'route'),
      ...said([
        `The route of pipe ${nameOf(pipe)} rises `,
        metres(routeRiseM),
        ' in all, but its ends differ by ',
        metres(riseM),
      ]),
      why: `The rises and falls of a route add up to the difference of the pipe's two elevations ${WITHIN}.`,
      remedy: `Correct a piece of the route, or the elevation of ${pipe.from} or ${pipe.to}.`,
    });
  }
  return found;
}

/** A gauge that stands further along than its pipe is long. */
export function gaugeFindings({ gauges, pipes }: Pick<DrawnElements, 'gauges' | 'pipes'>): TopologyFinding[] {
  if (gauges.length === 0) return [];
  const found: TopologyFinding[] = [];
  const pipeOf = new Map(pipes.map((pipe) => [pipe.id, pipe]));
  for (const gauge of gauges) {
    const { id } = gauge;
    const pipe = gauge.pipe === undefined ? undefined : pipeOf.get(gauge.pipe);
    if (pipe === undefined || gauge.distanceM === undefined) continue;
    if (gauge.distanceM <= pipe.lengthM + tolerance(pipe.lengthM)) continue;
    found.push({
      code: 'gaugePastEnd',
      severity: 'note',
      element: { in: 'gauges', id },
      key: 'distanceM',
      ...said([
        `Gauge ${nameOf(gauge)} stands `,
        metres(gauge.distanceM),
        ` along pipe ${nameOf(pipe)}, which is only `,
        metres(pipe.lengthM),
        ' long',
      ]),
      why: 'Its readings cannot be compared with a pressure in that pipe.',
      remedy: 'Correct its distance from the start of the pipe, or name the pipe that it stands on.',
    });
  }
  return found;
}

const WITHIN = `within ${ROUTE_TOLERANCE.absoluteM * 1e3} mm or ${ROUTE_TOLERANCE.relative * 100} %`;

function tolerance(lengthM: number): number {
  return Math.max(ROUTE_TOLERANCE.absoluteM, ROUTE_TOLERANCE.relative * lengthM);
}

function error(
  pipe: PipeRun,
  code: TopologyFinding['code'],
  key: string,
): Pick<TopologyFinding, 'code' | 'severity' | 'element'> & { key: string } {
  return { code, severity: 'error', element: { in: 'pipes', id: pipe.id }, key };
}

function sum(numbers: readonly number[]): number {
  return numbers.reduce((total, number) => total + number, 0);
}

function metres(si: number): FindingText[number] {
  return { quantity: 'length', si };
}

/** A sentence with lengths in it, for the command line in metres to the millimetre. */
function said(whatText: FindingText): Pick<TopologyFinding, 'what'> & { whatText: FindingText } {
  const what = whatText.map((part) => (typeof part === 'string' ? part : `${Number(part.si.toFixed(3))} m`)).join('');
  return { what, whatText };
}
