import { changeValve, linesLost } from './edit-valve.ts';
import { all, changeCircuit, type Edit } from './edit.ts';
import { names } from './ids.ts';
import { isOneLine, LIMITS } from './limits.ts';
import type { Circuit, Connection, ReadyMadeValve, ValveData } from './model.ts';
import { partOf } from './place.ts';
import { RefusedEdit } from './refused.ts';
import { sameValve, withNamesOf } from './valve-alike.ts';

/** Changes of the ready-made valves that a file holds. */

const readyOf = (circuit: Circuit): readonly ReadyMadeValve[] => circuit.readyMadeValves ?? [];
/** The last one takes the list with it, so that a circuit without any is written as before. */
const put = (list: readonly ReadyMadeValve[]): Edit =>
  changeCircuit({ readyMadeValves: list.length > 0 ? list : undefined });

export function readyValveOf(circuit: Circuit, id: string): ReadyMadeValve {
  const found = readyOf(circuit).find((each) => each.id === id);
  if (found) return found;
  throw new RefusedEdit('readyMadeValves', `There is no ready-made valve "${id}".`, 'It may have been removed before.');
}

/** Keeps a valve in the file, ready to be placed. A title that another one has gets a number. */
export function addReadyValve(
  circuit: Circuit,
  title: string,
  valve: ValveData,
  kind?: string,
): { readonly edit: Edit; readonly id: string; readonly title: string } {
  const list = readyOf(circuit);
  if (list.length >= LIMITS.readyMadeValves)
    throw new RefusedEdit(
      'readyMadeValves',
      `A file holds at most ${LIMITS.readyMadeValves} ready-made valves.`,
      'Remove one first.',
    );
  const shown = names(list.map((each) => each.title)).like(checkedTitle(title));
  const id = names(list.map((each) => each.id)).fresh('valve');
  return { edit: put([...list, { id, title: shown, ...(kind !== undefined && { kind }), valve }]), id, title: shown };
}

export function renameReadyValve(circuit: Circuit, id: string, title: string): Edit {
  readyValveOf(circuit, id);
  const wanted = checkedTitle(title);
  if (readyOf(circuit).some((each) => each.id !== id && each.title === wanted))
    throw new RefusedEdit('readyMadeValves', `Another one is called "${wanted}".`, 'Choose another name.');
  return put(readyOf(circuit).map((each) => (each.id === id ? { ...each, title: wanted } : each)));
}

/** Placed valves stay as they are; `updateAlike` changes them too. */
export function changeReadyValve(circuit: Circuit, id: string, valve: ValveData): Edit {
  readyValveOf(circuit, id);
  return put(readyOf(circuit).map((each) => (each.id === id ? { ...each, valve } : each)));
}

export function removeReadyValve(circuit: Circuit, id: string): Edit {
  readyValveOf(circuit, id);
  return put(readyOf(circuit).filter((each) => each.id !== id));
}

/** Ids of the placed valves of a kind that are the same but for the names of positions and coils. */
export const alikeValves = (circuit: Circuit, kind: string, valve: ValveData): string[] =>
  circuit.parts.flatMap((part) => (part.kind === kind && part.valve && sameValve(part.valve, valve) ? [part.id] : []));

/** Makes placed valves as a ready-made one is now. They keep their names; lines at ports that go are removed. */
export function updateAlike(circuit: Circuit, ids: readonly string[], valve: ValveData): Edit {
  const edits = ids.map((id) => {
    const had = valveOf(circuit, id);
    return changeValve(circuit, id, had, withNamesOf(valve, had));
  });
  return all(removedOnce(edits));
}

/** Lines that `updateAlike` would remove. */
export const linesLostOf = (circuit: Circuit, ids: readonly string[], valve: ValveData): readonly Connection[] => [
  ...new Set(ids.flatMap((id) => linesLost(circuit, id, valveOf(circuit, id), valve))),
];

function valveOf(circuit: Circuit, id: string): ValveData {
  const { valve } = partOf(circuit, id);
  if (valve) return valve;
  throw new RefusedEdit(id, 'This part has no valve data.', 'Choose a valve.');
}

/** A line between two valves that both lose their port goes once. */
function removedOnce(edits: readonly Edit[]): Edit[] {
  const gone = new Set<string>();
  return edits
    .flatMap((edit) => (edit.type === 'all' ? edit.edits : [edit]))
    .filter((edit) => {
      if (edit.type !== 'remove-connection') return true;
      if (gone.has(edit.id)) return false;
      gone.add(edit.id);
      return true;
    });
}

function checkedTitle(title: string): string {
  const wanted = title.trim();
  if (wanted !== '' && isOneLine(wanted)) return wanted;
  throw new RefusedEdit('readyMadeValves', 'A ready-made valve needs a name of one line.', 'Type a name.');
}
