import type { TableData } from '../engine/table/table-data.ts';

/** The memory of a table's planes, each stretch once: for handing it over to another thread without a copy. */
export function planeBuffers(data: TableData): ArrayBuffer[] {
  const planes = [
    data.actuatorPlanes,
    data.actuatorNotes,
    data.actuatorRests,
    data.pumpPlanes,
    data.linePlanes,
    data.blockedPlanes,
    data.trapPlanes,
    [[data.valued]],
  ].flat(2);
  const buffers = new Set<ArrayBuffer>();
  for (const plane of planes) if (plane?.buffer instanceof ArrayBuffer) buffers.add(plane.buffer);
  return [...buffers];
}
