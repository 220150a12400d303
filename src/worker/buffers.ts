import type { TableData } from '../engine/table/table-data.ts';

/** The memory of a table's planes, each stretch once: for handing it over to another thread without a copy. */
export function planeBuffers(data: TableData): ArrayBuffer[] {
  const buffers = new Set<ArrayBuffer>();
  const collect = (value: unknown): void => {
    if (value instanceof Uint32Array) {
      if (value.buffer instanceof ArrayBuffer) buffers.add(value.buffer);
    } else if (typeof value === 'object' && value !== null) {
      for (const inner of Object.values(value)) collect(inner);
    }
  };
  collect(data);
  return [...buffers];
}
