import type { Box, Point, Side } from '../base/points.ts';
import { placeSide } from '../base/points.ts';
import type { Part } from '../circuit/model.ts';
import { HALF_HEIGHT } from '../parts/valve-frame.ts';
import { isStripValve } from '../parts/valve-kinds.ts';
import { inflate, overlaps, segmentTouches } from './geometry.ts';
import type { Extent } from './label-text.ts';
import { isActuator } from './label-text.ts';
import { partLetters } from './letters.ts';
import { partReach, placedPorts, placementOf } from './shapes.ts';

export interface Spot {
  readonly at: Point;
  readonly align: 'start' | 'end';
  /** All that may come to stand there. */
  readonly box: Box;
  /** What a state says stands on a line of its own, which takes less room across. */
  readonly stacked: boolean;
}

/** What words keep clear of. */
export interface Ground {
  readonly parts: readonly { readonly part: Part; readonly box: Box }[];
  readonly lines: readonly (readonly [Point, Point])[];
  readonly taken: Box[];
}

type Place = 'above' | 'right' | 'left' | 'below';
interface Candidate extends Spot {
  /** How much worse than the best place for it, in modules. */
  readonly worse: number;
}

const GAP = 0.7;
/** From the letters of a valve. */
const SHOULDER = 0.6;
/** Half the length of a bar across a line, beyond which that counts. */
const MARK = 0.5;
/** From lines, which a state may make wide: less over and under, where letters do not fill their box. */
const CLEAR = { aside: 0.5, over: 0.15 };
/** What lies in the way, against which a longer way from the symbol is weighed. */
const COST = { part: 60, text: 80, line: 25, near: 1.5 } as const;
const PUSHED = 2;
/** How far from another part a name is not taken for that one's. */
const NEAR = 0.7;
/** Width of a name as it is as a rule. */
const NAME = 6;
/** Modules between the places tried along a side, and distances from it. */
const STEP = 1;
const AWAY = [0, 1, 2, 3.5, 5, 7] as const;

/**
 * The clearest place for the words of a part, near it; where all are crowded, the least crowded. `extents`: ways to lay the
 * words out, the best first.
 */
export function findSpot(part: Part, extents: readonly Extent[], ground: Ground): Spot {
  const box = partReach(part);
  const longest = Math.max(...extents.flatMap(({ width, height }) => [width, height]));
  const near = groundNear(ground, inflate(box, longest + 2 * GAP + NEAR));
  let found: Found | undefined;
  for (const extent of extents) {
    const first = best(beside(part, box, extent), part.id, near);
    if (first.cost < COST.line) return first.spot;
    if (!found || first.cost < found.cost) found = first;
  }
  const far = groundNear(ground, inflate(box, longest + (AWAY.at(-1) ?? 0) + 2 * GAP));
  for (const extent of extents) {
    const next = best(around(part, box, extent), part.id, far);
    if (!found || next.cost < found.cost) found = next;
  }
  return (found as Found).spot;
}

/** Where the words would stand if nothing were in the way. */
export const idealBox = (part: Part, extent: Extent): Box =>
  best(beside(part, partReach(part), extent), part.id, NOTHING).spot.box;

const NOTHING: Ground = { parts: [], lines: [], taken: [] };

interface Found {
  readonly spot: Spot;
  readonly cost: number;
}

function best(candidates: readonly Candidate[], own: string, ground: Ground): Found {
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

/** How far along its side the words stand from where they belong, in hundredths of it: by the part's middle, or the barrel's end. */
function away(part: Part, place: Place, box: Box, extent: Extent, along: number): number {
  const { x, y } = placementOf(part).at;
  const flat = place === 'above' || place === 'below';
  if (flat && isActuator(part)) return Math.abs(along - bodyOf(part, box).x) * 0.02;
  const [middle, size, low, high] = flat
    ? [x, extent.width, box.x, box.x + box.width]
    : [y, extent.height, box.y, box.y + box.height];
  // Beyond the ends of its side a name soon belongs to something else.
  const beyond = Math.max(0, low - (along + size), along - high);
  // Room that is only kept does not show: the name at its beginning does.
  const shown = flat && extent.kept ? Math.min(size, NAME) : size;
  return Math.abs(along + shown / 2 - middle) * (extent.kept ? 0.1 : 0.02) + beyond;
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
const spot = (p: Point, { width, height, kept, stacked }: Extent, align: Spot['align'], worse: number): Candidate => ({
  at: align === 'end' ? { x: p.x + width, y: p.y } : p,
  align,
  box: { ...p, width, height },
  stacked,
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
      ...placedPorts(part).flatMap((port) =>
        port.side === side ? [inflate({ ...port.at, width: 0, height: 0 }, MARK)] : [],
      ),
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
  for (const other of ground.taken) {
    if (overlaps(other, box)) cost += COST.text;
    else if (overlaps(other, nearby)) cost += COST.near / 2;
  }
  const room = {
    x: box.x - CLEAR.aside,
    y: box.y - CLEAR.over,
    width: box.width + 2 * CLEAR.aside,
    height: box.height + 2 * CLEAR.over,
  };
  for (const [a, b] of ground.lines) if (segmentTouches(a, b, room)) cost += COST.line;
  return cost;
}
