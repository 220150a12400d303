import { expect, test } from 'vitest';
import type { Primitive } from '../../src/base/primitives.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { overlaps } from '../../src/drawing/geometry.ts';
import { labelBox } from '../../src/drawing/labels.ts';
import { placeMissing } from '../../src/drawing/place.ts';
import { routeAll } from '../../src/drawing/routing.ts';
import { buildScene } from '../../src/drawing/scene.ts';
import type { Scene, SceneState } from '../../src/drawing/scene.ts';
import { partReach } from '../../src/drawing/shapes.ts';
import type { LineLook } from '../../src/drawing/strokes.ts';
import { placePrimitives } from '../../src/drawing/turned.ts';
import { circuit, joins, part, unplacedRig, valve } from './samples.ts';

const rig = placeMissing(unplacedRig());
const routes = routeAll(rig);
const scene = (state?: SceneState): Scene => buildScene(rig, routes, state);
const allLooks = (look: LineLook, of: Circuit = rig): ReadonlyMap<string, LineLook> =>
  new Map(of.connections.map((c) => [c.id, look]));

function flat(primitives: readonly Primitive[]): Primitive[] {
  return primitives.flatMap((p) => (p.type === 'group' ? [p, ...flat(p.children)] : [p]));
}

test('the scene holds every part and every connection once', () => {
  expect(scene().parts.map((p) => p.id)).toEqual(rig.parts.map((p) => p.id));
  expect(scene().lines.map((l) => l.connection)).toEqual(rig.connections.map((c) => c.id));
});

test('enclosures come apart from the parts, so that lines are drawn over them', () => {
  expect(scene().enclosures.map((e) => e.part)).toEqual(['DLC', 'TH']);
  for (const each of scene().parts)
    expect(each.primitives.some((p) => p.type === 'box' && p.pen === 'enclosure')).toBe(false);
});

test('a circuit that is only drawn has plain lines and no box picked out', () => {
  for (const line of scene().lines)
    for (const stroke of line.strokes) expect(stroke).toMatchObject({ role: 'core', colour: 'ink' });
  expect(
    scene()
      .parts.flatMap((p) => flat(p.primitives))
      .some((p) => 'pen' in p && p.pen === 'chosen'),
  ).toBe(false);
});

test('in a state the box at the ports is outlined and drawn last of its strip, its paths as the lines at them', () => {
  const lines = new Map([...allLooks({ class: 'vented' }), ['c5', { class: 'fed' }], ['c8', { class: 'fed' }]] as [
    string,
    LineLook,
  ][]);
  const shown = scene({ lines, parts: new Map([['V1', { position: 0 }]]) }).parts.find((p) => p.id === 'V1');
  const strip = shown?.primitives.find((p) => p.type === 'group' && p.role === 'strip');
  if (strip?.type !== 'group') throw new Error('no strip');
  const last = strip.children.at(-1);
  if (last?.type !== 'group') throw new Error('no box');
  expect(last.index).toBe(0);
  const pens = flat(last.children).flatMap((p) => ('pen' in p ? [p.pen] : []));
  expect(pens).toContain('chosen');
  expect(pens).toContain('fed');
  expect(pens).toContain('vented');
  expect(pens).not.toContain('active');
  // The other boxes keep their pens.
  const others = strip.children
    .slice(0, -1)
    .flatMap((c) => flat([c]))
    .flatMap((p) => ('pen' in p ? [p.pen] : []));
  expect(others.filter((pen) => pen === 'chosen' || pen === 'fed')).toEqual([]);
});

test('in a state a line reaches through the stub of a symbol, which is then not drawn in ink', () => {
  const drawn = scene().parts.find((p) => p.id === 'PU');
  const shown = scene({ lines: allLooks({ class: 'fed' }) }).parts.find((p) => p.id === 'PU');
  // Two stubs: outlet and suction.
  expect((drawn?.primitives.length ?? 0) - (shown?.primitives.length ?? 0)).toBe(2);
  const core = scene({ lines: allLooks({ class: 'fed' }) }).lines[0]?.strokes[0];
  const pump = rig.parts.find((p) => p.id === 'PU')?.at;
  expect(core?.lines[0]?.[0]).toEqual({ x: pump?.x, y: (pump?.y ?? 0) + 3 });
});

test('a line that runs through a symbol from port to port is shared half and half', () => {
  const sheet = circuit(
    [
      part('a', 'check-valve', { x: 0, y: 0 }),
      part('t', 'throttle', { x: 0, y: -14 }),
      part('b', 'check-valve', { x: 0, y: -28 }),
    ],
    joins('a.B t.A', 't.B b.A'),
  );
  const lines = buildScene(sheet, routeAll(sheet), { lines: allLooks({ class: 'fed' }, sheet) }).lines;
  expect(lines[0]?.strokes[0]?.lines[0]?.at(-1)).toEqual({ x: 0, y: -14 });
  expect(lines[1]?.strokes[0]?.lines[0]?.[0]).toEqual({ x: 0, y: -14 });
});

