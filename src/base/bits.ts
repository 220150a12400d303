/**
 * Sets of rows, one bit each, 32 to a word. Bits at and past `size` are always 0.
 * Word arithmetic in JavaScript is signed: results are stored into a Uint32Array, which mends it.
 */
export type BitSet = Uint32Array;

export const wordsFor = (size: number): number => (size + 31) >>> 5;
export const emptySet = (size: number): BitSet => new Uint32Array(wordsFor(size));

/** Clear the bits past the last one. */
export function trim(set: BitSet, size: number): BitSet {
  const used = size & 31;
  if (used !== 0) {
    const last = size >>> 5;
    set[last] = (set[last] as number) & ((1 << used) - 1);
  }
  return set;
}

export const fullSet = (size: number): BitSet => trim(emptySet(size).fill(0xffffffff), size);
export const has = (set: BitSet, index: number): boolean => (((set[index >>> 5] as number) >>> (index & 31)) & 1) === 1;

export function add(set: BitSet, index: number): void {
  const word = index >>> 5;
  set[word] = (set[word] as number) | (1 << (index & 31));
}

function popcount(word: number): number {
  let v = word - ((word >>> 1) & 0x55555555);
  v = (v & 0x33333333) + ((v >>> 2) & 0x33333333);
  return (((v + (v >>> 4)) & 0x0f0f0f0f) * 0x01010101) >>> 24;
}

export function countBits(set: BitSet): number {
  let total = 0;
  for (let i = 0; i < set.length; i++) total += popcount(set[i] as number);
  return total;
}

export function isEmpty(set: BitSet): boolean {
  for (let i = 0; i < set.length; i++) if (set[i] !== 0) return false;
  return true;
}

export function equalSets(a: BitSet, b: BitSet): boolean {
  if (a.length !== b.length) return false;
  for (let i = 0; i < a.length; i++) if (a[i] !== b[i]) return false;
  return true;
}

/** `target |= source`; true if it grew. */
export function orInto(target: BitSet, source: BitSet): boolean {
  let grown = 0;
  for (let i = 0; i < target.length; i++) {
    const before = target[i] as number;
    const after = before | (source[i] as number);
    grown |= before ^ after;
    target[i] = after;
  }
  return grown !== 0;
}

/** Members in rising order. */
export function* members(set: BitSet): Generator<number> {
  for (let w = 0; w < set.length; w++) {
    let word = set[w] as number;
    while (word !== 0) {
      const low = word & -word;
      yield w * 32 + (31 - Math.clz32(low));
      word ^= low;
    }
  }
}

/** Set bits `from` … `to - 1`. */
export function fillRange(set: BitSet, from: number, to: number): void {
  const first = from >>> 5;
  const last = (to - 1) >>> 5;
  const head = -1 << (from & 31);
  const tail = (to & 31) === 0 ? -1 : (1 << (to & 31)) - 1;
  if (first === last) {
    set[first] = (set[first] as number) | (head & tail);
    return;
  }
  set[first] = (set[first] as number) | head;
  set.fill(0xffffffff, first + 1, last);
  set[last] = (set[last] as number) | tail;
}

/** Set at `to` … what stands at `from` … `from + size - 1`; the two stretches must not overlap, and the target must be empty. */
export function copyRange(set: BitSet, from: number, to: number, size: number): void {
  let source = from;
  let target = to;
  const end = to + size;
  const lead = (32 - (target & 31)) & 31;
  if (lead > 0) {
    const bits = Math.min(lead, size);
    orBits(set, target, bitsAt(set, source, bits));
    source += bits;
    target += bits;
  }
  const words = (end - target) >>> 5;
  const shift = source & 31;
  let at = target >>> 5;
  let read = source >>> 5;
  if (shift === 0) {
    set.copyWithin(at, read, read + words);
  } else {
    const left = 32 - shift;
    let low = set[read] as number;
    for (const last = at + words; at < last; at++) {
      read += 1;
      const high = set[read] as number;
      set[at] = (low >>> shift) | (high << left);
      low = high;
    }
  }
  const done = words * 32;
  if (target + done < end) orBits(set, target + done, bitsAt(set, source + done, end - target - done));
}

/** True if the `size` rows from `a` on are the same as those from `b` on. */
export function sameRange(set: BitSet, a: number, b: number, size: number): boolean {
  let done = 0;
  for (; done + 32 <= size; done += 32) if (bitsAt(set, a + done, 32) !== bitsAt(set, b + done, 32)) return false;
  return done === size || bitsAt(set, a + done, size - done) === bitsAt(set, b + done, size - done);
}

/** Up to 32 bits from row `from` on, the first lowest. */
export function bitsAt(set: BitSet, from: number, size: number): number {
  const shift = from & 31;
  const word = from >>> 5;
  const low = (set[word] as number) >>> shift;
  const bits = shift === 0 ? low : low | ((set[word + 1] ?? 0) << (32 - shift));
  return size === 32 ? bits | 0 : bits & ((1 << size) - 1);
}

/** All of `bits` must lie in one word of the set. */
function orBits(set: BitSet, at: number, bits: number): void {
  const word = at >>> 5;
  set[word] = (set[word] as number) | (bits << (at & 31));
}
