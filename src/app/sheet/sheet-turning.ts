import type { History } from '../../circuit/history.ts';
import { changedSheets, hasSheets, saySheet, sheetLookup, sheetOf, sheetsOf } from '../../circuit/sheets.ts';
import { session } from '../state/session.svelte.ts';
import { editor } from '../state/editor.svelte.ts';
import { desk } from './desk.svelte.ts';
import { coversOf, EDGE, fitClear, itemsOf } from './fit.ts';
import { litSheets } from './lit-sheets.ts';
import type { Lights } from './lit-sheets.ts';
import type { Cursor } from './reading-order.ts';
import { drawing } from './sheet-drawing.svelte.ts';
import { shownSheet } from './sheet-shown.svelte.ts';
import { MODULE } from './viewport.ts';
import type { Viewport } from './viewport.ts';

/** How each sheet was looked at when it was left. */
const kept = new Map<string, Viewport>();
let at: string | undefined;

/** Show all of the sheet in view. */
export function fitView(): void {
  const { scene } = drawing;
  // An empty sheet begins at its first zone.
  desk.viewport =
    scene.parts.length === 0
      ? { x: -EDGE / MODULE, y: -EDGE / MODULE, scale: MODULE }
      : fitClear(itemsOf(scene), desk.size, coversOf(desk.host));
}

/** Another circuit was opened: nothing is known of its sheets. */
export function openAt(sheet?: string): void {
  kept.clear();
  shownSheet.want(sheet);
  at = shownSheet.now;
}

/** Brings a sheet into view; false if it is. A line that is being drawn, or what is to be placed, stays in hand. */
export function turnTo(sheet: string): boolean {
  shownSheet.want(sheet);
  return arrive();
}

/** To be called whenever another sheet came into view: it is looked at as before, or all of it. */
export function arrive(): boolean {
  const { now } = shownSheet;
  if (now === at) return false;
  const before = at;
  at = now;
  // The very first one has not been looked at yet.
  if (before === undefined) return false;
  kept.set(before, desk.viewport);
  drawing.preview = undefined;
  desk.hover = { type: 'paper' };
  desk.cursor = undefined;
  desk.naming = undefined;
  const { gesture } = desk;
  if (gesture.type === 'drag' || gesture.type === 'band' || gesture.type === 'bend') desk.rest();
  if (gesture.type === 'connect') desk.gesture = { ...gesture, over: undefined };
  editor.select({});
  const last = kept.get(now);
  if (last) desk.viewport = last;
  else fitView();
  return true;
}

/** The sheet that a thing stands on; of a line between two, the one in view if it is one of them. */
export function sheetOfCursor(cursor: Cursor): string {
  const { circuit } = editor;
  const of = sheetLookup(circuit);
  if (cursor.type === 'part') return of(cursor.id);
  if (cursor.type === 'port') return of(cursor.part);
  if (cursor.type === 'reference') return drawing.references.get(cursor.id)?.sheet ?? shownSheet.now;
  if (cursor.type === 'label') {
    const label = circuit.labels?.find(({ id }) => id === cursor.id);
    return label ? sheetOf(circuit, label) : shownSheet.now;
  }
  const line = circuit.connections.find(({ id }) => id === cursor.id);
  if (!line) return shownSheet.now;
  const ends = [of(line.from.part), of(line.to.part)];
  return ends.includes(shownSheet.now) ? shownSheet.now : (ends[0] ?? shownSheet.now);
}

/** Sheets other than the one in view that hold some of this; none if the one in view does too. */
export function elsewhere(lights: Lights): readonly string[] {
  const lit = litSheets(editor.circuit, lights, session.table?.data.lines ?? []);
  return lit.has(shownSheet.now) ? [] : sheetsOf(editor.circuit).flatMap(({ id }) => (lit.has(id) ? [id] : []));
}

/** Brings a sheet into view that holds some of this. */
export function turnToLit(lights: Lights): void {
  const [first] = elsewhere(lights);
  if (first !== undefined && turnTo(first)) desk.say(`Shown on ${saySheet(editor.circuit, first)}.`);
}

/** After undo and redo the sheet is in view on which something changed. */
export function followHistory(before: History, after: History): void {
  if (before === after || !(hasSheets(before.present) || hasSheets(after.present))) return;
  const [done, undone] = [before.past.at(-1), before.future[0]];
  const isUndo = done !== undefined && after.future[0] === done;
  const isRedo = undone !== undefined && after.past.at(-1) === undone;
  if (!isUndo && !isRedo) return;
  const changed = changedSheets(before.present, after.present);
  const [first] = changed;
  if (first === undefined || changed.includes(shownSheet.now)) return;
  if (turnTo(first)) desk.say(`${isUndo ? 'Undone' : 'Redone'} on ${saySheet(after.present, first)}.`);
}
