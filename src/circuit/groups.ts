import { changeCircuit, type Edit } from './edit.ts';
import { names } from './ids.ts';
import { isOneLine } from './limits.ts';
import type { Circuit, PartGroup } from './model.ts';
import { RefusedEdit } from './refused.ts';
import { sheetLookup } from './sheets.ts';

const groupsOf = (circuit: Circuit): readonly PartGroup[] => circuit.groups ?? [];
const put = (groups: readonly PartGroup[]): Edit => changeCircuit({ groups: groups.length > 0 ? groups : undefined });

/** Draws one enclosure round these parts. Parts of other groups leave those; a group that this empties goes. */
export function groupParts(circuit: Circuit, ids: Iterable<string>, name?: string): { edit: Edit; id: string } {
  const chosen = new Set(ids);
  const parts = circuit.parts.filter(({ id }) => chosen.has(id)).map(({ id }) => id);
  if (parts.length < 2) throw new RefusedEdit('group', 'A block needs two parts at least.', 'Select more of them.');
  const left = groupsOf(circuit).flatMap((group) => {
    const rest = group.parts.filter((id) => !chosen.has(id));
    return rest.length === group.parts.length ? [group] : rest.length > 0 ? [{ ...group, parts: rest }] : [];
  });
  const id = names(groupsOf(circuit).map((group) => group.id)).fresh('g');
  const shown = name ?? names(groupsOf(circuit).map((group) => group.name)).fresh('Block ');
  return { edit: put([...left, { id, name: shown, parts }]), id };
}

/** Takes away the enclosures that any of these parts stand in; the parts stay. */
export function ungroup(circuit: Circuit, ids: Iterable<string>): Edit {
  const chosen = new Set(ids);
  const left = groupsOf(circuit).filter(({ parts }) => !parts.some((id) => chosen.has(id)));
  if (left.length === groupsOf(circuit).length)
    throw new RefusedEdit('group', 'No block holds any of them.', 'Select a part of a block.');
  return put(left);
}

export function renameGroup(circuit: Circuit, id: string, name: string): Edit {
  const wanted = name.trim();
  if (wanted === '' || !isOneLine(wanted))
    throw new RefusedEdit(id, 'A block needs a name of one line.', 'Type another name.');
  if (!groupsOf(circuit).some((group) => group.id === id))
    throw new RefusedEdit(id, 'That block is gone.', 'It may have been removed before.');
  return put(groupsOf(circuit).map((group) => (group.id === id ? { ...group, name: wanted } : group)));
}

/** The edit after which no group names a part that is not there; undefined if none does. */
export function pruneGroups(circuit: Circuit): Edit | undefined {
  const known = new Set(circuit.parts.map(({ id }) => id));
  const groups = groupsOf(circuit);
  if (groups.every(({ parts }) => parts.every((id) => known.has(id)))) return undefined;
  return put(
    groups.flatMap((group) => {
      const parts = group.parts.filter((id) => known.has(id));
      return parts.length > 0 ? [{ ...group, parts }] : [];
    }),
  );
}

/** These parts, and all that stand in a block with one of them on its sheet: what moves together. */
export function withGroups(circuit: Circuit, ids: readonly string[]): readonly string[] {
  const groups = groupsOf(circuit);
  if (groups.length === 0) return ids;
  const chosen = new Set(ids);
  const out = new Set(ids);
  const known = new Set(circuit.parts.map(({ id }) => id));
  const sheet = sheetLookup(circuit);
  for (const { parts } of groups) {
    const sheets = new Set(parts.filter((id) => chosen.has(id)).map(sheet));
    for (const id of parts) if (known.has(id) && sheets.has(sheet(id))) out.add(id);
  }
  return out.size === ids.length ? ids : [...out];
}

export const groupOf = (circuit: Circuit, part: string): PartGroup | undefined =>
  groupsOf(circuit).find(({ parts }) => parts.includes(part));
