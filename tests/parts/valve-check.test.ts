import { expect, test } from 'vitest';
import type { ValveData } from '../../src/circuit/model.ts';
import { checkValve } from '../../src/parts/valve-check.ts';

const GOOD: ValveData = {
  ports: [
    { id: 'A', side: 'top' },
    { id: 'B', side: 'top' },
    { id: 'P', side: 'bottom' },
    { id: 'T', side: 'bottom' },
  ],
  positions: [
    { name: 'a', paths: ['P-A', 'B-T'] },
    { name: '0', paths: [] },
    { name: 'b', paths: ['P-B', 'A-T'] },
  ],
  left: ['coil', 'spring'],
  right: ['coil', 'spring'],
  rest: 1,
  coils: [
    { name: 'a', position: 0 },
    { name: 'b', position: 2 },
  ],
};
const paths = (...list: string[]): ValveData => ({
  ...GOOD,
  positions: [{ name: 'a', paths: list }, ...GOOD.positions.slice(1)],
});
const manyPorts = (count: number): ValveData => ({
  ...GOOD,
  ports: Array.from({ length: count }, (_, index) => ({ id: `N${index}`, side: 'top' as const })),
  positions: GOOD.positions.map(({ name }) => ({ name, paths: [] })),
});

test('a sound valve has nothing to report', () => {
  expect(checkValve(GOOD)).toEqual([]);
  expect(checkValve({ ...GOOD, crossovers: [['P-T'], []] })).toEqual([]);
});

test.each<[string, ValveData, string, RegExp]>([
  ['unknown port in a path', paths('P-Z'), 'valve.positions[0].paths[0]', /port Z/],
  ['unreadable path', paths('P-A', 'B=T'), 'valve.positions[0].paths[1]', /not a path/],
  ['two same paths', paths('P-A', 'B-T', 'A-P'), 'valve.positions[0].paths[2]', /same as "P-A"/],
  ['path within joined ports', paths('P-A-B', 'A-B'), 'valve.positions[0].paths[1]', /lies within/],
  ['same one-way path', paths('P>A', 'P>A'), 'valve.positions[0].paths[1]', /same/],
  [
    'one position',
    { ...GOOD, positions: GOOD.positions.slice(0, 1), rest: 0, coils: [] },
    'valve.positions',
    /1 position\./,
  ],
  [
    'five positions',
    { ...GOOD, positions: ['a', '0', 'b', 'c', 'd'].map((name) => ({ name, paths: [] })) },
    'valve.positions',
    /5 positions/,
  ],
  ['one way', manyPorts(1), 'valve.ports', /1 way\./],
  ['nine ways', manyPorts(9), 'valve.ports', /9 ways/],
  ['two ports of one name', { ...GOOD, ports: [...GOOD.ports, { id: 'A', side: 'top' }] }, 'valve.ports', /called A/],
  [
    'port name with a sign',
    { ...GOOD, ports: [...GOOD.ports, { id: 'A-1', side: 'top' }] },
    'valve.ports[4].id',
    /"A-1"/,
  ],
  [
    'two positions of one name',
    { ...GOOD, positions: GOOD.positions.map((each) => ({ ...each, name: 'a' })) },
    'valve.positions',
    /called "a"/,
  ],
  [
    'nameless position',
    { ...GOOD, positions: GOOD.positions.map((each, index) => (index === 2 ? { ...each, name: ' ' } : each)) },
    'valve.positions[2].name',
    /no name/,
  ],
  ['rest out of range', { ...GOOD, rest: 3 }, 'valve.rest', /rest position is 3/],
  ['rest between positions', { ...GOOD, rest: 0.5 }, 'valve.rest', /0\.5/],
  [
    'coil to no position',
    {
      ...GOOD,
      coils: [
        { name: 'a', position: 7 },
        { name: 'b', position: 2 },
      ],
    },
    'valve.coils[0].position',
    /position 7/,
  ],
  [
    'two coils of one name',
    {
      ...GOOD,
      coils: [
        { name: 'a', position: 0 },
        { name: 'a', position: 2 },
      ],
    },
    'valve.coils',
    /called "a"/,
  ],
  ['crossover names a strange port', { ...GOOD, crossovers: [['P-Q']] }, 'valve.crossovers[0][0]', /port Q/],
  ['too many crossovers', { ...GOOD, crossovers: [[], [], []] }, 'valve.crossovers', /3 crossovers/],
])('%s is an error', (_, data, where, what) => {
  const problem = checkValve(data).find((each) => each.where === where && what.test(each.what));
  expect(problem, JSON.stringify(checkValve(data))).toBeDefined();
  expect(problem?.level ?? 'error').toBe('error');
  expect(problem?.remedy).not.toBe('');
});

test.each<[string, ValveData, string, RegExp]>([
  ['rest without a spring', { ...GOOD, left: ['coil'], right: ['coil'] }, 'valve.rest', /no spring/],
  ['spring without a rest position', (({ rest: _rest, ...data }) => data)(GOOD), 'valve.rest', /keeps its last/],
  [
    'coil to the rest position',
    {
      ...GOOD,
      coils: [
        { name: 'a', position: 0 },
        { name: 'b', position: 1 },
      ],
    },
    'valve.coils[1].position',
    /rest position/,
  ],
  [
    'coil drawn but not bound',
    { ...GOOD, coils: [{ name: 'a', position: 0 }] },
    'valve.coils',
    /2 coils are drawn, but 1 is bound/,
  ],
  ['nothing moves it', { ...GOOD, left: ['spring'], right: ['spring'], coils: [] }, 'valve.left', /Nothing is drawn/],
  ['pilot', { ...GOOD, left: ['pilot', 'coil', 'spring'] }, 'valve.left', /pilot is drawn/],
])('%s is a warning', (_, data, where, what) => {
  expect(checkValve(data).find((each) => each.where === where && what.test(each.what))?.level).toBe('warning');
});

test('a one-way and a throttled path may stand side by side', () => {
  expect(checkValve(paths('P>A', 'P~A', 'B-T'))).toEqual([]);
});
