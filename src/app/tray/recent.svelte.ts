import { recall, remember } from '../state/remembered.ts';

const KEEP = 4;
const KEY = 'recentForms';

/** Ids of the ready-made forms used last, the latest first. */
class Recent {
  ids = $state.raw<readonly string[]>(recall<string[]>(KEY, []));

  use(id: string): void {
    this.ids = [id, ...this.ids.filter((each) => each !== id)].slice(0, KEEP);
    remember(KEY, this.ids);
  }
}

export const recent = new Recent();