test('names stand clear of parts, lines and each other on the placed rig', () => {
  const { labels } = scene({
    lines: allLooks({ class: 'fed' }),
    parts: new Map([
      ['V1', { note: 'out' }],
      ['C1', { note: 'extends' }],
    ]),
  });
  const boxes = labels.map((l) => ({ owner: l.owner, box: labelBox(l) }));
  for (const { owner, box } of boxes) {
    for (const each of rig.parts)
      if (each.id !== owner) expect([owner, each.id, overlaps(partReach(each), box)]).toEqual([owner, each.id, false]);
    for (const other of boxes)
      if (other.owner !== owner)
        expect([owner, other.owner, overlaps(other.box, box)]).toEqual([owner, other.owner, false]);
  }
  expect(labels.find((l) => l.owner === 'C1')?.runs.map((r) => r.text)).toEqual(['CLAMP', 'extends']);
  expect(labels.filter((l) => l.owner === 'V1').map((l) => l.runs.map((r) => r.text))).toEqual([
    ['V1', 'out'],
    ['H1.1'],
  ]);
});

test('names do not move when the state changes', () => {
  const places = (note: string): unknown[] =>
    scene({
      parts: new Map([
        ['V1', { note }],
        ['C1', { note }],
      ]),
    }).labels.map((l) => l.at);
  expect(places('in')).toEqual(places('moved out by spring'));
});

test('free labels stay where the user put them', () => {
  const sheet: Circuit = { ...circuit([]), labels: [{ id: 'n1', at: { x: 3, y: 4 }, text: 'Fit before start' }] };
  expect(buildScene(sheet, new Map()).labels).toMatchObject([{ role: 'free', owner: 'n1', at: { x: 3, y: 4 } }]);
});

test('a part of an unknown kind is shown as a box with a question mark', () => {
  const [shown] = buildScene(circuit([part('x', 'no-such-kind', { x: 5, y: 5 })]), new Map()).parts;
  expect(shown?.primitives.map((p) => p.type)).toEqual(['box', 'text']);
});

test('a turned and flipped symbol keeps its text upright and its group shift along its strip', () => {
  const primitives: Primitive[] = [
    { type: 'text', at: { x: 1, y: -2 }, text: 'A', size: 1, align: 'start' },
    {
      type: 'group',
      role: 'strip',
      shift: { x: 4, y: 0 },
      children: [{ type: 'box', x: -2, y: -1, width: 4, height: 2, pen: 'symbol' }],
    },
    { type: 'arc', from: { x: 0, y: 0 }, to: { x: 2, y: 0 }, radius: 1, clockwise: true, pen: 'symbol' },
  ];
  const [text, group, arc] = placePrimitives(primitives, { at: { x: 10, y: 20 }, turn: 90, flip: false });
  // What stood above and to the right of (1, −2) stands to the right of it and below.
  expect(text).toMatchObject({ at: { x: 12, y: 21.73 }, align: 'start' });
  expect(group).toMatchObject({ shift: { x: 0, y: 4 }, children: [{ x: 9, y: 18, width: 2, height: 4 }] });
  expect(arc).toMatchObject({ from: { x: 10, y: 20 }, to: { x: 10, y: 22 }, clockwise: true });
  const flipped = placePrimitives(primitives, { at: { x: 0, y: 0 }, turn: 0, flip: true });
  expect(flipped[0]).toMatchObject({ at: { x: -1, y: -2 }, align: 'end' });
  expect(flipped[2]).toMatchObject({ clockwise: false });
});

test('a shut port in the box at the ports shows its line, its bar included', () => {
  const sheet = circuit([valve('V', { x: 0, y: 0 }), part('c', 'check-valve', { x: 0, y: -20 })], joins('V.A c.A'));
  const shown = buildScene(sheet, routeAll(sheet), {
    lines: new Map([['c1', { class: 'cut off', trapped: 'known' }]]),
    parts: new Map([['V', { position: 1 }]]),
  });
  const trapped = flat(shown.parts[0]?.primitives ?? []).filter((p) => p.type === 'polyline' && p.pen === 'trapped');
  expect(trapped).toHaveLength(2);
});

test('the box at the ports is outlined even while nothing is connected', () => {
  const sheet = circuit([valve('V', { x: 0, y: 0 })]);
  const pens = (state?: SceneState): string[] =>
    flat(buildScene(sheet, new Map(), state).parts[0]?.primitives ?? []).flatMap((p) => ('pen' in p ? [p.pen] : []));
  expect(pens().filter((pen) => pen === 'chosen')).toHaveLength(0);
  expect(pens({ lines: new Map() }).filter((pen) => pen === 'chosen')).toHaveLength(1);
  // Symbols are kept between calls: the plain one must come back plain.
  expect(pens().filter((pen) => pen === 'chosen')).toHaveLength(0);
});

test('a lever that moves gives another strip, and back the same one', () => {
  const at = (position: number): string =>
    JSON.stringify(scene({ parts: new Map([['V1', { position }]]) }).parts.find((p) => p.id === 'V1')?.primitives);
  const first = at(0);
  expect(at(2)).not.toBe(first);
  expect(at(0)).toBe(first);
});
