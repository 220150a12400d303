import { expect, test } from 'vitest';
import { placeBox, type Box } from '../../src/base/points.ts';
import type { Primitive } from '../../src/base/primitives.ts';
import type { Part } from '../../src/circuit/model.ts';
import { CATALOGUE, ENTRIES, kindOf, readyMadeOf, searchCatalogue } from '../../src/parts/catalogue.ts';
import { PART_GROUPS, type Element, type Look, type PartKind } from '../../src/parts/contract.ts';
import { need } from './need.ts';

const partOf = (kind: PartKind, made: Pick<Part, 'settings' | 'valve'>): Part => ({
  id: 'X1',
  kind: kind.kind,
  ...made,
});
const made = ENTRIES.map(({ kind, readyMade }) => ({ id: readyMade.id, kind, part: partOf(kind, readyMade.make()) }));

const FIXED_PORTS: Readonly<Record<string, readonly string[]>> = {
  'fixed-pump': ['P', 'S'],
  'compensated-pump': ['P', 'S'],
  'hand-pump': ['P', 'S'],
  tank: ['T'],
  'relief-valve': ['P', 'T'],
  'pilot-relief-valve': ['P', 'T', 'X'],
  'sequence-valve': ['P', 'A', 'Y'],
  'unloading-valve': ['P', 'T', 'X'],
  'counterbalance-valve': ['V', 'C', 'X'],
  'reducing-valve': ['P', 'A', 'Y'],
  'shut-off-valve': ['A', 'B'],
  'check-valve': ['A', 'B'],
  'lock-check': ['V', 'C', 'X'],
  'double-lock-check': ['V1', 'C1', 'V2', 'C2'],
  throttle: ['A', 'B'],
  'one-way-throttle': ['A', 'B'],
  'flow-control': ['A', 'B'],
  'flow-divider': ['P', 'A', 'B'],
  'shuttle-valve': ['X', 'Y', 'A'],
  cylinder: ['A', 'B'],
  'double-rod-cylinder': ['A', 'B'],
  'single-acting-cylinder': ['A'],
  motor: ['A', 'B', 'L'],
  accumulator: ['A'],
  filter: ['A', 'B'],
  'quick-coupling': ['A', 'B'],
  plug: ['A'],
  gauge: ['M'],
  'pressure-switch': ['M'],
  junction: ['J'],
};

function portsNamed(element: Element): string[] {
  switch (element.type) {
    case 'path':
      return [
        element.from,
        element.to,
        ...(element.pilot ? [element.pilot.port] : []),
        ...(element.vent === undefined ? [] : [element.vent]),
      ];
    case 'pressure-opened':
      return [element.from, element.to, ...(element.vent ? [element.vent.port] : [])];
    case 'pressure-valve':
      return [element.from, element.to, ...element.signals.map((signal) => signal.port)];
    case 'pump':
      return [element.outlet, element.suction];
    case 'divider':
      return [element.inlet, ...element.outlets];
    case 'tank':
    case 'accumulator':
    case 'pressure-switch':
      return [element.port];
    case 'actuator':
      return [
        element.a,
        ...(element.b === undefined ? [] : [element.b]),
        ...(element.drain ? [element.drain.port] : []),
      ];
  }
}

/** Corners of everything drawn, in the frame of the part; text left out. */
function corners(primitives: readonly Primitive[], dx = 0, dy = 0): { x: number; y: number }[] {
  return primitives.flatMap((p): { x: number; y: number }[] => {
    switch (p.type) {
      case 'polyline':
        return p.points.map(({ x, y }) => ({ x: x + dx, y: y + dy }));
      case 'circle':
        return [
          { x: p.centre.x - p.radius + dx, y: p.centre.y - p.radius + dy },
          { x: p.centre.x + p.radius + dx, y: p.centre.y + p.radius + dy },
        ];
      case 'arc':
        return [p.from, p.to].map(({ x, y }) => ({ x: x + dx, y: y + dy }));
      case 'box':
        return [
          { x: p.x + dx, y: p.y + dy },
          { x: p.x + p.width + dx, y: p.y + p.height + dy },
        ];
      case 'text':
        return [];
      case 'group':
        return corners(p.children, dx + p.shift.x, dy + p.shift.y);
    }
  });
}

const within = (box: Box, { x, y }: { x: number; y: number }): boolean =>
  x >= box.x - 1e-9 && x <= box.x + box.width + 1e-9 && y >= box.y - 1e-9 && y <= box.y + box.height + 1e-9;

test('there are 34 kinds, each found by its name and in a known group', () => {
  expect(CATALOGUE).toHaveLength(34);
  expect(new Set(CATALOGUE.map((kind) => kind.kind)).size).toBe(34);
  for (const kind of CATALOGUE) {
    expect(kindOf(kind.kind)).toBe(kind);
    expect(PART_GROUPS).toContain(kind.group);
    expect(kind.readyMade.length).toBeGreaterThan(0);
  }
  expect(kindOf('pmup')).toBeUndefined();
});

test('groups follow each other in the order of the tray', () => {
  const order = CATALOGUE.map((kind) => PART_GROUPS.indexOf(kind.group));
  expect(order).toEqual(order.toSorted((a, b) => a - b));
});

test('ready-made ids and titles are unique, and each id finds its entry', () => {
  const ids = ENTRIES.map((entry) => entry.readyMade.id);
  expect(new Set(ids).size).toBe(ids.length);
  expect(new Set(ENTRIES.map((entry) => entry.readyMade.title)).size).toBe(ids.length);
  for (const id of ids) expect(readyMadeOf(id)?.readyMade.id).toBe(id);
});

