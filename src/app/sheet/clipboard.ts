import type { Point } from '../../base/points.ts';
import { copyOut, paste } from '../../circuit/build.ts';
import { readCircuit, writeCircuit } from '../../circuit/file.ts';
import { circuitBounds } from '../../drawing/geometry.ts';
import { namingSettings } from '../../parts/naming.ts';
import { editor } from '../state/editor.svelte.ts';
import { attempt, tryTo } from './attempt.ts';
import { desk } from './desk.svelte.ts';
import { sayThings } from './hand.ts';
import { drawing } from './sheet-drawing.svelte.ts';
import { shownSheet } from './sheet-shown.svelte.ts';
import { snap, toSheet } from './viewport.ts';

/** Modules that a copy stands off from what it was copied from. */
export const OFFSET: Point = { x: 4, y: 4 };

let lastText = '';
let times = 0;

/** What is selected, as the text of a circuit file: it can be pasted into another sheet, or into a message. */
export function copyText(): string | undefined {
  const { parts, labels } = editor.selection;
  if (parts.length + labels.length === 0) {
    desk.refuse('Nothing is selected that could be copied. Select parts first; lines between them go along.');
    return undefined;
  }
  const text = writeCircuit(copyOut(drawing.circuit, parts, labels));
  lastText = text;
  times = 0;
  desk.say(`${sayThings(parts, labels)} copied.`);
  return text;
}

/** What was copied here last, for menus: they may not read the clipboard unasked. */
export function pasteCopied(): void {
  if (lastText === '') desk.refuse('Nothing was copied here yet. Ctrl V pastes what another window copied.');
  else pasteText(lastText);
}

export function pasteText(text: string): void {
  const read = readCircuit(text);
  if (!read.ok) {
    desk.refuse('What is on the clipboard is no circuit.');
    return;
  }
  times = text === lastText ? times + 1 : 1;
  lastText = text;
  const fragment = read.value;
  const by = offsetInSight(circuitBounds(fragment), times);
  const pasted = tryTo(() => paste(editor.circuit, fragment, by.x, by.y, namingSettings, shownSheet.now));
  if (!pasted) return;
  const { edit, parts, labels } = pasted;
  if (
    attempt(
      () => edit,
      `${sayThings(
        fragment.parts.map(({ id }) => id),
        labels,
      )} pasted.`,
    )
  )
    editor.select({ parts, labels });
}

/** A little off the original; in the middle of the view if the original is out of sight. */
function offsetInSight(box: { x: number; y: number; width: number; height: number }, count: number): Point {
  const { viewport, size } = desk;
  const low = toSheet(viewport, { x: 0, y: 0 });
  const high = toSheet(viewport, { x: size.width, y: size.height });
  const seen = box.x < high.x && box.x + box.width > low.x && box.y < high.y && box.y + box.height > low.y;
  if (seen) return { x: OFFSET.x * count, y: OFFSET.y * count };
  return snap({ x: (low.x + high.x - box.width) / 2 - box.x, y: (low.y + high.y - box.height) / 2 - box.y });
}
