import type { Box, Point } from '../../src/base/points.ts';
import type { Circuit, Part } from '../../src/circuit/model.ts';
import { inflate, overlaps } from '../../src/drawing/geometry.ts';
import type { Routes } from '../../src/drawing/geometry.ts';
import type { PartWords } from '../../src/drawing/labels.ts';
import { lineNumbers } from '../../src/drawing/lines.ts';
import { buildScene } from '../../src/drawing/scene.ts';
import { drawnKind, placementOf } from '../../src/drawing/shapes.ts';
import { placePrimitives } from '../../src/drawing/turned.ts';
import { kindOf } from '../../src/parts/catalogue.ts';
import type { Look } from '../../src/parts/contract.ts';
import { inkOf, strikes, writtenLabel } from './ink.ts';
import type { Ink, Stroke, WrittenText } from './ink.ts';

/** What lies on what on a whole sheet, in words. */
export interface SheetFaults {
  /** A label on a label, on a symbol in any of its positions, or on a letter of one. */
  readonly labels: readonly string[];
  /** A label on a line. */
  readonly labelsOnLines: readonly string[];
  /** A line through a symbol, or through a letter of one. */
  readonly lines: readonly string[];
  readonly letters: readonly string[];
  /** Lines of different number along each other. */
  readonly doubled: readonly string[];
}

/** Half the width of a stroke, modules. */
const HALF = 0.1;
/** Below this two edges just touch. */
const SLACK = 0.05;

interface Drawn extends Ink {
  readonly part: Part;
}

/** `words`: what a state says beside a name; absent = a circuit that is only drawn. */
export function sheetFaults(circuit: Circuit, routes: Routes, words?: (part: Part) => PartWords): SheetFaults {
  const drawn = circuit.parts.map((part) => inAllPositions(part, words !== undefined));
  const state = words && { parts: new Map(circuit.parts.map((part) => [part.id, words(part)])) };
  const scene = buildScene(circuit, routes, state ?? {});
  const labels = scene.labels.map((label) => ({ ...writtenLabel(label), owner: label.owner, role: label.role }));
  const numbers = lineNumbers(circuit);
  const lines = circuit.connections.flatMap(({ id, from, to }) =>
    strokesAlong(routes.get(id) ?? []).map((stroke) => ({ ...stroke, id, ends: [from.part, to.part] })),
  );
  const onLabels: string[] = [];
  labels.forEach((p, i) => {
    for (const q of labels.slice(i + 1))
      if (overlaps(p.box, inflate(q.box, -SLACK)))
        onLabels.push(`“${p.text}” of ${p.owner} on “${q.text}” of ${q.owner}`);
    for (const { part, strokes, texts } of drawn) {
      const room = inflate(p.box, HALF);
      if (strokes.some((s) => strikes(s, room))) onLabels.push(`“${p.text}” of ${p.owner} on the symbol of ${part.id}`);
      const letter = texts.find((text) => overlaps(text.box, room));
      if (letter) onLabels.push(`“${p.text}” of ${p.owner} on “${letter.text}” of ${part.id}`);
    }
  });
  return {
    labels: onLabels,
    labelsOnLines: labels.flatMap((p) => {
      const found = lines.find((s) => strikes(s, inflate(p.box, HALF)));
      return found ? [`“${p.text}” of ${p.owner} on the line ${found.id}`] : [];
    }),
    lines: lines.flatMap((s) =>
      drawn.flatMap(({ part, strokes }) =>
        !s.ends.includes(part.id) && part.kind !== 'junction' && strokes.some((t) => meet(s, t))
          ? [`${s.id} through ${part.id}`]
          : [],
      ),
    ),
    letters: lines.flatMap((s) =>
      drawn.flatMap(({ part, texts }) =>
        texts
          .filter(({ box }) => strikes(s, inflate(box, HALF)))
          .map(({ text }) => `${s.id} through “${text}” of ${part.id}`),
      ),
    ),
    doubled: lines.flatMap((s, i) =>
      lines
        .slice(i + 1)
        .filter((t) => numbers.get(s.id) !== numbers.get(t.id) && along(s, t))
        .map((t) => `${s.id} along ${t.id}`),
    ),
  };
}

/** The symbol and its letters in every position that it can be shown in; strips only if a state is shown. */
function inAllPositions(part: Part, shown: boolean): Drawn {
  const spec = kindOf(part.kind)?.dependent?.(part) ?? kindOf(part.kind)?.input?.(part);
  const looks: Look[] = [{}, ...(shown ? (spec?.positions ?? []).map((_, position) => ({ position })) : [])];
  if (shown && kindOf(part.kind)?.group === 'Motion') looks.push({ stroke: 0 }, { stroke: 1 });
  const strokes: Stroke[] = [];
  const texts: WrittenText[] = [];
  for (const look of looks) {
    const ink = inkOf(placePrimitives(drawnKind(part)?.draw(part, look) ?? [], placementOf(part)));
    strokes.push(...ink.strokes);
    texts.push(...ink.texts);
  }
  return { part, strokes, texts };
}

const strokesAlong = (points: readonly Point[]): Stroke[] =>
  points.slice(1).map((b, i) => ({ a: points[i] as Point, b }));

const thin = ({ a, b }: Stroke): Box => ({
  x: Math.min(a.x, b.x) - SLACK,
  y: Math.min(a.y, b.y) - SLACK,
  width: Math.abs(a.x - b.x) + 2 * SLACK,
  height: Math.abs(a.y - b.y) + 2 * SLACK,
});
const meet = (line: Stroke, stroke: Stroke): boolean => strikes(stroke, thin(line));

/** Two stretches on one straight line that share more than a point. */
function along(s: Stroke, t: Stroke): boolean {
  const shared = (a: number, b: number, c: number, d: number): number =>
    Math.min(Math.max(a, b), Math.max(c, d)) - Math.max(Math.min(a, b), Math.min(c, d));
  const flat = s.a.y === s.b.y && t.a.y === t.b.y && s.a.y === t.a.y;
  const upright = s.a.x === s.b.x && t.a.x === t.b.x && s.a.x === t.a.x;
  return (flat && shared(s.a.x, s.b.x, t.a.x, t.b.x) > 0) || (upright && shared(s.a.y, s.b.y, t.a.y, t.b.y) > 0);
}
