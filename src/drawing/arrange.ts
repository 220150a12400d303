import type { Box, Point } from '../base/points.ts';
import { vector } from '../base/points.ts';
import type { Circuit, Part } from '../circuit/model.ts';
import { lineNumbers } from './lines.ts';
import { partBox, placedPorts } from './shapes.ts';
import type { PlacedPort } from './shapes.ts';

export type Edge = 'left' | 'centre' | 'right' | 'top' | 'middle' | 'bottom';
export type Way = 'across' | 'down';
/** Part id → how far it is to move, in whole modules. */
export type Shifts = ReadonlyMap<string, Point>;

/**
 * How parts move so that they line up. An outer edge is that of the outermost part. For `centre` (one above the
 * other) and `middle` (side by side) the first part stays; the others follow by the ports that face each other on a
 * common line, so that the line becomes straight, and by the middle of their outline where there is no such line.
 */
export function alignShifts(circuit: Circuit, ids: readonly string[], edge: Edge): Shifts {
  const parts = chosen(circuit, ids);
  const boxes = parts.map(partBox);
  const ends = (of: (box: Box) => number): number[] => boxes.map(of);
  const all = (to: number, of: (box: Box) => number, flat: boolean): Shifts =>
    new Map(parts.map((part, i) => [part.id, along(flat, to - of(boxes[i] as Box))]));
  switch (edge) {
    case 'left':
      return all(Math.min(...ends(left)), left, true);
    case 'right':
      return all(Math.max(...ends(right)), right, true);
    case 'top':
      return all(Math.min(...ends(top)), top, false);
    case 'bottom':
      return all(Math.max(...ends(bottom)), bottom, false);
    case 'centre':
    case 'middle':
      return onAxis(circuit, parts, edge === 'centre');
  }
}

/** How parts move so that the gaps between neighbours are equal; the two outermost stay. Fewer than three stay. */
export function distributeShifts(circuit: Circuit, ids: readonly string[], way: Way): Shifts {
  const flat = way === 'across';
  const [low, size] = flat ? [left, (b: Box) => b.width] : [top, (b: Box) => b.height];
  const items = chosen(circuit, ids)
    .map((part) => ({ part, box: partBox(part) }))
    .sort((a, b) => low(a.box) - low(b.box));
  const [first, last] = [items[0], items.at(-1)];
  if (!first || !last || items.length < 3) return new Map();
  const room = low(last.box) + size(last.box) - low(first.box);
  const gap = (room - items.reduce((sum, { box }) => sum + size(box), 0)) / (items.length - 1);
  let at = low(first.box);
  const out = new Map<string, Point>();
  for (const { part, box } of items) {
    out.set(part.id, along(flat, at - low(box)));
    at += size(box) + gap;
  }
  return out;
}

const left = (box: Box): number => box.x;
const right = (box: Box): number => box.x + box.width;
const top = (box: Box): number => box.y;
const bottom = (box: Box): number => box.y + box.height;
/** Ports stand on whole modules, so parts move by whole modules. */
const along = (flat: boolean, by: number): Point => {
  const whole = Math.round(by) + 0;
  return flat ? { x: whole, y: 0 } : { x: 0, y: whole };
};

function chosen(circuit: Circuit, ids: readonly string[]): Part[] {
  const parts = new Map(circuit.parts.map((part) => [part.id, part]));
  return ids.flatMap((id) => parts.get(id) ?? []);
}

/** `upright`: one above the other, on a common vertical axis. */
function onAxis(circuit: Circuit, parts: readonly Part[], upright: boolean): Shifts {
  const lines = linesAtPorts(circuit);
  const facing = (part: Part): PlacedPort[] =>
    placedPorts(part).filter(({ side }) => (vector(side).x === 0) === upright);
  const on = (p: Point): number => (upright ? p.x : p.y);
  const middle = ({ x, y, width, height }: Box): number => (upright ? x + width / 2 : y + height / 2);
  const [anchor] = parts;
  if (!anchor) return new Map();
  const out = new Map<string, Point>([[anchor.id, { x: 0, y: 0 }]]);
  const waiting = new Set(parts.slice(1));
  /** By which way a part must move so that one of its ports comes to stand straight over one that is settled. */
  const straight = (part: Part): Point | undefined => {
    for (const port of facing(part)) {
      const line = lines.get(`${part.id}.${port.ref.port}`);
      if (line === undefined) continue;
      for (const other of parts) {
        const moved = out.get(other.id);
        const match = moved && facing(other).find((p) => lines.get(`${other.id}.${p.ref.port}`) === line);
        if (match) return along(upright, on(match.at) + on(moved) - on(port.at));
      }
    }
    return undefined;
  };
  for (let found = true; found;) {
    found = false;
    for (const part of waiting) {
      const by = straight(part);
      if (!by) continue;
      out.set(part.id, by);
      waiting.delete(part);
      found = true;
    }
  }
  const axis = middle(partBox(anchor));
  for (const part of waiting) out.set(part.id, along(upright, axis - middle(partBox(part))));
  return out;
}

function linesAtPorts(circuit: Circuit): Map<string, number> {
  const numbers = lineNumbers(circuit);
  return new Map(
    circuit.connections.flatMap(({ id, from, to }) =>
      [from, to].map((ref) => [`${ref.part}.${ref.port}`, numbers.get(id) ?? -1] as const),
    ),
  );
}
