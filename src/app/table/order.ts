import { fullSet, has } from '../../base/bits.ts';
import type { BitSet } from '../../base/bits.ts';
import { TRAP_REASONS } from '../../worker/client.ts';
import type { StateTable } from '../../worker/client.ts';
import { levelPlanes, planeOf } from './columns.ts';
import type { Column } from './columns.ts';

/** Which rows are shown, and in which order. All of it yields between blocks, so that the screen stays alive. */
export interface Sort {
  readonly column: Column;
  readonly falling: boolean;
}

export interface ColumnFilter {
  readonly column: Column;
  /** Option values that are kept. */
  readonly keep: readonly number[];
}

export interface Order {
  /** Shown place → row. */
  readonly rows: Uint32Array;
  /** Row → shown place + 1; 0 = not shown. */
  readonly places: Uint32Array;
}

const BLOCK = 1 << 16;
const WORDS = BLOCK / 32;

/** Yields how far it is, 0 to 1. */
type Work<T> = Generator<number, T, undefined>;

/** Work that is a stretch of some other. */
function* stretch<T>(work: Work<T>, from: number, to: number): Work<T> {
  for (;;) {
    const step = work.next();
    if (step.done) return step.value;
    yield from + step.value * (to - from);
  }
}

function* kept(table: StateTable, filters: readonly ColumnFilter[], among: BitSet | undefined): Work<BitSet> {
  const keep = among?.slice() ?? fullSet(table.count);
  for (const [f, { column, keep: wanted }] of filters.entries()) {
    const any = new Uint32Array(keep.length);
    for (const [v, value] of wanted.entries()) {
      const plane = planeOf(table, column, value);
      for (let w = 0; w < any.length; w++) any[w] = (any[w] as number) | (plane[w] as number);
      yield (f + v / wanted.length) / filters.length;
    }
    for (let w = 0; w < keep.length; w++) keep[w] = (keep[w] as number) & (any[w] as number);
  }
  return keep;
}

/** Visits the rows of a plane without an object for each of them: there may be a hundred million such steps. */
function* eachRow(plane: BitSet, visit: (row: number) => void): Work<void> {
  for (let w = 0; w < plane.length; w++) {
    let word = plane[w] as number;
    while (word !== 0) {
      const low = word & -word;
      visit(w * 32 + 31 - Math.clz32(low));
      word ^= low;
    }
    if (w % WORDS === WORDS - 1) yield w / plane.length;
  }
}

/** Adds 1 to the key of every row of the plane. */
const tally = (keys: Uint16Array, plane: BitSet): Work<void> =>
  eachRow(plane, (row) => {
    keys[row] = (keys[row] as number) + 1;
  });

/** Adds 1 to the key of every row that has some of an item's planes. */
function* tallyEach(keys: Uint16Array, items: readonly (readonly (BitSet | undefined)[])[], words: number): Work<void> {
  for (const [i, planes] of items.entries()) {
    const any = yield* stretch(eitherOf(planes, words), i / items.length, i / items.length);
    yield* stretch(tally(keys, any), i / items.length, (i + 1) / items.length);
  }
}

function* eitherOf(planes: readonly (BitSet | undefined)[], size: number): Work<BitSet> {
  const any = new Uint32Array(size);
  for (const plane of planes) {
    if (!plane) continue;
    for (let w = 0; w < size; w++) any[w] = (any[w] as number) | (plane[w] as number);
  }
  yield 1;
  return any;
}

