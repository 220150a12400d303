import type { BlockedKind, LineClass, StateTable, TrapReason } from '../../worker/client.ts';

/** How a drawn connection is to look in the current row. */
export interface ConnectionLook {
  /** Index and name of its line in the table. */
  readonly line: number;
  readonly name: string;
  readonly class: LineClass;
  /** Why pressure can stand in it; empty = it is not trapped. */
  readonly trapped: readonly TrapReason[];
  readonly blocked: BlockedKind | undefined;
}

/** Connection id → look. */
export function connectionLooks(table: StateTable | undefined, row: number): ReadonlyMap<string, ConnectionLook> {
  const looks = new Map<string, ConnectionLook>();
  table?.data.lines.forEach((line, index) => {
    const look: ConnectionLook = {
      line: index,
      name: line.name,
      class: table.line(index, row),
      trapped: table.trapped(index, row),
      blocked: table.blocked(index, row),
    };
    for (const id of line.connections) looks.set(id, look);
  });
  return looks;
}
