import type { Reference } from '../../drawing/references.ts';
import { saySheet } from '../../circuit/sheets.ts';
import { labelOf } from '../../circuit/model.ts';
import type { Circuit, Connection, Part } from '../../circuit/model.ts';
import { kindOf } from '../../parts/catalogue.ts';
import { editor } from '../state/editor.svelte.ts';
import { session } from '../state/session.svelte.ts';
import { desk } from './desk.svelte.ts';
import { insertHint } from './inserting.ts';
import { drawing } from './sheet-drawing.svelte.ts';
import { shownSheet } from './sheet-shown.svelte.ts';
import { zoneAt } from './zones.ts';

/** What a screen reader says of a part. */
export function sayPart(part: Part): string {
  const note = drawing.states.get(part.id)?.note;
  return [labelOf(part), kindOf(part.kind)?.title ?? part.kind, part.code, note].filter(Boolean).join(', ');
}

export function sayConnection(connection: Connection, parts: ReadonlyMap<string, Part>): string {
  const look = session.connectionLook(connection.id);
  const end = ({ part, port }: Connection['from']): string => `${parts.get(part)?.label ?? part}.${port}`;
  const state = look
    ? [
        look.class,
        look.blocked === 'under pressure' ? 'blocked under pump pressure' : '',
        look.trapped.length > 0 ? `trapped: ${look.trapped.join(', ')}` : '',
      ]
    : [];
  return [`Line ${look?.name ?? connection.name ?? ''} from ${end(connection.from)} to ${end(connection.to)}`, ...state]
    .filter(Boolean)
    .join(', ');
}

/** What a screen reader says of a reference, and the status line. */
export function sayReference({ name, other, port }: Reference): string {
  const there = drawing.references.get(other);
  const where = there ? ` goes on on ${saySheet(editor.circuit, there.sheet)}, zone ${zoneAt(there.at)}` : '';
  return `Line ${name} from ${drawing.byId.get(port.part)?.label ?? port.part}.${port.port}${where}`;
}

/** One line on what can be done now. */
export function hint(circuit: Circuit, selected: number): string {
  const { gesture, hover, cursor } = desk;
  const inserts = insertHint();
  if (inserts !== undefined) return inserts;
  if (gesture.type === 'place-several')
    return `Click to put ${gesture.title.toLowerCase()} down, or type its position. Shift for several, T turns, F flips, Escape puts it away.`;
  if (gesture.type === 'text') return 'Click where the text is to begin. Escape gives it up.';
  if (gesture.type === 'bend')
    return gesture.held
      ? 'Let go to leave the stretch here.'
      : 'Tab: next stretch. Arrows move it, Del takes its bends away, Escape ends.';
  if (gesture.type === 'place')
    return `Click to put ${gesture.form.title.toLowerCase()} down, or type its position, such as 20, 38. Shift for several, T turns, F flips, Escape puts it away.`;
  if (gesture.type === 'connect')
    return gesture.from.sheet !== undefined && gesture.from.sheet !== shownSheet.now
      ? `Line from ${saySheet(circuit, gesture.from.sheet)}: end it at a port or on a line here. Escape gives it up.`
      : 'End at a port or on a line; / finds a port by its name. Escape gives the line up.';
  if (gesture.type === 'drag') return 'Let go to put it here. Escape leaves it where it was.';
  if (gesture.type !== 'none' || circuit.parts.length === 0) return '';
  if (hover.type === 'port' && !hover.port.joint)
    return `${sayPortOf(circuit, hover.port.part, hover.port.port)}: drag or click to draw a line.`;
  if (cursor?.type === 'port' && desk.focused)
    return `${sayPortOf(circuit, cursor.part, cursor.port)}: Enter starts a line, arrows go to the next port.`;
  const reference = drawing.references.get(
    hover.type === 'reference' ? hover.id : cursor?.type === 'reference' && desk.focused ? cursor.id : '',
  );
  if (reference) return `${sayReference(reference)}: click or Enter goes there.`;
  if (hover.type === 'connection') return sayConnectionById(circuit, hover.id);
  if (selected > 1)
    return 'Arrows move, H and V line up, G draws a block, Del deletes; the menu key or a right click has the rest.';
  if (selected > 0) return 'T turns, F flips, S swaps, F2 names, Del deletes, arrows move.';
  return '';
}

function sayPortOf(circuit: Circuit, part: string, port: string): string {
  return `Port ${circuit.parts.find(({ id }) => id === part)?.label ?? part}.${port}`;
}

function sayConnectionById(circuit: Circuit, id: string): string {
  const connection = circuit.connections.find((each) => each.id === id);
  return connection ? sayConnection(connection, drawing.byId) : '';
}
