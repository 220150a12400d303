import { rules } from '../state/rules.svelte.ts';
import { session } from '../state/session.svelte.ts';
import { whole } from '../state/whole.svelte.ts';
import { asking } from './asking.svelte.ts';
import { tableView } from './table-view.svelte.ts';

/** Rows are shown as they were; a question whose rows were being gathered is taken back. */
export function stopArranging(): void {
  if (!tableView.stop(session.table, asking.plane)) asking.clear();
}

/** Stops what keeps the person waiting: the rows being arranged, a question, a fold or a check. False if nothing does. */
export function stopWaiting(): boolean {
  if (tableView.slow) {
    stopArranging();
    return true;
  }
  const slow = [whole.rows, whole.fold, whole.influence, rules].find((each) => each.slow);
  slow?.stop();
  return slow !== undefined;
}
