import type { Box, Point, Side } from '../base/points.ts';
import { vector } from '../base/points.ts';
import type { Circuit, Part, PortRef } from '../circuit/model.ts';
import { crosses, sheetLookup, sheetOf } from '../circuit/sheets.ts';
import { inflate, overlaps, portOf, segmentTouches } from './geometry.ts';
import { flagBox, referenceId } from './reference-symbol.ts';
import type { Way } from './reference-symbol.ts';
import type { PlacedPort } from './shapes.ts';
import { partReach, placedPorts } from './shapes.ts';

/** Where a line leaves its sheet. */
export interface Reference {
  readonly id: string;
  readonly connection: string;
  readonly end: 'from' | 'to';
  /** The sheet that it stands on, and the port there that its line comes from. */
  readonly sheet: string;
  readonly port: PortRef;
  readonly portAt: Point;
  readonly at: Point;
  readonly way: Way;
  /** Of the line. */
  readonly name: string;
  /** Id of the one where the line goes on. */
  readonly other: string;
}

/** By id, in the order of the connections. */
export type References = ReadonlyMap<string, Reference>;

const NONE: References = new Map();
const SIDES: readonly Side[] = ['up', 'right', 'down', 'left'];
/** Modules from the port: least and most ahead, most aside, free of other things, ahead of other ports. */
const NEAR = 2;
const FAR = 12;
const ASIDE = 14;
const CLEAR = 0.8;
const AHEAD = 3;
/** What a corner, and a side that the line is less likely to take, count for in modules. */
const CORNER = 2.5;

/**
 * A place for each end of each connection between two sheets: the nearest to its port that stands clear of parts, texts
 * and one another. `before`: as they stood; those whose port looks the same way keep their distance from it, so that
 * nothing jumps while parts are dragged. Every part needs its place. `nameOf`: the line of a connection.
 */
export function placeReferences(
  circuit: Circuit,
  nameOf: (connection: string) => string,
  before?: References,
): References {
  const sheet = sheetLookup(circuit);
  const crossing = circuit.connections.filter((connection) => crosses(sheet, connection));
  if (crossing.length === 0) return NONE;
  const parts = new Map(circuit.parts.map((part) => [part.id, part]));
  const grounds = before ? undefined : groundsOf(circuit);
  const out = new Map<string, Reference>();
  for (const { id: connection, from, to } of crossing) {
    for (const [end, port, far] of [
      ['from', from, 'to'],
      ['to', to, 'from'],
    ] as const) {
      const part = parts.get(port.part);
      if (!part) continue;
      const placed = portOf(part, port);
      const id = referenceId(connection, end);
      const stood = before?.get(id);
      const name = stood?.name ?? nameOf(connection);
      const spot = stood ? follow(stood, placed) : find(grounds?.get(sheet(port.part)), part, placed, name);
      out.set(id, {
        id,
        connection,
        end,
        sheet: sheet(port.part),
        port,
        portAt: placed.at,
        name,
        other: referenceId(connection, far),
        ...spot,
      });
    }
  }
  return out;
}

interface Spot {
  readonly at: Point;
  readonly way: Way;
}

const follow = ({ at, portAt, way }: Reference, { at: now }: PlacedPort): Spot => ({
  at: { x: at.x + now.x - portAt.x, y: at.y + now.y - portAt.y },
  way,
});

/** What references keep clear of on one sheet. */
interface Ground {
  readonly parts: readonly { readonly id: string; readonly box: Box }[];
  /** Texts, flags and the ways to them, straight lines between ports. */
  readonly taken: Box[];
  /** Room ahead of ports that have lines. */
  readonly ahead: readonly { readonly at: Point; readonly box: Box }[];
}

