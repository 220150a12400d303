import type { Box, Point } from '../base/points.ts';
import type { Circuit, Part } from '../circuit/model.ts';
import { labelOf } from '../circuit/model.ts';
import { kindOf } from '../parts/catalogue.ts';
import { inflate, overlaps, segmentTouches } from './geometry.ts';
import type { Routes } from './geometry.ts';
import { TEXT_SIZES } from './palette.ts';
import { partReach, placedPorts } from './shapes.ts';
import { MODULE_PX } from './strokes.ts';

export interface LabelText {
  readonly text: string;
  /** Pixels at 8 px a module. */
  readonly size: number;
  readonly weight: 400 | 500 | 600;
  readonly tone: 'ink' | 'second' | 'mute' | 'accent';
}

/** One line of text on the sheet; `at` is on the baseline. */
export interface SceneLabel {
  readonly role: 'part' | 'port' | 'free';
  /** Part id, or id of the free label. */
  readonly owner: string;
  readonly at: Point;
  readonly align: 'start' | 'middle' | 'end';
  /** Pieces of one line, side by side. */
  readonly runs: readonly LabelText[];
}

export type NoteOf = (part: Part) => string | undefined;

interface Spot {
  readonly at: Point;
  readonly align: 'start' | 'middle' | 'end';
  readonly box: Box;
}

type Place = 'above' | 'right' | 'left' | 'below';

const ACTUATORS = new Set(['cylinder', 'double-rod-cylinder', 'single-acting-cylinder', 'motor']);
const VALVE = 'directional-valve';
/** Drawn so often, or so small, that an automatic name is noise. */
const QUIET = new Set(['tank', 'junction', 'plug']);
const GAP = 0.75;

/** Close enough for placing: Inter's capitals and figures are wider than its small letters. */
export function textWidth(text: string, size: number): number {
  let units = 0;
  for (const letter of text) {
    if ('il.,:;|\'!'.includes(letter)) units += 0.28;
    else if ('MWmw@%'.includes(letter)) units += 0.88;
    else if (letter === ' ') units += 0.28;
    else units += letter >= 'A' && letter <= 'Z' ? 0.68 : 0.59;
  }
  return (units * size) / MODULE_PX;
}

const runsWidth = (runs: readonly LabelText[]): number => runs.reduce((sum, r) => sum + textWidth(`${r.text} `, r.size), 0);
const lineHeight = (runs: readonly LabelText[]): number => (Math.max(...runs.map((r) => r.size)) * 1.2) / MODULE_PX;

/** Label and code of every part, port letters of valves, and free labels, each clear of ports and lines if it can be. */
export function sceneLabels(circuit: Circuit, routes: Routes, noteOf: NoteOf = () => undefined): SceneLabel[] {
  const letters = circuit.parts.filter((p) => p.kind === VALVE).flatMap(portLetters);
  const free = (circuit.labels ?? []).map((label): SceneLabel => ({
    role: 'free', owner: label.id, at: label.at, align: 'start',
    runs: [{ text: label.text, size: TEXT_SIZES.label, weight: 400, tone: 'second' }],
  }));
  const parts = circuit.parts.map((part) => ({ part, box: partReach(part) }));
  const taken = [...letters, ...free].map(labelBox);
  const out: SceneLabel[] = [];
  for (const { part, box } of parts) {
    const lines = linesOf(part, noteOf(part));
    if (lines.length === 0) continue;
    const spot = bestSpot(lines, part, box, (b) => crowd(b, part.id, parts, routes, taken));
    taken.push(spot.box);
    let y = spot.at.y;
    for (const runs of lines) {
      out.push({ role: 'part', owner: part.id, at: { x: spot.at.x, y: y + (runs[0]?.size ?? 12) / MODULE_PX }, align: spot.align, runs });
      y += lineHeight(runs);
    }
  }
  return [...out, ...letters, ...free];
}

function linesOf(part: Part, note: string | undefined): LabelText[][] {
  const lines: LabelText[][] = [];
  const actuator = ACTUATORS.has(part.kind);
  const size = actuator ? TEXT_SIZES.actuator : TEXT_SIZES.label;
  const first: LabelText[] = [];
  if (part.label !== undefined || !QUIET.has(part.kind)) {
    const strong = actuator || part.kind === VALVE;
    first.push({ text: labelOf(part), size, weight: strong ? 600 : 500, tone: strong ? 'ink' : 'second' });
  }
  if (note) first.push({ text: note, size: TEXT_SIZES.label, weight: 600, tone: part.kind === VALVE ? 'accent' : 'ink' });
  if (first.length > 0) lines.push(first);
  if (part.code) lines.push([{ text: part.code, size: TEXT_SIZES.code, weight: 400, tone: 'mute' }]);
  return lines;
}