/** What a column sorts by: the place of the word in its list, or the number of lines. */
function* keysOf(table: StateTable, column: Column): Work<Uint16Array> {
  const { data } = table;
  const keys = new Uint16Array(table.count);
  const words = (table.count + 31) >>> 5;
  const byWord = function* (planes: readonly (BitSet | undefined)[]): Work<void> {
    for (const [value, plane] of planes.entries()) {
      if (!plane) continue;
      const each = eachRow(plane, (row) => {
        keys[row] = value;
      });
      yield* stretch(each, value / planes.length, (value + 1) / planes.length);
    }
  };
  switch (column.of) {
    case 'number':
    case 'row':
      break;
    case 'input':
    case 'coil':
      for (let row = 0; row < table.count; row++) {
        const position = table.position(column.index, row);
        keys[row] = column.of === 'input' ? position : position === column.position ? 1 : 0;
        if (row % BLOCK === BLOCK - 1) yield row / table.count;
      }
      break;
    case 'dependent':
      yield* byWord(data.dependentPlanes[column.index] ?? []);
      break;
    case 'actuator':
      yield* byWord(data.actuatorPlanes[column.index] ?? []);
      break;
    case 'pump':
      yield* byWord(data.pumpPlanes[column.index] ?? []);
      break;
    case 'blocked':
      yield* tallyEach(keys, data.blockedPlanes, words);
      break;
    case 'trapped': {
      const heat = TRAP_REASONS.indexOf('heat');
      const counted = data.trapPlanes.map((planes) => planes.filter((_, reason) => reason !== heat));
      yield* tallyEach(keys, counted, words);
      break;
    }
    case 'notes':
      yield* byWord(levelPlanes(table));
      break;
  }
  return keys;
}

/**
 * Counting sort on small whole keys: stable, so rows of one key stay in row order in both directions.
 * Undefined when the natural order of all rows is asked for. `among`: rows that other than filters leave.
 */
export function* orderRows(
  table: StateTable,
  filters: readonly ColumnFilter[],
  sort: Sort | undefined,
  among?: BitSet,
): Work<Order | undefined> {
  if (filters.length === 0 && !among && (!sort || (sort.column.of === 'row' && !sort.falling))) return undefined;
  const keep = yield* stretch(kept(table, filters, among), 0, 0.2);
  const shown = new Uint32Array(table.count);
  let size = 0;
  for (let row = 0; row < table.count; row++) {
    if (has(keep, row)) shown[size++] = row;
    if (row % BLOCK === BLOCK - 1) yield 0.2 + (0.1 * row) / table.count;
  }
  let rows: Uint32Array = shown.slice(0, size);
  if (sort?.column.of === 'row') {
    if (sort.falling) rows.reverse();
  } else if (sort) {
    const keys = yield* stretch(keysOf(table, sort.column), 0.3, 0.7);
    rows = yield* stretch(byKey(rows, keys, sort.falling), 0.7, 0.9);
  }
  const places = new Uint32Array(table.count);
  for (let i = 0; i < rows.length; i++) {
    places[rows[i] as number] = i + 1;
    if (i % BLOCK === BLOCK - 1) yield 0.9 + (0.1 * i) / rows.length;
  }
  return { rows, places };
}

function* byKey(rows: Uint32Array, keys: Uint16Array, falling: boolean): Work<Uint32Array> {
  let top = 0;
  for (let i = 0; i < rows.length; i++) {
    top = Math.max(top, keys[rows[i] as number] as number);
    if (i % BLOCK === BLOCK - 1) yield i / (3 * rows.length);
  }
  const start = new Uint32Array(top + 2);
  for (let i = 0; i < rows.length; i++) {
    const key = keys[rows[i] as number] as number;
    const slot = (falling ? top - key : key) + 1;
    start[slot] = (start[slot] as number) + 1;
    if (i % BLOCK === BLOCK - 1) yield (1 + i / rows.length) / 3;
  }
  for (let k = 1; k < start.length; k++) start[k] = (start[k] as number) + (start[k - 1] as number);
  const out = new Uint32Array(rows.length);
  for (let i = 0; i < rows.length; i++) {
    const row = rows[i] as number;
    const key = keys[row] as number;
    const slot = falling ? top - key : key;
    out[start[slot] as number] = row;
    start[slot] = (start[slot] as number) + 1;
    if (i % BLOCK === BLOCK - 1) yield (2 + i / rows.length) / 3;
  }
  return out;
}