test('ports of the plain kinds are the agreed ones', () => {
  for (const { kind, part } of made) {
    const agreed = FIXED_PORTS[kind.kind];
    if (agreed) expect(kind.ports(part).map((port) => port.id)).toEqual(agreed);
  }
});

test.each(made)('$id: ports and outline on the grid, ports on or inside the outline', ({ kind, part }) => {
  const bounds = kind.bounds(part);
  expect([bounds.x, bounds.y, bounds.width, bounds.height].every(Number.isInteger)).toBe(true);
  const ports = kind.ports(part);
  for (const port of ports) {
    expect(Number.isInteger(port.at.x) && Number.isInteger(port.at.y), port.id).toBe(true);
    expect(within(bounds, port.at), port.id).toBe(true);
  }
  expect(new Set(ports.map((port) => `${port.at.x} ${port.at.y}`)).size).toBe(ports.length);
  expect(new Set(ports.map((port) => port.id)).size).toBe(ports.length);
});

test.each(made)('$id: elements name its own ports and its own check is clean', ({ kind, part }) => {
  const ids = kind.ports(part).map((port) => port.id);
  const positions = (kind.dependent ?? kind.input)?.(part)?.positions.length ?? 0;
  for (const element of kind.elements(part)) {
    for (const id of portsNamed(element)) expect(ids).toContain(id);
    if (element.type === 'path') for (const index of element.positions ?? []) expect(index).toBeLessThan(positions);
  }
  expect(kind.check?.(part) ?? []).toEqual([]);
});

test.each(made)('$id: what is drawn stays inside its outline, in every look', ({ kind, part }) => {
  const positions = (kind.dependent ?? kind.input)?.(part)?.positions.length ?? 1;
  const reach = kind.reach?.(part) ?? kind.bounds(part);
  const looks: Look[] = [
    {},
    { stroke: 0 },
    { stroke: 1 },
    ...Array.from({ length: positions }, (_, position) => ({ position })),
  ];
  for (const look of looks) {
    const drawn = corners(kind.draw(part, look));
    expect(drawn.length).toBeGreaterThan(0);
    for (const corner of drawn) expect(within(reach, corner), JSON.stringify({ look, corner, reach })).toBe(true);
  }
  for (const corner of corners(kind.draw(part, {})))
    expect(within(kind.bounds(part), corner), JSON.stringify({ corner })).toBe(true);
});

test.each(made)('$id: every port is touched by the drawing', ({ kind, part }) => {
  const drawn = corners(kind.draw(part, {}));
  for (const port of kind.ports(part)) {
    const touched =
      kind.kind === 'junction' || drawn.some(({ x, y }) => Math.hypot(x - port.at.x, y - port.at.y) < 1e-9);
    expect(touched, port.id).toBe(true);
  }
});

test('half a turn and a flip keep the ports of a 4/3 valve within the same box edges', () => {
  const entry = need(readyMadeOf('valve-4/3-shut'));
  const part = partOf(entry.kind, entry.readyMade.make());
  const bounds = entry.kind.bounds(part);
  const flipped = placeBox(bounds, { at: { x: 0, y: 0 }, turn: 0, flip: true });
  expect(flipped.width).toBe(bounds.width);
  expect(entry.kind.ports(part).map((port) => [port.id, port.at.x, port.at.y])).toEqual([
    ['A', -1, -2],
    ['B', 1, -2],
    ['P', -1, 2],
    ['T', 1, 2],
  ]);
});

test('a ready-made part is made anew each time', () => {
  for (const { kind, readyMade } of ENTRIES) {
    const first = readyMade.make();
    if (first.valve) expect(readyMade.make().valve).not.toBe(first.valve);
    expect(partOf(kind, readyMade.make())).toEqual(partOf(kind, first));
  }
});

test.each([
  ['tandem centre', 'valve-4/3-bypass'],
  ['solenoid tandem', 'valve-4/3-bypass-coils'],
  ['normally closed', 'valve-2/2-shut-coil'],
  ['pilot operated check', 'lock-check'],
  ['hydraulic motor', 'motor'],
  ['reservoir', 'tank'],
  ['carry over', 'valve-6/3-carry-over'],
  ['P–T', 'valve-4/3-bypass'],
  ['needle', 'throttle'],
  ['overcentre', 'counterbalance-valve'],
  ['pressure compensated', 'flow-control'],
  ['unloader', 'unloading-valve'],
  ['regulator', 'reducing-valve'],
  ['or valve', 'shuttle-valve'],
  ['back pressure', 'check-valve-spring'],
  ['lever pump', 'hand-pump'],
  ['gear divider', 'flow-divider-gear'],
  ['vent port', 'pilot-relief-valve'],
  ['pressostat', 'pressure-switch'],
])('searching "%s" finds %s', (query, id) => {
  expect(searchCatalogue(query).map((entry) => entry.readyMade.id)).toContain(id);
});

test('an empty search gives all, a strange one nothing', () => {
  expect(searchCatalogue('  ')).toEqual(ENTRIES);
  expect(searchCatalogue('xylophone')).toEqual([]);
});

test('the best match of a plain word comes first', () => {
  expect(searchCatalogue('cylinder')[0]?.readyMade.id).toBe('cylinder');
  expect(searchCatalogue('check valve')[0]?.readyMade.id).toBe('check-valve');
});
