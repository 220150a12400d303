import type { Names } from './names.ts';
import { sayName } from './names.ts';
import { parseCondition, parseRule } from './parse.ts';
import type { Continuation } from './reader.ts';

/** What may follow a text, ready to be put in, and where the unfinished word begins that it replaces. */
export interface Continuations {
  readonly from: number;
  readonly options: readonly Continuation[];
}

/** Other spellings of words that are offered already. */
const SPARED = new Set(
  (
    'move,move out,move in,stand still,extend,retract,float,work,turns A>B,turns A->B,turns B>A,turns B->A,energised,' +
    'energized,rest,is at rest,stands at rest,are,stays,stands,in,each,all,some,a,an,do not,while,if,above,below,' +
    'levers,valve,valves,coils,actuators,cylinders,motors,pumps,lines,only when,only while,;,,'
  ).split(','),
);
/** Names past this many are left to be typed. */
const MOST = 60;

/**
 * How a rule or a condition may go on at its end. The parser itself is asked: whatever it looked for where the text
 * ends may stand there.
 */
export function continuations(text: string, names: Names, as: 'rule' | 'condition'): Continuations {
  const parse = as === 'rule' ? parseRule : parseCondition;
  const at = (cut: number): Continuation[] => {
    const wanted: Continuation[] = [];
    parse(`${text.slice(0, cut).trimEnd()} `, names, wanted);
    return offered(wanted);
  };
  // Back from the end over the blanks: what is typed of a phrase narrows what is offered.
  const starts = [text.length, ...[...text.matchAll(/(?<=^|[\s(/])\S/g)].map(({ index }) => index).reverse()];
  for (const from of starts.slice(0, 5)) {
    const typed = text.slice(from).replace(/\s+/g, ' ').replace(/^"/, '').toLowerCase();
    if (typed === '' && text !== '' && !/[\s(/]$/.test(text)) continue;
    const options = at(from).filter(({ text: each }) => {
      const plain = each.replace(/^"/, '').toLowerCase();
      return plain.startsWith(typed) && plain !== typed.trimEnd();
    });
    if (options.length > 0) return { from, options: options.slice(0, MOST) };
  }
  return { from: text.length, options: [] };
}

function offered(wanted: readonly Continuation[]): Continuation[] {
  const seen = new Set<string>();
  return wanted.flatMap(({ kind, text }) => {
    const said = kind === 'name' ? sayName(text) : text;
    if ((kind === 'word' && SPARED.has(text)) || text === '' || seen.has(said)) return [];
    seen.add(said);
    return [{ kind, text: said }];
  });
}
