import { duplicate, flipParts, turnParts } from '../../circuit/build.ts';
import { saySheet } from '../../circuit/sheets.ts';
import { isReference } from '../../drawing/reference-symbol.ts';
import { namingSettings } from '../../parts/naming.ts';
import { editor } from '../state/editor.svelte.ts';
import { session } from '../state/session.svelte.ts';
import { view } from '../state/view.svelte.ts';
import { attempt, tryTo } from './attempt.ts';
import { OFFSET } from './clipboard.ts';
import type { SheetActions } from './commands.ts';
import { endOnLine, portEnd } from './connecting.ts';
import { counted } from './counted.ts';
import { desk } from './desk.svelte.ts';
import type { End } from './desk.svelte.ts';
import {
  commitShift,
  finishLine,
  middleOfView,
  nameOf,
  putDown,
  putDownSeveral,
  sayThings,
  setLever,
  startLine,
  turnInHand,
  writeAt,
} from './hand.ts';
import { arrangeActions } from './arrange-actions.ts';
import { followed } from './following.ts';
import { insertHint } from './inserting.ts';
import { lineActions, nudgeStretch, stepStretch, straightenStretch } from './line-actions.ts';
import { lookActions } from './look-actions.ts';
import { menuActsOn } from './sheet-menu.ts';
import { placeOf, portTowards, readingOrder, stepFrom } from './reading-order.ts';
import type { Cursor } from './reading-order.ts';
import { removal } from './removing.ts';
import { drawing } from './sheet-drawing.svelte.ts';
import { shownSheet } from './sheet-shown.svelte.ts';
import { fitView, sheetOfCursor, turnTo } from './sheet-turning.ts';
import { sheetsActions } from './sheets-actions.ts';
import { saySpot } from './spot-text.ts';
import { typeSpot } from './spots.ts';
import { panBy, reveal, zoomAt } from './viewport.ts';

/** Stand on a thing: it comes into sight, and is selected unless a line is being drawn. */
export function goTo(cursor: Cursor): void {
  // Wherever it stands: its sheet comes into view.
  const turned = turnTo(sheetOfCursor(cursor));
  desk.cursor = cursor;
  const at = placeOf(drawing.map, cursor);
  if (at) desk.viewport = reveal(desk.viewport, desk.size, { ...at, width: 0, height: 0 }, 5);
  const { gesture } = desk;
  if (gesture.type === 'connect') {
    const over = endOf(cursor);
    desk.gesture = { ...gesture, over, to: over?.at ?? gesture.to };
    return;
  }
  selectAt(cursor);
  if (turned) desk.say(`${saySheet(editor.circuit, shownSheet.now)}.`);
}

function selectAt(cursor: Cursor): void {
  if (cursor.type === 'part') editor.select({ parts: [cursor.id] });
  else if (cursor.type === 'connection') editor.select({ connections: [cursor.id] });
  else if (cursor.type === 'reference') {
    const line = drawing.references.get(cursor.id)?.connection;
    editor.select(line === undefined ? {} : { connections: [line] });
  }
  else editor.select(cursor.type === 'label' ? { labels: [cursor.id] } : {});
}

function endOf(cursor: Cursor): End | undefined {
  const { map } = drawing;
  if (cursor.type === 'port') {
    const port = map.ports.find((each) => each.part === cursor.part && each.port === cursor.port);
    return port && portEnd(port);
  }
  const at = placeOf(map, cursor);
  return cursor.type === 'connection' && at ? endOnLine(map, cursor.id, at) : undefined;
}

/** Where the keyboard last went along a line from. */
let cameFrom: Cursor | undefined;

const selectedParts = (): readonly string[] => editor.selection.parts;

function refuseEmpty(): boolean {
  if (selectedParts().length > 0) return false;
  desk.refuse('No part is selected.');
  return true;
}

