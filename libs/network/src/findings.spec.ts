import { describe, expect, it } from 'vitest';
import { emptyDocument } from './network-document';
import { fileFindings, findings } from './findings';
import { solvablePart } from './solvable-part';
import { documentOf, fileOf, junction, pipe, receiver, smallJson, trap, vessel } from './spec-network';

function told(nodes: unknown[], pipes: unknown[]): string[] {
  return findings(documentOf(smallJson({ nodes, pipes }))).map(({ code, element }) => `${code} ${element?.id ?? '-'}`);
}

const base = [trap('T1'), junction('J1'), receiver('R1')];

describe('a sound network', () => {
  it('has no findings', () => {
    expect(findings(documentOf(smallJson()))).toEqual([]);
  });

  it('an arrow that points the wrong way is the solver’s to tell', () => {
    expect(told(base, [pipe('L1', 'T1', 'J1'), pipe('L2', 'R1', 'J1')])).toEqual(['receiverPipes R1']);
    expect(
      told([...base, junction('J2')], [pipe('L1', 'T1', 'J1'), pipe('L2', 'J2', 'J1'), pipe('L3', 'J2', 'R1')]),
    ).toEqual([]);
  });

  it('a vessel cuts it: what leaves it starts anew', () => {
    const nodes = [...base, vessel('V1'), junction('J2'), trap('T2')];
    const pipes = [
      pipe('a', 'T1', 'J1'),
      pipe('b', 'J1', 'V1'),
      pipe('c', 'V1', 'J2'),
      pipe('d', 'T2', 'J2'),
      pipe('e', 'J2', 'R1'),
    ];
    expect(told(nodes, pipes)).toEqual([]);
  });
});

describe('reach', () => {
  it('an empty network has no receiver', () => {
    expect(findings(emptyDocument('Empty')).map(({ code }) => code)).toEqual(['noReceiver']);
  });

  it('without a receiver one finding says so for all', () => {
    expect(told([trap('T1'), junction('J1')], [pipe('L1', 'T1', 'J1')])).toEqual(['noReceiver -']);
  });

  it('each node from which no receiver is reached is named', () => {
    const nodes = [...base, trap('T2'), junction('J2'), trap('T3')];
    expect(told(nodes, [pipe('L1', 'T1', 'J1'), pipe('L2', 'J1', 'R1'), pipe('L3', 'T2', 'J2')])).toEqual([
      'cutOff T2',
      'cutOff J2',
      'cutOff T3',
    ]);
  });

  it('what a vessel drains into must lead on', () => {
    const pipes = [pipe('L1', 'T1', 'V1'), pipe('L2', 'V1', 'J1')];
    expect(told([trap('T1'), vessel('V1'), junction('J1'), receiver('R1')], pipes)).toEqual(['cutOff J1']);
  });

  it('without a source nothing flows', () => {
    expect(findings(documentOf(smallJson({ nodes: [receiver('R1')], pipes: [] })))).toMatchObject([
      { code: 'noSource', severity: 'note' },
    ]);
  });
});

describe('loops', () => {
  it('loops, pipes side by side and second receivers are sound: the flow divides by itself', () => {
    const nodes = [...base, junction('J2')];
    const pipes = [pipe('a', 'T1', 'J1'), pipe('b', 'J1', 'R1'), pipe('c', 'J1', 'J2'), pipe('d', 'J2', 'R1')];
    expect(told(nodes, pipes)).toEqual([]);
    expect(told(base, [pipe('a', 'T1', 'J1'), pipe('b', 'J1', 'R1'), pipe('c', 'J1', 'R1')])).toEqual([]);
    const two = [...base, receiver('R2')];
    expect(told(two, [pipe('a', 'T1', 'J1'), pipe('b', 'J1', 'R1'), pipe('c', 'J1', 'R2')])).toEqual([]);
  });

  it('a vessel whose liquid may come back to it, but may also go on, is the solver’s to judge', () => {
    const nodes = [trap('T1'), junction('J1'), vessel('V1'), receiver('R1')];
    const round = [pipe('a', 'T1', 'J1'), pipe('b', 'J1', 'V1'), pipe('c', 'V1', 'J1')];
    expect(told(nodes, [...round, pipe('d', 'J1', 'R1')])).toEqual([]);
    const over = [pipe('d', 'J1', 'V2'), pipe('e', 'V2', 'R1')];
    expect(told([...nodes, vessel('V2')], [...round, ...over])).toEqual([]);
  });

  it('a vessel that feeds itself, directly or over another, is named', () => {
    const nodes = [trap('T1'), junction('J1'), vessel('V1'), receiver('R1')];
    expect(told(nodes, [pipe('a', 'T1', 'J1'), pipe('b', 'J1', 'V1'), pipe('c', 'V1', 'J1')])).toEqual(['loop V1']);
    const two = [trap('T1'), vessel('V1'), vessel('V2'), receiver('R1'), vessel('V3')];
    const pipes = [pipe('a', 'T1', 'V1'), pipe('b', 'V1', 'V2'), pipe('c', 'V2', 'V1'), pipe('d', 'V3', 'V1')];
    expect(told(two, pipes)).toEqual(['loop V1', 'loop V2']);
  });
});

