import { emptySet, members } from '../../base/bits.ts';
import { ACTUATOR_VERDICTS, LINE_CLASSES, PUMP_VERDICTS } from '../../worker/client.ts';
import type { FoldAnswer, StateTable } from '../../worker/client.ts';

/** A line of the folded table: a fold, or one of the combinations of an opened one. */
export type FoldEntry =
  | { readonly fold: number; readonly of: 'fold' }
  | { readonly fold: number; readonly of: 'member'; readonly positions: readonly number[] };

/** Combinations up to which a fold can be opened. */
export const MOST_OPENED = 5_000_000;

/** Number of the rest, which comes after the rows. */
export const restOf = (answer: FoldAnswer): number => answer.rows.length;

/** Combinations of a fold. */
export const countOf = (answer: FoldAnswer, fold: number): bigint => answer.rows[fold]?.count ?? answer.otherwise.count;

/** The lines of a folded table by their place, without making all of them. */
export class FoldEntries {
  readonly count: number;
  /** Per fold the place of its own line; last, how many lines there are. */
  readonly #places: readonly number[];
  readonly #answer: FoldAnswer;
  readonly #table: StateTable | undefined;
  /** Rows of the rest, if it is open. */
  readonly #rest: Uint32Array | undefined;

  /** `table`: of the answer, if there is one. Opening the rest needs it. */
  constructor(answer: FoldAnswer, table: StateTable | undefined, opened: ReadonlySet<number>) {
    this.#answer = answer;
    this.#table = table;
    const rest = restOf(answer);
    this.#rest = opened.has(rest) && table ? restRows(answer, table) : undefined;
    const places = [0];
    for (let fold = 0; fold <= rest; fold++) {
      const open = opened.has(fold) && canOpen(answer, table, fold);
      places.push((places[fold] as number) + 1 + (open ? Number(countOf(answer, fold)) : 0));
    }
    this.#places = places;
    this.count = places[rest + 1] as number;
  }

  at(place: number): FoldEntry | undefined {
    if (place < 0 || place >= this.count) return undefined;
    let low = 0;
    let high = this.#places.length - 1;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if ((this.#places[middle] as number) <= place) low = middle;
      else high = middle;
    }
    const inside = place - (this.#places[low] as number) - 1;
    if (inside < 0) return { fold: low, of: 'fold' };
    return { fold: low, of: 'member', positions: this.#member(low, inside) };
  }

  placeOf(fold: number): number {
    return this.#places[fold] ?? 0;
  }

  #member(fold: number, index: number): readonly number[] {
    const row = this.#answer.rows[fold];
    return row ? memberOf(row.positions, index) : (this.#table?.positionsOf(this.#rest?.[index] ?? 0) ?? []);
  }
}

export const canOpen = (answer: FoldAnswer, table: StateTable | undefined, fold: number): boolean =>
  countOf(answer, fold) <= BigInt(MOST_OPENED) && (fold < restOf(answer) || table !== undefined);

/** The combination of a fold with this number, the last lever changing fastest: the order of the table. */
export function memberOf(masks: readonly number[], index: number): number[] {
  const out = new Array<number>(masks.length).fill(0);
  let left = index;
  for (let i = masks.length - 1; i >= 0; i--) {
    const allowed = positionsIn(masks[i] ?? 1);
    out[i] = allowed[left % allowed.length] ?? 0;
    left = Math.floor(left / allowed.length);
  }
  return out;
}

export function positionsIn(mask: number): number[] {
  const out: number[] = [];
  for (let p = 0; 1 << p <= mask; p++) if (((mask >>> p) & 1) === 1) out.push(p);
  return out;
}

/** Rows with the outcome of the rest: no other row has it. */
function restRows(answer: FoldAnswer, table: StateTable): Uint32Array {
  const rows = new Uint32Array(Number(answer.otherwise.count));
  let plane: Uint32Array | undefined;
  answer.items.forEach(({ of, index }, i) => {
    const words = planeWith(table, of, index, answer.otherwise.outcome[i] ?? '');
    plane = plane ? plane.map((word, w) => word & (words[w] as number)) : words;
  });
  let n = 0;
  for (const row of members(plane ?? new Uint32Array(0))) if (n < rows.length) rows[n++] = row;
  return rows;
}

const PLANES = {
  actuator: { words: ACTUATOR_VERDICTS, of: 'actuatorPlanes' },
  pump: { words: PUMP_VERDICTS, of: 'pumpPlanes' },
  line: { words: LINE_CLASSES, of: 'linePlanes' },
} as const;

function planeWith(table: StateTable, of: keyof typeof PLANES, index: number, word: string): Uint32Array {
  const { words, of: planes } = PLANES[of];
  const at = (words as readonly string[]).indexOf(word);
  return table.data[planes][index]?.[at] ?? emptySet(table.count);
}