function groundsOf(circuit: Circuit): Map<string, Ground> {
  const sheet = sheetLookup(circuit);
  const used = new Set(circuit.connections.flatMap(({ from, to }) => [from, to].map((r) => `${r.part}.${r.port}`)));
  const grounds = new Map<
    string,
    { parts: { id: string; box: Box }[]; taken: Box[]; ahead: { at: Point; box: Box }[] }
  >();
  const on = (id: string) => {
    let ground = grounds.get(id);
    if (!ground) grounds.set(id, (ground = { parts: [], taken: [], ahead: [] }));
    return ground;
  };
  const places = new Map<string, Point>();
  for (const part of circuit.parts) {
    const ground = on(sheet(part.id));
    ground.parts.push({ id: part.id, box: partReach(part) });
    for (const port of placedPorts(part)) {
      const key = `${port.ref.part}.${port.ref.port}`;
      places.set(key, port.at);
      if (port.role === 'joint' || !used.has(key)) continue;
      ground.ahead.push({ at: port.at, box: strip(port.at, along(port.at, port.side, AHEAD)) });
    }
  }
  for (const label of circuit.labels ?? [])
    on(sheetOf(circuit, label)).taken.push({ x: label.at.x, y: label.at.y - 2, width: label.text.length, height: 2 });
  for (const connection of circuit.connections) {
    const { from, to } = connection;
    const [a, b] = [places.get(`${from.part}.${from.port}`), places.get(`${to.part}.${to.port}`)];
    if (!a || !b || crosses(sheet, connection) || (a.x !== b.x && a.y !== b.y)) continue;
    on(sheet(from.part)).taken.push(strip(a, b));
  }
  return grounds;
}

const along = (p: Point, side: Side, by: number): Point => ({
  x: p.x + vector(side).x * by,
  y: p.y + vector(side).y * by,
});
/** A straight line as a box of some width. */
const strip = (a: Point, b: Point): Box =>
  inflate(
    { x: Math.min(a.x, b.x), y: Math.min(a.y, b.y), width: Math.abs(a.x - b.x), height: Math.abs(a.y - b.y) },
    0.4,
  );

interface Candidate extends Spot {
  readonly cost: number;
  readonly turn: Point;
}

function find(ground: Ground | undefined, part: Part, port: PlacedPort, name: string): Spot {
  const outs = port.role === 'joint' ? SIDES : [port.side];
  const all = outs.flatMap((out) => candidates(port.at, out)).sort((a, b) => a.cost - b.cost);
  const around = inflate({ ...port.at, width: 0, height: 0 }, FAR + ASIDE + 20);
  const near: Ground = {
    parts: (ground?.parts ?? []).filter(({ box }) => overlaps(box, around)),
    taken: (ground?.taken ?? []).filter((box) => overlaps(box, around)),
    ahead: (ground?.ahead ?? []).filter(({ box }) => overlaps(box, around)),
  };
  const found = all.find((candidate) => isFree(near, part, port, candidate, name)) ?? (all[0] as Candidate);
  const { at, way, turn } = found;
  ground?.taken.push(flagAt(found, name), strip(port.at, turn), strip(turn, at));
  return { at, way };
}

/** Straight on, or round one corner. */
function candidates(port: Point, out: Side): Candidate[] {
  const found: Candidate[] = [];
  const whole: Point = { x: Math.round(port.x), y: Math.round(port.y) };
  const upright = out === 'up' || out === 'down';
  // On the module grid across the line only where the port is.
  const start = upright ? { x: port.x, y: whole.y } : { x: whole.x, y: port.y };
  for (let ahead = NEAR; ahead <= FAR; ahead++) {
    const turn = along(start, out, ahead);
    found.push({ at: turn, way: out, turn, cost: ahead });
    for (const way of SIDES) {
      if ((way === 'up' || way === 'down') === upright) continue;
      for (let aside = NEAR; aside <= ASIDE; aside++)
        found.push({ at: along(turn, way, aside), way, turn, cost: ahead + aside + CORNER });
    }
  }
  return found;
}

const flagAt = ({ at, way }: Spot, name: string): Box => {
  const box = flagBox({ way, name });
  return { ...box, x: box.x + at.x, y: box.y + at.y };
};

function isFree(ground: Ground, part: Part, port: PlacedPort, candidate: Candidate, name: string): boolean {
  const { at, turn } = candidate;
  const flag = inflate(flagAt(candidate, name), CLEAR);
  if (ground.parts.some(({ box }) => overlaps(box, flag))) return false;
  if (ground.taken.some((box) => overlaps(box, flag))) return false;
  if (ground.ahead.some(({ at: other, box }) => !same(other, port.at) && overlaps(box, flag))) return false;
  return ground.parts.every(({ id, box }) => {
    const room = inflate(box, 0.5);
    const own = id === part.id;
    return (own || !segmentTouches(port.at, turn, room)) && (same(turn, at) || !segmentTouches(turn, at, room));
  });
}

const same = (a: Point, b: Point): boolean => a.x === b.x && a.y === b.y;
