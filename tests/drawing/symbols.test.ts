import { expect, test } from 'vitest';
import type { Point } from '../../src/base/points.ts';
import { vector } from '../../src/base/points.ts';
import { inflate, overlaps } from '../../src/drawing/geometry.ts';
import { routeAll } from '../../src/drawing/routing.ts';
import { buildScene } from '../../src/drawing/scene.ts';
import { partBox, partReach, placedPorts } from '../../src/drawing/shapes.ts';
import { placePrimitives } from '../../src/drawing/turned.ts';
import { CATALOGUE, kindOf } from '../../src/parts/catalogue.ts';
import type { Ink } from './ink.ts';
import { inkOf, strikes, writtenLabel } from './ink.ts';
import type { Specimen, Stand } from './specimens.ts';
import { specimens, STANDS, standing } from './specimens.ts';

const ALL = specimens();
/** Half the width of a stroke, modules. */
const HALF = 0.1;

interface Case {
  readonly specimen: Specimen;
  readonly stand: Stand;
  readonly ink: Ink;
  readonly name: string;
}

const cases: Case[] = ALL.flatMap((specimen) =>
  STANDS.map((stand): Case => {
    const { part, look } = specimen;
    const drawn = kindOf(part.kind)?.draw({ ...part, ...stand }, look) ?? [];
    const ink = inkOf(placePrimitives(drawn, { ...stand, at: { x: 0, y: 0 } }));
    return { specimen, stand, ink, name: `${specimen.name}, ${stand.turn}°${stand.flip ? ' mirrored' : ''}` };
  }),
);
const partOf = ({ specimen, stand }: Case): Specimen['part'] => ({ ...specimen.part, ...stand, at: { x: 0, y: 0 } });
const near = (p: Point, q: Point): boolean => Math.hypot(p.x - q.x, p.y - q.y) < 1e-6;

/** Names of the cases of which something is wrong, with what. */
const faults = (of: (each: Case) => readonly string[]): string[] =>
  cases.flatMap((each) => of(each).map((fault) => `${each.name}: ${fault}`));

test('every kind is among the symbols that are looked at, and no two are drawn alike', () => {
  expect(new Set(ALL.map(({ part }) => part.kind))).toEqual(new Set(CATALOGUE.map(({ kind }) => kind)));
  expect(ALL.length).toBeGreaterThan(200);
});

test('no letter lies on another, in any turn', () => {
  const found = faults(({ ink: { texts } }) =>
    texts.flatMap((p, i) =>
      texts.slice(i + 1).flatMap((q) => (overlaps(inflate(p.box, 0.1), q.box) ? [`${p.text} on ${q.text}`] : [])),
    ),
  );
  expect(found).toEqual([]);
});

test('no stroke of a symbol runs through its letters, in any turn', () => {
  const found = faults(({ ink: { texts, strokes } }) =>
    texts.flatMap(({ text, box }) => (strokes.some((s) => strikes(s, inflate(box, HALF))) ? [text] : [])),
  );
  expect(found).toEqual([]);
});

test('every port lies on the grid, at the end of a stroke, and its line leads away from the symbol', () => {
  const found = faults((each) => {
    const part = partOf(each);
    return placedPorts(part).flatMap(({ ref, at, side, role }) => {
      const out: string[] = [];
      if (!Number.isInteger(at.x) || !Number.isInteger(at.y)) out.push(`${ref.port} is off the grid`);
      if (role === 'joint') return out;
      if (!each.ink.strokes.some(({ a, b }) => near(a, at) || near(b, at))) out.push(`${ref.port} ends no stroke`);
      const way = vector(side);
      const ahead = {
        a: { x: at.x + way.x * 0.3, y: at.y + way.y * 0.3 },
        b: { x: at.x + 3 * way.x, y: at.y + 3 * way.y },
      };
      const struck = [...each.ink.strokes].some((s) => crosses(s, ahead));
      if (struck) out.push(`the line at ${ref.port} runs over the symbol`);
      const written = each.ink.texts.find(({ box }) => strikes(ahead, inflate(box, HALF)));
      if (written) out.push(`the line at ${ref.port} runs through ${written.text}`);
      return out;
    });
  });
  expect(found).toEqual([]);
});

const side = (s: { a: Point; b: Point }, p: Point): number =>
  Math.sign((s.b.x - s.a.x) * (p.y - s.a.y) - (s.b.y - s.a.y) * (p.x - s.a.x));
const crosses = (s: { a: Point; b: Point }, t: { a: Point; b: Point }): boolean =>
  side(s, t.a) !== side(s, t.b) && side(t, s.a) !== side(t, s.b);

test('a symbol stays within the outline that it declares, names of coils included', () => {
  const found = faults((each) => {
    const part = partOf(each);
    const atRest = Object.keys(each.specimen.look).length === 0;
    const room = inflate(atRest ? partBox(part) : partReach(part), 0.15);
    const outside = each.ink.strokes.filter(
      ({ a, b }) =>
        ![a, b].every(
          (p) => p.x >= room.x && p.y >= room.y && p.x <= room.x + room.width && p.y <= room.y + room.height,
        ),
    );
    return outside.slice(0, 1).map(({ a, b }) => `${JSON.stringify([a, b])} is out of ${JSON.stringify(room)}`);
  });
  expect(found).toEqual([]);
});

test('a name lies on no stroke or letter of its symbol, and no line at a port runs through it', () => {
  const atRest = cases.filter(({ specimen }) => Object.keys(specimen.look).length === 0);
  const found = atRest.flatMap(({ specimen, stand, name }) => {
    const circuit = standing(specimen, stand, { x: 0, y: 0 });
    const scene = buildScene(circuit, routeAll(circuit), { parts: new Map([['S', specimen.look]]) });
    const ink = inkOf(scene.parts.flatMap((part) => part.primitives));
    const lines = scene.lines.flatMap(({ points }) => points.slice(1).map((b, i) => ({ a: points[i] as Point, b })));
    return scene.labels.map(writtenLabel).flatMap(({ text, box }) => {
      const room = inflate(box, HALF);
      const struck =
        [...ink.strokes, ...lines].some((s) => strikes(s, room)) || ink.texts.some((t) => overlaps(t.box, room));
      return struck ? [`${name}: ${text}`] : [];
    });
  });
  expect(found).toEqual([]);
});
