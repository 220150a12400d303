import type { Circuit } from '../../circuit/model.ts';
import { hasSheets, sheetLookup } from '../../circuit/sheets.ts';

/** Lines by their index in the table, parts by id. */
export interface Lights {
  readonly lines: readonly number[];
  readonly parts: readonly string[];
}

/** Sheets on which something is lit: parts, and lines of the table with a connection there. */
export function litSheets(
  circuit: Circuit,
  lit: Lights & { readonly steps?: readonly Lights[] },
  lines: readonly { readonly connections: readonly string[] }[],
): ReadonlySet<string> {
  const found = new Set<string>();
  if (!hasSheets(circuit)) return found;
  const of = sheetLookup(circuit);
  const all = [lit, ...(lit.steps ?? [])];
  for (const { parts } of all) for (const part of parts) found.add(of(part));
  const connections = new Set(all.flatMap((each) => each.lines.flatMap((line) => lines[line]?.connections ?? [])));
  if (connections.size === 0) return found;
  for (const { id, from, to } of circuit.connections)
    if (connections.has(id)) found.add(of(from.part)).add(of(to.part));
  return found;
}
