import type { Edge, Way } from '../../drawing/arrange.ts';
import type { Command } from './command-types.ts';

const EDGES: readonly (readonly [Edge, string, string])[] = [
  ['left', 'Align left edges', 'Ctrl+Shift+ArrowLeft'],
  ['right', 'Align right edges', 'Ctrl+Shift+ArrowRight'],
  ['top', 'Align upper edges', 'Ctrl+Shift+ArrowUp'],
  ['bottom', 'Align lower edges', 'Ctrl+Shift+ArrowDown'],
  ['centre', 'Align one above the other, by their ports', 'V'],
  ['middle', 'Align side by side, by their ports', 'H'],
];
const WAYS: readonly (readonly [Way, string, string])[] = [
  ['across', 'Space evenly across', 'Shift+H'],
  ['down', 'Space evenly down', 'Shift+V'],
];

/** Arranging, lines, blocks and ways of looking at the sheet. */
export const MORE_COMMANDS: readonly Command[] = [
  { id: 'text', title: 'Write a text on the sheet', group: 'Draw', keys: ['X'], run: (s) => s.writeText() },
  {
    id: 'insert',
    title: 'Insert a part into the selected line',
    group: 'Draw',
    keys: ['I'],
    run: (s) => s.insertPart(),
  },
  {
    id: 'add-section',
    title: 'Add another section beside the selected lever valve',
    group: 'Draw',
    keys: ['Shift+A'],
    run: (s) => s.addSection(),
  },
  {
    id: 'save-own',
    title: 'Keep the selection in the tray, ready to place',
    group: 'Draw',
    keys: ['Shift+S'],
    run: (s) => s.saveOwn(),
  },

  {
    id: 'maker',
    title: 'Valve maker: paths, ports, positions and operators of the valve',
    group: 'Change',
    keys: ['Shift+E'],
    run: (s) => s.openMaker(),
  },
  { id: 'swap', title: 'Swap the part for another kind', group: 'Change', keys: ['S'], run: (s) => s.swap() },

  ...EDGES.map(([edge, title, key]): Command => ({
    id: `align-${edge}`,
    title,
    group: 'Arrange',
    keys: [key],
    run: (s) => s.align(edge),
  })),
  ...WAYS.map(([way, title, key]): Command => ({
    id: `space-${way}`,
    title,
    group: 'Arrange',
    keys: [key],
    run: (s) => s.distribute(way),
  })),
  { id: 'group', title: 'Draw a block round the parts', group: 'Arrange', keys: ['G'], run: (s) => s.group() },
  { id: 'ungroup', title: 'Take the block away', group: 'Arrange', keys: ['Shift+G'], run: (s) => s.ungroup() },

  {
    id: 'bend',
    title: 'Move stretches of the line: Tab goes along, arrows move, Del straightens',
    group: 'Lines',
    keys: ['M'],
    run: (s) => s.bend(),
  },
  {
    id: 'tidy',
    title: 'Tidy: lay the selected lines anew, or all if none is selected',
    group: 'Lines',
    keys: ['Shift+M'],
    run: (s) => s.tidy(),
  },
  { id: 'use', title: 'Working, pilot or drain line in turn', group: 'Lines', keys: ['D'], run: (s) => s.nextUse() },
  { id: 'size', title: 'Note the size of the line', group: 'Lines', keys: ['N'], run: (s) => s.setSize() },

  {
    id: 'select-kind',
    title: 'Select all of this kind',
    group: 'Select and go',
    keys: ['K'],
    run: (s) => s.selectKind(),
  },
  {
    id: 'find',
    title: 'Find a part, line or text by its name',
    group: 'Select and go',
    keys: ['/', 'Ctrl+F'],
    run: (s) => s.find(),
  },
  {
    id: 'menu',
    title: 'Open the menu of what is selected',
    group: 'Select and go',
    keys: ['ContextMenu', 'Shift+F10'],
    run: (s) => s.openMenu(),
  },

  {
    id: 'sheet-next',
    title: 'Next sheet; a line that is being drawn goes along',
    group: 'Sheets',
    keys: ['PageDown'],
    run: (s) => s.turnSheet(1),
  },
  { id: 'sheet-before', title: 'Sheet before', group: 'Sheets', keys: ['PageUp'], run: (s) => s.turnSheet(-1) },
  {
    id: 'sheets',
    title: 'Sheets: go to one, add, name, move or delete one',
    group: 'Sheets',
    keys: ['Shift+P'],
    run: (s) => s.sheetMenu(),
  },
  {
    id: 'to-sheet',
    title: 'Move the selection to another sheet',
    group: 'Sheets',
    keys: ['Shift+PageDown'],
    run: (s) => s.moveToSheet(),
  },

  { id: 'overview', title: 'Overview of the whole sheet', group: 'View', keys: ['Z'], run: (s) => s.toggleOverview() },
  { id: 'rulers', title: 'Rulers in modules', group: 'View', keys: ['Shift+Z'], run: (s) => s.toggleRulers() },
  { id: 'grid', title: 'Grid', group: 'View', keys: ['#'], run: (s) => s.toggleGrid() },
  { id: 'hops', title: 'Hops where lines cross', group: 'View', keys: ['Shift+J'], run: (s) => s.toggleHops() },
];
