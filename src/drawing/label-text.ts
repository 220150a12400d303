import { advance } from '../base/text-advance.ts';
import type { Part } from '../circuit/model.ts';
import { labelOf } from '../circuit/model.ts';
import { isStripValve } from '../parts/valve-kinds.ts';
import { TEXT_SIZES } from './palette.ts';
import { REFERENCE } from './reference-symbol.ts';
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

export interface PartWords {
  readonly note?: string | undefined;
  readonly figure?: Figure | undefined;
}

const ACTUATORS = new Set(['cylinder', 'double-rod-cylinder', 'single-acting-cylinder', 'motor']);
export const isActuator = ({ kind }: Part): boolean => ACTUATORS.has(kind);
/** Verdicts have a glyph; positions have none. */
const hasGlyph = (part: Part): boolean => isActuator(part) || part.kind.endsWith('-pump');
/** Drawn so often, or so small, that an automatic name is noise. */
const QUIET = new Set(['tank', 'junction', 'plug', REFERENCE]);
/** Modules: the glyph and the gap after it. */
export const GLYPH_ROOM = 2.2;
/** Between two runs of a line. */
const RUN_GAP = 0.8;
/** Modules kept after a name for the verdict and its figure as they are as a rule; long ones may reach further. */
const VERDICT_ROOM = { actuator: 26, pump: 16.5 };

/** Width in modules of a text of a size in pixels. */
export const textWidth = (text: string, size: number, weight: LabelText['weight'] = 400): number =>
  advance(text, size, weight) / MODULE_PX;

export const runsWidth = (runs: readonly LabelText[]): number =>
  runs.reduce(
    (sum, r, i) => sum + (i > 0 ? RUN_GAP : 0) + textWidth(r.text, r.size, r.weight) + (r.glyph ? GLYPH_ROOM : 0),
    0,
  );
export const lineHeight = (runs: readonly LabelText[]): number =>
  (Math.max(...runs.map((r) => r.size)) * 1.2) / MODULE_PX;

/** Modules to be kept after the name for what a state may say of the part. */
function noteRoom(part: Part): number {
  if (isActuator(part)) return VERDICT_ROOM.actuator;
  if (part.kind.endsWith('-pump')) return VERDICT_ROOM.pump;
  if (!isStripValve(part.kind)) return 0;
  const names = part.valve?.positions.map(({ name }) => name) ?? [];
  return RUN_GAP + Math.max(2, ...names.map((name) => textWidth(name, TEXT_SIZES.label, 600)));
}

/**
 * The lines of words beside a part: its name with what a state says, and its code. `stacked`: what the state says has a
 * line of its own.
 */
export function linesOf(part: Part, { note, figure }: PartWords, stacked = false): LabelText[][] {
  const actuator = isActuator(part);
  const size = actuator ? TEXT_SIZES.actuator : TEXT_SIZES.label;
  const name: LabelText[] = [];
  if (part.label !== undefined || !QUIET.has(part.kind)) {
    const strong = actuator || isStripValve(part.kind);
    name.push({ text: labelOf(part), size, weight: strong ? 600 : 500, tone: strong ? 'ink' : 'second' });
  }
  const said: LabelText[] = [];
  if (note) {
    const tone = isStripValve(part.kind) ? 'accent' : 'ink';
    said.push({ text: note, size: TEXT_SIZES.label, weight: 600, tone, ...(hasGlyph(part) && { glyph: true }) });
  }
  if (figure)
    said.push({ text: figure.text, size: TEXT_SIZES.label, weight: 600, tone: 'ink', assumed: figure.assumed });
  const code: LabelText[] = part.code ? [{ text: part.code, size: TEXT_SIZES.code, weight: 400, tone: 'mute' }] : [];
  return [...(stacked ? [name, said] : [[...name, ...said]]), code].filter((runs) => runs.length > 0);
}

/** Size of all that may be said of a part; `noted`: by a state, too. The ways to lay it out, the best first. */
export function extentsOf(part: Part, noted: boolean): Extent[] {
  const lines = linesOf(part, {});
  const room = noted ? noteRoom(part) : 0;
  const [first = 0, ...rest] = lines.map(runsWidth);
  const height = lines.reduce((sum, runs) => sum + lineHeight(runs), 0);
  const wide: Extent = { width: Math.max(first + room, ...rest), height, kept: room > 0, stacked: false };
  if (room === 0 || !hasGlyph(part)) return [wide];
  const own = lineHeight([{ text: '', size: TEXT_SIZES.label, weight: 600, tone: 'ink' }]);
  return [wide, { ...wide, width: Math.max(first, room - RUN_GAP, ...rest), height: height + own, stacked: true }];
}

/** Size of words, in modules. */
export interface Extent {
  readonly width: number;
  readonly height: number;
  /** Room for what a state says is part of it. */
  readonly kept: boolean;
  readonly stacked: boolean;
}
