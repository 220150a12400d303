import { session } from '../state/session.svelte.ts';
import { readGoTo } from './go-to.ts';

/** The box that leads to a row by its number, or by where levers are to stand. */
class GoToRow {
  on = $state(false);

  /** Goes there, and closes the box; gives what keeps it from going. */
  go(text: string): string | undefined {
    const { table, inputs } = session;
    const found = readGoTo(text, inputs, table?.count ?? 0);
    if (found.to === 'nowhere') return found.why;
    if (found.to === 'row') session.goToRow(found.row);
    else {
      inputs.forEach(({ part }, i) => {
        const position = found.positions.get(i);
        if (position !== undefined) session.setPosition(part, position);
      });
    }
    this.on = false;
    return undefined;
  }
}

export const goToRow = new GoToRow();
