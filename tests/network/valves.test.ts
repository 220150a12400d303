import { expect, test } from 'vitest';
import { compileNetwork } from '../../src/network/compile.ts';
import type { Network } from '../../src/network/network.ts';
import { kindOf } from '../../src/parts/catalogue.ts';
import { circuit } from '../notation.ts';

function net(notation: string): Network {
  return compileNetwork(circuit(notation), (name) => {
    const kind = kindOf(name);
    if (!kind) throw new Error(name);
    return kind;
  });
}

test('a counterbalance valve is a valve one way and a free check the other', () => {
  const n = net(
    'V1 counterbalance-valve{setting=120 bar;ratio=4;ratedFlow=60 L/min;fullFlowRise=6 bar;ratedDrop=2 bar}, C1 cylinder | A: V1.C C1.A | B: V1.X C1.B',
  );
  const [a, b, v] = [n.lineOf.get('C1.A'), n.lineOf.get('C1.B'), n.lineOf.get('V1.V')];
  expect(n.valves).toEqual([
    {
      part: 0,
      from: a,
      to: v,
      fromPort: 'C',
      toPort: 'V',
      duty: 'counterbalance',
      signals: [
        { line: a, factor: 1 },
        { line: b, factor: 4 },
        { line: v, factor: -5 },
      ],
      setting: 120e5,
      override: 6e8,
      rated: { flow: 1e-3, drop: 2e5 },
    },
  ]);
  expect(n.paths).toMatchObject([{ from: v, to: a, oneWay: true, throttled: false }]);
  expect(n.paths[0]).not.toHaveProperty('valve');
});

test('a reducing valve is one throttled path for open paths, and that path names the valve that closes it', () => {
  const n = net(
    'S1 sequence-valve, R1 reducing-valve{bypass=true}, T1 tank | main: S1.P R1.P | low: R1.A S1.A | T1.T R1.Y S1.Y',
  );
  expect(n.valves.map((valve) => valve.duty)).toEqual(['sequence', 'closes']);
  const [main, low] = [n.lineOf.get('R1.P'), n.lineOf.get('R1.A')];
  expect(n.paths).toMatchObject([
    { part: 1, from: main, to: low, oneWay: true, throttled: true, input: -1, pilot: -1, valve: 1 },
    { part: 1, from: low, to: main, oneWay: true, throttled: false },
  ]);
});

test('the limit of a flow control stays with its path', () => {
  const n = net('F1 flow-control:flow-control-check{flow=6 L/min}, C1 cylinder, T1 tank | F1.A C1.A | F1.B T1.T');
  expect(n.paths.map((path) => path.limit)).toEqual([1e-4, undefined]);
  expect(n.paths.map((path) => [path.oneWay, path.throttled])).toEqual([
    [false, true],
    [true, false],
  ]);
  expect(n.valves).toEqual([]);
});

test('a pressure switch stands on its line with the pressures at which it comes on and goes off', () => {
  const n = net(
    'G1 pressure-switch{setting=80 bar;difference=15 bar}, G2 pressure-switch{setting=5 bar;difference=9 bar}, C1 cylinder | A: G1.M C1.A G2.M',
  );
  const line = n.lineOf.get('C1.A');
  expect(n.switches).toEqual([
    { part: 0, line, on: 80e5, off: 65e5 },
    { part: 1, line, on: 5e5, off: 0 },
  ]);
});
