import type { LineLook } from '../../drawing/strokes.ts';
import type { SceneState } from '../../drawing/scene.ts';
import type { StateTable } from '../../engine/table/state-table.ts';
import type { TrapReason } from '../../engine/table/words.ts';

/** Reasons for which pressure stands there now; heat only raises it once the oil warms up. */
const KNOWN: readonly TrapReason[] = ['load', 'left behind', 'stopped', 'stored'];

/** How a row is drawn: lines by class and marks, valves at their positions, verdicts beside the names. Ways of flow are not told. */
export function sceneStateOf(table: StateTable, row: number): SceneState {
  const lines = new Map<string, LineLook>();
  table.data.lines.forEach(({ connections }, i) => {
    const trapped = table.trapped(i, row);
    const look: LineLook = {
      class: table.line(i, row),
      flow: 'unknown',
      ...(trapped.length > 0 && { trapped: trapped.some((reason) => KNOWN.includes(reason)) ? 'known' : 'possible' }),
      ...(table.blocked(i, row) === 'under pressure' && { blocked: true }),
    };
    for (const id of connections) lines.set(id, look);
  });
  const parts = new Map<string, { position?: number; note?: string }>();
  const positions = table.positionsOf(row);
  table.data.inputs.forEach(({ part, positions: names }, i) => {
    const position = positions[i] ?? 0;
    parts.set(part, { position, note: names[position] ?? '' });
  });
  table.data.dependents.forEach(({ part, positions: names }, i) => {
    const position = table.dependent(i, row);
    parts.set(part, { position, note: names[position] ?? '' });
  });
  table.data.actuators.forEach(({ part }, i) => parts.set(part, { note: table.actuator(i, row) }));
  table.data.pumps.forEach(({ part }, i) => parts.set(part, { note: table.pump(i, row) }));
  return { lines, parts };
}
