import type { MenuItem } from '../ui/menu-item.ts';
import { sheetView } from './sheet-view.svelte.ts';

/** What of the sheet can be shown or hidden, for the menu of views. */
export const sheetLooks = (): MenuItem[] => [
  { text: 'Overview', keys: 'Z', on: sheetView.overview, run: () => sheetView.toggle('overview') },
  { text: 'Rulers in modules', keys: 'Shift Z', on: sheetView.rulers, run: () => sheetView.toggle('rulers') },
  { text: 'Hops where lines cross', keys: 'Shift J', on: sheetView.hops, run: () => sheetView.toggle('hops') },
];
