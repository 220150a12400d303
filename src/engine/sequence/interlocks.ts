/** A combination of coils and lever contacts: it holds if all of these are so. */
export interface ContactTerm {
  readonly on: readonly number[];
  readonly off: readonly number[];
  readonly contacts: readonly { readonly contact: number; readonly closed: boolean }[];
}

/** Combinations that a rule forbids. */
export interface Interlock {
  /** The rule, or why else. */
  readonly reason: string;
  readonly terms: readonly ContactTerm[];
}

/** A valve, lever or hand valve that combinations speak of. */
export interface InterlockInput {
  readonly label: string;
  readonly positions: readonly string[];
  readonly rest?: number;
  /** Coil numbers of the program, with the position that each holds. */
  readonly coils: readonly { readonly coil: number; readonly position: number }[];
}

/** A contact that is closed while the lever stands in the position. */
export interface LeverContact {
  readonly input: number;
  readonly position: number;
}

/** Bit p of a mask = position p; inputs that are not named may stand anywhere. */
export type Combination = ReadonlyMap<number, number>;

/** Gathers the lever contacts that interlocks need. */
export class ContactTerms {
  readonly contacts: LeverContact[] = [];
  readonly #inputs: readonly InterlockInput[];

  constructor(inputs: readonly InterlockInput[]) {
    this.#inputs = inputs;
  }

  /** The combination in coils and contacts; a text says why it cannot be told that way. */
  terms(combination: Combination): readonly ContactTerm[] | string {
    let terms: ContactTerm[] = [{ on: [], off: [], contacts: [] }];
    for (const [input, mask] of combination) {
      const valve = this.#inputs[input];
      if (!valve || mask === (1 << valve.positions.length) - 1) continue;
      const choices = valve.coils.length > 0 ? coilTerms(valve, mask) : this.#leverTerms(input, valve, mask);
      if (typeof choices === 'string') return choices;
      terms = terms.flatMap((term) =>
        choices.map((choice) => ({
          on: [...term.on, ...choice.on],
          off: [...term.off, ...choice.off],
          contacts: [...term.contacts, ...choice.contacts],
        })),
      );
    }
    return terms.every(({ on }) => on.length > 0)
      ? terms
      : 'switching coils off does not leave it: some of these combinations have no coil on';
  }

  #leverTerms(input: number, { positions }: InterlockInput, mask: number): ContactTerm[] {
    const within = positions.flatMap((_, p) => (((mask >>> p) & 1) === 1 ? [p] : []));
    const [only] = within;
    const wanted =
      within.length === 1 && only !== undefined
        ? [only]
        : positions.map((_, p) => p).filter((p) => !within.includes(p));
    const contacts = wanted.map((position) => ({
      contact: this.#contact(input, position),
      closed: within.length === 1,
    }));
    return [{ on: [], off: [], contacts }];
  }

  #contact(input: number, position: number): number {
    const found = this.contacts.findIndex((c) => c.input === input && c.position === position);
    return found >= 0 ? found : this.contacts.push({ input, position }) - 1;
  }
}

function coilTerms({ label, positions, rest, coils }: InterlockInput, mask: number): readonly ContactTerm[] | string {
  if (rest === undefined)
    return `${label} keeps its last position without a coil, so its coils do not tell where it stands`;
  if (coils.length !== positions.length - 1) return `the coils of ${label} do not tell all of its positions`;
  const isIn = (position: number): boolean => ((mask >>> position) & 1) === 1;
  const off = coils.filter(({ position }) => !isIn(position)).map(({ coil }) => coil);
  if (isIn(rest)) return [{ on: [], off, contacts: [] }];
  // A coil of this valve that is on keeps the others of it off, which the program sees to by itself.
  return coils.filter(({ position }) => isIn(position)).map(({ coil }) => ({ on: [coil], off: [], contacts: [] }));
}

const isTrue = ({ on, off, contacts }: ContactTerm, coils: ReadonlySet<number>, closed: ReadonlySet<number>): boolean =>
  on.every((c) => coils.has(c)) &&
  !off.some((c) => coils.has(c)) &&
  contacts.every((c) => closed.has(c.contact) === c.closed);

/** Whether these coils are in a forbidden combination. */
export const isForbidden = (
  interlocks: readonly Interlock[],
  coils: ReadonlySet<number>,
  closed: ReadonlySet<number>,
): boolean => interlocks.some(({ terms }) => terms.some((term) => isTrue(term, coils, closed)));

/** Coils that stay on when each one that a forbidden combination has on is left off. */
export const allowedCoils = (
  interlocks: readonly Interlock[],
  coils: ReadonlySet<number>,
  closed: ReadonlySet<number>,
): Set<number> => {
  const dropped = new Set(
    interlocks.flatMap(({ terms }) => terms.filter((term) => isTrue(term, coils, closed)).flatMap(({ on }) => on)),
  );
  return new Set([...coils].filter((coil) => !dropped.has(coil)));
};

const MOST_TRIED = 12;

/** False: leaving those coils off never brings about another forbidden combination, tried for all of them. */
export function mayForbidAgain(interlocks: readonly Interlock[]): boolean {
  const terms = interlocks.flatMap((interlock) => interlock.terms);
  if (terms.every(({ off }) => off.length === 0)) return false;
  const coils = [...new Set(terms.flatMap(({ on, off }) => [...on, ...off]))];
  const contacts = [...new Set(terms.flatMap((term) => term.contacts.map(({ contact }) => contact)))];
  if (coils.length + contacts.length > MOST_TRIED) return true;
  for (let state = 0; state < 1 << (coils.length + contacts.length); state++) {
    const isSet = (bit: number): boolean => ((state >>> bit) & 1) === 1;
    const on = new Set(coils.filter((_, i) => isSet(i)));
    const closed = new Set(contacts.filter((_, i) => isSet(coils.length + i)));
    if (isForbidden(interlocks, allowedCoils(interlocks, on, closed), closed)) return true;
  }
  return false;
}
