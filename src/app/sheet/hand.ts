import type { Point } from '../../base/points.ts';
import { moveLabel, moveParts, placePart } from '../../circuit/build.ts';
import { all, applyEdit, changeConnection } from '../../circuit/edit.ts';
import type { Edit } from '../../circuit/edit.ts';
import { paste } from '../../circuit/build.ts';
import { withGroups } from '../../circuit/groups.ts';
import { labelOf } from '../../circuit/model.ts';
import type { Circuit } from '../../circuit/model.ts';
import { onSheet } from '../../circuit/sheets.ts';
import { slideBends } from '../../drawing/bending.ts';
import type { Insertion } from '../../drawing/through.ts';
import { turnedCircuit } from '../../drawing/turned-circuit.ts';
import { namingSettings } from '../../parts/naming.ts';
import { editor } from '../state/editor.svelte.ts';
import { withPlaces as keepPlaces } from '../state/places.ts';
import type { Selection } from '../state/editor.svelte.ts';
import { session } from '../state/session.svelte.ts';
import { entryOf } from '../tray/entries.ts';
import { recent } from '../tray/recent.svelte.ts';
import { attempt, tryTo } from './attempt.ts';
import { joinEnds, sayEnd } from './connecting.ts';
import { counted } from './counted.ts';
import { desk } from './desk.svelte.ts';
import type { End, Gesture } from './desk.svelte.ts';
import { insertHint, insertionInHand, sayLine, withInsertion } from './inserting.ts';
import { drawing } from './sheet-drawing.svelte.ts';
import { shownSheet } from './sheet-shown.svelte.ts';
import { saySpot } from './spot-text.ts';
import { snap, toSheet } from './viewport.ts';
import { zoneAt } from './zones.ts';

// What both the pointer and the keys do on the sheet.

/** Take a ready-made part into the hand. `at`: already over the sheet, as with the keyboard. */
export function takeUp(readyId: string, at?: Point): void {
  const entry = entryOf(readyId);
  if (!entry) return;
  const { kind, readyMade } = entry;
  editor.select({});
  desk.cursor = undefined;
  desk.gesture = {
    type: 'place',
    form: { kind: kind.kind, ready: readyMade.id, title: readyMade.title },
    at,
    turn: 0,
    flip: false,
  };
  desk.say([`${readyMade.title} in hand.`, insertHint()].filter(Boolean).join(' '));
}

/** Take several parts with their lines into the hand, as one. */
export function takeUpSeveral(title: string, fragment: Circuit, at?: Point): void {
  editor.select({});
  desk.cursor = undefined;
  desk.gesture = { type: 'place-several', title, fragment, at };
  desk.say(`${title} in hand.`);
}

/** The circuit in the hand, turned or mirrored before it is put down. */
export function turnInHand(gesture: Extract<Gesture, { type: 'place-several' }>, how: 90 | 270 | 'flip'): void {
  desk.gesture = { ...gesture, fragment: turnedCircuit(gesture.fragment, how) };
  desk.say(`${gesture.title} ${how === 'flip' ? 'flipped' : 'turned'}.`);
}

export function putDownSeveral(at: Point, again = false): void {
  const { gesture } = desk;
  if (gesture.type !== 'place-several') return;
  const where = snap(at);
  const put = tryTo(() => paste(editor.circuit, gesture.fragment, where.x, where.y, namingSettings, shownSheet.now));
  if (!put) return;
  if (!again) desk.rest();
  if (
    !attempt(() => put.edit, `${gesture.title} placed in zone ${zoneAt(where)}: ${counted(put.parts.length, 'part')}.`)
  )
    return;
  editor.select({ parts: put.parts, labels: put.labels });
}

/** Opens the field in which the text is typed that begins at `at`. */
export function writeAt(at: Point): void {
  desk.rest();
  desk.naming = { of: 'text', id: '', at: snap(at) };
}

export const middleOfView = (): Point =>
  snap(toSheet(desk.viewport, { x: desk.size.width / 2, y: desk.size.height / 2 }));

/** Put the part in hand down. `again`: keep another one in hand. */
export function putDown(at: Point, again = false): void {
  const { gesture } = desk;
  if (gesture.type !== 'place') return;
  const entry = entryOf(gesture.form.ready);
  if (!entry) return;
  const { kind, readyMade } = entry;
  const into = insertionInHand({ ...gesture, at: snap(at) });
  const turn = into?.turn ?? gesture.turn;
  const put = tryTo(() =>
    placePart(editor.circuit, kind.prefix, {
      kind: kind.kind,
      ...onSheet(editor.circuit, shownSheet.now),
      at: into?.at ?? snap(at),
      ...(turn !== 0 && { turn }),
      ...(gesture.flip && { flip: true }),
      ...readyMade.make(),
    }),
  );
  if (!put) return;
  if (!again) desk.rest();
  const where = into ? `put into ${sayLine(into.connection)}` : `placed in zone ${zoneAt(at)}`;
  const edit = (): Edit => (into ? withInsertion(withPlaces(editor.circuit), put, put.part.id, into) : put);
  if (!attempt(edit, `${put.part.id}, ${readyMade.title.toLowerCase()}, ${where}.`)) return;
  recent.use(readyMade.id);
  desk.cursor = { type: 'part', id: put.part.id };
  editor.select({ parts: [put.part.id] });
}

