/** A set of combinations: the number of a node. Equal sets have equal numbers. */
export type Diagram = number;

export const NONE: Diagram = 0;
export const ALL: Diagram = 1;

const AND = 0;
const OR = 1;
const MINUS = 2;
const FIRST_NODES = 1 << 10;
/** Places for results of operations: some for each node, within bounds. */
const LEAST_KEPT = 1 << 13;
const MOST_KEPT = 1 << 21;
const KEPT_PER_NODE = 4;

/** More nodes than allowed: the sets are too entangled to be held. */
export class TooManyNodes extends Error {
  constructor(most: number) {
    super(
      `The sets of combinations need more than ${most.toLocaleString('en')} nodes. Table a part of the circuit by itself.`,
    );
    this.name = 'TooManyNodes';
  }
}

export interface DiagramOptions {
  /** Inputs from the root downwards; absent = as numbered. */
  readonly order?: readonly number[];
  readonly mostNodes?: number;
  /** Called now and then while nodes are made; may throw to give up. */
  readonly heartbeat?: () => void;
}

/**
 * Sets of combinations of inputs with few positions each, as reduced ordered decision diagrams with one
 * branch per position. Nodes are kept once each in typed arrays, so that equal sets are equal numbers;
 * nodes are never given back. Bryant's reduction rules; the operations keep their latest results.
 */
export class Diagrams {
  readonly radices: readonly number[];
  /** Level → input, and the reverse. */
  readonly order: readonly number[];
  readonly levelOf: readonly number[];
  readonly #arity: Int32Array;
  readonly #stride: number;
  readonly #mostNodes: number;
  readonly #heartbeat: () => void;
  #level: Int32Array = new Int32Array(FIRST_NODES);
  #kids: Int32Array;
  #nodes = 2;
  #slots: Int32Array = new Int32Array(FIRST_NODES * 2).fill(-1);
  /** Latest results, four numbers each: the operation's sets, what it gave, and the operation; a first number of 0 is an empty place. */
  #results: Int32Array = new Int32Array(4 * LEAST_KEPT);
  readonly #scratch: Int32Array;
  readonly #counts: bigint[] = [0n, 1n];
  /** Level → combinations of the inputs from there on. */
  readonly #below: readonly bigint[];

  constructor(radices: readonly number[], options: DiagramOptions = {}) {
    this.radices = radices;
    this.order = options.order ?? radices.map((_, i) => i);
    const levelOf = new Array<number>(radices.length).fill(-1);
    this.order.forEach((input, level) => (levelOf[input] = level));
    if (this.order.length !== radices.length || levelOf.includes(-1))
      throw new RangeError('the order must name every input once');
    this.levelOf = levelOf;
    const arity = this.order.map((input) => radices[input] as number);
    this.#arity = Int32Array.from(arity);
    this.#stride = Math.max(1, ...arity);
    this.#mostNodes = options.mostNodes ?? 4_000_000;
    this.#heartbeat = options.heartbeat ?? (() => undefined);
    this.#kids = new Int32Array(FIRST_NODES * this.#stride);
    this.#scratch = new Int32Array((radices.length + 1) * this.#stride);
    this.#level[NONE] = radices.length;
    this.#level[ALL] = radices.length;
    const below = new Array<bigint>(radices.length + 1).fill(1n);
    for (let level = radices.length - 1; level >= 0; level--)
      below[level] = (below[level + 1] as bigint) * BigInt(arity[level] as number);
    this.#below = below;
  }

  /** Nodes made so far, the two ends among them. */
  get nodes(): number {
    return this.#nodes;
  }

