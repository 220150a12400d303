import type { Box, Point } from '../base/points.ts';
import type { Circuit, Part } from '../circuit/model.ts';
import type { Routes } from './geometry.ts';
import { inflate, overlaps } from './geometry.ts';
import type { Ground, Spot } from './label-spots.ts';
import { findSpot, idealBox } from './label-spots.ts';
import type { Extent, LabelText, PartWords } from './label-text.ts';
import { extentsOf, lineHeight, linesOf, runsWidth } from './label-text.ts';
import { partLetters } from './letters.ts';
import { TEXT_SIZES } from './palette.ts';
import { partReach } from './shapes.ts';
import { MODULE_PX } from './strokes.ts';

export { GLYPH_ROOM, textWidth } from './label-text.ts';
export type { Figure, LabelText, PartWords } from './label-text.ts';
export type { Spot } from './label-spots.ts';

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

export type WordsOf = (part: Part) => PartWords;

/** Where the words of each part stand; free of the state that is shown, so that no name jumps when a lever moves. */
export type LabelSpots = ReadonlyMap<string, Spot>;

/** `noted`: keep room beside names for what a state says. Each spot is clear of ports, lines and other names if it can be. */
export function labelSpots(circuit: Circuit, routes: Routes, noted: boolean): LabelSpots {
  const ground: Ground = {
    parts: circuit.parts.map((part) => ({ part, box: partReach(part) })),
    lines: [...routes.values()].flatMap((points) => points.slice(1).map((b, i) => [points[i] as Point, b] as const)),
    taken: [
      ...freeLabels(circuit).map(labelBox),
      ...circuit.parts.flatMap(partLetters).map((box) => inflate(box, LETTER_ROOM)),
    ],
  };
  const worded = circuit.parts
    .map((part) => ({ part, extents: extentsOf(part, noted) }))
    .filter(({ extents }) => extents.some(({ width }) => width > 0));
  const crowded = crowdedRows(worded);
  const out = new Map<string, Spot>();
  for (const { part, extents } of worded) {
    const spot = findSpot(part, crowded.has(part.id) ? extents.slice(1) : extents, ground);
    ground.taken.push(spot.box);
    out.set(part.id, spot);
  }
  return out;
}

interface Worded {
  readonly part: Part;
  readonly extents: readonly Extent[];
}

/** Parts side by side whose words would take each other's place in one line, but not in two. */
function crowdedRows(worded: readonly Worded[]): ReadonlySet<string> {
  const ideal = worded.flatMap(({ part, extents: [wide, stacked] }) =>
    wide && stacked ? [{ id: part.id, wide: idealBox(part, wide), stacked: idealBox(part, stacked) }] : [],
  );
  const out = new Set<string>();
  for (const a of ideal)
    for (const b of ideal)
      if (b.id !== a.id && overlaps(a.wide, b.wide) && !overlaps(a.stacked, b.stacked)) out.add(a.id).add(b.id);
  return out;
}

/** Modules kept round a letter beside a port. */
const LETTER_ROOM = 0.25;

/** Label, note, figure and code of every part, and the free labels. */
export function sceneLabels(circuit: Circuit, spots: LabelSpots, wordsOf: WordsOf = () => ({})): SceneLabel[] {
  const out: SceneLabel[] = [];
  for (const part of circuit.parts) {
    const spot = spots.get(part.id);
    if (!spot) continue;
    let y = spot.at.y;
    for (const runs of linesOf(part, wordsOf(part), spot.stacked)) {
      out.push({
        role: 'part',
        owner: part.id,
        at: { x: spot.at.x, y: y + Math.max(...runs.map(({ size }) => size)) / MODULE_PX },
        align: spot.align,
        runs,
      });
      y += lineHeight(runs);
    }
  }
  return [...out, ...freeLabels(circuit)];
}

export const freeLabels = (circuit: Circuit): SceneLabel[] =>
  (circuit.labels ?? []).map((label) => ({
    role: 'free',
    owner: label.id,
    at: label.at,
    align: 'start',
    runs: [{ text: label.text, size: TEXT_SIZES.label, weight: 400, tone: 'second' }],
  }));

export function labelBox(label: SceneLabel): Box {
  const width = runsWidth(label.runs);
  const height = lineHeight(label.runs);
  const x = label.align === 'start' ? label.at.x : label.align === 'end' ? label.at.x - width : label.at.x - width / 2;
  return { x, y: label.at.y - height * 0.8, width, height };
}
