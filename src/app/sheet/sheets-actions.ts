import { addSheet, moveSheet, moveToSheet, removeSheet } from '../../circuit/edit-sheets.ts';
import { withGroups } from '../../circuit/groups.ts';
import { hasSheets, saySheet, sheetOf, sheetsOf } from '../../circuit/sheets.ts';
import { union } from '../../base/points.ts';
import type { Box, Point } from '../../base/points.ts';
import { inflate, overlaps } from '../../drawing/geometry.ts';
import { partReach } from '../../drawing/shapes.ts';
import { editor } from '../state/editor.svelte.ts';
import type { MenuItem } from '../ui/menu-item.ts';
import { attempt, tryTo } from './attempt.ts';
import type { SheetsActions } from './command-types.ts';
import { counted } from './counted.ts';
import { desk } from './desk.svelte.ts';
import { sayThings } from './hand.ts';
import { drawing } from './sheet-drawing.svelte.ts';
import { shownSheet } from './sheet-shown.svelte.ts';
import { turnTo } from './sheet-turning.ts';
import { reveal } from './viewport.ts';

/** Modules between what comes to a sheet and what stands there. */
const APART = 8;

const sayNow = (): string => saySheet(editor.circuit, shownSheet.now);
const upper = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/** Opens the menu below the sheet's tabs, or where the sheet is. */
function openMenu(title: string, items: readonly MenuItem[]): void {
  const tab = document.querySelector('[data-sheet-tabs] [aria-selected="true"]') ?? desk.host;
  const box = tab?.getBoundingClientRect();
  desk.menu = { at: { x: box?.left ?? 40, y: box?.top ?? 40 }, title, items };
}

export const goToItems = (run: (sheet: string) => void, except?: string): MenuItem[] =>
  sheetsOf(editor.circuit).flatMap(({ id, name }, i): MenuItem[] =>
    id === except
      ? []
      : [
          {
            text: `${i + 1}  ${name}`,
            ...(except === undefined && { checked: id === shownSheet.now }),
            run: () => run(id),
          },
        ],
  );

/** What can be done with a sheet, for its menu. */
export function sheetItems(sheet: string): MenuItem[] {
  const sheets = sheetsOf(editor.circuit);
  const at = sheets.findIndex(({ id }) => id === sheet);
  return [
    { text: 'Add a sheet', run: () => addSheetAfter(sheet) },
    ...(editor.circuit.sheets
      ? [
          { text: 'Name the sheet', keys: 'F2', run: () => (desk.namingSheet = sheet) },
          { text: 'Move the sheet to the left', disabled: at <= 0, run: () => move(sheet, -1) },
          { text: 'Move the sheet to the right', disabled: at >= sheets.length - 1, run: () => move(sheet, 1) },
          { heading: 'Delete' } as const,
          { text: 'Delete the sheet', disabled: sheets.length < 2, run: () => remove(sheet) },
        ]
      : []),
  ];
}

export function addSheetAfter(sheet: string): void {
  const made = tryTo(() => addSheet(editor.circuit, sheet));
  if (!made || !attempt(() => made.edit, '')) return;
  turnTo(made.id);
  desk.say(`${upper(sayNow())} added.`);
  // Named at once, or left as it is with Escape.
  desk.namingSheet = made.id;
}

export function move(sheet: string, by: 1 | -1): void {
  const { name } = sheetsOf(editor.circuit).find(({ id }) => id === sheet) ?? { name: '' };
  attempt(() => moveSheet(editor.circuit, sheet, by), '');
  desk.say(`${name} is ${saySheet(editor.circuit, sheet)} now.`);
}

export function remove(sheet: string): void {
  const { circuit } = editor;
  const said = upper(saySheet(circuit, sheet));
  const count = circuit.parts.filter((part) => sheetOf(circuit, part) === sheet).length;
  const sheets = sheetsOf(circuit);
  const beside = sheets[sheets.findIndex(({ id }) => id === sheet) - 1] ?? sheets[1];
  const inView = shownSheet.now === sheet;
  const done = attempt(
    () => removeSheet(circuit, sheet),
    `${said}${count === 0 ? '' : ` with ${counted(count, 'part')}`} deleted. Ctrl Z brings it back.`,
  );
  if (done && inView && beside) turnTo(beside.id);
}

