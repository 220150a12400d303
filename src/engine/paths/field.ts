import type { Adjacency } from './edges.ts';

/** One word-block of bit planes, one plane per line: word w of line l stands at `l * width + w`. */
export type Field = Uint32Array;

/** Displacement through an actuator: oil that enters line `from` leaves at `to`. */
export interface Link {
  readonly from: number;
  readonly to: number;
  readonly actuator: number;
}

/**
 * The workhorse: spreads bits along edges until nothing changes, 32 states to a word. It owns the
 * scratch memory and the masks of the current block, and allocates nothing while it runs.
 */
export class Spreader {
  readonly lines: number;
  /** Words of the current block. */
  width = 0;
  /** Mask m of this block starts at `m * width`. */
  readonly masks: Uint32Array;
  readonly maskLive: Uint8Array;
  readonly #tank: Uint8Array;
  readonly #queue: Int32Array;
  readonly #queued: Uint8Array;

  constructor(lines: number, tank: readonly boolean[], maskCount: number, maxWidth: number) {
    this.lines = lines;
    this.masks = new Uint32Array(maskCount * maxWidth);
    this.maskLive = new Uint8Array(maskCount);
    this.#tank = Uint8Array.from(tank, Number);
    this.#queue = new Int32Array(lines + 1);
    this.#queued = new Uint8Array(lines);
  }

  setMask(index: number, source: Uint32Array, offset: number): void {
    let any = 0;
    const base = index * this.width;
    for (let w = 0; w < this.width; w++) {
      const word = source[offset + w] as number;
      this.masks[base + w] = word;
      any |= word;
    }
    this.maskLive[index] = any === 0 ? 0 : 1;
  }

  /**
   * Grow `field` along `edges` to its fixpoint. `gate`: bits that may be set in the line arrived at.
   * `links`: ways through actuators, except those of actuator `without`. Tanks absorb: nothing spreads
   * on from a tank line unless `fromTank`.
   */
  spread(field: Field, edges: Adjacency, options: SpreadOptions = {}): void {
    const { width, masks, maskLive, lines } = this;
    const { gate, links, without = -1, fromTank = false, order, from, touched } = options;
    const queue = this.#queue;
    const queued = this.#queued;
    const size = lines + 1;
    let head = 0;
    let tail = 0;
    const push = (line: number): void => {
      if (queued[line] === 1 || (this.#tank[line] === 1 && !fromTank)) return;
      queued[line] = 1;
      queue[tail] = line;
      tail = tail + 1 === size ? 0 : tail + 1;
    };
    if (from) {
      for (const line of from) push(line);
    } else {
      for (let i = 0; i < lines; i++) {
        const line = order === undefined ? i : (order[i] as number);
        if (this.anyIn(field, line)) push(line);
      }
    }

    while (head !== tail) {
      const line = queue[head] as number;
      head = head + 1 === size ? 0 : head + 1;
      queued[line] = 0;
      const source = line * width;
      const end = edges.start[line + 1] as number;
      for (let e = edges.start[line] as number; e < end; e++) {
        const mask = edges.mask[e] as number;
        if (maskLive[mask] === 0) continue;
        const to = edges.to[e] as number;
        const target = to * width;
        const open = mask * width;
        let grown = 0;
        if (gate === undefined) {
          for (let w = 0; w < width; w++) {
            const before = field[target + w] as number;
            const after = before | ((field[source + w] as number) & (masks[open + w] as number));
            grown |= before ^ after;
            field[target + w] = after;
          }
        } else {
          for (let w = 0; w < width; w++) {
            const before = field[target + w] as number;
            const after =
              before | ((field[source + w] as number) & (masks[open + w] as number) & (gate[target + w] as number));
            grown |= before ^ after;
            field[target + w] = after;
          }
        }
        if (grown === 0) continue;
        if (touched) touched[to] = 1;
        push(to);
      }
      const ways = links?.[line];
      if (ways === undefined) continue;
      for (const link of ways) {
        if (link.actuator === without) continue;
        const target = link.to * width;
        let grown = 0;
        for (let w = 0; w < width; w++) {
          const before = field[target + w] as number;
          const allowed = gate === undefined ? -1 : (gate[target + w] as number);
          const after = before | ((field[source + w] as number) & allowed);
          grown |= before ^ after;
          field[target + w] = after;
        }
        if (grown === 0) continue;
        if (touched) touched[link.to] = 1;
        push(link.to);
      }
    }
  }

  field(): Field {
    return new Uint32Array(this.lines * this.width);
  }

  anyIn(field: Field, line: number): boolean {
    const base = line * this.width;
    for (let w = 0; w < this.width; w++) if (field[base + w] !== 0) return true;
    return false;
  }

  /** Set every bit of a line that is set in mask 0 (the states that exist). */
  seed(field: Field, line: number): void {
    const base = line * this.width;
    for (let w = 0; w < this.width; w++) field[base + w] = (field[base + w] as number) | (this.masks[w] as number);
  }
}

export interface SpreadOptions {
  readonly gate?: Field;
  /** [line] → links that leave it. */
  readonly links?: readonly (readonly Link[])[];
  readonly without?: number;
  readonly fromTank?: boolean;
  /** Lines in the order to begin with; see `orderFrom`. */
  readonly order?: Int32Array;
  /** Only these lines are new: begin with them. */
  readonly from?: readonly number[];
  /** Set to 1 for every line that grows. */
  readonly touched?: Uint8Array;
}

/**
 * Lines by their distance from `starts`, whatever is open. A search that begins in this order meets
 * most lines after all that can reach them, and seldom has to come back.
 */
export function orderFrom(
  starts: readonly number[],
  lines: number,
  edges: Adjacency,
  links: readonly (readonly Link[])[],
): Int32Array {
  const seen = new Uint8Array(lines);
  const order: number[] = [];
  const visit = (line: number): void => {
    if (line < 0 || seen[line] === 1) return;
    seen[line] = 1;
    order.push(line);
  };
  starts.forEach(visit);
  for (let head = 0; head < lines; head++) {
    if (head === order.length) {
      for (let line = 0; line < lines; line++) visit(line);
    }
    const line = order[head] as number;
    for (let e = edges.start[line] as number; e < (edges.start[line + 1] as number); e++) visit(edges.to[e] as number);
    for (const link of links[line] ?? []) visit(link.to);
  }
  return Int32Array.from(order);
}

/** `~field`, within the states that exist. */
export function complement(field: Field, masks: Uint32Array, width: number): Field {
  const out = new Uint32Array(field.length);
  for (let i = 0; i < field.length; i++) out[i] = ~(field[i] as number) & (masks[i % width] as number);
  return out;
}
