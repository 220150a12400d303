import { maker } from '../maker/maker.svelte.ts';
import { view } from '../state/view.svelte.ts';
import type { LookActions } from './command-types.ts';
import { desk } from './desk.svelte.ts';
import { openMenuAtSelection } from './sheet-menu.ts';
import { sheetView } from './sheet-view.svelte.ts';

export const lookActions: LookActions = {
  openMenu: () => openMenuAtSelection(),
  openMaker: () => maker.openForSelection(),
  find() {
    desk.finding = true;
  },
  toggleOverview() {
    desk.say(sheetView.toggle('overview') ? 'Overview shown.' : 'Overview hidden.');
  },
  toggleRulers() {
    desk.say(sheetView.toggle('rulers') ? 'Rulers in modules shown.' : 'Zones shown.');
  },
  toggleGrid() {
    view.setGrid(!view.grid);
    desk.say(view.grid ? 'Grid shown.' : 'Grid hidden.');
  },
  toggleHops() {
    desk.say(sheetView.toggle('hops') ? 'Lines hop where they cross.' : 'Lines cross plainly.');
  },
};
