import type { Box, Point, Side } from '../base/points.ts';
import { placeSide } from '../base/points.ts';
import type { Part } from '../circuit/model.ts';
import { HALF_HEIGHT } from '../parts/valve-frame.ts';
import { isStripValve } from '../parts/valve-kinds.ts';
import { inflate, overlaps, segmentTouches } from './geometry.ts';
import { isActuator } from './label-text.ts';
import { partLetters } from './letters.ts';
import { partReach, placedPorts, placementOf } from './shapes.ts';

export interface Spot {
  readonly at: Point;
  readonly align: 'start' | 'end';
  /** All that may come to stand there. */
  readonly box: Box;
}

/** What words keep clear of. */
export interface Ground {
  readonly parts: readonly { readonly part: Part; readonly box: Box }[];
  readonly lines: readonly (readonly [Point, Point])[];
  readonly taken: Box[];
}

/** Size of the words, in modules; `kept`: room for what a state says is part of the width. */
export interface Extent {
  readonly width: number;
  readonly height: number;
  readonly kept: boolean;
}

type Place = 'above' | 'right' | 'left' | 'below';
interface Candidate extends Spot {
  /** How much worse than the best place for it, in modules. */
  readonly worse: number;
}

const GAP = 0.7;
/** From the letters of a valve. */
const SHOULDER = 0.6;
/** From lines: less, since letters do not fill their box. */
const CLEAR = 0.1;
/** What lies in the way, against which a longer way from the symbol is weighed. */
const COST = { part: 60, text: 80, line: 25, near: 1.5 } as const;
const PUSHED = 2;
/** How far from another part a name is not taken for that one's. */
const NEAR = 0.7;
/** Modules between the places tried along a side, and distances from it. */
const STEP = 1;
const AWAY = [0, 1, 2, 3.5, 5, 7] as const;

/** The clearest place for the words of a part, near it; where all are crowded, the least crowded. */
export function findSpot(part: Part, extent: Extent, ground: Ground): Spot {
  const box = partReach(part);
  const near = groundNear(ground, inflate(box, Math.max(extent.width, extent.height) + 2 * GAP + NEAR));
  const first = best(beside(part, box, extent), part.id, near);
  if (first.cost < COST.line) return first.spot;
  const far = groundNear(ground, inflate(box, Math.max(extent.width, extent.height) + (AWAY.at(-1) ?? 0) + 2 * GAP));
  const second = best(around(part, box, extent), part.id, far);
  return second.cost < first.cost ? second.spot : first.spot;
}

function best(candidates: readonly Candidate[], own: string, ground: Ground): { spot: Spot; cost: number } {
  let found: Candidate | undefined;
  let least = Infinity;
  for (const candidate of candidates) {
    if (candidate.worse >= least) continue;
    const cost = candidate.worse + crowd(candidate.box, own, ground);
    if (cost < least) [least, found] = [cost, candidate];
  }
  return { spot: found as Candidate, cost: least };
}

/** The customary places: at the shoulders of a valve, else along the sides. */
function beside(part: Part, box: Box, extent: Extent): Candidate[] {
  const shouldered = isStripValve(part.kind);
  const sides = orderOf(part, box).flatMap((place, rank) =>
    alignments(part, place, box, extent).map((along, i) =>
      at(place, box, extent, along, 0, (shouldered ? 3 : 0) + rank + 0.1 * i + away(part, place, box, extent, along)),
    ),
  );
  return shouldered ? [...shoulders(part, box, extent), ...sides] : sides;
}

/** Everywhere round it, at growing distances. */
function around(part: Part, box: Box, extent: Extent): Candidate[] {
  return orderOf(part, box).flatMap((place, rank) => {
    const flat = place === 'above' || place === 'below';
    const [low, high] = flat ? [box.x - extent.width, box.x + box.width] : [box.y - extent.height, box.y + box.height];
    const out: Candidate[] = [];
    for (let along = low; along <= high; along += STEP)
      for (const off of AWAY)
        out.push(at(place, box, extent, along, off, rank + 3 * off + away(part, place, box, extent, along)));
    return out;
  });
}

