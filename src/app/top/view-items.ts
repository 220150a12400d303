import type { UnitSystem } from '../../base/units.ts';
import { sheetLooks } from '../sheet/sheet-looks.ts';
import { view } from '../state/view.svelte.ts';
import type { ThemeChoice } from '../state/view.svelte.ts';
import { NUMBER_GROUPS } from '../table/number-columns.ts';
import type { MenuItem } from '../ui/menu-item.ts';

const UNITS: readonly { readonly value: UnitSystem; readonly text: string; readonly short: string }[] = [
  { value: 'metric', text: 'bar, L/min, mm, kN', short: 'bar, L/min, mm' },
  { value: 'us', text: 'psi, gpm, in, lbf', short: 'psi, gpm, in' },
];
const THEMES: readonly { readonly value: ThemeChoice; readonly text: string }[] = [
  { value: 'system', text: 'As the system' },
  { value: 'light', text: 'Light' },
  { value: 'dark', text: 'Dark' },
];

export const unitItems = (): MenuItem[] =>
  UNITS.map(({ value, text }) => ({ text, checked: view.units === value, run: () => view.setUnits(value) }));

/** The units in use, for a button. */
export const shortUnits = (): string => UNITS.find((each) => each.value === view.units)?.short ?? '';

/** How sheet and table look. */
export const viewItems = (): MenuItem[] => [
  { heading: 'On the sheet' },
  {
    text: 'Pressures and speeds',
    on: view.sheetFigures,
    run: () => view.setSheetFigures(!view.sheetFigures),
  },
  { text: 'Grid', keys: '#', on: view.grid, run: () => view.setGrid(!view.grid) },
  ...sheetLooks(),
  { heading: 'Numbers in the state table' },
  { text: 'Speeds and pump pressures', on: view.tableFigures, run: () => view.setTableFigures(!view.tableFigures) },
  ...NUMBER_GROUPS.map(({ id, ask }): MenuItem => {
    const on = view.tableNumbers.includes(id);
    return { text: ask, on, run: () => view.showNumbers(id, !on) };
  }),
  { heading: 'Room' },
  { text: 'More for the sheet', hint: 'The splitters do it too: drag, or arrow keys', run: () => view.shareRoom(0.1) },
  { text: 'More for what stands below', run: () => view.shareRoom(-0.1) },
  { text: 'As at first', run: () => view.shareRoom(undefined) },
  { heading: 'Units' },
  ...unitItems(),
  { heading: 'Theme' },
  ...THEMES.map(({ value, text }) => ({ text, checked: view.theme === value, run: () => view.setTheme(value) })),
];
