import { emptySet } from '../../base/bits.ts';
import type { Network } from '../../network/network.ts';
import type { PathConditions } from '../paths/reach.ts';
import { Settlers, solveOne } from './one-state.ts';
import type { Plane, TableData } from './table-data.ts';
import { LINE_CLASSES, TRAP_REASONS } from './words.ts';

/** The same circuit with one held lever in another position: its rows are one move away from those of the same number. */
export interface Beside {
  readonly net: Network;
  /** The move that leads here, in words. */
  readonly text: string;
}

const CUT_OFF = LINE_CLASSES.indexOf('cut off');
const LEFT_BEHIND = TRAP_REASONS.indexOf('left behind');

/**
 * Adds what moves of held levers leave behind to a table in which they are held: lines cut off here that were
 * under pressure one move before. `running`: the same table with the pumps running.
 */
export function withLeftBehind(
  data: TableData,
  running: TableData,
  conditions: PathConditions,
  besides: readonly Beside[],
): TableData {
  const planes = data.lines.map((_, line) =>
    Uint32Array.from(data.trapPlanes[line]?.[LEFT_BEHIND] ?? emptySet(data.count)),
  );
  for (const { net } of besides) {
    const settlers = new Settlers(net);
    // Where no valve follows from pressures, one search answers for 32 rows.
    const step = net.dependents.length === 0 ? 32 : 1;
    for (let row = 0; row < data.count; row += step) {
      const { block } = solveOne(net, { ...conditions, pumpsRunning: true }, row, settlers);
      const [word, rows] = [row >>> 5, step === 32 ? -1 : 1 << (row & 31)];
      planes.forEach((plane, line) => {
        const shut =
          (data.linePlanes[line]?.[CUT_OFF]?.[word] ?? 0) & (running.linePlanes[line]?.[CUT_OFF]?.[word] ?? 0);
        plane[word] = (plane[word] ?? 0) | ((block.reach.underPressure[line] ?? 0) & shut & rows);
      });
    }
  }
  return {
    ...data,
    trapPlanes: data.trapPlanes.map((reasons, line) =>
      reasons.map((plane, reason): Plane | undefined => (reason === LEFT_BEHIND ? planes[line] : plane)),
    ),
  };
}
