import type { Point } from '../../base/points.ts';
import { clearBends, setBends } from '../../circuit/bends.ts';
import { all, applyEdit, changeConnection } from '../../circuit/edit.ts';
import { moveSegment, segmentOn, withoutBendsAt } from '../../drawing/bending.ts';
import { editor } from '../state/editor.svelte.ts';
import { attempt, tryTo } from './attempt.ts';
import type { LineActions } from './command-types.ts';
import { counted } from './counted.ts';
import { desk } from './desk.svelte.ts';
import type { Gesture } from './desk.svelte.ts';
import { sayLine } from './inserting.ts';
import { drawing } from './sheet-drawing.svelte.ts';
import { reveal } from './viewport.ts';

const USES = ['working', 'pilot', 'drain'] as const;
type Bending = Extract<Gesture, { type: 'bend' }>;

const routeOf = (connection: string): readonly Point[] => drawing.routes.get(connection) ?? [];

/** The stretches of a line that are told: what is shorter than a module counts for nothing. */
function sayStretch(route: readonly Point[], segment: number): string {
  const [a, b] = [route[segment], route[segment + 1]];
  const count = Math.max(1, route.length - 1);
  const way = a && b && a.y === b.y ? 'across: arrows up and down move it' : 'upright: arrows left and right move it';
  return `Stretch ${segment + 1} of ${count}, ${way}.`;
}

/** A stretch is in the pointer's hand, or under the keys. */
export function takeStretch(connection: string, segment: number, held: boolean): void {
  const route = routeOf(connection);
  if (route.length < 2) return;
  if (drawing.crosses(connection)) return desk.refuse('This line leads to another sheet; it lays itself.');
  desk.gesture = { type: 'bend', connection, segment: Math.min(segment, route.length - 2), route, held };
}

/** Shows the stretch moved, before it is. */
export function previewStretch(gesture: Bending, dx: number, dy: number): void {
  const { bends } = moved(gesture, dx, dy);
  const edit = tryTo(() => setBends(editor.circuit, gesture.connection, bends));
  drawing.preview = edit && applyEdit(editor.circuit, edit);
}

export function dropStretch(gesture: Bending, dx: number, dy: number, burst: string): void {
  const { bends } = moved(gesture, dx, dy);
  drawing.preview = undefined;
  desk.rest();
  if (across(gesture, dx, dy) === 0) return;
  attempt(
    () => setBends(editor.circuit, gesture.connection, bends),
    `Stretch of ${sayLine(gesture.connection)} moved.`,
    burst,
  );
}

const isFlat = ({ route, segment }: Bending): boolean => route[segment]?.y === route[segment + 1]?.y;
const across = (gesture: Bending, dx: number, dy: number): number => (isFlat(gesture) ? dy : dx);
const moved = (gesture: Bending, dx: number, dy: number): ReturnType<typeof moveSegment> =>
  moveSegment(gesture.route, gesture.segment, across(gesture, dx, dy));

/** Arrow keys on the stretch that the keys are at: it moves across itself; along itself the arrow does nothing. */
export function nudgeStretch(gesture: Bending, dx: number, dy: number): void {
  const { connection, segment } = gesture;
  if (across(gesture, dx, dy) === 0) return desk.refuse(sayStretch(gesture.route, segment));
  const flat = isFlat(gesture);
  const next = moved(gesture, dx, dy);
  const said = `Moved ${flat ? (dy < 0 ? 'up' : 'down') : dx < 0 ? 'left' : 'right'}.`;
  if (!attempt(() => setBends(editor.circuit, connection, next.bends), said, `bend ${connection}`)) return;
  const route = routeOf(connection);
  const [a, b] = [gesture.route[segment], gesture.route[segment + 1]];
  if (!a || !b) return;
  const middle = { x: (a.x + b.x) / 2 + (flat ? 0 : dx), y: (a.y + b.y) / 2 + (flat ? dy : 0) };
  desk.gesture = { ...gesture, route, segment: segmentOn(route, middle, flat) };
}

export function stepStretch(gesture: Bending, by: 1 | -1): void {
  const count = gesture.route.length - 1;
  const segment = (gesture.segment + by + count) % count;
  desk.gesture = { ...gesture, segment };
  const [a, b] = [gesture.route[segment], gesture.route[segment + 1]];
  if (a && b) {
    const box = {
      x: Math.min(a.x, b.x),
      y: Math.min(a.y, b.y),
      width: Math.abs(a.x - b.x),
      height: Math.abs(a.y - b.y),
    };
    desk.viewport = reveal(desk.viewport, desk.size, box, 3);
  }
  desk.say(sayStretch(gesture.route, segment));
}

/** Takes away the bends at the ends of a stretch. */
export function straightenStretch(gesture: Bending): void {
  const connection = editor.circuit.connections.find(({ id }) => id === gesture.connection);
  if (!connection) return desk.rest();
  const bends = withoutBendsAt(connection, gesture.route, gesture.segment);
  if (bends.length === (connection.bends ?? []).length) return desk.refuse('No bend was set at this stretch.');
  if (!attempt(() => setBends(editor.circuit, connection.id, bends), 'Bend removed.')) return;
  const route = routeOf(connection.id);
  desk.gesture = { ...gesture, route, segment: Math.min(gesture.segment, Math.max(0, route.length - 2)) };
}

export const lineActions: LineActions = {
  bend() {
    const [connection] = editor.selection.connections;
    if (connection === undefined) return desk.refuse('Select a line first.');
    const route = routeOf(connection);
    const lengths = route
      .slice(1)
      .map((b, i) => Math.abs(b.x - (route[i]?.x ?? 0)) + Math.abs(b.y - (route[i]?.y ?? 0)));
    takeStretch(connection, Math.max(0, lengths.indexOf(Math.max(...lengths))), false);
    const { gesture } = desk;
    if (gesture.type === 'bend')
      desk.say(`${sayStretch(gesture.route, gesture.segment)} Tab goes to the next, Escape ends.`);
  },

  tidy() {
    const { parts, connections } = editor.selection;
    const { circuit } = editor;
    const at = new Set(parts);
    const picked = circuit.connections.filter(
      ({ id, from, to }) => connections.includes(id) || (at.has(from.part) && at.has(to.part)),
    );
    const lines = picked.length > 0 ? picked : parts.length + connections.length === 0 ? circuit.connections : [];
    const bent = lines.filter(({ bends }) => (bends?.length ?? 0) > 0);
    if (bent.length === 0) return desk.refuse('No bend was set there: the sheet lays these lines itself.');
    attempt(
      () =>
        clearBends(
          circuit,
          bent.map(({ id }) => id),
        ),
      `${counted(bent.length, 'connection')} laid anew.`,
    );
  },

  nextUse() {
    const { connections } = editor.selection;
    const [first] = editor.circuit.connections.filter(({ id }) => connections.includes(id));
    if (!first) return desk.refuse('Select a line first.');
    const use = USES[(USES.indexOf(first.use ?? 'working') + 1) % USES.length] ?? 'working';
    const edit = all(connections.map((id) => changeConnection(id, { use: use === 'working' ? undefined : use })));
    attempt(() => edit, `${counted(connections.length, 'connection')} drawn as ${use} line.`);
  },

  setSize() {
    const [connection] = editor.selection.connections;
    if (connection === undefined) return desk.refuse('Select a line first.');
    desk.naming = { of: 'size', id: connection };
  },
};
