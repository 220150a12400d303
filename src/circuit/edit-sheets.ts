import type { Point } from '../base/points.ts';
import { removeParts } from './build.ts';
import { all, changeCircuit, changeConnection, changeLabel, changePart, type Edit } from './edit.ts';
import { names } from './ids.ts';
import { isOneLine, LIMITS } from './limits.ts';
import type { Circuit, CircuitSheet } from './model.ts';
import { partsOf, type Places } from './place.ts';
import { RefusedEdit } from './refused.ts';
import { crosses, firstSheet, onSheet, sheetLookup, sheetOf, sheetsOf } from './sheets.ts';

const NOWHERE: Places = new Map();

/** A sheet behind `after`, or at the end. */
export function addSheet(circuit: Circuit, after?: string, name?: string): { edit: Edit; id: string } {
  const sheets = sheetsOf(circuit);
  if (sheets.length >= LIMITS.sheets)
    throw new RefusedEdit('sheets', `A circuit has ${LIMITS.sheets} sheets at most.`, 'Delete one that is empty.');
  const id = names(sheets.map((sheet) => sheet.id)).fresh('s');
  const shown = names(sheets.map((sheet) => sheet.name));
  const wanted = name === undefined ? undefined : checkName('sheets', name);
  const sheet: CircuitSheet = { id, name: wanted ?? shown.like(`Sheet ${sheets.length + 1}`) };
  const at = sheets.findIndex((each) => each.id === after);
  return { edit: changeCircuit({ sheets: sheets.toSpliced(at < 0 ? sheets.length : at + 1, 0, sheet) }), id };
}

export function renameSheet(circuit: Circuit, id: string, name: string): Edit {
  const sheet = namedSheet(circuit, id);
  const wanted = checkName(id, name);
  return changeCircuit({
    sheets: sheetsOf(circuit).map((each) => (each === sheet ? { ...each, name: wanted } : each)),
  });
}

/** One place to the left or right. */
export function moveSheet(circuit: Circuit, id: string, by: 1 | -1): Edit {
  const sheets = sheetsOf(circuit);
  const sheet = namedSheet(circuit, id);
  const at = sheets.indexOf(sheet);
  const to = at + by;
  if (to < 0 || to >= sheets.length)
    throw new RefusedEdit(id, `This is the ${by < 0 ? 'first' : 'last'} sheet.`, 'Move another one.');
  const moved = sheets.toSpliced(at, 1).toSpliced(to, 0, sheet);
  return all([...spelledOut(circuit, moved), changeCircuit({ sheets: moved })]);
}

/** The sheet with all that stands on it, and the lines that end there. */
export function removeSheet(circuit: Circuit, id: string): Edit {
  const sheets = sheetsOf(circuit);
  const sheet = namedSheet(circuit, id);
  if (sheets.length < 2) throw new RefusedEdit(id, 'This is the only sheet.', 'Add another one first.');
  const left = sheets.filter((each) => each !== sheet);
  const gone = circuit.parts.filter((part) => sheetOf(circuit, part) === id);
  const labels = (circuit.labels ?? []).filter((label) => sheetOf(circuit, label) === id);
  return all([
    ...labels.map((label): Edit => ({ type: 'remove-label', id: label.id })),
    removeParts(
      circuit,
      gone.map((part) => part.id),
    ),
    ...(id === firstSheet(circuit) ? [] : spelledOut(circuit, left)),
    changeCircuit({ sheets: left }),
  ]);
}

export interface MoveOptions {
  /** Modules that they are moved by on the way. */
  readonly dx?: number;
  readonly dy?: number;
  /** Where parts are shown that have no place of their own. */
  readonly places?: Places;
}

/** Parts and texts to another sheet. Bends of lines that lead to another sheet afterwards go. */
export function moveToSheet(
  circuit: Circuit,
  things: { readonly parts: Iterable<string>; readonly labels?: Iterable<string> },
  sheet: string,
  { dx = 0, dy = 0, places = NOWHERE }: MoveOptions = {},
): Edit {
  namedSheet(circuit, sheet);
  const chosen = new Set(things.parts);
  const texts = new Set(things.labels);
  const standing = { sheet: onSheet(circuit, sheet).sheet };
  const shifted = (p: Point): Point => ({ x: p.x + dx, y: p.y + dy });
  const was = sheetLookup(circuit);
  const willBe = (part: string): string => (chosen.has(part) ? sheet : was(part));
  const edits: Edit[] = partsOf(circuit, chosen).map(({ id, at }) => {
    const place = at ?? places.get(id);
    return changePart(id, { ...standing, ...(place && { at: shifted(place) }) });
  });
  for (const label of circuit.labels ?? []) {
    if (texts.has(label.id)) edits.push(changeLabel(label.id, { ...standing, at: shifted(label.at) }));
  }
  for (const connection of circuit.connections) {
    const { id, from, to, bends } = connection;
    if (!bends?.length || !(chosen.has(from.part) || chosen.has(to.part))) continue;
    if (crosses(willBe, connection)) edits.push(changeConnection(id, { bends: undefined }));
    else if (chosen.has(from.part) && chosen.has(to.part))
      edits.push(changeConnection(id, { bends: bends.map(shifted) }));
  }
  return all(edits);
}

/** What stands on the first sheet without saying so says so, before another one becomes the first. */
function spelledOut(circuit: Circuit, after: readonly CircuitSheet[]): Edit[] {
  const first = firstSheet(circuit);
  if (after[0]?.id === first) return [];
  return [
    ...circuit.parts.flatMap(({ id, sheet }) => (sheet === undefined ? [changePart(id, { sheet: first })] : [])),
    ...(circuit.labels ?? []).flatMap(({ id, sheet }) =>
      sheet === undefined ? [changeLabel(id, { sheet: first })] : [],
    ),
  ];
}

function namedSheet(circuit: Circuit, id: string): CircuitSheet {
  const sheet = sheetsOf(circuit).find((each) => each.id === id);
  if (!sheet) throw new RefusedEdit(id, 'That sheet is gone.', 'It may have been deleted before.');
  return sheet;
}

function checkName(where: string, name: string): string {
  const wanted = name.trim();
  if (wanted === '' || !isOneLine(wanted))
    throw new RefusedEdit(where, 'A sheet needs a name of one line.', 'Type another name.');
  return wanted;
}
