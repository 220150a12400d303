import type { Box, Point } from '../base/points.ts';
import { union } from '../base/points.ts';
import type { Circuit, Part } from '../circuit/model.ts';
import { hasSheets, sheetOf, sheetsOf } from '../circuit/sheets.ts';
import { inflate, overlaps } from './geometry.ts';
import type { Meetings } from './neighbours.ts';
import { meetings, reach } from './neighbours.ts';
import { planSheet, SPACE } from './plan.ts';
import { partReach, placedPorts } from './shapes.ts';

const TANK = 'tank';

/**
 * Gives every part without coordinates a readable place on the module grid, at least 4 M from all
 * others of its sheet. Parts that have a place keep it, even if those overlap each other.
 */
export function placeMissing(circuit: Circuit): Circuit {
  if (circuit.parts.every((p) => p.at)) return circuit;
  if (!hasSheets(circuit)) return placeOnSheet(circuit);
  const placed = new Map<string, Part>();
  for (const { id } of sheetsOf(circuit)) {
    const parts = circuit.parts.filter((part) => sheetOf(circuit, part) === id);
    const known = new Set(parts.map((part) => part.id));
    const connections = circuit.connections.filter(({ from, to }) => known.has(from.part) && known.has(to.part));
    for (const part of placeOnSheet({ ...circuit, parts, connections }).parts) placed.set(part.id, part);
  }
  return { ...circuit, parts: circuit.parts.map((p) => placed.get(p.id) ?? p) };
}

function placeOnSheet(circuit: Circuit): Circuit {
  if (circuit.parts.every((p) => p.at)) return circuit;
  const all = meetings(circuit);
  const plan = planSheet(circuit);
  const placed = new Map(circuit.parts.filter((p) => p.at).map((p) => [p.id, p]));
  const missing = circuit.parts.filter((p) => !p.at);
  const origin = startOf([...placed.values()]);
  for (const part of missing.filter((p) => p.kind !== TANK)) {
    const wanted = plan.get(part.id) ?? { x: 0, y: 0 };
    const shift = shiftOf(circuit, all, plan, part) ?? origin;
    settle(placed, part, { x: wanted.x + shift.x, y: wanted.y + shift.y });
  }
  for (const part of missing.filter((p) => p.kind === TANK)) settle(placed, part, underItsPort(placed, all, part));
  return { ...circuit, parts: circuit.parts.map((p) => placed.get(p.id) ?? p) };
}

/** New parts that know no placed one begin to the right of everything. */
function startOf(parts: readonly Part[]): Point {
  const box = union(parts.map(partReach));
  return box ? { x: Math.ceil(box.x + box.width) + 2 * SPACE, y: Math.round(box.y + box.height / 2) } : { x: 0, y: 0 };
}

/** How far the user's places are from the plan's, judged by the nearest part that the user placed. */
function shiftOf(circuit: Circuit, all: Meetings, plan: ReadonlyMap<string, Point>, part: Part): Point | undefined {
  const own = new Map(circuit.parts.filter((p) => p.at).map((p) => [p.id, p]));
  if (own.size === 0) return { x: 0, y: 0 };
  for (const { part: id } of reach(
    all,
    part.id,
    () => true,
    (p) => own.get(p)?.kind === TANK,
  )) {
    const at = own.get(id)?.at;
    const planned = plan.get(id);
    if (at && planned) return { x: Math.round(at.x - planned.x), y: Math.round(at.y - planned.y) };
  }
  return undefined;
}

/** Straight below the port that it drains; beside the port's line if that port looks elsewhere. */
function underItsPort(placed: ReadonlyMap<string, Part>, all: Meetings, tank: Part): Point {
  const met = (all.get(tank.id) ?? []).flatMap(({ other }) => {
    const part = placed.get(other.part);
    const port = part && placedPorts(part).find((p) => p.ref.port === other.port);
    return port ? [{ port, part }] : [];
  });
  const box = partReach({ ...tank, at: { x: 0, y: 0 } });
  // A tank shared by several returns stands under the lowest of them.
  const lowest = met.sort((a, b) => b.port.at.y - a.port.at.y)[0];
  if (!lowest) {
    const all = union([...placed.values()].map(partReach));
    return all
      ? { x: Math.round(all.x + all.width) + SPACE - box.x, y: Math.round(all.y + all.height) - box.y - box.height }
      : { x: 0, y: 0 };
  }
  const { port, part } = lowest;
  const under = partReach(part);
  const y = Math.ceil(under.y + under.height) + SPACE - box.y;
  const beside = placedPorts(part).filter((p) => p.side === 'down' && Math.abs(p.at.x - port.at.x) < 4).length > 1;
  switch (port.side) {
    case 'down':
      // Clear of the line at the port next to it.
      return { x: Math.round(port.at.x) + (beside ? 3 : 0), y };
    case 'left':
      return { x: Math.round(port.at.x) - SPACE, y };
    default:
      return { x: Math.round(under.x + under.width) + SPACE, y };
  }
}

/** The wanted spot, or the free one nearest to it; sideways before up and down at equal distance. */
function settle(placed: Map<string, Part>, part: Part, wanted: Point): void {
  const boxes = [...placed.values()].map((p) => inflate(partReach(p), SPACE - 0.001));
  const free = (at: Point): boolean => {
    const box: Box = partReach({ ...part, at });
    return !boxes.some((other) => overlaps(other, box));
  };
  for (let ring = 0; ; ring++) {
    for (const step of ringOf(ring)) {
      const at = { x: wanted.x + step.x, y: wanted.y + step.y };
      if (!free(at)) continue;
      placed.set(part.id, { ...part, at });
      return;
    }
  }
}

function ringOf(ring: number): Point[] {
  if (ring === 0) return [{ x: 0, y: 0 }];
  const out: Point[] = [];
  for (let k = 0; k <= ring; k++) {
    for (const sign of k === 0 ? [1] : [1, -1]) {
      out.push({ x: ring, y: k * sign }, { x: -ring, y: k * sign });
      if (k < ring) out.push({ x: k * sign, y: ring }, { x: k * sign, y: -ring });
    }
  }
  return out;
}
