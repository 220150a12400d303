import { matches } from './chords.ts';
import type { Chord, KeyPress } from './chords.ts';
import type { Command } from './command-types.ts';
import { MORE_COMMANDS } from './more-commands.ts';

export type { Command, CommandGroup, SheetActions } from './command-types.ts';

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
  { id: 'tray', title: 'Add a part: open the parts tray', group: 'Draw', keys: ['A'], run: (s) => s.openTray() },
  { id: 'connect', title: 'Draw a line from here', group: 'Draw', keys: ['C'], run: (s) => s.connectFrom() },
  {
    id: 'accept',
    title: 'Place the part, start or end the line, or name what is selected',
    group: 'Draw',
    keys: ['Enter'],
    run: (s) => s.accept(),
  },
  {
    id: 'cancel',
    title: 'Give up the line or placement, then select nothing',
    group: 'Draw',
    keys: ['Escape'],
    run: (s) => s.cancel(),
  },

  { id: 'name', title: 'Name the part or line', group: 'Change', keys: ['F2'], run: (s) => s.rename() },
  {
    id: 'spot',
    title: 'Type the position: what is in hand is placed there, what is selected moves there',
    group: 'Change',
    keys: ['@', 'Shift+W'],
    run: (s) => s.typeSpot(),
  },
  {
    id: 'settings',
    title: 'Open the settings of the part',
    group: 'Change',
    keys: ['E'],
    run: (s) => s.openSettings(),
  },
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
  {
    id: 'previous',
    title: 'Previous part, port or line',
    group: 'Select and go',
    keys: ['Shift+Tab'],
    run: (s) => s.step(-1),
  },
  {
    id: 'follow',
    title: 'From a port to its line, and along it to its other end',
    group: 'Select and go',
    keys: ['Shift+Enter'],
    run: (s) => s.follow(),
  },
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

  ...MORE_COMMANDS.filter(({ group }) => group !== 'View'),

  {
    id: 'lever-back',
    title: 'Selected valve: lever to the position on the left',
    group: 'Levers',
    keys: ['Ctrl+ArrowLeft'],
    run: (s) => s.shiftLever(-1),
  },
  {
    id: 'lever-on',
    title: 'Selected valve: lever to the position on the right',
    group: 'Levers',
    keys: ['Ctrl+ArrowRight'],
    run: (s) => s.shiftLever(1),
  },

  { id: 'zoom-in', title: 'Zoom in', group: 'View', keys: ['+', '='], run: (s) => s.zoom(ZOOM_STEP) },
  { id: 'zoom-out', title: 'Zoom out', group: 'View', keys: ['-'], run: (s) => s.zoom(1 / ZOOM_STEP) },
  { id: 'fit', title: 'Show the whole circuit', group: 'View', keys: ['.', 'Home'], run: (s) => s.fit() },
  ...MORE_COMMANDS.filter(({ group }) => group === 'View'),
];

/** What only the mouse or a finger does, for the same list. */
export const MOUSE_HINTS: readonly { readonly hand: string; readonly does: string }[] = [
  { hand: 'Drag from a port, or click two ports', does: 'Draw a line; end on a line to join it' },
  { hand: 'Drag across the paper', does: 'Select what lies inside' },
  { hand: 'Shift-click', does: 'Add to the selection, or take from it' },
  { hand: 'Drop a part on a line', does: 'It goes into the line' },
  { hand: 'Drag a stretch of a line', does: 'Move it; the bends stay' },
  { hand: 'Ctrl-drag a part of a block', does: 'Move it without the block' },
  { hand: 'Right-click, or press long', does: 'Menu of what is there' },
  { hand: 'Double-click a part', does: 'Open its settings' },
  { hand: 'Alt-click a box of a valve, or click its position name', does: 'Move the lever' },
  { hand: 'Wheel, or pinch', does: 'Zoom at the pointer' },
  { hand: 'Middle-drag, or Space and drag', does: 'Pan' },
];

export const commandFor = (press: KeyPress): Command | undefined =>
  SHEET_COMMANDS.find((command) => command.keys.some((chord) => matches(chord, press)));