/** Where a name is looked for on each kind, best first. */
function orderOf(part: Part, box: Box): readonly Place[] {
  if (part.kind === VALVE) return ['right', 'left', 'below', 'above'];
  if (ACTUATORS.has(part.kind)) return box.width >= box.height ? ['above', 'right', 'left', 'below'] : ['right', 'left', 'above', 'below'];
  const facesAcross = placedPorts(part).some((p) => p.side === 'left' || p.side === 'right');
  return facesAcross ? ['above', 'below', 'right', 'left'] : ['right', 'left', 'above', 'below'];
}

function bestSpot(lines: readonly LabelText[][], part: Part, box: Box, crowding: (box: Box) => number): Spot {
  const width = Math.max(...lines.map(runsWidth));
  const height = lines.reduce((sum, runs) => sum + lineHeight(runs), 0);
  let best: Spot | undefined;
  let least = Infinity;
  for (const spot of orderOf(part, box).flatMap((p) => spotsAt(p, box, width, height))) {
    const cost = crowding(spot.box);
    if (cost < least) {
      least = cost;
      best = spot;
    }
    if (cost === 0) break;
  }
  return best as Spot;
}

function spotsAt(where: Place, box: Box, width: number, height: number): Spot[] {
  const beside = (y: number): Spot => {
    const x = where === 'right' ? box.x + box.width + GAP : box.x - GAP - width;
    const at = { x: where === 'right' ? x : x + width, y };
    return { at, align: where === 'right' ? 'start' : 'end', box: { x, y, width, height } };
  };
  const along = (x: number): Spot => {
    const y = where === 'above' ? box.y - GAP - height : box.y + box.height + GAP;
    return { at: { x, y }, align: 'start', box: { x, y, width, height } };
  };
  if (where === 'right' || where === 'left') {
    return [box.y + (box.height - height) / 2, box.y, box.y + box.height - height].map(beside);
  }
  return [box.x, box.x + (box.width - width) / 2, box.x + box.width - width].map(along);
}

/** How much a box of text would cover: 0 = free. */
function crowd(
  box: Box, own: string, parts: readonly { part: Part; box: Box }[], routes: Routes, taken: readonly Box[],
): number {
  let cost = 0;
  for (const other of parts) if (other.part.id !== own && overlaps(other.box, box)) cost += 4;
  for (const other of taken) if (overlaps(other, box)) cost += 6;
  const room = inflate(box, 0.3);
  for (const points of routes.values()) {
    for (let i = 1; i < points.length; i++) if (segmentTouches(points[i - 1] as Point, points[i] as Point, room)) cost += 2;
  }
  return cost;
}

export function labelBox(label: SceneLabel): Box {
  const width = runsWidth(label.runs);
  const height = lineHeight(label.runs);
  const x = label.align === 'start' ? label.at.x : label.align === 'end' ? label.at.x - width : label.at.x - width / 2;
  return { x, y: label.at.y - height * 0.8, width, height };
}

/** Small letters outside the box, turned away from the middle of the edge, clear of the line. */
function portLetters(part: Part): SceneLabel[] {
  const ports = placedPorts(part);
  const kind = kindOf(part.kind);
  if (!kind) return [];
  return ports.map((port) => {
    const edge = ports.filter((p) => p.side === port.side);
    const upright = port.side === 'up' || port.side === 'down';
    const place = (p: Point): number => (upright ? p.x : p.y);
    const middle = edge.reduce((sum, p) => sum + place(p.at), 0) / edge.length;
    const before = edge.length > 1 && place(port.at) < middle;
    const cap = TEXT_SIZES.letter / MODULE_PX;
    const { x, y } = port.at;
    const base = { role: 'port' as const, owner: part.id, runs: [{ text: port.ref.port, size: TEXT_SIZES.letter, weight: 400 as const, tone: 'second' as const }] };
    if (upright) {
      const baseline = port.side === 'up' ? y - 0.4 : y + 0.4 + cap * 0.75;
      return { ...base, at: { x: before ? x - 0.6 : x + 0.6, y: baseline }, align: before ? 'end' : 'start' };
    }
    const baseline = before ? y - 0.5 : y + 0.5 + cap * 0.75;
    return { ...base, at: { x: port.side === 'left' ? x - 0.4 : x + 0.4, y: baseline }, align: port.side === 'left' ? 'end' : 'start' };
  });
}
