import type { Box, Point } from '../base/points.ts';
import { isStripValve } from '../parts/valve-kinds.ts';
import type { Circuit, Part } from '../circuit/model.ts';
import { labelOf } from '../circuit/model.ts';
import { inflate, overlaps, segmentTouches } from './geometry.ts';
import type { Routes } from './geometry.ts';
import { TEXT_SIZES } from './palette.ts';
import { REFERENCE } from './reference-symbol.ts';
import { partReach, placedPorts } from './shapes.ts';
import { MODULE_PX } from './strokes.ts';

export interface LabelText {
  readonly text: string;
  /** Pixels at 8 px a module. */
  readonly size: number;
  readonly weight: 400 | 500 | 600;
  readonly tone: 'ink' | 'second' | 'mute' | 'accent';
  /** Room of `GLYPH_ROOM` is kept before it for the glyph of a verdict. */
  readonly glyph?: true;
  /** A figure that rests on values nobody entered. */
  readonly assumed?: boolean;
}

/** What a state says of a part, after its name. */
export interface Figure {
  readonly text: string;
  readonly assumed: boolean;
}

/** One line of text on the sheet; `at` is on the baseline. */
export interface SceneLabel {
  readonly role: 'part' | 'free' | 'line';
  /** Id of the part, of the free label, or of the connection that bears a line's name. */
  readonly owner: string;
  readonly at: Point;
  readonly align: 'start' | 'middle' | 'end';
  /** Pieces of one line, side by side. */
  readonly runs: readonly LabelText[];
}

export interface PartWords {
  readonly note?: string | undefined;
  readonly figure?: Figure | undefined;
}
export type WordsOf = (part: Part) => PartWords;

export interface Spot {
  readonly at: Point;
  readonly align: 'start' | 'middle' | 'end';
  /** All that may come to stand there. */
  readonly box: Box;
}

type Place = 'above' | 'right' | 'left' | 'below';

const ACTUATORS = new Set(['cylinder', 'double-rod-cylinder', 'single-acting-cylinder', 'motor']);
/** Verdicts have a glyph; positions have none. */
const hasGlyph = ({ kind }: Part): boolean => ACTUATORS.has(kind) || kind.endsWith('-pump');
/** Drawn so often, or so small, that an automatic name is noise. */
const QUIET = new Set(['tank', 'junction', 'plug', REFERENCE]);
const GAP = 0.75;
/** Modules: the glyph and the gap after it. */
export const GLYPH_ROOM = 2.2;
/** Modules kept for a position's or verdict's glyph and words. */
const NOTE_ROOM: Readonly<Record<string, number>> = {
  'directional-valve': 6,
  'pilot-valve': 6,
  'two-stage-valve': 6,
  'roller-valve': 6,
  cylinder: 16,
  'double-rod-cylinder': 16,
  'single-acting-cylinder': 16,
  motor: 17,
  'fixed-pump': 14,
  'compensated-pump': 14,
};

/** Close enough for placing: Inter's capitals and figures are wider than its small letters. */
export function textWidth(text: string, size: number): number {
  let units = 0;
  for (const letter of text) {
    if ("il.,:;|'!".includes(letter)) units += 0.28;
    else if ('MWmw@%'.includes(letter)) units += 0.88;
    else if (letter === ' ') units += 0.28;
    else units += letter >= 'A' && letter <= 'Z' ? 0.68 : 0.59;
  }
  return (units * size) / MODULE_PX;
}

const runsWidth = (runs: readonly LabelText[]): number =>
  runs.reduce((sum, r) => sum + textWidth(`${r.text} `, r.size) + (r.glyph ? GLYPH_ROOM : 0), 0);
const lineHeight = (runs: readonly LabelText[]): number => (Math.max(...runs.map((r) => r.size)) * 1.2) / MODULE_PX;

/** Where the words of each part stand; free of the state that is shown, so that no name jumps when a lever moves. */
export type LabelSpots = ReadonlyMap<string, Spot>;

/** `noted`: keep room beside names for what a state says. Each spot is clear of ports, lines and other names if it can be. */
export function labelSpots(circuit: Circuit, routes: Routes, noted: boolean): LabelSpots {
  const parts = circuit.parts.map((part) => ({ part, box: partReach(part) }));
  const ground: Ground = {
    parts,
    lines: [...routes.values()].flatMap((points) => points.slice(1).map((b, i) => [points[i] as Point, b] as const)),
    taken: [
      ...freeLabels(circuit).map(labelBox),
      ...circuit.parts.filter((p) => isStripValve(p.kind)).flatMap(letterRoom),
    ],
  };
  const out = new Map<string, Spot>();
  for (const { part, box } of parts) {
    const lines = linesOf(part, {});
    if (lines.length === 0) continue;
    const spot = bestSpot(lines, part, box, ground, noted ? (NOTE_ROOM[part.kind] ?? 0) : 0);
    ground.taken.push(spot.box);
    out.set(part.id, spot);
  }
  return out;
}

