import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Operator, ValveData } from '../../src/circuit/model.ts';
import {
  boxesOf,
  cyclePath,
  joinPorts,
  kindBetween,
  pathsIn,
  setPath,
  type PathKind,
} from '../../src/circuit/valve-box.ts';
import {
  addOperator,
  changeCoil,
  coilAt,
  moveOperator,
  OPERATORS,
  removeOperator,
} from '../../src/circuit/valve-ends.ts';
import {
  addPort,
  addPosition,
  coilPlaces,
  lostWithPosition,
  movePort,
  movePosition,
  removePort,
  removePosition,
  renamePort,
  renamePosition,
  setCrossovers,
  setPortSide,
  setRest,
} from '../../src/circuit/valve-shape.ts';
import { pathsKey, sameValve, withNamesOf } from '../../src/circuit/valve-alike.ts';
import { RefusedEdit } from '../../src/circuit/refused.ts';
import { checkValve } from '../../src/parts/valve-check.ts';

const VALVE: ValveData = {
  ports: [
    { id: 'A', side: 'top' },
    { id: 'B', side: 'top' },
    { id: 'P', side: 'bottom' },
    { id: 'T', side: 'bottom' },
  ],
  positions: [
    { name: 'a', paths: ['P-A', 'B-T'] },
    { name: '0', paths: ['P-A-B-T'] },
    { name: 'b', paths: ['P-B', 'A-T'] },
  ],
  crossovers: [['A-T'], ['B-T']],
  rest: 1,
  left: ['coil', 'spring'],
  right: ['coil', 'spring'],
  coils: [
    { name: 'a', position: 0 },
    { name: 'b', position: 2 },
  ],
};
const A0 = { of: 'position', index: 0 } as const;
const GAP = { of: 'crossover', index: 0 } as const;
const errors = (valve: ValveData): string[] =>
  checkValve(valve)
    .filter(({ level }) => level !== 'warning')
    .map(({ what }) => what);

test('drawing a path again makes it one way, the other way, throttled and none', () => {
  let valve = setPath(VALVE, A0, 'P', 'A', 'none');
  expect(pathsIn(valve, A0)).toEqual(['B-T']);
  const seen: string[] = [];
  for (let i = 0; i < 5; i++) {
    valve = cyclePath(valve, A0, 'P', 'A');
    seen.push(pathsIn(valve, A0).join(' '));
  }
  expect(seen).toEqual(['B-T P-A', 'B-T P>A', 'B-T A>P', 'B-T P~A', 'B-T']);
});

test('every kind is read back as it was set, from either port, and takes the place of the one before', () => {
  const turned: Partial<Record<PathKind, PathKind>> = {
    there: 'back',
    back: 'there',
    'throttled-there': 'throttled-back',
    'throttled-back': 'throttled-there',
  };
  for (const kind of ['none', 'open', 'there', 'back', 'throttled', 'throttled-there', 'throttled-back'] as const) {
    const valve = setPath(VALVE, A0, 'P', 'A', kind);
    expect(kindBetween(valve, A0, 'P', 'A')).toBe(kind);
    expect(kindBetween(valve, A0, 'A', 'P')).toBe(turned[kind] ?? kind);
    expect(pathsIn(valve, A0)).toHaveLength(kind === 'none' ? 1 : 2);
  }
});

test('ports are joined with all that they are joined to, and taken out again', () => {
  const float = setPath(joinPorts(VALVE, GAP, 'B', 'T'), GAP, 'P', 'A', 'throttled');
  expect(pathsIn(float, GAP)).toEqual(['A-B-T', 'P~A']);
  expect(kindBetween(float, GAP, 'A', 'B')).toBe('joined');
  expect(pathsIn(setPath(float, GAP, 'B', 'A', 'none'), GAP)).toEqual(['B-T', 'P~A']);
  // What is left of three may be a path that is there already.
  const twice: ValveData = { ...VALVE, crossovers: [['A-B-T', 'P-A'], []] };
  expect(errors(setPath(twice, GAP, 'A', 'B', 'none'))).toEqual([]);
});

test('a path to itself, to a port that is not there or in a box that is not there is refused', () => {
  expect(() => setPath(VALVE, A0, 'P', 'P', 'open')).toThrow('port it comes from');
  expect(() => cyclePath(VALVE, A0, 'P', 'Q')).toThrow('no port Q');
  expect(() => setPath(VALVE, { of: 'crossover', index: 2 }, 'P', 'A', 'open')).toThrow('no such box');
});

