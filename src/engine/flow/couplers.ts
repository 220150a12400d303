import type { Coupler } from './problem.ts';
import type { Plan } from './sparse.ts';

/** Ties of several lines laid out for the iteration; entries of coupler c stand from start[c] to start[c + 1]. */
export interface Couplers {
  readonly count: number;
  readonly start: Int32Array;
  readonly line: Int32Array;
  readonly factor: Float64Array;
  readonly r: Float64Array;
  /** Square of the largest factor, which softness goes by. */
  readonly square: Float64Array;
  /** Of each pair of entries within a coupler: its slot in the matrix, and the product of their factors. */
  readonly pairs: readonly { readonly coupler: number; readonly slot: number; readonly product: number }[];
}

/** Pairs of lines that the elimination must keep a place for. */
export const coupledLines = (couplers: readonly Coupler[], tank: (line: number) => number): [number, number][] =>
  couplers.flatMap(({ lines }) =>
    lines.flatMap((a, i) => lines.slice(i + 1).map((b): [number, number] => [tank(a), tank(b)])),
  );

export function layCouplers(couplers: readonly Coupler[], plan: Plan, tank: (line: number) => number): Couplers {
  const start = [0];
  const line: number[] = [];
  const factor: number[] = [];
  const pairs: { coupler: number; slot: number; product: number }[] = [];
  couplers.forEach(({ lines, factors }, coupler) => {
    lines.forEach((own, i) => {
      const a = tank(own);
      const fa = factors[i] as number;
      line.push(a);
      factor.push(fa);
      lines.forEach((other, j) => {
        const b = tank(other);
        const product = fa * (factors[j] as number);
        if (a === plan.n || b === plan.n) return;
        if (a === b) pairs.push({ coupler, slot: a, product });
        else if (i < j) pairs.push({ coupler, slot: Math.min(plan.at(a, b), plan.at(b, a)), product });
      });
    });
    start.push(line.length);
  });
  return {
    count: couplers.length,
    start: Int32Array.from(start),
    line: Int32Array.from(line),
    factor: Float64Array.from(factor),
    r: Float64Array.from(couplers, (c) => c.r),
    square: Float64Array.from(couplers, (c) => Math.max(...c.factors.map((f) => f * f))),
    pairs,
  };
}

/** Σ factor · values over the lines of coupler c. */
export function pull(couplers: Couplers, c: number, values: ArrayLike<number>): number {
  const { start, line, factor } = couplers;
  let sum = 0;
  for (let e = start[c] as number; e < (start[c + 1] as number); e++)
    sum += (factor[e] as number) * (values[line[e] as number] as number);
  return sum;
}

/** Their flows into the balance `f`, their slopes into `v` above the diagonal. */
export function addCouplers(couplers: Couplers, p: Float64Array, f: Float64Array, v: Float64Array, soft: number): void {
  const { start, line, factor, r, square, pairs } = couplers;
  for (let c = 0; c < couplers.count; c++) {
    const x = pull(couplers, c, p) / ((r[c] as number) + soft * (square[c] as number));
    for (let e = start[c] as number; e < (start[c + 1] as number); e++) {
      const i = line[e] as number;
      f[i] = (f[i] as number) + (factor[e] as number) * x;
    }
  }
  for (const { coupler, slot, product } of pairs)
    v[slot] = (v[slot] as number) + product / ((r[coupler] as number) + soft * (square[coupler] as number));
}
