/** Where a typed row number or typed lever positions lead. */
export interface GoToInput {
  readonly label: string;
  readonly positions: readonly string[];
}

export type GoTo =
  | { readonly to: 'row'; readonly row: number }
  /** Input → position; the other levers stay where they are. */
  | { readonly to: 'levers'; readonly positions: ReadonlyMap<number, number> }
  | { readonly to: 'nowhere'; readonly why: string };

const nowhere = (why: string): GoTo => ({ to: 'nowhere', why });

/** Longest first, so that V12 is not read as V1. */
const longest = (names: readonly string[]): number[] =>
  names.map((_, i) => i).sort((a, b) => (names[b] ?? '').length - (names[a] ?? '').length);

const ENDS = /^(?:$|[\s,;])/;

/** Index of the name that the text begins with; the case counts only where two names differ by it alone. */
function beginsWith(text: string, names: readonly string[], ends: RegExp): number | undefined {
  const order = longest(names);
  const reads = (i: number, fold: (text: string) => string): boolean => {
    const name = names[i] ?? '';
    return name !== '' && fold(text.slice(0, name.length)) === fold(name) && ends.test(text.slice(name.length));
  };
  return order.find((i) => reads(i, (s) => s)) ?? order.find((i) => reads(i, (s) => s.toLowerCase()));
}

/**
 * `1243`, `1,243`, `row 1243`, or `V1=a V3=0` with labels and positions as on the sheet, parted by spaces, commas or
 * semicolons. `count`: rows of the table.
 */
export function readGoTo(text: string, inputs: readonly GoToInput[], count: number): GoTo {
  const typed = text.trim();
  if (typed === '') return nowhere('Type a row number, or levers such as V1=a.');
  const number = /^(?:row\s+)?(\d[\d\s,.’']*)$/i.exec(typed)?.[1];
  if (number !== undefined) {
    const row = Number(number.replace(/\D/g, ''));
    if (row < 1 || row > count) return nowhere(`Rows go from 1 to ${count.toLocaleString('en')}.`);
    return { to: 'row', row: row - 1 };
  }
  const labels = inputs.map(({ label }) => label);
  const positions = new Map<number, number>();
  for (let rest = typed; rest !== '';) {
    const input = beginsWith(rest, labels, /^\s*=/);
    const { label = '', positions: names = [] } = inputs[input ?? -1] ?? {};
    if (input === undefined) {
      const word = /^[^\s,;=]+/.exec(rest)?.[0] ?? rest;
      if (labels.some((each) => each.toLowerCase() === word.toLowerCase()))
        return nowhere(`Say where ${word} is to stand, such as ${word}=${inputs[0]?.positions[0] ?? 'a'}.`);
      return nowhere(`There is no lever “${word}”; there are ${sayNames(labels)}.`);
    }
    rest = rest.slice(label.length).replace(/^\s*=\s*/, '');
    const position = beginsWith(rest, names, ENDS);
    if (position === undefined) {
      const word = /^[^\s,;]*/.exec(rest)?.[0] ?? '';
      return nowhere(
        word === ''
          ? `Say where ${label} is to stand: ${sayNames(names)}.`
          : `${label} has no position “${word}”; it has ${sayNames(names)}.`,
      );
    }
    positions.set(input, position);
    rest = rest.slice((names[position] ?? '').length).replace(/^[\s,;]+/, '');
  }
  return { to: 'levers', positions };
}

const MOST_NAMES = 12;

function sayNames(names: readonly string[]): string {
  if (names.length === 0) return 'none';
  if (names.length > MOST_NAMES) return `${names.slice(0, MOST_NAMES - 1).join(', ')}, … ${names.at(-1) ?? ''}`;
  return names.join(', ');
}
