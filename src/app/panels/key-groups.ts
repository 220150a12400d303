import { sayChord } from '../sheet/chords.ts';
import { MOUSE_HINTS, SHEET_COMMANDS } from '../sheet/commands.ts';

export interface KeyGroup {
  readonly title: string;
  readonly lines: readonly { readonly keys: string; readonly does: string }[];
}

const group = (title: string, ...lines: (readonly [string, string])[]): KeyGroup => ({
  title,
  lines: lines.map(([keys, does]) => ({ keys, does })),
});

const EVERYWHERE: readonly KeyGroup[] = [
  group(
    'Levers',
    ['1 … 9', 'Go to a lever; two digits soon after one another for 10 and up'],
    ['← →', 'Move it'],
    ['0', 'Let it go to rest'],
    ['R', 'Let every lever go'],
  ),
  group(
    'Rows',
    ['[ ]', 'Row before, row after'],
    ['G or Ctrl G', 'Go to a row by its number, or by where levers are to stand; from the sheet with Ctrl'],
    ['↑ ↓', 'In the table: move the row, and the levers with it'],
    ['Enter', 'In the table: why; in its head: sort'],
    ['F', 'In the table: filter this column'],
    ['P', 'Pumps running or stopped'],
  ),
  group(
    'Step plans',
    ['J', 'Step plans or state table below the bench'],
    [', ;', 'Event before, event after: levers, sheet and diagram go along'],
    ['← → ↑ ↓', 'In the coil chart: from cell to cell; Space switches'],
    ['Alt ↑ ↓', 'Move the step'],
    ['Ctrl Enter', 'Insert a step after this one'],
    ['Ctrl Shift D', 'Duplicate the step'],
    ['Del', 'On the number of a step: delete it'],
  ),
  group(
    'Everywhere',
    ['Ctrl Z', 'Undo'],
    ['Ctrl Shift Z or Ctrl Y', 'Redo'],
    ['Ctrl S', 'Save; with Shift, save as'],
    ['Ctrl O', 'Open'],
    ['Ctrl P', 'Drawing and print: title block, paper, part codes, what is printed'],
    ['F6', 'Next band or panel; with Shift, the one before'],
    ['W L F E', 'Why, lines, findings, settings'],
    ['O U B', 'Conditions, rules, bleed-down'],
    ['M', 'Moves of one lever, also on the way, and which vent a line'],
    ['Y', 'Loss of power'],
    ['Q', 'Ask the table: rows in which something holds'],
    ['V', 'Influence: which lever matters to what'],
    ['Shift E', 'Valve maker: the selected valve, or a new one'],
    ['?', 'This panel'],
    ['Esc', 'Close the panel in hand; stop sorting, filtering, folding or a question that takes long'],
  ),
];

/** Eight arrow commands would say the same thing eight times. */
const ARROWS: KeyGroup['lines'] = [
  { keys: 'Arrows', does: 'Move what is selected by 1 module; with nothing selected: pan' },
  { keys: 'Shift arrows', does: 'Move it by 4 modules' },
];
const SAID_ABOVE: readonly string[] = ['undo', 'redo'];

function sheetGroups(): KeyGroup[] {
  const titles = [...new Set(SHEET_COMMANDS.map((command) => command.group))];
  return titles.map((title) => {
    const commands = SHEET_COMMANDS.filter(
      (command) => command.group === title && !SAID_ABOVE.includes(command.id) && !command.id.startsWith('arrow-'),
    );
    const lines = commands.map((command) => ({ keys: command.keys.map(sayChord).join(' or '), does: command.title }));
    const moves = title === 'Select and go' ? ARROWS : [];
    return { title: `On the sheet: ${title.toLowerCase()}`, lines: [...lines, ...moves] };
  });
}

export const KEY_GROUPS: readonly KeyGroup[] = [
  ...EVERYWHERE,
  ...sheetGroups(),
  { title: 'On the sheet: by hand', lines: MOUSE_HINTS.map(({ hand, does }) => ({ keys: hand, does })) },
];