/** How far the boxes must go to the right to stand clear of what is there; nothing if they do. */
function clearBy(boxes: readonly Box[], sheet: string): Point {
  const { circuit } = drawing;
  const there = circuit.parts.filter((part) => sheetOf(circuit, part) === sheet).map(partReach);
  const free = boxes.every((box) => !there.some((other) => overlaps(other, inflate(box, 1))));
  const [own, taken] = [union(boxes), union(there)];
  if (free || !own || !taken) return { x: 0, y: 0 };
  return { x: Math.ceil(taken.x + taken.width + APART - own.x), y: 0 };
}

/** What is selected, and what stands in a block with it, goes to another sheet; the sheet comes into view. */
export function moveSelectionTo(sheet: string): void {
  const { parts, labels } = editor.selection;
  const all = withGroups(editor.circuit, parts);
  const chosen = new Set(all);
  const boxes = drawing.circuit.parts.filter(({ id }) => chosen.has(id)).map(partReach);
  const by = clearBy(boxes, sheet);
  const said = sayThings(all, labels);
  const { places } = drawing;
  if (!attempt(() => moveToSheet(editor.circuit, { parts: all, labels }, sheet, { dx: by.x, dy: by.y, places }), ''))
    return;
  turnTo(sheet);
  editor.select({ parts: all, labels });
  const box = union(boxes);
  if (box) desk.viewport = reveal(desk.viewport, desk.size, { ...box, x: box.x + by.x, y: box.y + by.y });
  desk.say(`${said} moved to ${saySheet(editor.circuit, sheet)}.`);
}

export const sheetsActions: SheetsActions = {
  turnSheet(by) {
    const { circuit } = editor;
    // With one sheet the keys are free for others.
    if (!hasSheets(circuit)) return false;
    const sheets = sheetsOf(circuit);
    const next = sheets[sheets.findIndex(({ id }) => id === shownSheet.now) + by];
    if (!next) desk.refuse(`This is the ${by < 0 ? 'first' : 'last'} sheet.`);
    else {
      turnTo(next.id);
      const { gesture } = desk;
      desk.say(`${upper(sayNow())}.${gesture.type === 'connect' ? ' The line is still in hand.' : ''}`);
    }
    return true;
  },

  sheetMenu() {
    const others = hasSheets(editor.circuit) ? goToItems((id) => turnTo(id) && desk.say(`${upper(sayNow())}.`)) : [];
    openMenu(upper(sayNow()), [
      ...others,
      ...(others.length > 0 ? [{ heading: 'Sheet' }] : []),
      ...sheetItems(shownSheet.now),
    ]);
  },

  moveToSheet() {
    const { parts, labels } = editor.selection;
    if (parts.length + labels.length === 0) return desk.refuse('Select parts or texts first.');
    if (!hasSheets(editor.circuit)) {
      desk.refuse('There is only one sheet. Shift P adds another one.');
      return;
    }
    openMenu(`${sayThings(parts, labels)} to sheet`, goToItems(moveSelectionTo, shownSheet.now));
  },

  followReference(id) {
    const reference = drawing.references.get(id);
    const other = drawing.references.get(reference?.other ?? '');
    if (!reference || !other) return;
    turnTo(other.sheet);
    desk.cursor = { type: 'reference', id: other.id };
    if (desk.gesture.type !== 'connect') editor.select({ connections: [other.connection] });
    desk.viewport = reveal(desk.viewport, desk.size, { ...other.at, width: 0, height: 0 }, 8);
    desk.say(`Line ${other.name} on ${sayNow()}, at ${other.port.part}.${other.port.port}.`);
  },
};
