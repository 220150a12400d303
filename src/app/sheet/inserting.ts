import type { Point } from '../../base/points.ts';
import { insertInto } from '../../circuit/insert.ts';
import { all, applyEdit } from '../../circuit/edit.ts';
import type { Edit } from '../../circuit/edit.ts';
import type { Circuit, Part } from '../../circuit/model.ts';
import { insertionAt, throughPairs } from '../../drawing/through.ts';
import type { Insertion } from '../../drawing/through.ts';
import { placedPorts } from '../../drawing/shapes.ts';
import { entryOf } from '../tray/entries.ts';
import { editor } from '../state/editor.svelte.ts';
import { desk } from './desk.svelte.ts';
import type { Gesture } from './desk.svelte.ts';
import { routeAt } from './hit.ts';
import { drawing } from './sheet-drawing.svelte.ts';

/** Modules between the middle of a part and the line that it goes into. */
const REACH = 1.25;

/** Where a part that stands at `at` would go into a line; `mayTurn`: nobody has turned it. */
export function insertionUnder(part: Part, at: Point, mayTurn: boolean): Insertion | undefined {
  const [pair] = throughPairs(part);
  if (!pair) return undefined;
  const ports = placedPorts({ ...part, at }).filter(({ ref }) => pair.includes(ref.port));
  const middle = (on: (p: Point) => number): number => ports.reduce((sum, port) => sum + on(port.at), 0) / ports.length;
  const hit = routeAt(drawing.map, { x: middle((p) => p.x), y: middle((p) => p.y) }, REACH);
  const points = hit && drawing.routes.get(hit.id);
  const [a, b] = [points?.[hit?.segment ?? 0], points?.[(hit?.segment ?? 0) + 1]];
  return hit && a && b ? insertionAt(part, { connection: hit.id, a, b }, at, mayTurn) : undefined;
}

/** The line that the part in hand would go into. */
export function insertionInHand(gesture: Gesture): Insertion | undefined {
  if (gesture.type === 'drag') return gesture.into;
  if (gesture.type !== 'place' || !gesture.at) return undefined;
  const ready = entryOf(gesture.form.ready)?.readyMade;
  if (!ready) return undefined;
  const part: Part = {
    id: '?',
    kind: gesture.form.kind,
    ...ready.make(),
    turn: gesture.turn,
    ...(gesture.flip && { flip: true }),
  };
  return insertionUnder(part, gesture.at, gesture.turn === 0 && !gesture.flip);
}

/** Of parts that are dragged: only one that no line holds goes into a line. */
export function insertionOfDragged(ids: readonly string[], dx: number, dy: number): Insertion | undefined {
  const [id] = ids;
  const { circuit } = editor;
  if (ids.length !== 1 || circuit.connections.some(({ from, to }) => from.part === id || to.part === id))
    return undefined;
  const part = circuit.parts.find((each) => each.id === id);
  const at = part && (part.at ?? drawing.places.get(part.id));
  return part && at ? insertionUnder(part, { x: at.x + dx, y: at.y + dy }, false) : undefined;
}

/** `before`, which puts the part where it belongs, and the line cut and joined to it. */
export function withInsertion(
  circuit: Circuit,
  before: Edit,
  part: string,
  { connection, entry, exit, at }: Insertion,
): Edit {
  return all([before, insertInto(applyEdit(circuit, before), connection, part, { entry, exit }, at)]);
}

export const sayLine = (connection: string): string => {
  const found = editor.circuit.connections.find(({ id }) => id === connection);
  if (!found) return 'the line';
  if (found.name !== undefined) return `line ${found.name}`;
  const end = ({ part, port }: { readonly part: string; readonly port: string }): string =>
    `${drawing.byId.get(part)?.label ?? part}.${port}`;
  return `the line from ${end(found.from)} to ${end(found.to)}`;
};

/** Shown while the hand is over a line. */
export const insertHint = (): string | undefined => {
  const into = insertionInHand(desk.gesture);
  return into && `Goes into ${sayLine(into.connection)}, by its ports ${into.entry} and ${into.exit}.`;
};
