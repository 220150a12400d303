import type { Circuit, CircuitSheet, Connection, PortRef } from './model.ts';

/** The sheet of a circuit that names none. */
const ONLY: CircuitSheet = { id: 's1', name: 'Sheet 1' };
const ONE: readonly CircuitSheet[] = [ONLY];

/** In their order, at least one. */
export const sheetsOf = ({ sheets }: Circuit): readonly CircuitSheet[] => (sheets && sheets.length > 0 ? sheets : ONE);

export const hasSheets = ({ sheets }: Circuit): boolean => (sheets?.length ?? 0) > 1;

export const firstSheet = (circuit: Circuit): string => (sheetsOf(circuit)[0] ?? ONLY).id;

interface Standing {
  readonly sheet?: string;
}

/** Id of the sheet that a part or a text stands on. */
export const sheetOf = (circuit: Circuit, thing: Standing): string => thing.sheet ?? firstSheet(circuit);

/** 1-based, as it is written in references. */
export const sheetNumber = (circuit: Circuit, id: string): number =>
  Math.max(
    0,
    sheetsOf(circuit).findIndex((sheet) => sheet.id === id),
  ) + 1;

/** `2, Clamp station`; the number alone where the name says no more. */
export function saySheet(circuit: Circuit, id: string): string {
  const number = sheetNumber(circuit, id);
  const name = sheetsOf(circuit)[number - 1]?.name ?? '';
  return name === '' || name === `Sheet ${number}` ? `sheet ${number}` : `sheet ${number}, ${name}`;
}

/** The field of what is put on a sheet: none on the first, so that a circuit of one sheet says nothing of sheets. */
export const onSheet = (circuit: Circuit, id: string): Standing => (id === firstSheet(circuit) ? {} : { sheet: id });

export type SheetLookup = (part: string) => string;

/** Part id → its sheet; the first for a part that is not there. */
export function sheetLookup(circuit: Circuit): SheetLookup {
  const first = firstSheet(circuit);
  if (!hasSheets(circuit)) return () => first;
  const sheets = new Map(circuit.parts.map((part) => [part.id, part.sheet ?? first]));
  return (part) => sheets.get(part) ?? first;
}

/** Whether the ends of a connection stand on two sheets. */
export const crosses = (sheet: SheetLookup, { from, to }: { readonly from: PortRef; readonly to: PortRef }): boolean =>
  sheet(from.part) !== sheet(to.part);

/** Sheets on which something differs between two forms of a circuit, in the order of the later one. */
export function changedSheets(before: Circuit, after: Circuit): readonly string[] {
  const changed = new Set<string>();
  const note = (circuit: Circuit, sheets: Iterable<string>): void => {
    const known = new Set(sheetsOf(circuit).map(({ id }) => id));
    for (const id of sheets) if (known.has(id)) changed.add(id);
  };
  const [was, is] = [sheetLookup(before), sheetLookup(after)];
  note(
    after,
    differing(before.parts, after.parts).flatMap(({ id }) => [was(id), is(id)]),
  );
  const ends = (list: readonly Connection[], of: SheetLookup): string[] =>
    list.flatMap(({ from, to }) => [of(from.part), of(to.part)]);
  note(after, ends(differing(before.connections, after.connections), is));
  note(after, ends(differing(after.connections, before.connections), was));
  note(
    after,
    differing(before.labels ?? [], after.labels ?? []).map((label) => sheetOf(after, label)),
  );
  note(
    after,
    differing(after.labels ?? [], before.labels ?? []).map((label) => sheetOf(before, label)),
  );
  note(
    after,
    differing(before.sheets ?? ONE, after.sheets ?? ONE).map(({ id }) => id),
  );
  return sheetsOf(after).flatMap(({ id }) => (changed.has(id) ? [id] : []));
}

/** What is new or another in `after`, and what is no more there. */
function differing<T extends { readonly id: string }>(before: readonly T[], after: readonly T[]): T[] {
  if (before === after) return [];
  const had = new Map(before.map((item) => [item.id, item]));
  const has = new Set(after.map(({ id }) => id));
  return [...after.filter((item) => had.get(item.id) !== item), ...before.filter(({ id }) => !has.has(id))];
}
