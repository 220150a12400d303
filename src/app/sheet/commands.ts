import { matches } from './chords.ts';
import type { Chord, KeyPress } from './chords.ts';

/** What the commands act on; the sheet's desk implements it. */
export interface SheetActions {
  cancel(): void;
  accept(): void;
  /** Go to the next or previous thing in reading order; false at the end, so that Tab leaves the sheet. */
  step(by: 1 | -1): boolean;
  /** Nudge what is selected, move what is being placed, go to the next port, or pan. */
  arrow(dx: number, dy: number): void;
  turn(by: 90 | -90): void;
  /** False if nothing is there to flip. */
  flip(): boolean;
  remove(heal: boolean): void;
  duplicate(): void;
  selectAll(): void;
  rename(): void;
  connectFrom(): void;
  openSettings(): void;
  shiftLever(by: 1 | -1): void;
  undo(): void;
  redo(): void;
  zoom(factor: number): void;
  fit(): void;
  openTray(): void;
}

export type CommandGroup = 'Draw' | 'Change' | 'Select and go' | 'Levers' | 'View';

export interface Command {
  readonly id: string;
  readonly title: string;
  readonly group: CommandGroup;
  readonly keys: readonly Chord[];
  /** Absent: the browser's own clipboard events do it. Gives false to let the key pass on. */
  readonly run?: (sheet: SheetActions) => unknown;
}

const ZOOM_STEP = 1.25;
/** Modules that Shift makes of one. */
const LONG = 4;

const arrows = (ahead: number): [Chord, number, number][] => [
  ['ArrowLeft', -ahead, 0],
  ['ArrowRight', ahead, 0],
  ['ArrowUp', 0, -ahead],
  ['ArrowDown', 0, ahead],
];
const WORDS: Record<string, string> = { ArrowLeft: 'left', ArrowRight: 'right', ArrowUp: 'up', ArrowDown: 'down' };

/** Everything that the sheet can be told by keys, once. The Keys panel lists it. */
export const SHEET_COMMANDS: readonly Command[] = [
  { id: 'tray', title: 'Add a part: open the parts tray', group: 'Draw', keys: ['A', '/'], run: (s) => s.openTray() },
  { id: 'connect', title: 'Draw a line from here', group: 'Draw', keys: ['C'], run: (s) => s.connectFrom() },
  {
    id: 'accept',
    title: 'Place the part, start or end the line, or name what is selected',
    group: 'Draw',
    keys: ['Enter'],
    run: (s) => s.accept(),
  },
  { id: 'cancel', title: 'Give up the line or placement, then select nothing', group: 'Draw', keys: ['Escape'], run: (s) => s.cancel() },

  { id: 'name', title: 'Name the part or line', group: 'Change', keys: ['F2'], run: (s) => s.rename() },
  { id: 'settings', title: 'Open the settings of the part', group: 'Change', keys: ['E'], run: (s) => s.openSettings() },
  { id: 'turn', title: 'Turn clockwise', group: 'Change', keys: ['T'], run: (s) => s.turn(90) },
  { id: 'turn-back', title: 'Turn anticlockwise', group: 'Change', keys: ['Shift+T'], run: (s) => s.turn(-90) },
  { id: 'flip', title: 'Flip left to right', group: 'Change', keys: ['F'], run: (s) => s.flip() },
  { id: 'delete', title: 'Delete', group: 'Change', keys: ['Delete', 'Backspace'], run: (s) => s.remove(false) },
  {
    id: 'delete-heal',
    title: 'Delete and join the lines on both sides',
    group: 'Change',
    keys: ['Shift+Delete', 'Shift+Backspace'],
    run: (s) => s.remove(true),
  },
  { id: 'duplicate', title: 'Duplicate', group: 'Change', keys: ['Ctrl+D'], run: (s) => s.duplicate() },
  { id: 'copy', title: 'Copy', group: 'Change', keys: ['Ctrl+C'] },
  { id: 'cut', title: 'Cut', group: 'Change', keys: ['Ctrl+X'] },
  { id: 'paste', title: 'Paste', group: 'Change', keys: ['Ctrl+V'] },
  { id: 'undo', title: 'Undo', group: 'Change', keys: ['Ctrl+Z'], run: (s) => s.undo() },
  { id: 'redo', title: 'Redo', group: 'Change', keys: ['Ctrl+Shift+Z', 'Ctrl+Y'], run: (s) => s.redo() },

  { id: 'select-all', title: 'Select everything', group: 'Select and go', keys: ['Ctrl+A'], run: (s) => s.selectAll() },
  { id: 'next', title: 'Next part, port or line', group: 'Select and go', keys: ['Tab'], run: (s) => s.step(1) },
  { id: 'previous', title: 'Previous part, port or line', group: 'Select and go', keys: ['Shift+Tab'], run: (s) => s.step(-1) },
  ...arrows(1).map(([key, dx, dy]): Command => ({
    id: `arrow-${WORDS[key] ?? key}`,
    title: `Move 1 module ${WORDS[key] ?? ''}; from a port: next port that way; with nothing selected: pan`,
    group: 'Select and go',
    keys: [key],
    run: (s) => s.arrow(dx, dy),
  })),
  ...arrows(LONG).map(([key, dx, dy]): Command => ({
    id: `arrow-far-${WORDS[key] ?? key}`,
    title: `Move ${LONG} modules ${WORDS[key] ?? ''}`,
    group: 'Select and go',
    keys: [`Shift+${key}`],
    run: (s) => s.arrow(dx, dy),
  })),

  { id: 'lever-back', title: 'Selected valve: lever to the position on the left', group: 'Levers', keys: ['Ctrl+ArrowLeft'], run: (s) => s.shiftLever(-1) },
  { id: 'lever-on', title: 'Selected valve: lever to the position on the right', group: 'Levers', keys: ['Ctrl+ArrowRight'], run: (s) => s.shiftLever(1) },

  { id: 'zoom-in', title: 'Zoom in', group: 'View', keys: ['+', '='], run: (s) => s.zoom(ZOOM_STEP) },
  { id: 'zoom-out', title: 'Zoom out', group: 'View', keys: ['-'], run: (s) => s.zoom(1 / ZOOM_STEP) },
  { id: 'fit', title: 'Show the whole circuit', group: 'View', keys: ['.', 'Home'], run: (s) => s.fit() },
];

/** What only the mouse or a finger does, for the same list. */
export const MOUSE_HINTS: readonly { readonly hand: string; readonly does: string }[] = [
  { hand: 'Drag from a port, or click two ports', does: 'Draw a line; end on a line to join it' },
  { hand: 'Drag across the paper', does: 'Select what lies inside' },
  { hand: 'Shift-click', does: 'Add to the selection, or take from it' },
  { hand: 'Double-click a part', does: 'Open its settings' },
  { hand: 'Alt-click a box of a valve, or click its position name', does: 'Move the lever' },
  { hand: 'Wheel, or pinch', does: 'Zoom at the pointer' },
  { hand: 'Middle-drag, or Space and drag', does: 'Pan' },
];

export const commandFor = (press: KeyPress): Command | undefined =>
  SHEET_COMMANDS.find((command) => command.keys.some((chord) => matches(chord, press)));
