import type { Point } from '../base/points.ts';
import { all, changeConnection, type Edit } from './edit.ts';
import { LIMITS } from './limits.ts';
import type { Circuit } from './model.ts';
import { RefusedEdit } from './refused.ts';

/** Where the user wants a connection to turn, from its first end on; none = the sheet lays it. */
export function setBends(circuit: Circuit, id: string, bends: readonly Point[]): Edit {
  if (!circuit.connections.some((c) => c.id === id))
    throw new RefusedEdit(id, 'That line is gone.', 'Choose another line.');
  if (bends.length > LIMITS.bends)
    throw new RefusedEdit(id, `A line can have ${LIMITS.bends} bends at most.`, 'Tidy the line first.');
  return changeConnection(id, { bends: bends.length > 0 ? bends : undefined });
}

/** Takes all bends of these connections away, so that the sheet lays them anew. */
export function clearBends(circuit: Circuit, ids: Iterable<string>): Edit {
  const chosen = new Set(ids);
  const bent = circuit.connections.filter(({ id, bends }) => chosen.has(id) && (bends?.length ?? 0) > 0);
  if (bent.length === 0) throw new RefusedEdit('bends', 'No bend was set there.', 'Nothing had to be tidied.');
  return all(bent.map(({ id }) => changeConnection(id, { bends: undefined })));
}
