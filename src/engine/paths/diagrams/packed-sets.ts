import type { BitSet } from '../../../base/bits.ts';
import { copyRange, emptySet, fillRange } from '../../../base/bits.ts';
import type { Diagram } from './diagrams.ts';
import { ALL, morePlaces, NONE, placeOf, TooManyNodes } from './diagrams.ts';
import type { SetAlgebra } from './set-algebra.ts';

const AND = 0;
const OR = 1;
const MINUS = 2;
const FIRST_NODES = 1 << 10;
/** Places for results of operations: some for each node, within bounds. */
const LEAST_KEPT = 1 << 13;
const MOST_KEPT = 1 << 19;
const KEPT_PER_NODE = 4;
/** Rows of a table that one number holds: the last few inputs. Its sign tells such numbers from nodes. */
const MOST_BITS = 30;

/**
 * Sets of rows of one table: decision diagrams in the order of the table whose lowest inputs are the bits
 * of one number. A set is NONE, ALL, `~word` for a set that asks the lowest inputs only, or a node. Equal
 * sets are equal numbers, as in `Diagrams`; a set of rows is written out as a bit plane by copying what
 * repeats.
 */
export class PackedSets implements SetAlgebra {
  readonly rows: number;
  readonly #radices: readonly number[];
  /** Inputs above the words; a word stands at this level. */
  readonly #levels: number;
  /** Level → rows from one position of its input to the next; at `levels`: the rows of a word, and 1 at the end. */
  readonly #strides: readonly number[];
  readonly #full: number;
  readonly #width: number;
  /** Numbers of a node. */
  readonly #size: number;
  readonly #mostNodes: number;
  readonly #heartbeat: () => void;
  /** Level → levels before it whose input can move at all. */
  readonly #movable: readonly number[];
  /** Node n: its level at `n * size`, then its children. */
  #table: Int32Array;
  #nodes = 2;
  #slots: Int32Array = new Int32Array(FIRST_NODES * 2).fill(-1);
  /** Latest results, four numbers each, as in `Diagrams`; no operation starts from NONE, so 0 is an empty place. */
  #results: Int32Array = new Int32Array(4 * LEAST_KEPT);
  readonly #scratch: Int32Array;
  readonly #moved = new Map<Diagram, Diagram>();
  /** One move of an input inside a word: the rows that can make it, and how far it takes them. */
  readonly #wordMoves: readonly { readonly from: number; readonly by: number }[];

  constructor(radices: readonly number[], mostNodes: number, heartbeat: () => void = () => undefined) {
    this.#radices = radices;
    const strides = new Array<number>(radices.length + 1).fill(1);
    for (let i = radices.length - 1; i >= 0; i--) strides[i] = (strides[i + 1] as number) * (radices[i] as number);
    this.rows = strides[0] as number;
    let levels = radices.length;
    while (levels > 0 && (strides[levels - 1] as number) <= MOST_BITS) levels -= 1;
    this.#levels = levels;
    this.#strides = strides.slice(1);
    const bits = strides[levels] as number;
    this.#full = bits === 1 ? 1 : (1 << bits) - 1;
    this.#width = Math.max(1, ...radices.slice(0, levels));
    this.#size = this.#width + 1;
    this.#mostNodes = mostNodes;
    this.#heartbeat = heartbeat;
    const movable = [0];
    for (let level = 0; level < levels; level++)
      movable.push((movable[level] as number) + ((radices[level] as number) > 1 ? 1 : 0));
    this.#movable = movable;
    this.#table = new Int32Array(FIRST_NODES * this.#size);
    this.#scratch = new Int32Array((levels + 1) * this.#width);
    this.#wordMoves = radices.slice(levels).flatMap((radix, i) =>
      Array.from({ length: 2 * radix - 1 }, (_, k) => k + 1 - radix)
        .filter((by) => by !== 0)
        .map((by) => {
          let positions = 0;
          for (let p = 0; p < radix; p++) if (p + by >= 0 && p + by < radix) positions |= 1 << p;
          const input = levels + i;
          return { from: this.#wordOf(this.literal(input, positions)), by: by * (this.#strides[input] as number) };
        }),
    );
  }

  /** Nodes made so far. */
  get nodes(): number {
    return this.#nodes;
  }

  #levelOf(set: Diagram): number {
    return set > ALL ? (this.#table[set * this.#size] as number) : this.#levels;
  }

