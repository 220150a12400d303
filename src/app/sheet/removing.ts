import { removeConnections, removeLabels, removeParts } from '../../circuit/build.ts';
import { all, applyEdit } from '../../circuit/edit.ts';
import type { Edit } from '../../circuit/edit.ts';
import { pruneGroups } from '../../circuit/groups.ts';
import type { Circuit } from '../../circuit/model.ts';
import type { Selection } from '../state/editor.svelte.ts';

/**
 * Remove what is selected. A junction that this leaves with two connections or fewer is no branch any more:
 * it goes too, and the line runs on.
 */
export function removal(circuit: Circuit, selection: Selection, heal: boolean): Edit {
  const touched = junctionsAt(circuit, selection);
  const parts = removeParts(circuit, selection.parts, { heal });
  const withoutParts = applyEdit(circuit, parts);
  const left = new Set(withoutParts.connections.map(({ id }) => id));
  const rest = all([
    removeConnections(selection.connections.filter((id) => left.has(id))),
    removeLabels(selection.labels),
  ]);
  const edits: Edit[] = [parts, rest];
  let now = applyEdit(withoutParts, rest);
  for (const id of touched) {
    const own = now.connections.filter(({ from, to }) => from.part === id || to.part === id);
    if (own.length > 2 || !now.parts.some((part) => part.id === id)) continue;
    const tidy = removeParts(now, [id], { heal: true });
    now = applyEdit(now, tidy);
    edits.push(tidy);
  }
  const pruned = pruneGroups(now);
  return all(pruned ? [...edits, pruned] : edits);
}

/** Junctions at the far end of something that goes. */
function junctionsAt(circuit: Circuit, { parts, connections }: Selection): Set<string> {
  const gone = new Set(parts);
  const cut = new Set(connections);
  const junctions = new Set(
    circuit.parts.flatMap(({ id, kind }) => (kind === 'junction' && !gone.has(id) ? [id] : [])),
  );
  const touched = new Set<string>();
  for (const { id, from, to } of circuit.connections) {
    if (!cut.has(id) && !gone.has(from.part) && !gone.has(to.part)) continue;
    for (const end of [from.part, to.part]) if (junctions.has(end)) touched.add(end);
  }
  return touched;
}