/** How far along its side the words stand from the part's middle, in hundredths of it. */
function away(part: Part, place: Place, box: Box, extent: Extent, along: number): number {
  const { x, y } = placementOf(part).at;
  const flat = place === 'above' || place === 'below';
  const [middle, size, low, high] = flat
    ? [x, extent.width, box.x, box.x + box.width]
    : [y, extent.height, box.y, box.y + box.height];
  // Beyond the ends of its side a name soon belongs to something else.
  const beyond = Math.max(0, low - (along + size), along - high);
  return Math.abs(along + size / 2 - middle) * 0.02 + beyond;
}

/** Where a name is looked for on each kind, best first. */
function orderOf(part: Part, box: Box): readonly Place[] {
  const wide = box.width >= box.height;
  if (isStripValve(part.kind)) return wide ? ['right', 'left', 'below', 'above'] : ['above', 'below', 'right', 'left'];
  if (isActuator(part)) return wide ? ['above', 'below', 'right', 'left'] : ['right', 'left', 'above', 'below'];
  const facesAcross = placedPorts(part).some((p) => p.side === 'left' || p.side === 'right');
  return facesAcross ? ['above', 'below', 'right', 'left'] : ['right', 'left', 'above', 'below'];
}

/** Starts along a side, best first; an actuator's name begins with its barrel, wherever its rod reaches. */
function alignments(part: Part, place: Place, box: Box, { width, height }: Extent): number[] {
  const flat = place === 'above' || place === 'below';
  const body = isActuator(part) ? bodyOf(part, box) : box;
  const [low, length, size] = flat ? [body.x, body.width, width] : [body.y, body.height, height];
  const [start, middle, end] = [low, low + (length - size) / 2, low + length - size];
  return isActuator(part) && flat ? [start, middle, end] : [middle, start, end];
}

function bodyOf(part: Part, box: Box): Box {
  const ports = placedPorts(part);
  const wide = box.width >= box.height;
  const [low, high] = wide ? [box.x, box.x + box.width] : [box.y, box.y + box.height];
  const ends = ports.map(({ at: { x, y } }) => (wide ? x : y));
  const { x, y } = placementOf(part).at;
  // One port stands at one end of the barrel, which lies evenly about the part's middle.
  const half = Math.max(...ends.map((end) => Math.abs(end - (wide ? x : y)))) + 1;
  const [from, to] = [Math.max(low, (wide ? x : y) - half), Math.min(high, (wide ? x : y) + half)];
  return wide ? { ...box, x: from, width: to - from } : { ...box, y: from, height: to - from };
}

function at(place: Place, box: Box, extent: Extent, along: number, off: number, worse: number): Candidate {
  const { width, height } = extent;
  switch (place) {
    case 'above':
      return spot({ x: along, y: box.y - GAP - off - height }, extent, 'start', worse);
    case 'below':
      return spot({ x: along, y: box.y + box.height + GAP + off }, extent, 'start', worse);
    case 'right':
      return spot({ x: box.x + box.width + GAP + off, y: along }, extent, 'start', worse);
    case 'left':
      return spot({ x: box.x - GAP - off - width, y: along }, extent, 'end', worse);
  }
}

/** Words that end at the symbol are pushed about by what is said of a state, so they are the second choice. */
const spot = (p: Point, { width, height, kept }: Extent, align: Spot['align'], worse: number): Candidate => ({
  at: align === 'end' ? { x: p.x + width, y: p.y } : p,
  align,
  box: { ...p, width, height },
  worse: worse + (kept && align === 'end' ? PUSHED : 0),
});

