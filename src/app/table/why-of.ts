import type { Subject } from '../state/session.svelte.ts';
import type { StateTable } from '../../worker/client.ts';
import type { Column } from './columns.ts';
import { trappedGroups } from './cell-texts.ts';

/** What the reason of a cell is about; undefined for cells that need none. */
export function whyOf(table: StateTable, column: Column, row: number): Subject | undefined {
  if (column.of === 'actuator') {
    const actuator = table.data.actuators[column.index];
    return actuator && { of: 'actuator', key: actuator.part };
  }
  if (column.of === 'pump') {
    const pump = table.data.pumps[column.index];
    return pump && { of: 'pump', key: pump.part };
  }
  if (column.of === 'dependent') {
    const valve = table.data.dependents[column.index];
    return valve && { of: 'dependent', key: valve.part };
  }
  if (column.of !== 'trapped') return undefined;
  const name = trappedGroups(table, row)[0]?.names[0];
  return name === undefined ? undefined : { of: 'line', key: name };
}
