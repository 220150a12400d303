import { countBits } from '../../base/bits.ts';
import { session } from '../state/session.svelte.ts';
import { whole } from '../state/whole.svelte.ts';
import { tableView } from './table-view.svelte.ts';

/** The question to the table: which rows it keeps, and going from one to the next. */
class Asking {
  on = $state(false);
  text = $state('');
  /** Show rows too in which what is asked is left open. */
  withOpen = $state(false);

  answer = $derived(whole.rows.value);
  /** Rows kept by the question alone; undefined = all. */
  plane = $derived.by(() => {
    const rows = this.answer?.rows;
    if (!rows || this.text === '') return undefined;
    return this.withOpen ? rows.matches.map((word, w) => word | (rows.undecided[w] as number)) : rows.matches;
  });

  /** Undefined while the question is being answered. */
  kept = $derived(this.plane ? countBits(this.plane) : undefined);

  ask(text: string): void {
    this.text = text;
    this.again();
  }

  /** Ask the same of the table that is there now. */
  again(): void {
    const { asked } = whole;
    if (this.text === '' || !asked) whole.rows.clear();
    else whole.askRows(asked, this.text);
  }

  clear(): void {
    this.text = '';
    whole.rows.clear();
  }

  close(): void {
    this.on = false;
    this.clear();
  }

  /** The match before or after the row on show, in the order shown; round the end. */
  step(by: 1 | -1): void {
    const { shown } = tableView;
    if (shown === 0) return;
    const at = tableView.placeOf(session.row);
    const from = at < 0 ? (by > 0 ? -1 : 0) : at;
    const row = tableView.rowAt((from + by + shown) % shown);
    if (row !== undefined) session.goToRow(row);
  }
}

export const asking = new Asking();
