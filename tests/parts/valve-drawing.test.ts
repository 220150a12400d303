import { expect, test } from 'vitest';
import type { Primitive } from '../../src/base/primitives.ts';
import type { Operator, ValveData } from '../../src/circuit/model.ts';
import { ENTRIES } from '../../src/parts/catalogue.ts';
import { drawValve, valveBounds, valveReach } from '../../src/parts/valve-drawing.ts';
import { VALVE_FORMS } from '../../src/parts/valve-forms.ts';
import { frameOf } from '../../src/parts/valve-frame.ts';
import { placeOperators } from '../../src/parts/valve-operators.ts';
import { need } from './need.ts';

type Group = Extract<Primitive, { type: 'group' }>;
const groups = (list: readonly Primitive[], role: Group['role']): Group[] =>
  list.flatMap((each) =>
    each.type === 'group' ? [...(each.role === role ? [each] : []), ...groups(each.children, role)] : [],
  );
const valve = (id: string): ValveData => need(VALVE_FORMS.find((form) => form.id === id)?.make().valve);
const pens = (group: Group): Set<string> =>
  new Set(
    group.children.flatMap((each) =>
      'pen' in each && (each.pen === 'active' || each.pen === 'idle') ? [each.pen] : [],
    ),
  );

test.each([
  [undefined, 1],
  [0, 0],
  [1, 1],
  [2, 2],
])('position %s puts box %d to the ports, and only that one is active', (position, box) => {
  const drawn = drawValve(valve('valve-4/3-bypass'), position);
  const strip = need(groups(drawn, 'strip')[0]);
  const boxes = groups(drawn, 'box');
  expect(boxes.map((each) => each.index)).toEqual([0, 1, 2]);
  boxes.forEach((each) => {
    const atPorts = strip.shift.x + each.shift.x === 0;
    expect(atPorts).toBe(each.index === box);
    expect([...pens(each)]).toEqual([atPorts ? 'active' : 'idle']);
  });
});

test('the strip slides 4 M a position for two ports an edge, more for more ports', () => {
  expect(frameOf(valve('valve-4/3-shut')).width).toBe(4);
  expect(frameOf(valve('valve-2/2-shut-coil')).width).toBe(4);
  expect(frameOf(valve('valve-6/3-carry-over')).width).toBe(6);
});

test('a shut port is a stub of 1 M with a bar of 1.2 M', () => {
  const box = need(groups(drawValve(valve('valve-4/3-shut')), 'box')[1]);
  const lines = box.children.flatMap((each) => (each.type === 'polyline' ? [each.points] : []));
  const length = ([from, to]: readonly { x: number; y: number }[]): number =>
    Math.hypot(need(to).x - need(from).x, need(to).y - need(from).y);
  expect(lines.map(length).map((each) => each.toFixed(2))).toEqual(
    Array.from({ length: 4 }, () => ['1.00', '1.20']).flat(),
  );
});

test('open paths between edges carry a head at their second port', () => {
  const box = need(groups(drawValve(valve('valve-4/3-shut')), 'box')[2]);
  const tips = box.children.flatMap((each) => (each.type === 'polyline' && each.closed ? [each.points[0]] : []));
  expect(tips).toEqual([
    { x: 1, y: -2 },
    { x: 1, y: 2 },
  ]);
});

test('what is drawn shows every port of every position: no box is empty', () => {
  for (const form of VALVE_FORMS) {
    for (const box of groups(drawValve(need(form.make().valve)), 'box')) expect(pens(box).size, form.id).toBe(1);
  }
});

const OPERATORS: readonly Operator[] = [
  'lever',
  'pedal',
  'button',
  'coil',
  'spring',
  'detent',
  'hand',
  'roller',
  'pilot',
];
const REACH = (operators: readonly Operator[]): number => placeOperators(operators).length;

test('operators of one end never lie over each other', () => {
  for (const first of OPERATORS) {
    for (const second of OPERATORS) {
      const { placed, length } = placeOperators([first, second]);
      expect(placed).toHaveLength(2);
      const [p, q] = placed as [(typeof placed)[number], (typeof placed)[number]];
      const apart = p.y !== q.y && p.y * q.y <= 0 && Math.abs(p.y - q.y) > 1.5;
      const beside = p.u + REACH([p.operator]) <= q.u || q.u + REACH([q.operator]) <= p.u;
      expect(apart || beside, `${first} ${second}`).toBe(true);
      expect(length).toBeGreaterThanOrEqual(Math.max(REACH([first]), REACH([second])));
    }
  }
});

test('the reach covers the outline at rest', () => {
  for (const { kind, readyMade } of ENTRIES) {
    if (kind.kind !== 'directional-valve') continue;
    const data = need(readyMade.make().valve);
    const rest = valveBounds(data);
    const reach = valveReach(data);
    expect(reach.x).toBeLessThanOrEqual(rest.x);
    expect(reach.x + reach.width).toBeGreaterThanOrEqual(rest.x + rest.width);
  }
});

test('odd data are still drawn: no position, no port', () => {
  expect(() => drawValve({ ports: [], positions: [], left: [], right: [] })).not.toThrow();
  expect(() =>
    drawValve({
      ports: [{ id: 'A', side: 'top' }],
      positions: [{ name: 'a', paths: ['A-Z', '?'] }],
      left: ['lever'],
      right: [],
      rest: 9,
    }),
  ).not.toThrow();
});
