/** Some variables and the values that they must have, bit by bit; an empty mask is always true. */
export interface Term {
  readonly mask: number;
  /** Within `mask`. */
  readonly value: number;
}

/** A sum of terms; none = never true. */
export interface Minimised {
  readonly terms: readonly Term[];
  /** Known to be the fewest terms and, with that many, the fewest literals; of these the fewest negated. */
  readonly least: boolean;
}

/** Variables that fit into the bits of a vector. */
export const MOST_VARIABLES = 30;
const MOST_TERMS = 4000;
const MOST_NODES = 40_000;
/** Terms count before literals, and these before negated ones, for any sum that comes about here. */
const [TERM_COST, LITERAL_COST] = [1e8, 1e4];

const holds = ({ mask, value }: Term, vector: number): boolean => (vector & mask) === value;

export function literals({ mask }: Term): number {
  let count = 0;
  for (let rest = mask; rest !== 0; rest &= rest - 1) count += 1;
  return count;
}

/**
 * The shortest sum of products that is true for every vector of `on` and false for every one of `off`; what it is
 * elsewhere does not matter. Vectors are bit sets of up to `MOST_VARIABLES` variables, `on` and `off` without common
 * ones.
 *
 * A term that holds for v and for no vector of `off` has to keep, for each o of `off`, a variable in which v and o
 * differ; the prime terms are the minimal such choices. Then the fewest primes that cover `on` are sought.
 */
export function minimise(on: readonly number[], off: readonly number[]): Minimised {
  const wanted = [...new Set(on)];
  if (wanted.length === 0) return { terms: [], least: true };
  const primes = new Map<string, Term>();
  let complete = true;
  for (const vector of wanted) {
    const differences = smallest(off.map((other) => vector ^ other));
    if (differences.includes(0)) throw new RangeError('a vector is to be both on and off');
    const { choices, all } = hittingSets(differences);
    complete &&= all;
    for (const mask of choices) primes.set(`${mask}/${vector & mask}`, { mask, value: vector & mask });
  }
  const { chosen, proven } = cover(wanted, [...primes.values()]);
  const terms = chosen.toSorted((a, b) => literals(a) - literals(b) || a.mask - b.mask || a.value - b.value);
  return { terms, least: complete && proven };
}

/** Without sets that contain another one. */
function smallest(sets: readonly number[]): number[] {
  const kept: number[] = [];
  const distinct = [...new Set(sets)];
  const size = (set: number): number => literals({ mask: set, value: 0 });
  for (const set of distinct.toSorted((a, b) => size(a) - size(b))) {
    if (!kept.some((other) => (other & set) === other)) kept.push(set);
  }
  return kept;
}

/** All minimal bit sets that share a bit with each of `sets` (Berge's multiplication), or some if there are too many. */
function hittingSets(sets: readonly number[]): { readonly choices: readonly number[]; readonly all: boolean } {
  let choices: number[] = [0];
  let all = true;
  for (const set of sets) {
    const next: number[] = [];
    for (const choice of choices) {
      if ((choice & set) !== 0) next.push(choice);
      else for (let rest = set; rest !== 0; rest &= rest - 1) next.push(choice | (rest & -rest));
    }
    choices = smallest(next);
    if (choices.length > MOST_TERMS) {
      all = false;
      choices = choices.slice(0, MOST_TERMS);
    }
  }
  return { choices, all };
}

interface Search {
  best: number;
  chosen: readonly Term[];
  nodes: number;
}

/** The cheapest primes that together hold for every vector; branch and bound. */
function cover(vectors: readonly number[], primes: readonly Term[]): { chosen: readonly Term[]; proven: boolean } {
  const search: Search = { best: Infinity, chosen: [], nodes: 0 };
  const proven = branch(vectors, primes, [], 0, search);
  return { chosen: search.chosen, proven };
}

const cost = (term: Term): number =>
  TERM_COST + LITERAL_COST * literals(term) + literals({ mask: term.mask & ~term.value, value: 0 });

function branch(
  vectors: readonly number[],
  primes: readonly Term[],
  taken: readonly Term[],
  spent: number,
  search: Search,
): boolean {
  if (vectors.length === 0) {
    if (spent < search.best) [search.best, search.chosen] = [spent, taken];
    return true;
  }
  search.nodes += 1;
  const reduced = undominated(vectors, primes);
  const rows = vectors.map((vector) => reduced.filter((term) => holds(term, vector)));
  if (spent + bound(rows) >= search.best) return true;
  let pick = 0;
  rows.forEach((terms, i) => {
    if (terms.length < (rows[pick]?.length ?? Infinity)) pick = i;
  });
  let proven = true;
  const gain = (term: Term): number => vectors.filter((vector) => holds(term, vector)).length / cost(term);
  for (const term of (rows[pick] ?? []).toSorted((a, b) => gain(b) - gain(a))) {
    if (search.nodes > MOST_NODES && search.best < Infinity) return false;
    const rest = vectors.filter((vector) => !holds(term, vector));
    proven = branch(rest, reduced, [...taken, term], spent + cost(term), search) && proven;
  }
  return proven;
}

/** Without primes that hold for no vector, or for none but those of a prime that costs no more. */
function undominated(vectors: readonly number[], primes: readonly Term[]): readonly Term[] {
  const columns = primes
    .map((term) => ({ term, rows: new Set(vectors.flatMap((vector, i) => (holds(term, vector) ? [i] : []))) }))
    .filter(({ rows }) => rows.size > 0)
    .toSorted((a, b) => b.rows.size - a.rows.size || cost(a.term) - cost(b.term));
  const kept: typeof columns = [];
  for (const column of columns) {
    const beaten = kept.some(
      ({ term, rows }) => cost(term) <= cost(column.term) && [...column.rows].every((row) => rows.has(row)),
    );
    if (!beaten) kept.push(column);
  }
  return kept.map(({ term }) => term);
}

/** Vectors that share no prime each need one of their own: at least their cheapest. */
function bound(rows: readonly (readonly Term[])[]): number {
  const used = new Set<Term>();
  let sum = 0;
  for (const terms of rows.toSorted((a, b) => a.length - b.length)) {
    if (terms.some((term) => used.has(term))) continue;
    for (const term of terms) used.add(term);
    sum += Math.min(...terms.map(cost));
  }
  return sum;
}