describe('pipes at a node', () => {
  it('a trap and a pumped inlet have one, leaving', () => {
    const inlet = { id: 'P1', kind: 'pumpedInlet', elevationM: 0, flowKgS: 1, temperatureK: 350 };
    const nodes = [...base, inlet, junction('J2')];
    const pipes = [pipe('a', 'J1', 'T1'), pipe('b', 'P1', 'J1'), pipe('c', 'P1', 'J2'), pipe('d', 'J1', 'R1')];
    expect(told(nodes, pipes)).toEqual(['trapPipes T1', 'trapPipes P1']);
  });

  it('a flash vessel has exactly one leaving', () => {
    const nodes = [trap('T1'), vessel('V1'), receiver('R1'), receiver('R2')];
    expect(told(nodes, [pipe('a', 'T1', 'V1')])).toEqual(['vesselPipes V1']);
    expect(told(nodes, [pipe('a', 'T1', 'V1'), pipe('b', 'V1', 'R1'), pipe('c', 'V1', 'R2')])).toEqual([
      'vesselPipes V1',
    ]);
  });
});

describe('a pipe by itself', () => {
  const between = (rise: number, more: Record<string, unknown>, lengthM = 10): string[] =>
    told([trap('T1'), { ...receiver('R1'), elevationM: rise }], [pipe('L1', 'T1', 'R1', lengthM, more)]);

  it('has a length, and is as long as it rises or falls', () => {
    expect(between(0, {}, 0)).toEqual(['zeroLength L1']);
    expect(between(10, {})).toEqual([]);
    expect(between(10.1, {})).toEqual(['shorterThanRise L1']);
    expect(between(-10.1, {})).toEqual(['shorterThanRise L1']);
  });

  it('leads to another node', () => {
    expect(told(base, [pipe('a', 'T1', 'J1'), pipe('b', 'J1', 'R1'), pipe('c', 'J1', 'J1')])).toEqual(['selfPipe c']);
  });

  it('has a route that adds up within a millimetre or a thousandth', () => {
    const up = (riseM: number, lengthM = 4): unknown => ({
      route: [
        { lengthM, riseM },
        { lengthM: 6, riseM: 0 },
      ],
    });
    expect(between(4, up(4) as Record<string, unknown>)).toEqual([]);
    expect(between(4, up(4.003) as Record<string, unknown>)).toEqual([]);
    expect(between(4, up(3.9) as Record<string, unknown>)).toEqual(['routeRise L1']);
    expect(between(4, up(4, 4.1) as Record<string, unknown>)).toEqual(['routeLength L1']);
    expect(between(5, up(5) as Record<string, unknown>)).toEqual(['shorterThanRise L1']);
    expect(
      between(0, {
        route: [
          { lengthM: 10, riseM: 0 },
          { lengthM: 0, riseM: 0 },
        ],
      }),
    ).toEqual(['zeroLength L1']);
  });
});

it('a finding of a file points into it, and names the tag', () => {
  const json = smallJson({ pipes: [pipe('L2', 'J1', 'R1', 30), pipe('L1', 'T1', 'J1', 2, { tag: 'CR-1' })] });
  expect(fileFindings(fileOf(json))).toMatchObject([
    { code: 'shorterThanRise', pointer: '/pipes/1/lengthM', what: 'Pipe CR-1 rises 3 m but is only 2 m long' },
  ]);
  expect(fileFindings(fileOf(smallJson({ nodes: [], pipes: [] })))).toMatchObject([{ pointer: '/nodes' }]);
});

it('a gauge past the end of its pipe is noted', () => {
  const json = smallJson({ gauges: [{ id: 'G1', pipe: 'L1', distanceM: 7, elevationM: 0 }] });
  expect(fileFindings(fileOf(json))).toMatchObject([
    { code: 'gaugePastEnd', severity: 'note', pointer: '/gauges/0/distanceM' },
  ]);
});

describe('the solvable part', () => {
  const part = (nodes: unknown[], pipes: unknown[]): string[] => {
    const { nodes: inside, pipes: between } = solvablePart(documentOf(smallJson({ nodes, pipes })));
    return [...inside, ...between];
  };

  it('is all of a sound network', () => {
    expect(part(base, [pipe('L1', 'T1', 'J1'), pipe('L2', 'J1', 'R1')])).toEqual(['T1', 'J1', 'R1', 'L1', 'L2']);
  });

  it('leaves out what stands behind an unsound pipe, and what is cut off', () => {
    const nodes = [...base, trap('T2'), trap('T3')];
    const pipes = [pipe('L1', 'T1', 'J1', 0), pipe('L2', 'J1', 'R1'), pipe('L3', 'T2', 'J1')];
    expect(part(nodes, pipes)).toEqual(['J1', 'R1', 'T2', 'L2', 'L3']);
  });

  it('leaves out a trap with two pipes, but not what drains to the vessel behind which the way is lost', () => {
    const nodes = [...base, vessel('V1'), trap('T2')];
    const pipes = [pipe('a', 'T1', 'J1'), pipe('b', 'T1', 'R1'), pipe('c', 'T2', 'V1'), pipe('d', 'V1', 'J1')];
    expect(part(nodes, pipes)).toEqual(['R1', 'V1', 'T2', 'c']);
  });
});

it('a line of 50,000 pipes overflows nothing', () => {
  const count = 50_000;
  const nodes = [receiver('J0'), ...Array.from({ length: count }, (_, i) => junction(`J${i + 1}`))];
  const pipes = Array.from({ length: count }, (_, i) => pipe(`L${i}`, `J${i + 1}`, `J${i}`));
  const line = documentOf(smallJson({ nodes, pipes }));
  expect(findings(line).map(({ code }) => code)).toEqual(['noSource']);
  expect(solvablePart(line).pipes.size).toBe(count);
});
