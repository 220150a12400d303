/**
 * Elimination without pivoting for matrices whose pattern is symmetric, planned once per circuit:
 * minimum-degree order, then flat lists of slots that the numeric part walks through.
 *
 * Values lie in one array: slots 0 … n−1 the diagonal, slot n a bin for entries of the tank, then one
 * slot per edge for the entry above the diagonal (row eliminated first) and, `lower` further on, one
 * for the entry below it.
 */
export interface Plan {
  readonly n: number;
  /** Length of the value array. */
  readonly size: number;
  /** Distance from the slot above the diagonal to the one below it. */
  readonly lower: number;
  readonly order: Int32Array;
  /** For each elimination step, where its neighbours begin in `line` and `slot`; n + 1 entries. */
  readonly start: Int32Array;
  readonly line: Int32Array;
  readonly slot: Int32Array;
  /** Targets of the updates, for each step and each pair of neighbours a ≤ b: the entry (a, b) above the diagonal. */
  readonly target: Int32Array;
  /** Multiply-adds of one symmetric factorisation. */
  readonly work: number;
  /** Slot of the entry (row, column); the bin if one of them is the tank (n). */
  readonly at: (row: number, column: number) => number;
}

export function planElimination(n: number, edges: Iterable<readonly [number, number]>): Plan {
  const near: Set<number>[] = Array.from({ length: n }, () => new Set());
  for (const [i, j] of edges) {
    if (i === j || i < 0 || j < 0 || i >= n || j >= n) continue;
    (near[i] as Set<number>).add(j);
    (near[j] as Set<number>).add(i);
  }
  const order = new Int32Array(n);
  const rank = new Int32Array(n).fill(-1);
  const rows: number[][] = [];
  for (let step = 0; step < n; step++) {
    let best = -1;
    for (let i = 0; i < n; i++) {
      if (rank[i] === -1 && (best < 0 || (near[i] as Set<number>).size < (near[best] as Set<number>).size)) best = i;
    }
    order[step] = best;
    rank[best] = step;
    const row = [...(near[best] as Set<number>)];
    rows.push(row);
    for (const a of row) {
      const set = near[a] as Set<number>;
      set.delete(best);
      for (const b of row) if (b !== a) set.add(b);
    }
  }
  return layOut(n, order, rank, rows);
}

function layOut(n: number, order: Int32Array, rank: Int32Array, rows: readonly number[][]): Plan {
  const start = new Int32Array(n + 1);
  const line: number[] = [];
  const slot: number[] = [];
  const slots = new Map<number, number>();
  rows.forEach((row, step) => {
    row.sort((a, b) => (rank[a] as number) - (rank[b] as number));
    for (const a of row) {
      slots.set((order[step] as number) * n + a, n + 1 + slot.length);
      line.push(a);
      slot.push(n + 1 + slot.length);
    }
    start[step + 1] = line.length;
  });
  const lower = slot.length;
  const at = (row: number, column: number): number => {
    if (row === column) return row;
    if (row >= n || column >= n || row < 0 || column < 0) return n;
    const above = (rank[row] as number) < (rank[column] as number);
    const found = slots.get(above ? row * n + column : column * n + row);
    if (found === undefined) throw new RangeError(`No place for entry ${row}, ${column}`);
    return above ? found : found + lower;
  };
  const target: number[] = [];
  for (const row of rows) {
    for (let i = 0; i < row.length; i++) {
      for (let j = i; j < row.length; j++) target.push(at(row[i] as number, row[j] as number));
    }
  }
  return {
    n,
    size: n + 1 + 2 * lower,
    lower,
    order,
    start,
    line: Int32Array.from(line),
    slot: Int32Array.from(slot),
    target: Int32Array.from(target),
    work: target.length + line.length,
    at,
  };
}

/**
 * Factors the symmetric matrix in `v` (above the diagonal only) in place; the diagonal becomes one over the
 * pivots. A pivot that rounding has driven to `floor` or below is raised to it.
 */