export function startLine(from: End, held: boolean): void {
  desk.gesture = { type: 'connect', from: { ...from, sheet: shownSheet.now }, to: from.at, over: undefined, held };
  if (!held) desk.say(`Line from ${sayEnd(editor.circuit, from)}. Go to another port or line.`);
}

export function finishLine(to: End): void {
  const { gesture } = desk;
  if (gesture.type !== 'connect') return;
  const { from } = gesture;
  desk.rest();
  const { circuit } = editor;
  const done = attempt(
    // With every part in its shown place, so that a line is split on the stretch that was hit.
    () => joinEnds(withPlaces(circuit), from, { ...to, sheet: shownSheet.now }),
    `${sayEnd(circuit, from)} joined to ${sayEnd(circuit, to)}.`,
  );
  if (done && to.type === 'port') desk.cursor = { type: 'port', ...to.ref };
}

const withPlaces = (circuit: Circuit): Circuit => (circuit === editor.circuit ? drawing.circuit : circuit);

/** The edit that moves what is selected, and with it, unless `alone`, what stands in a block with it. */
export function shift(circuit: Circuit, { parts, labels }: Selection, dx: number, dy: number, alone = false): Edit {
  const moving = alone ? parts : withGroups(circuit, parts);
  const edits: Edit[] = labels.flatMap((id) => {
    const label = circuit.labels?.find((each) => each.id === id);
    return label ? [moveLabel(id, { x: label.at.x + dx, y: label.at.y + dy })] : [];
  });
  if (parts.length > 0) {
    edits.unshift(moveParts(circuit, moving, dx, dy, drawing.places));
    for (const [id, bends] of slideBends(circuit, new Set(moving), dx, dy)) edits.push(changeConnection(id, { bends }));
  }
  return all(edits);
}

/** Where the first of what is selected stands; undefined with nothing selected. */
export function placeNow(): Point | undefined {
  const { parts, labels } = editor.selection;
  const [part] = parts;
  if (part !== undefined) return drawing.places.get(part);
  return editor.circuit.labels?.find(({ id }) => id === labels[0])?.at;
}

/** Show the selection moved, before it is. */
export function previewShift(dx: number, dy: number, alone = false): void {
  // Back where it began, it is still in the hand.
  if (dx === 0 && dy === 0 && !drawing.preview) return;
  const edit = tryTo(() => shift(editor.circuit, editor.selection, dx, dy, alone));
  drawing.preview = edit && applyEdit(editor.circuit, keepPlaces(editor.circuit, edit));
}

export interface ShiftOptions {
  /** A line that the moved part goes into. */
  readonly into?: Insertion | undefined;
  /** Not with what stands in a block with it. */
  readonly alone?: boolean;
}

export function commitShift(
  dx: number,
  dy: number,
  burst: string | undefined,
  { into, alone = false }: ShiftOptions = {},
): void {
  const { parts, labels } = editor.selection;
  const [first] = parts;
  const { circuit } = editor;
  if (into && first !== undefined) {
    const at = drawing.places.get(first);
    // The part as it stands now, wherever the preview shows it.
    drawing.preview = undefined;
    const from = circuit.parts.find(({ id }) => id === first)?.at ?? at ?? into.at;
    const moved = (): Edit => shift(circuit, editor.selection, into.at.x - from.x, into.at.y - from.y, true);
    attempt(
      () => withInsertion(circuit, moved(), first, into),
      `${nameOf(first)} put into ${sayLine(into.connection)}.`,
    );
  } else if (dx !== 0 || dy !== 0) {
    const done = attempt(() => shift(circuit, editor.selection, dx, dy, alone), '', burst);
    drawing.preview = undefined;
    const at = placeNow();
    if (done && at) desk.say(`${sayThings(parts, labels)} moved to ${saySpot(at)}.`);
  }
  drawing.preview = undefined;
}

/** Move the lever of a valve; says where it stands then. */
export function setLever(partId: string, position: number): void {
  const input = session.inputs.find(({ part }) => part === partId);
  if (!input) return;
  const count = input.positions.length;
  const to = ((position % count) + count) % count;
  session.setPosition(partId, to);
  desk.say(`${input.label}: ${input.positions[to] ?? ''}.`);
}

/** `V1`, or `3 parts, 1 text`. */
export function sayThings(parts: readonly string[], labels: readonly string[]): string {
  const [only] = parts;
  if (only !== undefined && parts.length + labels.length === 1) return nameOf(only);
  return [
    ...(parts.length > 0 ? [counted(parts.length, 'part')] : []),
    ...(labels.length > 0 ? [counted(labels.length, 'text')] : []),
  ].join(', ');
}

export const nameOf = (id: string): string => {
  const part = editor.circuit.parts.find((each) => each.id === id);
  return part ? labelOf(part) : id;
};