test('a port that goes takes its paths along; what was joined through it stays joined', () => {
  const valve = removePort(VALVE, 'B');
  expect(valve.positions.map(({ paths }) => paths)).toEqual([['P-A'], ['P-A-T'], ['A-T']]);
  expect(valve.crossovers).toEqual([['A-T'], []]);
  expect(() => removePort(removePort(valve, 'A'), 'P')).toThrow('at least 2 ways');
});

test('a port gets the next letter, another name in every path, another place on its edge, the other edge', () => {
  const five = addPort(addPort(VALVE, 'top'), 'bottom');
  expect(five.ports.map(({ id }) => id)).toEqual(['A', 'B', 'P', 'T', 'C', 'R']);
  const named = renamePort(VALVE, 'T', 'T1');
  expect(named.positions.map(({ paths }) => paths)).toEqual([['P-A', 'B-T1'], ['P-A-B-T1'], ['P-B', 'A-T1']]);
  expect(named.crossovers).toEqual([['A-T1'], ['B-T1']]);
  expect(() => renamePort(VALVE, 'T', 'P')).toThrow('called P');
  expect(() => renamePort(VALVE, 'T', '1')).toThrow('cannot be the name');
  expect(() => renamePort(VALVE, 'T', 'constructor')).toThrow('cannot be the name');
  expect(movePort(VALVE, 'T', -1).ports.map(({ id }) => id)).toEqual(['A', 'B', 'T', 'P']);
  expect(movePort(VALVE, 'B', 5)).toEqual(VALVE);
  expect(setPortSide(VALVE, 'T', 'top').ports[3]).toEqual({ id: 'T', side: 'top' });
});

test('rest, coils and crossovers follow the positions; what cannot is told before it goes', () => {
  const four = addPosition(VALVE);
  expect(four.positions[3]).toEqual({ name: 'c', paths: [] });
  expect(() => addPosition(four)).toThrow('at most 4');
  const turned = movePosition(VALVE, 0, 1);
  expect(turned.positions.map(({ name }) => name)).toEqual(['0', 'a', 'b']);
  expect([turned.rest, turned.coils?.map(({ position }) => position)]).toEqual([0, [1, 2]]);
  // Between a and b nothing is known, since they were no neighbours.
  expect(turned.crossovers).toEqual([['A-T']]);
  expect(lostWithPosition(VALVE, 0)).toEqual(['coil a']);
  const two = removePosition(VALVE, 0);
  expect(two).toMatchObject({ rest: 0, coils: [{ name: 'b', position: 1 }], left: ['spring'], crossovers: [['B-T']] });
  expect(lostWithPosition(VALVE, 1)).toEqual(['the rest position', 'the crossovers from there on']);
  expect(removePosition(VALVE, 1)).not.toHaveProperty('crossovers');
  expect(() => removePosition(two, 0)).toThrow('at least 2');
  expect(() => renamePosition(VALVE, 0, 'b')).toThrow('called "b"');
  expect(renamePosition(VALVE, 0, ' raise ').positions[0]?.name).toBe('raise');
});

test('crossovers are unknown, shut, joined, or completed where some are missing', () => {
  expect(setCrossovers(VALVE, 'unknown')).not.toHaveProperty('crossovers');
  expect(setCrossovers(VALVE, 'joined').crossovers).toEqual([['A-B-P-T'], ['A-B-P-T']]);
  expect(setCrossovers({ ...VALVE, crossovers: [['A-T']] }, 'complete').crossovers).toEqual([['A-T'], []]);
  expect(boxesOf({ ...VALVE, crossovers: [['A-T']] }).map(({ of, index }) => `${of} ${index}`)).toEqual([
    'position 0',
    'crossover 0',
    'position 1',
    'position 2',
  ]);
});