export function factorSymmetric(plan: Plan, v: Float64Array, floor: number): void {
  const { n, order, start, target } = plan;
  let next = 0;
  // Slots above the diagonal lie in the order of elimination.
  let i = n + 1;
  for (let step = 0; step < n; step++) {
    const k = order[step] as number;
    const pivot = v[k] as number;
    const inverse = 1 / (pivot > floor ? pivot : floor);
    v[k] = inverse;
    const end = n + 1 + (start[step + 1] as number);
    for (; i < end; i++) {
      const entry = v[i] as number;
      if (entry === 0) {
        next += end - i;
        continue;
      }
      const factor = entry * inverse;
      for (let j = i; j < end; j++) {
        const t = target[next++] as number;
        v[t] = (v[t] as number) - factor * (v[j] as number);
      }
    }
  }
}

/** Solves with the factors of `factorSymmetric`; `b` becomes the solution. */
export function solveSymmetric(plan: Plan, v: Float64Array, b: Float64Array): void {
  const { n, order, start, line } = plan;
  let i = 0;
  for (let step = 0; step < n; step++) {
    const k = order[step] as number;
    const value = (b[k] as number) * (v[k] as number);
    b[k] = value;
    const end = start[step + 1] as number;
    for (; i < end; i++) {
      const a = line[i] as number;
      b[a] = (b[a] as number) - (v[n + 1 + i] as number) * value;
    }
  }
  for (let step = n - 1; step >= 0; step--) {
    const k = order[step] as number;
    const begin = start[step] as number;
    let sum = 0;
    for (i = begin; i < (start[step + 1] as number); i++)
      sum += (v[n + 1 + i] as number) * (b[line[i] as number] as number);
    b[k] = (b[k] as number) - sum * (v[k] as number);
  }
}

/** The same for a matrix with entries on both sides; false if a pivot vanishes beside its row. */
export function factorGeneral(plan: Plan, v: Float64Array, floor: number): boolean {
  const { n, order, start, line, slot, target, lower } = plan;
  let next = 0;
  let sound = true;
  for (let step = 0; step < n; step++) {
    const k = order[step] as number;
    let pivot = v[k] as number;
    if (!(Math.abs(pivot) > floor)) {
      v[k] = pivot = pivot < 0 ? -floor : floor;
      sound = false;
    }
    const begin = start[step] as number;
    const end = start[step + 1] as number;
    for (let i = begin; i < end; i++) {
      const a = line[i] as number;
      const slotA = slot[i] as number;
      const down = (v[slotA + lower] as number) / pivot;
      const right = (v[slotA] as number) / pivot;
      v[a] = (v[a] as number) - down * (v[slotA] as number);
      next++;
      for (let j = i + 1; j < end; j++) {
        const t = target[next++] as number;
        const slotB = slot[j] as number;
        v[t] = (v[t] as number) - down * (v[slotB] as number);
        v[t + lower] = (v[t + lower] as number) - right * (v[slotB + lower] as number);
      }
    }
  }
  return sound;
}

export function solveGeneral(plan: Plan, v: Float64Array, b: Float64Array): void {
  const { n, order, start, line, slot, lower } = plan;
  for (let step = 0; step < n; step++) {
    const k = order[step] as number;
    const value = (b[k] as number) / (v[k] as number);
    b[k] = value;
    const end = start[step + 1] as number;
    for (let i = start[step] as number; i < end; i++) {
      const a = line[i] as number;
      b[a] = (b[a] as number) - (v[(slot[i] as number) + lower] as number) * value;
    }
  }
  for (let step = n - 1; step >= 0; step--) {
    const k = order[step] as number;
    const end = start[step + 1] as number;
    let sum = 0;
    for (let i = start[step] as number; i < end; i++)
      sum += (v[slot[i] as number] as number) * (b[line[i] as number] as number);
    b[k] = (b[k] as number) - sum / (v[k] as number);
  }
}
