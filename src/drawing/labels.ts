import type { Box, Point } from '../base/points.ts';
import type { Circuit, Part } from '../circuit/model.ts';
import type { Routes } from './geometry.ts';
import { inflate } from './geometry.ts';
import type { Ground, Spot } from './label-spots.ts';
import { findSpot } from './label-spots.ts';
import type { LabelText, PartWords } from './label-text.ts';
import { lineHeight, linesOf, noteRoom, runsWidth } from './label-text.ts';
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
  const out = new Map<string, Spot>();
  for (const part of circuit.parts) {
    const lines = linesOf(part, {});
    if (lines.length === 0) continue;
    const [first, ...rest] = lines.map(runsWidth);
    const room = noted ? noteRoom(part) : 0;
    const spot = findSpot(
      part,
      {
        width: Math.max((first ?? 0) + room, ...rest),
        height: lines.reduce((sum, runs) => sum + lineHeight(runs), 0),
        kept: room > 0,
      },
      ground,
    );
    ground.taken.push(spot.box);
    out.set(part.id, spot);
  }
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