test('a coil that is drawn is bound at once, and goes with its binding', () => {
  const bare = removeOperator(removeOperator(VALVE, 'left', 0), 'right', 0);
  expect(bare).toMatchObject({ left: ['spring'], right: ['spring'] });
  expect(bare).not.toHaveProperty('coils');
  const again = addOperator(addOperator(bare, 'right', 'coil'), 'left', 'coil');
  // Coils are listed from left to right, each bound to the nearest position that is no rest.
  expect(again.coils).toEqual([
    { name: 'b', position: 0 },
    { name: 'a', position: 2 },
  ]);
  expect(coilAt(again, 'left', 1)).toBe(0);
  const three = addOperator(again, 'left', 'coil');
  expect(three.coils?.map(({ name }) => name)).toEqual(['c', 'b', 'a']);
  // The outer one of the two comes nearest to the box.
  const inwards = moveOperator(three, 'left', 2, -2);
  expect(inwards.left).toEqual(['coil', 'spring', 'coil']);
  expect(inwards.coils?.map(({ name }) => name)).toEqual(['b', 'c', 'a']);
  expect(changeCoil(again, 0, { name: 'Y1', position: 2 }).coils?.[0]).toEqual({ name: 'Y1', position: 2 });
  expect(() => changeCoil(again, 0, { name: 'a' })).toThrow('called "a"');
  expect(() => changeCoil(again, 0, { position: 3 })).toThrow('no position 4');
});

test('valves are the same whatever order and direction their paths are written in, and whatever things are called', () => {
  expect(pathsKey(['P-A', 'T-B-P', 'A>T'])).toBe(pathsKey(['A>T', 'B-P-T', 'A-P']));
  expect(pathsKey(['P>A'])).not.toBe(pathsKey(['A>P']));
  const named = renamePosition(changeCoil(VALVE, 0, { name: 'Y1' }), 0, 'raise');
  expect(sameValve(named, VALVE)).toBe(true);
  expect(sameValve(setRest(VALVE, 0), VALVE)).toBe(false);
  expect(withNamesOf(VALVE, named)).toEqual(named);
  expect(withNamesOf(addPosition(VALVE), named).positions[0]?.name).toBe('a');
});

const step = fc.record({
  what: fc.nat(14),
  a: fc.nat(8),
  b: fc.nat(8),
  kind: fc.constantFrom<PathKind>(
    'none',
    'open',
    'there',
    'back',
    'throttled',
    'throttled-there',
    'throttled-back',
    'joined',
  ),
  operator: fc.constantFrom<Operator>(...OPERATORS),
  end: fc.constantFrom('left', 'right'),
});
type Step = typeof step extends fc.Arbitrary<infer T> ? T : never;

function perform(valve: ValveData, { what, a, b, kind, operator, end }: Step): ValveData {
  const box = boxesOf(valve)[a % boxesOf(valve).length] ?? A0;
  const port = (i: number): string => valve.ports[i % valve.ports.length]?.id ?? '';
  const position = a % valve.positions.length;
  switch (what) {
    case 0:
      return addPort(valve, a % 2 === 0 ? 'top' : 'bottom');
    case 1:
      return removePort(valve, port(a));
    case 2:
      return movePort(valve, port(a), b - 4);
    case 3:
      return setPortSide(valve, port(a), b % 2 === 0 ? 'top' : 'bottom');
    case 4:
      return renamePort(valve, port(a), `N${b}`);
    case 5:
      return addPosition(valve, b % (valve.positions.length + 1));
    case 6:
      return removePosition(valve, position);
    case 7:
      return movePosition(valve, position, b - 4);
    case 8:
      return setRest(valve, b === 0 ? undefined : position);
    case 9:
      return setCrossovers(valve, (['unknown', 'shut', 'joined', 'complete'] as const)[b % 4] ?? 'shut');
    case 10:
      return addOperator(valve, end, operator);
    case 11:
      return removeOperator(valve, end, a % Math.max(1, valve[end].length));
    case 12:
      return moveOperator(valve, end, a % Math.max(1, valve[end].length), b - 4);
    case 13:
      return cyclePath(valve, box, port(a), port(b));
    default:
      return setPath(valve, box, port(a), port(b), kind);
  }
}

test('whatever is done, a valve stays one that can be saved and opened, with its coils in step', () => {
  fc.assert(
    fc.property(fc.array(step, { maxLength: 40 }), (steps) => {
      let valve = VALVE;
      for (const each of steps) {
        try {
          valve = perform(valve, each);
        } catch (error) {
          expect(error).toBeInstanceOf(RefusedEdit);
        }
        expect(errors(valve)).toEqual([]);
        expect(coilPlaces(valve)).toHaveLength(valve.coils?.length ?? 0);
        expect(valve.crossovers?.length ?? 0).toBeLessThan(valve.positions.length);
      }
    }),
    { numRuns: 300 },
  );
});