export const sheetActions: SheetActions = {
  ...arrangeActions,
  ...lineActions,
  ...lookActions,
  ...sheetsActions,

  cancel() {
    const { gesture } = desk;
    drawing.preview = undefined;
    if (gesture.type !== 'none') {
      desk.rest();
      if (gesture.type === 'connect') desk.say('The line was given up.');
      if (gesture.type === 'place') desk.say(`${gesture.form.title} put away.`);
      if (gesture.type === 'place-several') desk.say(`${gesture.title} put away.`);
      if (gesture.type === 'bend') desk.say('Stretches left as they are.');
      return;
    }
    desk.cursor = undefined;
    editor.select({});
  },

  accept() {
    const { gesture, cursor } = desk;
    if (gesture.type === 'place') return putDown(gesture.at ?? middleOfView());
    if (gesture.type === 'place-several') return putDownSeveral(gesture.at ?? middleOfView());
    if (gesture.type === 'text') return writeAt(gesture.at ?? middleOfView());
    if (gesture.type === 'bend') return desk.rest();
    if (cursor?.type === 'reference') return sheetsActions.followReference(cursor.id);
    const end = cursor && endOf(cursor);
    if (gesture.type === 'connect') {
      if (end) return finishLine(end);
      return desk.refuse('Go to a port or a line first, with Tab or the arrow keys.');
    }
    if (cursor?.type === 'port' && end) return startLine(end, false);
    sheetActions.rename();
  },

  step(by) {
    const { gesture } = desk;
    if (gesture.type === 'place' || gesture.type === 'place-several' || gesture.type === 'text') return false;
    if (gesture.type === 'bend') {
      stepStretch(gesture, by);
      return true;
    }
    const order = readingOrder(drawing.map, gesture.type === 'connect');
    const next = stepFrom(order, desk.cursor, by);
    if (!next) return false;
    goTo(next);
    return true;
  },

  follow() {
    const from = desk.cursor;
    if (from?.type === 'reference') return sheetsActions.followReference(from.id);
    const next = followed(editor.circuit.connections, from, cameFrom);
    if (!next) return desk.refuse('Go to a port with a line, or to a line, first.');
    cameFrom = from;
    goTo(next);
  },

  arrow(dx, dy) {
    const { gesture, cursor } = desk;
    if (gesture.type === 'bend') return nudgeStretch(gesture, dx, dy);
    if (gesture.type === 'place' || gesture.type === 'place-several' || gesture.type === 'text') {
      const at = gesture.at ?? middleOfView();
      const moved = { x: at.x + dx, y: at.y + dy };
      const before = insertHint();
      desk.gesture = { ...gesture, at: moved };
      const now = insertHint();
      desk.say(now !== undefined && now !== before ? `${saySpot(moved)}. ${now}` : `${saySpot(moved)}.`);
      desk.viewport = reveal(desk.viewport, desk.size, { ...moved, width: 0, height: 0 }, 6);
      return;
    }
    if (gesture.type === 'connect' || cursor?.type === 'port') {
      const from = (cursor && placeOf(drawing.map, cursor)) ?? (gesture.type === 'connect' ? gesture.to : undefined);
      const next = from && portTowards(drawing.map, from, dx, dy);
      if (next) goTo(next);
      return;
    }
    const { parts, labels } = editor.selection;
    if (parts.length + labels.length > 0) commitShift(dx, dy, `nudge ${[...parts, ...labels].join(' ')}`);
    else desk.viewport = panBy(desk.viewport, -dx * 4 * desk.viewport.scale, -dy * 4 * desk.viewport.scale);
  },

  turn(by) {
    const { gesture } = desk;
    const quarter = by === 90 ? 90 : 270;
    if (gesture.type === 'place') {
      const turn = ((gesture.turn + quarter) % 360) as typeof gesture.turn;
      desk.gesture = { ...gesture, turn };
      return;
    }
    if (gesture.type === 'place-several') return turnInHand(gesture, quarter);
    if (refuseEmpty()) return;
    attempt(
      () => turnParts(editor.circuit, selectedParts(), quarter, drawing.places),
      `${sayThings(selectedParts(), [])} turned.`,
    );
  },

  flip() {
    const { gesture } = desk;
    if (gesture.type === 'place') {
      desk.gesture = { ...gesture, flip: !gesture.flip };
      return true;
    }
    if (gesture.type === 'place-several') {
      turnInHand(gesture, 'flip');
      return true;
    }
    // With nothing to flip the key is free for others.
    if (selectedParts().length === 0) return false;
    return attempt(
      () => flipParts(editor.circuit, selectedParts(), drawing.places),
      `${sayThings(selectedParts(), [])} flipped.`,
    );
  },

  remove(heal) {
    const { gesture } = desk;
    if (gesture.type === 'bend') return straightenStretch(gesture);
    const { selection } = editor;
    const { parts, connections, labels } = selection;
    if (parts.length + connections.length + labels.length === 0) return desk.refuse('Nothing is selected.');
    const words = [
      ...(parts.length === 1 ? [nameOf(parts[0] ?? '')] : parts.length > 0 ? [counted(parts.length, 'part')] : []),
      ...(connections.length > 0 ? [counted(connections.length, 'connection')] : []),
      ...(labels.length > 0 ? [counted(labels.length, 'text')] : []),
    ];
    desk.cursor = undefined;
    attempt(() => removal(editor.circuit, selection, heal), `${words.join(', ')} deleted. Ctrl Z brings it back.`);
  },

  duplicate() {
    const { parts, labels } = editor.selection;
    if (parts.length + labels.length === 0) return desk.refuse('Nothing is selected.');
    const copy = tryTo(() => 
      duplicate(drawing.circuit, parts, OFFSET.x, OFFSET.y, namingSettings, labels, shownSheet.now),
    );
    if (copy && attempt(() => copy.edit, `${sayThings(parts, labels)} duplicated.`)) {
      editor.select({ parts: copy.parts, labels: copy.labels });
    }
  },

  selectAll() {
    const { connections, labels = [] } = drawing.face;
    const parts = drawing.face.parts.filter((part) => !isReference(part));
    const ids = (list: readonly { readonly id: string }[]): string[] => list.map(({ id }) => id);
    editor.select({ parts: ids(parts), connections: ids(connections), labels: ids(labels) });
    desk.say(`${counted(parts.length, 'part')} and ${counted(connections.length, 'connection')} selected.`);
  },

  rename() {
    const { parts, connections, labels } = editor.selection;
    const [part] = parts;
    const [connection] = connections;
    const [label] = labels;
    if (part !== undefined) desk.naming = { of: 'part', id: part };
    else if (connection !== undefined) desk.naming = { of: 'connection', id: connection };
    else if (label !== undefined) desk.naming = { of: 'label', id: label };
    else desk.refuse('Select a part, a line or a text to name it.');
  },

  typeSpot: () => typeSpot(),

  connectFrom() {
    const { cursor } = desk;
    const part = cursor?.type === 'part' ? cursor.id : selectedParts()[0];
    const port = part === undefined ? undefined : drawing.map.ports.find((each) => each.part === part);
    const end = (cursor && endOf(cursor)) ?? (port && portEnd(port));
    if (!end) return desk.refuse('Go to a part, a port or a line first, with Tab.');
    if (end.type === 'port') desk.cursor = { type: 'port', ...end.ref };
    startLine(end, false);
  },

  openSettings() {
    if (view.panels.settings) view.close('settings');
    else if (!refuseEmpty()) view.enter('settings');
  },

  shiftLever(by) {
    const part = selectedParts().find((id) => session.inputs.some((input) => input.part === id));
    if (part === undefined) return desk.refuse('Select a valve that somebody moves.');
    const count = session.inputs.find((input) => input.part === part)?.positions.length ?? 1;
    const to = session.positionOf(part) + by;
    if (to >= 0 && to < count) setLever(part, to);
  },

  undo() {
    if (!editor.canUndo) return desk.refuse('There is nothing to undo.');
    editor.undo();
    desk.say('Undone.');
  },

  redo() {
    if (!editor.canRedo) return desk.refuse('There is nothing to redo.');
    editor.redo();
    desk.say('Redone.');
  },

  zoom(factor) {
    desk.viewport = zoomAt(desk.viewport, { x: desk.size.width / 2, y: desk.size.height / 2 }, factor);
  },

  fit() {
    fitView();
  },

  openTray() {
    desk.swapping = undefined;
    desk.target = undefined;
    desk.trayOpen = true;
  },
};

menuActsOn(sheetActions);
