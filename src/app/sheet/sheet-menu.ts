import type { Point } from '../../base/points.ts';
import { groupOf } from '../../circuit/groups.ts';
import { hasSheets } from '../../circuit/sheets.ts';
import { isStripValve } from '../../parts/valve-kinds.ts';
import { editor } from '../state/editor.svelte.ts';
import type { MenuItem } from '../ui/menu-item.ts';
import { sayChord } from './chords.ts';
import { copyText, pasteCopied } from './clipboard.ts';
import type { SheetActions } from './command-types.ts';
import { SHEET_COMMANDS } from './commands.ts';
import { desk } from './desk.svelte.ts';
import { sayThings } from './hand.ts';
import { sayLine } from './inserting.ts';
import { placeOf } from './reading-order.ts';
import { drawing } from './sheet-drawing.svelte.ts';
import { toScreen } from './viewport.ts';

/** Set by the actions, which know this file. */
let actions: SheetActions | undefined;
export const menuActsOn = (sheet: SheetActions): void => {
  actions = sheet;
};

const heading = (text: string): MenuItem => ({ heading: text });

/** The command of that name, with its key beside it. */
function item(id: string, disabled = false): MenuItem {
  const command = SHEET_COMMANDS.find((each) => each.id === id);
  const [key] = command?.keys ?? [];
  return {
    text: command?.title ?? id,
    ...(key !== undefined && { keys: sayChord(key) }),
    disabled,
    run: () => {
      if (id === 'copy' || id === 'cut') {
        const text = copyText();
        if (text === undefined) return;
        void navigator.clipboard?.writeText(text).catch(() => undefined);
        if (id === 'cut') actions?.remove(false);
      } else if (id === 'paste') pasteCopied();
      else if (actions) command?.run?.(actions);
    },
  };
}

const items = (...ids: string[]): MenuItem[] => ids.map((id) => item(id));

/** What can be done with what is selected. */
export function menuItems(): { title: string; items: MenuItem[] } {
  const { parts, connections, labels } = editor.selection;
  const { circuit } = editor;
  if (parts.length > 0) {
    const [first] = parts;
    const only = parts.length === 1 && first !== undefined;
    const kind = circuit.parts.find(({ id }) => id === first)?.kind;
    const isValve = only && kind === 'directional-valve';
    const grouped = parts.some((id) => groupOf(circuit, id));
    return {
      title: sayThings(parts, labels),
      items: [
        ...(only ? items('settings', 'name', 'swap') : []),
        ...(only && isStripValve(kind) ? items('maker') : []),
        ...(isValve ? items('add-section') : []),
        ...items('turn', 'turn-back', 'flip', 'spot'),
        ...(parts.length > 1
          ? [
              heading('Arrange'),
              ...items('align-left', 'align-right', 'align-top', 'align-bottom', 'align-centre', 'align-middle'),
              ...(parts.length > 2 ? items('space-across', 'space-down') : []),
            ]
          : []),
        ...(parts.length > 1 || grouped
          ? [heading('Block'), ...(parts.length > 1 ? items('group') : []), ...(grouped ? items('ungroup') : [])]
          : []),
        heading('Selection'),
        ...items('select-kind', 'duplicate', 'copy', 'cut', 'save-own'),
        ...(hasSheets(circuit) ? items('to-sheet') : []),
        ...(only ? [] : items('tidy')),
        heading('Delete'),
        ...items('delete', 'delete-heal'),
      ],
    };
  }
  const [connection] = connections;
  if (connection !== undefined) {
    return {
      title: connections.length > 1 ? `${connections.length} connections` : sayLine(connection),
      items: [
        ...items('name', 'size', 'use', 'insert'),
        heading('Shape'),
        ...items('bend', 'tidy'),
        heading('Selection'),
        ...items('follow', 'select-kind', 'delete'),
      ],
    };
  }
  if (labels.length > 0)
    return { title: sayThings([], labels), items: items('name', 'spot', 'select-kind', 'duplicate', 'copy', 'cut', 'delete') };
  return {
    title: 'Sheet',
    items: [
      ...items('tray', 'text', 'paste'),
      heading('Select and go'),
      ...items('select-all', 'find'),
      heading('Lines'),
      item('tidy', !circuit.connections.some(({ bends }) => bends?.length)),
      heading('Sheets'),
      ...items('sheets'),
      heading('View'),
      ...items('fit', 'overview', 'rulers', 'grid', 'hops'),
    ],
  };
}

export function openMenuAt(at: Point): void {
  const { title, items: list } = menuItems();
  desk.menu = { at, title, items: list };
}

/** By the keyboard: beside what is selected, or in the middle of the sheet. */
export function openMenuAtSelection(): void {
  const { parts, connections, labels } = editor.selection;
  const [part, connection, label] = [parts[0], connections[0], labels[0]];
  const cursor =
    part !== undefined
      ? ({ type: 'part', id: part } as const)
      : connection !== undefined
        ? ({ type: 'connection', id: connection } as const)
        : label !== undefined
          ? ({ type: 'label', id: label } as const)
          : undefined;
  const spot = cursor && placeOf(drawing.map, cursor);
  const box = desk.host?.getBoundingClientRect();
  const inside = spot ? toScreen(desk.viewport, spot) : { x: desk.size.width / 2, y: desk.size.height / 3 };
  openMenuAt({ x: (box?.left ?? 0) + inside.x, y: (box?.top ?? 0) + inside.y });
}
