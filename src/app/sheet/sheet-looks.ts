import type { MenuItem } from '../ui/menu-item.ts';
import { sheetView } from './sheet-view.svelte.ts';

/** What of the sheet can be shown or hidden, for the menu of views. */
export const sheetLooks = (): MenuItem[] => [
  {
    text: sheetView.overview ? 'Hide the overview' : 'Show the overview',
    keys: 'Z',
    run: () => sheetView.toggle('overview'),
  },
  {
    text: sheetView.rulers ? 'Show zones along the edges' : 'Show rulers in modules',
    keys: 'Shift Z',
    run: () => sheetView.toggle('rulers'),
  },
  {
    text: sheetView.hops ? 'Let lines cross plainly' : 'Draw hops where lines cross',
    keys: 'Shift J',
    run: () => sheetView.toggle('hops'),
  },
];