  /** The set that asks nothing above the words. */
  #ofWord(word: number): Diagram {
    return word === 0 ? NONE : word === this.#full ? ALL : ~word;
  }

  #wordOf(set: Diagram): number {
    return set < 0 ? ~set : set === ALL ? this.#full : 0;
  }

  literal(input: number, positions: number): Diagram {
    const radix = this.#radices[input] as number;
    if (input < this.#levels) {
      for (let p = 0; p < radix; p++) this.#scratch[p] = (positions >>> p) & 1;
      return this.#make(input, 0);
    }
    const stride = this.#strides[input] as number;
    let word = 0;
    for (let bit = 0; bit < (this.#strides[this.#levels - 1] ?? this.rows); bit++) {
      if (((positions >>> (Math.floor(bit / stride) % radix)) & 1) === 1) word |= 1 << bit;
    }
    return this.#ofWord(word);
  }

  and(a: Diagram, b: Diagram): Diagram {
    return this.#apply(AND, a, b);
  }

  or(a: Diagram, b: Diagram): Diagram {
    return this.#apply(OR, a, b);
  }

  minus(a: Diagram, b: Diagram): Diagram {
    return this.#apply(MINUS, a, b);
  }

  not(a: Diagram): Diagram {
    return this.#apply(MINUS, ALL, a);
  }

  #apply(op: number, x: Diagram, y: Diagram): Diagram {
    let a = x;
    let b = y;
    if (op === AND) {
      if (a === b || b === ALL) return a;
      if (a === ALL) return b;
      if (a === NONE || b === NONE) return NONE;
    } else if (op === OR) {
      if (a === b || b === NONE) return a;
      if (a === NONE) return b;
      if (a === ALL || b === ALL) return ALL;
    } else {
      if (a === b || a === NONE || b === ALL) return NONE;
      if (b === NONE) return a;
    }
    if (a <= ALL && b <= ALL) {
      const [one, other] = [this.#wordOf(a), this.#wordOf(b)];
      return this.#ofWord(op === AND ? one & other : op === OR ? one | other : one & ~other);
    }
    if (op !== MINUS && a > b) [a, b] = [b, a];
    const place = placeOf(op, a, b);
    const results = this.#results;
    const known = place & (results.length - 4);
    if (results[known] === a && results[known + 1] === b && results[known + 3] === op)
      return results[known + 2] as number;
    const size = this.#size;
    const table = this.#table;
    const levelA = a > ALL ? (table[a * size] as number) : this.#levels;
    const levelB = b > ALL ? (table[b * size] as number) : this.#levels;
    const level = Math.min(levelA, levelB);
    const arity = this.#radices[level] as number;
    // Every level has its own stretch of scratch, since the recursion only goes down.
    const scratch = this.#scratch;
    const base = level * this.#width;
    for (let p = 0; p < arity; p++) {
      const kidA = levelA === level ? (table[a * size + 1 + p] as number) : a;
      const kidB = levelB === level ? (table[b * size + 1 + p] as number) : b;
      scratch[base + p] = this.#apply(op, kidA, kidB);
    }
    const found = this.#make(level, base);
    // The places move when there come to be more of them.
    const now = this.#results;
    const slot = place & (now.length - 4);
    now[slot] = a;
    now[slot + 1] = b;
    now[slot + 2] = found;
    now[slot + 3] = op;
    return found;
  }

  /** The node with the children that stand in the scratch at `base`, reduced and shared. */
  #make(level: number, base: number): Diagram {
    const kids = this.#scratch;
    const arity = this.#radices[level] as number;
    const first = kids[base] as number;
    let same = true;
    for (let p = 1; p < arity; p++) if (kids[base + p] !== first) same = false;
    if (same) return first;
    const slots = this.#slots;
    const table = this.#table;
    const size = this.#size;
    const mask = slots.length - 1;
    let slot = hashOf(level, kids, base, arity) & mask;
    for (let node = slots[slot] as number; node >= 0; node = slots[slot] as number) {
      const at = node * size;
      if (table[at] === level) {
        let p = 0;
        while (p < arity && table[at + 1 + p] === kids[base + p]) p += 1;
        if (p === arity) return node;
      }
      slot = (slot + 1) & mask;
    }
    return this.#add(level, base, slot);
  }

  #add(level: number, base: number, slot: number): Diagram {
    const node = this.#nodes;
    if (node >= this.#mostNodes) throw new TooManyNodes(this.#mostNodes);
    if ((node & 0xfff) === 0) this.#heartbeat();
    if ((node + 1) * this.#size > this.#table.length) {
      this.#table = grown(this.#table);
      const places = Math.min(MOST_KEPT, (KEPT_PER_NODE * this.#table.length) / this.#size);
      while (this.#results.length < 4 * places) this.#results = morePlaces(this.#results);
    }
    const at = node * this.#size;
    this.#table[at] = level;
    const arity = this.#radices[level] as number;
    for (let p = 0; p < arity; p++) this.#table[at + 1 + p] = this.#scratch[base + p] as number;
    this.#slots[slot] = node;
    this.#nodes = node + 1;
    if (this.#nodes * 2 > this.#slots.length) this.#rehash();
    return node;
  }

  #rehash(): void {
    const slots = new Int32Array(this.#slots.length * 2).fill(-1);
    const mask = slots.length - 1;
    for (let node = 2; node < this.#nodes; node++) {
      const at = node * this.#size;
      const level = this.#table[at] as number;
      let slot = hashOf(level, this.#table, at + 1, this.#radices[level] as number) & mask;
      while (slots[slot] !== -1) slot = (slot + 1) & mask;
      slots[slot] = node;
    }
    this.#slots = slots;
  }

  /** Rows that one move of one input leads to from a row of the set. */
  oneMoveFrom(set: Diagram): Diagram {
    return this.or(this.#moves(set), this.#skips(0, set) ? set : NONE);
  }

  /** True if some input that can move lies between this level and what the set asks first: moving it changes nothing. */
  #skips(level: number, set: Diagram): boolean {
    return (this.#movable[this.#levelOf(set)] as number) > (this.#movable[level] as number);
  }

  #moves(set: Diagram): Diagram {
    if (set <= ALL) return this.#ofWord(this.#movesInWord(this.#wordOf(set)));
    const known = this.#moved.get(set);
    if (known !== undefined) return known;
    const level = this.#table[set * this.#size] as number;
    const arity = this.#radices[level] as number;
    const kids = Array.from({ length: arity }, (_, p) => this.#table[set * this.#size + 1 + p] as Diagram);
    const found = kids.map((kid, p) => {
      let from = this.or(this.#moves(kid), this.#skips(level + 1, kid) ? kid : NONE);
      kids.forEach((other, q) => {
        if (q !== p) from = this.or(from, other);
      });
      return from;
    });
    found.forEach((kid, p) => (this.#scratch[level * this.#width + p] = kid));
    const made = this.#make(level, level * this.#width);
    this.#moved.set(set, made);
    return made;
  }

  #movesInWord(word: number): number {
    let found = 0;
    for (const { from, by } of this.#wordMoves) found |= by > 0 ? (word & from) << by : (word & from) >>> -by;
    return found;
  }

  /** The set as a bit plane over the rows. */
  plane(set: Diagram): BitSet {
    const plane = emptySet(this.rows);
    this.#write(set, 0, 0, plane, new Map());
    return plane;
  }

  #write(set: Diagram, level: number, at: number, plane: BitSet, written: Map<Diagram, number>): void {
    if (set === NONE) return;
    if (set === ALL) {
      fillRange(plane, at, at + (level === 0 ? this.rows : (this.#strides[level - 1] as number)));
      return;
    }
    if (level === this.#levels) {
      const word = ~set;
      const shift = at & 31;
      const index = at >>> 5;
      plane[index] = (plane[index] as number) | (word << shift);
      if (shift > 0) plane[index + 1] = (plane[index + 1] as number) | (word >>> (32 - shift));
      return;
    }
    const stride = this.#strides[level] as number;
    const arity = this.#radices[level] as number;
    if (this.#levelOf(set) > level) {
      this.#write(set, level + 1, at, plane, written);
      for (let done = 1; done < arity;) {
        const more = Math.min(done, arity - done);
        copyRange(plane, at, at + done * stride, more * stride);
        done += more;
      }
      return;
    }
    const known = written.get(set);
    if (known !== undefined) {
      copyRange(plane, known, at, stride * arity);
      return;
    }
    for (let p = 0; p < arity; p++) {
      this.#write(this.#table[set * this.#size + 1 + p] as Diagram, level + 1, at + p * stride, plane, written);
    }
    written.set(set, at);
  }
}

function hashOf(level: number, kids: Int32Array, base: number, arity: number): number {
  let hash = Math.imul(level + 1, 0x9e3779b1);
  for (let p = 0; p < arity; p++) {
    hash = Math.imul(hash ^ (kids[base + p] as number), 0x85ebca6b);
    hash ^= hash >>> 15;
  }
  return hash;
}

function grown(array: Int32Array): Int32Array {
  const larger = new Int32Array(array.length * 2);
  larger.set(array);
  return larger;
}