/** Label, note, figure and code of every part, and the free labels. */
export function sceneLabels(circuit: Circuit, spots: LabelSpots, wordsOf: WordsOf = () => ({})): SceneLabel[] {
  const out: SceneLabel[] = [];
  for (const part of circuit.parts) {
    const spot = spots.get(part.id);
    if (!spot) continue;
    let y = spot.at.y;
    for (const runs of linesOf(part, wordsOf(part))) {
      out.push({
        role: 'part',
        owner: part.id,
        at: { x: spot.at.x, y: y + (runs[0]?.size ?? 0) / MODULE_PX },
        align: spot.align,
        runs,
      });
      y += lineHeight(runs);
    }
  }
  return [...out, ...freeLabels(circuit)];
}

const freeLabels = (circuit: Circuit): SceneLabel[] =>
  (circuit.labels ?? []).map((label) => ({
    role: 'free',
    owner: label.id,
    at: label.at,
    align: 'start',
    runs: [{ text: label.text, size: TEXT_SIZES.label, weight: 400, tone: 'second' }],
  }));

function linesOf(part: Part, { note, figure }: PartWords): LabelText[][] {
  const lines: LabelText[][] = [];
  const actuator = ACTUATORS.has(part.kind);
  const size = actuator ? TEXT_SIZES.actuator : TEXT_SIZES.label;
  const first: LabelText[] = [];
  if (part.label !== undefined || !QUIET.has(part.kind)) {
    const strong = actuator || isStripValve(part.kind);
    first.push({ text: labelOf(part), size, weight: strong ? 600 : 500, tone: strong ? 'ink' : 'second' });
  }
  if (note) {
    const valve = isStripValve(part.kind);
    const tone = valve ? 'accent' : 'ink';
    first.push({ text: note, size: TEXT_SIZES.label, weight: 600, tone, ...(hasGlyph(part) && { glyph: true }) });
  }
  if (figure)
    first.push({ text: figure.text, size: TEXT_SIZES.label, weight: 600, tone: 'ink', assumed: figure.assumed });
  if (first.length > 0) lines.push(first);
  if (part.code) lines.push([{ text: part.code, size: TEXT_SIZES.code, weight: 400, tone: 'mute' }]);
  return lines;
}

/** Where a name is looked for on each kind, best first. */
function orderOf(part: Part, box: Box): readonly Place[] {
  if (isStripValve(part.kind)) return ['right', 'left', 'below', 'above'];
  if (ACTUATORS.has(part.kind))
    return box.width >= box.height ? ['above', 'right', 'left', 'below'] : ['right', 'left', 'above', 'below'];
  const facesAcross = placedPorts(part).some((p) => p.side === 'left' || p.side === 'right');
  return facesAcross ? ['above', 'below', 'right', 'left'] : ['right', 'left', 'above', 'below'];
}

function bestSpot(lines: readonly LabelText[][], part: Part, box: Box, ground: Ground, extra: number): Spot {
  const [first, ...rest] = lines.map(runsWidth);
  const width = Math.max((first ?? 0) + extra, ...rest);
  const height = lines.reduce((sum, runs) => sum + lineHeight(runs), 0);
  const near = groundNear(ground, inflate(box, Math.max(width, height) + 2 * GAP));
  let best: Spot | undefined;
  let least = Infinity;
  for (const spot of orderOf(part, box).flatMap((p) => spotsAt(p, box, width, height))) {
    const cost = crowd(spot.box, part.id, near);
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

/** What names keep clear of. */
interface Ground {
  readonly parts: readonly { readonly part: Part; readonly box: Box }[];
  readonly lines: readonly (readonly [Point, Point])[];
  readonly taken: Box[];
}

const groundNear = (ground: Ground, around: Box): Ground => ({
  parts: ground.parts.filter((p) => overlaps(p.box, around)),
  lines: ground.lines.filter(([a, b]) => segmentTouches(a, b, around)),
  taken: ground.taken.filter((box) => overlaps(box, around)),
});

/** How much a box of text would cover: 0 = free. */
function crowd(box: Box, own: string, ground: Ground): number {
  let cost = 0;
  for (const other of ground.parts) if (other.part.id !== own && overlaps(other.box, box)) cost += 4;
  for (const other of ground.taken) if (overlaps(other, box)) cost += 6;
  const room = inflate(box, 0.3);
  for (const [a, b] of ground.lines) if (segmentTouches(a, b, room)) cost += 2;
  return cost;
}

export function labelBox(label: SceneLabel): Box {
  const width = runsWidth(label.runs);
  const height = lineHeight(label.runs);
  const x = label.align === 'start' ? label.at.x : label.align === 'end' ? label.at.x - width : label.at.x - width / 2;
  return { x, y: label.at.y - height * 0.8, width, height };
}

/** Room for the letter that a valve draws beside each of its ports. */
function letterRoom(part: Part): Box[] {
  return placedPorts(part).map(({ at }) => ({ x: at.x - 1.8, y: at.y - 1.8, width: 3.6, height: 3.6 }));
}
