import { expect, test } from 'vitest';
import type { Point } from '../../src/base/points.ts';
import { crossings, junctionDots } from '../../src/drawing/joints.ts';
import { lineNumbers } from '../../src/drawing/lines.ts';
import { freshPieces } from '../../src/drawing/pieces.ts';
import { routeAll } from '../../src/drawing/routing.ts';
import { circuit, joins, part } from './samples.ts';

const at = (x: number, y: number): Point => ({ x, y });
const path = (...pairs: [number, number][]): Point[] => pairs.map(([x, y]) => at(x, y));

// Check valves: A 3 M below, B 3 M above the origin.
const three = [
  part('a', 'check-valve', at(0, 40)),
  part('b', 'check-valve', at(0, 0)),
  part('c', 'check-valve', at(20, 0)),
];

test('one connection has no dot', () => {
  const sheet = circuit(three, joins('a.B b.A'));
  expect(junctionDots(sheet, routeAll(sheet))).toEqual([]);
});

test('a branch off a shared trunk has one dot, where it leaves the trunk', () => {
  const sheet = circuit(three, joins('a.B b.A', 'a.B c.A'));
  const routes = new Map([
    ['c1', path([0, 37], [0, 3])],
    ['c2', path([0, 37], [0, 20], [20, 20], [20, 3])],
  ]);
  expect(junctionDots(sheet, routes)).toEqual([{ at: at(0, 20), line: 0 }]);
});

test('a port that two lines leave in different ways has its dot on the port', () => {
  const sheet = circuit(three, joins('b.A a.B', 'b.A c.A'));
  const routes = new Map([
    ['c1', path([0, 3], [0, 37])],
    ['c2', path([0, 3], [20, 3])],
  ]);
  expect(junctionDots(sheet, routes)).toEqual([{ at: at(0, 3), line: 0 }]);
});

test('a joint has a dot for three lines and none for two', () => {
  const parts = [...three, part('j', 'junction', at(0, 20))];
  const two = circuit(parts, joins('a.B j.J', 'j.J b.A'));
  const all = circuit(parts, joins('a.B j.J', 'j.J b.A', 'j.J c.A'));
  expect(junctionDots(two, routeAll(two))).toEqual([]);
  expect(junctionDots(all, routeAll(all))).toEqual([{ at: at(0, 20), line: 0 }]);
});

test('routes of one line that meet in a cross are one dot; different lines that cross have none', () => {
  const routes = new Map([
    ['c1', path([0, 0], [20, 0])],
    ['c2', path([10, -10], [10, 10])],
  ]);
  const joined = circuit([], joins('a.P b.P', 'a.P c.P'));
  const apart = circuit([], joins('a.P b.P', 'd.P c.P'));
  expect(junctionDots(joined, routes)).toEqual([{ at: at(10, 0), line: 0 }]);
  expect(crossings(joined, routes)).toEqual([]);
  expect(junctionDots(apart, routes)).toEqual([]);
  expect(crossings(apart, routes)).toEqual([at(10, 0)]);
});

test('lines that only touch at an end do not cross', () => {
  const apart = circuit([], joins('a.P b.P', 'd.P c.P'));
  expect(
    crossings(
      apart,
      new Map([
        ['c1', path([0, 0], [20, 0])],
        ['c2', path([10, 0], [10, 10])],
      ]),
    ),
  ).toEqual([]);
});

test('one port feeding four parts has three dots on its trunk', () => {
  const parts = [
    part('pu', 'fixed-pump', at(0, 40)),
    ...[0, 1, 2, 3].map((i) => part(`v${i}`, 'check-valve', at(12 + i * 12, 10))),
  ];
  const sheet = circuit(parts, joins('pu.P v0.A', 'pu.P v1.A', 'pu.P v2.A', 'pu.P v3.A'));
  expect(junctionDots(sheet, routeAll(sheet))).toHaveLength(3);
});

test('a shared trunk is drawn by the first connection alone', () => {
  const sheet = circuit([], joins('a.P b.P', 'a.P c.P'));
  const routes = new Map([
    ['c1', path([0, 30], [0, 10], [10, 10])],
    ['c2', path([0, 30], [0, 20], [20, 20], [20, 0])],
  ]);
  const pieces = freshPieces(sheet, routes, lineNumbers(sheet));
  expect(pieces.get('c1')).toEqual([{ points: path([0, 30], [0, 10], [10, 10]), fromPort: true, toPort: true }]);
  expect(pieces.get('c2')).toEqual([{ points: path([0, 20], [20, 20], [20, 0]), fromPort: false, toPort: true }]);
});

test('a connection that leaves the trunk and comes back draws only what is new, end by end', () => {
  const sheet = circuit([], joins('a.P b.P', 'a.P c.P'));
  const routes = new Map([
    ['c1', path([10, 0], [20, 0])],
    ['c2', path([0, 0], [30, 0], [30, 9])],
  ]);
  expect(freshPieces(sheet, routes, lineNumbers(sheet)).get('c2')).toEqual([
    { points: path([0, 0], [10, 0]), fromPort: true, toPort: false },
    { points: path([20, 0], [30, 0], [30, 9]), fromPort: false, toPort: true },
  ]);
});

test('different lines are each drawn whole', () => {
  const sheet = circuit([], joins('a.P b.P', 'd.P c.P'));
  const same = path([0, 0], [9, 0]);
  const pieces = freshPieces(
    sheet,
    new Map([
      ['c1', same],
      ['c2', same],
    ]),
    lineNumbers(sheet),
  );
  expect(pieces.get('c2')).toHaveLength(1);
});
