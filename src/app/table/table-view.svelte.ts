import { untrack } from 'svelte';
import type { BitSet } from '../../base/bits.ts';
import { session } from '../state/session.svelte.ts';
import type { Column } from './columns.ts';
import { orderRows } from './order.ts';
import type { ColumnFilter, Order, Sort } from './order.ts';
import type { StateTable } from '../../worker/client.ts';

/** Longest stretch of work before the screen gets its turn. */
const SLICE_MS = 8;
/** Work that takes longer says how far it is, and can be stopped. */
const PATIENCE_MS = 500;

interface Arranged {
  readonly table: StateTable;
  readonly order: Order | undefined;
  readonly sort: Sort | undefined;
  readonly filters: readonly ColumnFilter[];
  readonly among: BitSet | undefined;
}

/** How the table is sorted and filtered: a look at it, no part of the circuit. */
class TableView {
  sort = $state.raw<Sort | undefined>();
  filters = $state.raw<readonly ColumnFilter[]>([]);
  #arranged = $state.raw<Arranged | undefined>();
  /** Undefined = all rows in their natural order. An order of another table's rows is none. */
  order = $derived(this.#arranged?.table === session.table ? this.#arranged?.order : undefined);
  busy = $state(false);
  /** Busy for long enough to be worth a word. */
  slow = $state(false);
  /** How far the arranging is, 0 to 1. */
  share = $state(0);

  shown = $derived(this.order ? this.order.rows.length : (session.table?.count ?? 0));

  #turn = 0;

  rowAt(place: number): number | undefined {
    if (place < 0 || place >= this.shown) return undefined;
    return this.order ? this.order.rows[place] : place;
  }

  /** Where a row is shown; -1 = filtered out. */
  placeOf(row: number): number {
    return this.order ? (this.order.places[row] ?? 0) - 1 : row;
  }

  /** Rising, falling, natural. */
  cycleSort(column: Column): void {
    if (this.sort?.column.id !== column.id) this.sort = { column, falling: false };
    else this.sort = this.sort.falling ? undefined : { column, falling: true };
  }

  filterOf(column: Column): readonly number[] | undefined {
    return this.filters.find((filter) => filter.column.id === column.id)?.keep;
  }

  /** Undefined lifts the column's filter. */
  setFilter(column: Column, keep: readonly number[] | undefined): void {
    const rest = this.filters.filter((filter) => filter.column.id !== column.id);
    this.filters = keep === undefined ? rest : [...rest, { column, keep }];
  }

  /** Only rows in which these levers stand as given; filters of other columns go. */
  holdLevers(columns: readonly Column[], positions: ReadonlyMap<number, number>): void {
    this.filters = columns.flatMap((column) => {
      const position = column.of === 'input' ? positions.get(column.index) : undefined;
      return position === undefined ? [] : [{ column, keep: [position] }];
    });
  }

  clear(): void {
    this.filters = [];
  }

  /** Columns that an edit took away can neither sort nor filter. */
  adopt(columns: readonly Column[]): void {
    const known = new Map(columns.map((column) => [`${column.id} ${column.title}`, column]));
    const same = (column: Column): Column | undefined => known.get(`${column.id} ${column.title}`);
    this.filters = this.filters.flatMap((filter) => {
      const column = same(filter.column);
      return column ? [{ ...filter, column }] : [];
    });
    const column = this.sort && same(this.sort.column);
    this.sort = this.sort && column ? { ...this.sort, column } : undefined;
  }

  /** `among`: the rows of this table that a question leaves. */
  async arrange(table: StateTable | undefined, among?: BitSet): Promise<void> {
    const turn = ++this.#turn;
    const { sort, filters } = this;
    const was = untrack(() => this.#arranged);
    untrack(() => this.#settle());
    if (!table) return;
    if (was?.table === table && was.sort === sort && was.filters === filters && was.among === among) return;
    const work = orderRows(table, filters, sort, among);
    const began = performance.now();
    let until = began + SLICE_MS;
    for (let step = work.next(); ; step = work.next()) {
      if (step.done) {
        this.#arranged = { table, order: step.value, sort, filters, among };
        this.#settle();
        return;
      }
      const now = performance.now();
      if (now < until) continue;
      this.busy = true;
      this.share = step.value;
      this.slow = now - began > PATIENCE_MS;
      await new Promise((resolve) => setTimeout(resolve));
      if (turn !== this.#turn) return;
      until = performance.now() + SLICE_MS;
    }
  }

  /**
   * The person stops it: sort and filters are as they were before, or none where this table was never arranged. False
   * if `among` is what is new, so that the question has to go.
   */
  stop(table: StateTable | undefined, among: BitSet | undefined): boolean {
    if (!this.busy) return true;
    const was = this.#arranged?.table === table ? this.#arranged : undefined;
    this.#turn++;
    this.#settle();
    this.sort = was?.sort;
    this.filters = was?.filters ?? [];
    return among === was?.among;
  }

  #settle(): void {
    this.busy = false;
    this.slow = false;
    this.share = 0;
  }
}

export const tableView = new TableView();
