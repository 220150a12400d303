import type { Point } from '../base/points.ts';
import { vector } from '../base/points.ts';
import type { Circuit } from '../circuit/model.ts';
import type { Routes } from './geometry.ts';
import { lineNumbers } from './lines.ts';
import { placedPorts } from './shapes.ts';

export interface Dot {
  readonly at: Point;
  readonly line: number;
}

interface Span {
  readonly line: number;
  /** The coordinate that stays the same: y of a flat span, x of an upright one. */
  readonly fixed: number;
  readonly low: number;
  readonly high: number;
}

interface Spans {
  readonly flat: Span[];
  readonly upright: Span[];
}

/** Straight pieces of each line, overlapping and touching ones merged. */
function spansOf(circuit: Circuit, routes: Routes, only?: ReadonlySet<number>): Spans {
  const lines = lineNumbers(circuit);
  const flat: Span[] = [];
  const upright: Span[] = [];
  for (const connection of circuit.connections) {
    const line = lines.get(connection.id) ?? -1;
    if (only && !only.has(line)) continue;
    const points = routes.get(connection.id) ?? [];
    for (let i = 1; i < points.length; i++) {
      const a = points[i - 1] as Point;
      const b = points[i] as Point;
      if (a.y === b.y && a.x !== b.x)
        flat.push({ line, fixed: a.y, low: Math.min(a.x, b.x), high: Math.max(a.x, b.x) });
      else if (a.x === b.x && a.y !== b.y)
        upright.push({ line, fixed: a.x, low: Math.min(a.y, b.y), high: Math.max(a.y, b.y) });
    }
  }
  return { flat: merge(flat), upright: merge(upright) };
}

function merge(spans: Span[]): Span[] {
  spans.sort((a, b) => a.line - b.line || a.fixed - b.fixed || a.low - b.low);
  const out: Span[] = [];
  for (const span of spans) {
    const last = out.at(-1);
    if (last && last.line === span.line && last.fixed === span.fixed && span.low <= last.high) {
      out[out.length - 1] = { ...last, high: Math.max(last.high, span.high) };
    } else out.push(span);
  }
  return out;
}

/**
 * Where three or more ends of one line meet: branches of its routes, and ports that lines leave in
 * different directions (the port itself is one end). In the order of lines, then down the sheet. `only`: of these lines.
 */
export function junctionDots(circuit: Circuit, routes: Routes, only?: ReadonlySet<number>): Dot[] {
  const spans = spansOf(circuit, routes, only);
  const ends = new Map<string, { at: Point; line: number; ways: Set<string> }>();
  const note = (line: number, at: Point, way: string): void => {
    const key = `${line} ${at.x} ${at.y}`;
    const entry = ends.get(key) ?? { at, line, ways: new Set<string>() };
    ends.set(key, entry.ways.add(way) && entry);
  };
  for (const s of spans.flat) {
    note(s.line, { x: s.low, y: s.fixed }, 'right');
    note(s.line, { x: s.high, y: s.fixed }, 'left');
  }
  for (const s of spans.upright) {
    note(s.line, { x: s.fixed, y: s.low }, 'down');
    note(s.line, { x: s.fixed, y: s.high }, 'up');
  }
  const upright = byLine(spans.upright);
  for (const s of spans.flat) {
    for (const u of upright.get(s.line) ?? []) {
      if (u.fixed < s.low || u.fixed > s.high || s.fixed < u.low || s.fixed > u.high) continue;
      const at = { x: u.fixed, y: s.fixed };
      if (u.fixed > s.low) note(s.line, at, 'left');
      if (u.fixed < s.high) note(s.line, at, 'right');
      if (s.fixed > u.low) note(s.line, at, 'up');
      if (s.fixed < u.high) note(s.line, at, 'down');
    }
  }
  notePorts(circuit, note, only);
  return [...ends.values()]
    .filter((e) => e.ways.size >= 3)
    .map(({ at, line }) => ({ at, line }))
    .sort((a, b) => a.line - b.line || a.at.y - b.at.y || a.at.x - b.at.x);
}

function notePorts(
  circuit: Circuit,
  note: (line: number, at: Point, way: string) => void,
  only?: ReadonlySet<number>,
): void {
  const lines = lineNumbers(circuit);
  const parts = new Map(circuit.parts.map((p) => [p.id, p]));
  const done = new Set<string>();
  for (const connection of circuit.connections) {
    if (only && !only.has(lines.get(connection.id) ?? -1)) continue;
    for (const ref of [connection.from, connection.to]) {
      const part = parts.get(ref.part);
      const key = `${ref.part}.${ref.port}`;
      if (!part || done.has(key)) continue;
      done.add(key);
      const port = placedPorts(part).find((p) => p.ref.port === ref.port);
      if (!port || port.role === 'joint') continue;
      const out = vector(port.side);
      const inward = out.x > 0 ? 'left' : out.x < 0 ? 'right' : out.y > 0 ? 'up' : 'down';
      note(lines.get(connection.id) ?? -1, port.at, inward);
    }
  }
}

function byLine(spans: readonly Span[]): Map<number, Span[]> {
  const out = new Map<number, Span[]>();
  for (const span of spans) {
    const list = out.get(span.line);
    if (list) list.push(span);
    else out.set(span.line, [span]);
  }
  return out;
}

/** Where two different lines cross. Drawn plainly, without a dot: not joined (ISO 1219-1, from memory). */
export function crossings(circuit: Circuit, routes: Routes): Point[] {
  const { flat, upright } = spansOf(circuit, routes);
  const found = new Map<string, Point>();
  for (const s of flat) {
    for (const u of upright) {
      if (u.line === s.line || u.fixed <= s.low || u.fixed >= s.high || s.fixed <= u.low || s.fixed >= u.high) continue;
      found.set(`${u.fixed} ${s.fixed}`, { x: u.fixed, y: s.fixed });
    }
  }
  return [...found.values()].sort((a, b) => a.y - b.y || a.x - b.x);
}
