import { view } from '../state/view.svelte.ts';
import type { PanelId } from '../state/view.svelte.ts';
import { session } from '../state/session.svelte.ts';
import { goToRow } from '../table/go-to-row.svelte.ts';
import { maker } from '../maker/maker.svelte.ts';
import type { MenuItem } from '../ui/menu-item.ts';

interface Entry {
  readonly id: PanelId;
  readonly text: string;
  readonly keys: string;
}

const STATE: readonly Entry[] = [
  { id: 'legend', text: 'Lines in this row', keys: 'L' },
  { id: 'why', text: 'Why', keys: 'W' },
  { id: 'moves', text: 'Moves of one lever', keys: 'M' },
  { id: 'loss', text: 'Loss of power', keys: 'Y' },
  { id: 'bleed', text: 'Bleed-down', keys: 'B' },
];
const TABLE: readonly Entry[] = [
  { id: 'findings', text: 'Findings', keys: 'F' },
  { id: 'rules', text: 'Rules', keys: 'U' },
  { id: 'influence', text: 'Influence', keys: 'V' },
  { id: 'conditions', text: 'Conditions and load cases', keys: 'O' },
];
const DRAWING: readonly Entry[] = [
  { id: 'settings', text: 'Settings of the picked part', keys: 'E' },
  { id: 'maker', text: 'Valve maker', keys: 'Shift E' },
  { id: 'print', text: 'Drawing and print', keys: 'Ctrl P' },
];

const item = ({ id, text, keys }: Entry): MenuItem => ({
  text,
  keys,
  on: view.panels[id],
  run: () => {
    if (id === 'maker' && !view.panels.maker) maker.openForSelection();
    else view.toggle(id);
  },
});

/** All panels, with a tick at those that are open, and what stands below the bench. */
export const panelItems = (): MenuItem[] => [
  { heading: 'The row on show' },
  {
    text: 'Go to row',
    keys: 'G',
    disabled: session.table === undefined,
    // The menu gives the focus back to its button first.
    run: () => setTimeout(() => (goToRow.on = true)),
  },
  ...STATE.map(item),
  { heading: 'The whole table' },
  ...TABLE.map(item),
  {
    text: 'Step plans below the bench',
    keys: 'J',
    on: view.lower === 'plans',
    run: () => view.showLower(view.lower === 'plans' ? 'table' : 'plans'),
  },
  { heading: 'The circuit' },
  ...DRAWING.map(item),
  { heading: 'Help' },
  item({ id: 'keys', text: 'Keys', keys: '?' }),
];