  /** Of the arrays of nodes and of kept results. */
  get bytes(): number {
    const arrays = [this.#level, this.#kids, this.#slots, this.#results];
    return arrays.reduce((sum, array) => sum + array.byteLength, 0);
  }

  /** Combinations of all inputs. */
  get total(): bigint {
    return this.#below[0] as bigint;
  }

  /** Level of the root; as many as there are inputs for NONE and ALL. */
  level(a: Diagram): number {
    return this.#level[a] as number;
  }

  arity(level: number): number {
    return this.#arity[level] as number;
  }

  /** The set with the input of `level` in `position`, which must not lie below the root. */
  child(a: Diagram, level: number, position: number): Diagram {
    return this.#level[a] === level ? (this.#kids[a * this.#stride + position] as number) : a;
  }

  /** The node with these children (one per position), reduced and shared. */
  make(level: number, kids: ArrayLike<number>, offset = 0): Diagram {
    const arity = this.#arity[level] as number;
    const first = kids[offset] as number;
    let same = true;
    let hash = Math.imul(level + 1, 0x9e3779b1);
    for (let p = 0; p < arity; p++) {
      const kid = kids[offset + p] as number;
      if (kid !== first) same = false;
      hash = Math.imul(hash ^ kid, 0x85ebca6b);
      hash ^= hash >>> 15;
    }
    if (same) return first;
    const mask = this.#slots.length - 1;
    let slot = hash & mask;
    for (let node = this.#slots[slot] as number; node >= 0; node = this.#slots[slot] as number) {
      if (this.#level[node] === level && this.#sameKids(node, kids, offset, arity)) return node;
      slot = (slot + 1) & mask;
    }
    return this.#add(level, kids, offset, arity, slot);
  }

  #sameKids(node: number, kids: ArrayLike<number>, offset: number, arity: number): boolean {
    const base = node * this.#stride;
    for (let p = 0; p < arity; p++) if (this.#kids[base + p] !== kids[offset + p]) return false;
    return true;
  }

  #add(level: number, kids: ArrayLike<number>, offset: number, arity: number, slot: number): Diagram {
    const node = this.#nodes;
    if (node >= this.#mostNodes) throw new TooManyNodes(this.#mostNodes);
    if ((node & 0xfff) === 0) this.#heartbeat();
    if (node === this.#level.length) {
      this.#level = grown(this.#level);
      this.#kids = grown(this.#kids);
      while (this.#results.length < 4 * Math.min(MOST_KEPT, KEPT_PER_NODE * this.#level.length))
        this.#results = morePlaces(this.#results);
    }
    this.#level[node] = level;
    const base = node * this.#stride;
    for (let p = 0; p < arity; p++) this.#kids[base + p] = kids[offset + p] as number;
    this.#slots[slot] = node;
    this.#nodes = node + 1;
    if (this.#nodes * 2 > this.#slots.length) this.#rehash();
    return node;
  }

  #rehash(): void {
    const slots = new Int32Array(this.#slots.length * 2).fill(-1);
    const mask = slots.length - 1;
    for (let node = 2; node < this.#nodes; node++) {
      const level = this.#level[node] as number;
      const arity = this.#arity[level] as number;
      let hash = Math.imul(level + 1, 0x9e3779b1);
      for (let p = 0; p < arity; p++) {
        hash = Math.imul(hash ^ (this.#kids[node * this.#stride + p] as number), 0x85ebca6b);
        hash ^= hash >>> 15;
      }
      let slot = hash & mask;
      while (slots[slot] !== -1) slot = (slot + 1) & mask;
      slots[slot] = node;
    }
    this.#slots = slots;
  }

  /** "Input stands in one of `positions`" (bit p = position p). */
  literal(input: number, positions: number): Diagram {
    const level = this.levelOf[input] as number;
    const arity = this.#arity[level] as number;
    return this.make(
      level,
      Array.from({ length: arity }, (_, p) => ((positions >>> p) & 1) as Diagram),
    );
  }

  and(a: Diagram, b: Diagram): Diagram {
    return this.#apply(AND, a, b);
  }

  or(a: Diagram, b: Diagram): Diagram {
    return this.#apply(OR, a, b);
  }

  /** In `a` and not in `b`. */
  minus(a: Diagram, b: Diagram): Diagram {
    return this.#apply(MINUS, a, b);
  }

  not(a: Diagram): Diagram {
    return this.#apply(MINUS, ALL, a);
  }

  /** `yes` where `test` holds, `no` elsewhere. */
  ite(test: Diagram, yes: Diagram, no: Diagram): Diagram {
    return this.or(this.and(test, yes), this.minus(no, test));
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
    if (op !== MINUS && a > b) [a, b] = [b, a];
    const place = placeOf(op, a, b);
    const results = this.#results;
    const at = place & (results.length - 4);
    if (results[at] === a && results[at + 1] === b && results[at + 3] === op) return results[at + 2] as number;
    const kids = this.#kids;
    const stride = this.#stride;
    const levelA = this.#level[a] as number;
    const levelB = this.#level[b] as number;
    const level = levelA < levelB ? levelA : levelB;
    const arity = this.#arity[level] as number;
    // Every level has its own stretch of scratch, since the recursion only goes down.
    const scratch = this.#scratch;
    const base = level * stride;
    for (let p = 0; p < arity; p++) {
      const kidA = levelA === level ? (kids[a * stride + p] as number) : a;
      const kidB = levelB === level ? (kids[b * stride + p] as number) : b;
      scratch[base + p] = this.#apply(op, kidA, kidB);
    }
    const found = this.make(level, scratch, base);
    const now = this.#results;
    const slot = place & (now.length - 4);
    now[slot] = a;
    now[slot + 1] = b;
    now[slot + 2] = found;
    now[slot + 3] = op;
    return found;
  }

  /** Exact number of combinations. */
  count(a: Diagram): bigint {
    return this.#countFrom(a) * ((this.#below[0] as bigint) / (this.#below[this.level(a)] as bigint));
  }

  /** Combinations of the inputs from the node's own level on. */
  #countFrom(a: Diagram): bigint {
    const known = this.#counts[a];
    if (known !== undefined) return known;
    const level = this.level(a);
    let sum = 0n;
    for (let p = 0; p < this.arity(level); p++) {
      const kid = this.child(a, level, p);
      const skipped = (this.#below[level + 1] as bigint) / (this.#below[this.level(kid)] as bigint);
      sum += this.#countFrom(kid) * skipped;
    }
    this.#counts[a] = sum;
    return sum;
  }

  /** Membership of a combination: a position per input. */
  has(a: Diagram, positions: readonly number[]): boolean {
    let node = a;
    while (node > ALL)
      node = this.#kids[node * this.#stride + (positions[this.order[this.level(node)] as number] as number)] as number;
    return node === ALL;
  }

  /** One combination of the set, in which inputs that do not matter stand as in `usual`; undefined if it is empty. */
  example(a: Diagram, usual: readonly number[] = []): number[] | undefined {
    if (a === NONE) return undefined;
    const positions = this.radices.map((_, input) => usual[input] ?? 0);
    let node = a;
    while (node > ALL) {
      const level = this.level(node);
      const input = this.order[level] as number;
      let position = positions[input] as number;
      if (this.child(node, level, position) === NONE) {
        position = 0;
        while (this.child(node, level, position) === NONE) position += 1;
      }
      positions[input] = position;
      node = this.child(node, level, position);
    }
    return positions;
  }

  /** Nodes that make up these sets together, the ends left out. */
  size(...sets: readonly Diagram[]): number {
    const seen = new Set<number>();
    const stack = [...sets];
    for (let node = stack.pop(); node !== undefined; node = stack.pop()) {
      if (node <= ALL || seen.has(node)) continue;
      seen.add(node);
      const level = this.level(node);
      for (let p = 0; p < this.arity(level); p++) stack.push(this.child(node, level, p));
    }
    return seen.size;
  }
}

/** Room for twice as many results; those there are move to their new places. */
export function morePlaces(before: Int32Array): Int32Array {
  const results = new Int32Array(before.length * 2);
  const mask = results.length - 4;
  for (let old = 0; old < before.length; old += 4) {
    const a = before[old] as number;
    if (a === 0) continue;
    const place = placeOf(before[old + 3] as number, a, before[old + 1] as number) & mask;
    for (let i = 0; i < 4; i++) results[place + i] = before[old + i] as number;
  }
  return results;
}

/** Where a result is kept, but for the bits above the number of places. */
export function placeOf(op: number, a: number, b: number): number {
  const hash = Math.imul(Math.imul(a, 0x9e3779b1) ^ Math.imul(b + op, 0x85ebca6b), 0xc2b2ae35);
  return (hash ^ (hash >>> 15)) << 2;
}

function grown(array: Int32Array): Int32Array {
  const larger = new Int32Array(array.length * 2);
  larger.set(array);
  return larger;
}
