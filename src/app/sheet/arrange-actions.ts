import { shiftEach } from '../../circuit/arrange.ts';
import { groupParts, ungroup, withGroups } from '../../circuit/groups.ts';
import { alignShifts, distributeShifts } from '../../drawing/arrange.ts';
import type { Edge } from '../../drawing/arrange.ts';
import { appendSection } from '../../drawing/add-section.ts';
import { editor } from '../state/editor.svelte.ts';
import { own } from '../tray/own.svelte.ts';
import { attempt, tryTo } from './attempt.ts';
import type { ArrangeActions } from './command-types.ts';
import { counted } from './counted.ts';
import { desk } from './desk.svelte.ts';
import { middleOfView, nameOf } from './hand.ts';
import { placeOf } from './reading-order.ts';
import { drawing } from './sheet-drawing.svelte.ts';
import { snap } from './viewport.ts';

const EDGE_WORDS: Record<Edge, string> = {
  left: 'aligned by their left edges',
  right: 'aligned by their right edges',
  top: 'aligned by their upper edges',
  bottom: 'aligned by their lower edges',
  centre: 'aligned one above the other',
  middle: 'aligned side by side',
};

function several(least: number, what: string): readonly string[] | undefined {
  const { parts } = editor.selection;
  if (parts.length >= least) return parts;
  desk.refuse(`Select ${least === 2 ? 'two' : 'three'} parts or more to ${what}.`);
  return undefined;
}

export const arrangeActions: ArrangeActions = {
  align(edge) {
    // With nothing to align the key is free for others.
    if (editor.selection.parts.length === 0) return false;
    const parts = several(2, 'align them');
    if (!parts) return true;
    const shifts = alignShifts(drawing.circuit, parts, edge);
    attempt(
      () => shiftEach(editor.circuit, shifts, drawing.places),
      `${counted(parts.length, 'part')} ${EDGE_WORDS[edge]}.`,
    );
    return true;
  },

  distribute(way) {
    const parts = several(3, 'space them evenly');
    if (!parts) return;
    const shifts = distributeShifts(drawing.circuit, parts, way);
    attempt(
      () => shiftEach(editor.circuit, shifts, drawing.places),
      `${counted(parts.length, 'part')} spaced evenly ${way}.`,
    );
  },

  selectKind() {
    const { parts, connections, labels } = editor.selection;
    const { circuit } = editor;
    // On the sheet in view: nobody sees what is selected on another one.
    const { face } = drawing;
    if (parts.length + connections.length + labels.length === 0)
      return desk.refuse('Select a part, a line or a text first.');
    const kinds = new Set(circuit.parts.filter(({ id }) => parts.includes(id)).map(({ kind }) => kind));
    const uses = new Set(
      circuit.connections.filter(({ id }) => connections.includes(id)).map(({ use }) => use ?? 'working'),
    );
    const found = {
      parts: face.parts.filter(({ kind }) => kinds.has(kind)).map(({ id }) => id),
      connections: face.connections.filter(({ use }) => uses.has(use ?? 'working')).map(({ id }) => id),
      labels: labels.length > 0 ? (face.labels ?? []).map(({ id }) => id) : [],
    };
    editor.select(found);
    const words = [
      ...(found.parts.length > 0 ? [counted(found.parts.length, 'part')] : []),
      ...(found.connections.length > 0 ? [counted(found.connections.length, 'connection')] : []),
      ...(found.labels.length > 0 ? [counted(found.labels.length, 'text')] : []),
    ];
    desk.say(`${words.join(', ')} of this kind selected.`);
  },

  insertPart() {
    const [connection] = editor.selection.connections;
    const at = connection === undefined ? undefined : placeOf(drawing.map, { type: 'connection', id: connection });
    if (!at) return desk.refuse('Select the line that the part is to go into.');
    desk.swapping = undefined;
    desk.target = snap(at);
    desk.trayOpen = true;
    desk.say('Pick a part from the tray; Enter puts it into the line.');
  },

  swap() {
    const { parts } = editor.selection;
    const [part] = parts;
    if (part === undefined || parts.length > 1) return desk.refuse('Select the one part that is to be swapped.');
    desk.swapping = part;
    desk.trayOpen = true;
    desk.say(`Pick what ${nameOf(part)} is to become.`);
  },

  group() {
    const parts = several(2, 'draw a block round them');
    const made = parts && tryTo(() => groupParts(editor.circuit, parts));
    if (!parts || !made || !attempt(() => made.edit, `Block drawn round ${counted(parts.length, 'part')}.`)) return;
    desk.naming = { of: 'group', id: made.id };
  },

  ungroup() {
    const { parts } = editor.selection;
    if (parts.length === 0) return desk.refuse('Select a part of the block.');
    attempt(() => ungroup(editor.circuit, parts), 'Block taken away; its parts stay.');
  },

  addSection() {
    const [valve] = editor.selection.parts;
    if (valve === undefined) return desk.refuse('Select the valve beside which the section is to go.');
    const made = tryTo(() => appendSection(drawing.circuit, valve));
    if (!made) return;
    if (!attempt(() => made.edit, `Section with ${counted(made.parts.length, 'part')} added beside ${nameOf(valve)}.`))
      return;
    editor.select({ parts: made.parts });
    desk.cursor = { type: 'part', id: made.valve };
  },

  saveOwn() {
    const { parts, labels } = editor.selection;
    if (parts.length + labels.length === 0) return desk.refuse('Select what is to be kept.');
    const all = withGroups(editor.circuit, parts);
    const kept = own.keep(drawing.circuit, all, labels);
    if (kept === undefined)
      desk.refuse('This browser has no room to keep it. Remove one of your own from the tray first.');
    else desk.say(`Kept in the tray as ${kept}, under Your own.`);
  },

  writeText() {
    editor.select({});
    desk.cursor = undefined;
    desk.gesture = { type: 'text', at: desk.focused ? middleOfView() : undefined };
    desk.say('Click, or press Enter, where the text is to begin.');
  },
};