/** Beside the letters of a valve: over and under the rest of its strip, which slides but comes no nearer. */
function shoulders(part: Part, box: Box, extent: Extent): Candidate[] {
  const { width, height } = extent;
  const middle = placementOf(part).at;
  const wide = box.width >= box.height;
  const out: Candidate[] = [];
  for (const side of wide ? (['up', 'down'] as const) : (['right', 'left'] as const)) {
    const marks: Box[] = [
      ...placedPorts(part).flatMap((port) => (port.side === side ? [{ ...port.at, width: 0, height: 0 }] : [])),
      ...partLetters(part).filter((b) => liesTo(side, b, middle)),
    ];
    if (marks.length === 0) continue;
    const low = Math.min(...marks.map((b) => (wide ? b.x : b.y))) - SHOULDER;
    const high = Math.max(...marks.map((b) => (wide ? b.x + b.width : b.y + b.height))) + SHOULDER;
    // Along the strip: before the first letter, and after the last.
    for (const end of wide ? (['right', 'left'] as const) : (['down', 'up'] as const)) {
      const after = end === 'right' || end === 'down';
      const along = after ? high : low - (wide ? width : height);
      const edge = shoulderEdge(part, box, side, end);
      const off = side === 'up' ? edge - GAP - height : side === 'left' ? edge - GAP - width : edge + GAP;
      const rank = (side === 'up' || side === 'right' ? 0 : 0.4) + (after ? 0 : 0.2);
      const align = side === 'left' || end === 'left' ? 'end' : 'start';
      // Further out, where a line turns off close to the letters, but still along the strip.
      const room = after ? (wide ? box.x + box.width : box.y + box.height) - along : along - (wide ? box.x : box.y);
      for (let step = 0; step === 0 || step < room; step += STEP) {
        const place = after ? along + step : along - step;
        out.push(spot(wide ? { x: place, y: off } : { x: off, y: place }, extent, align, rank + 0.2 * step));
      }
    }
  }
  return out;
}

function liesTo(side: Side, box: Box, { x, y }: Point): boolean {
  switch (side) {
    case 'up':
      return box.y < y;
    case 'down':
      return box.y > y;
    case 'left':
      return box.x < x;
    case 'right':
      return box.x > x;
  }
}

/** Where the strip ends towards `side`: at its outline, or at its boxes if nothing at this end of it stands out further. */
function shoulderEdge(part: Part, box: Box, side: Side, end: Side): number {
  const placement = placementOf(part);
  const { x, y } = placement.at;
  const operators = placeSide('left', placement) === end ? part.valve?.left : part.valve?.right;
  const tall = !operators || operators.some((each) => each === 'lever' || each === 'coil' || each === 'pilot');
  const [low, high] = side === 'up' || side === 'down' ? [box.y, box.y + box.height] : [box.x, box.x + box.width];
  const middle = side === 'up' || side === 'down' ? y : x;
  if (side === 'up' || side === 'left') return tall ? low : middle - HALF_HEIGHT;
  return tall ? high : middle + HALF_HEIGHT;
}

const groundNear = (ground: Ground, zone: Box): Ground => ({
  parts: ground.parts.filter((p) => overlaps(p.box, zone)),
  lines: ground.lines.filter(([a, b]) => segmentTouches(a, b, zone)),
  taken: ground.taken.filter((box) => overlaps(box, zone)),
});

/** How much a box of words would cover: below the cost of a line it is free. */
function crowd(box: Box, own: string, ground: Ground): number {
  let cost = 0;
  const nearby = inflate(box, NEAR);
  for (const other of ground.parts) {
    if (other.part.id === own) continue;
    if (overlaps(other.box, box)) cost += COST.part;
    else if (overlaps(other.box, nearby)) cost += COST.near;
  }
  for (const other of ground.taken) if (overlaps(other, box)) cost += COST.text;
  const room = inflate(box, CLEAR);
  for (const [a, b] of ground.lines) if (segmentTouches(a, b, room)) cost += COST.line;
  return cost;
}
