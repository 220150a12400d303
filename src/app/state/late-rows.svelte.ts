import { SvelteMap } from 'svelte/reactivity';
import type { LateRows } from '../../worker/client.ts';

/** Rows that are kept: scrolling through a million rows must not fill the memory. */
const KEPT = 5000;

/** What the pressures have said of single rows ahead of the table on show. */
class LateStore {
  readonly #rows = new SvelteMap<number, LateRows>();
  /** Answers that were asked for before the last clearing are of another table. */
  turn = 0;

  of(row: number): LateRows | undefined {
    return this.#rows.get(row);
  }

  has(row: number): boolean {
    return this.#rows.has(row);
  }

  put(words: readonly LateRows[]): void {
    for (const late of words)
      for (let bit = 0; bit < 32; bit++)
        if (((late.rows >>> bit) & 1) === 1) this.#rows.set(32 * late.word + bit, late);
    // Those longest known go first, and are asked for again when they come into view.
    for (const row of this.#rows.keys()) {
      if (this.#rows.size <= KEPT) break;
      this.#rows.delete(row);
    }
  }

  clear(): void {
    this.turn++;
    this.#rows.clear();
  }
}

export const lateRows = new LateStore();
