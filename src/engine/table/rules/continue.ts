import type { Names } from './names.ts';
import { sayName } from './names.ts';
import { parseCondition, parseRule } from './parse.ts';
import type { Continuation } from './reader.ts';

/** What may follow a text, ready to be put in from the column `from` on (0-based), where what is begun of it begins. */
export interface Next extends Continuation {
  readonly from: number;
}

/** Other spellings of words that are offered already. */
const SPARED = new Set(
  (
    'move,move out,move in,stand still,extend,retract,float,work,turns A>B,turns A->B,turns B>A,turns B->A,energised,' +
    'energized,rest,is at rest,stands at rest,are,stays,stands,in,each,all,some,a,an,do not,while,if,above,below,' +
    'levers,valve,valves,coils,actuators,cylinders,motors,pumps,lines,only when,only while'
  )
    .split(',')
    .concat(','),
);
/** Names past this many are left to be typed. */
const MOST = 60;

/**
 * How a rule or a condition may go on at its end. The parser itself is asked: whatever it looked for where the text
 * ends may stand there.
 */
export function continuations(text: string, names: Names, as: 'rule' | 'condition'): Next[] {
  const parse = as === 'rule' ? parseRule : parseCondition;
  const at = (cut: number): Continuation[] => {
    const wanted: Continuation[] = [];
    parse(text.slice(0, cut), names, wanted);
    return offered(wanted);
  };
  // Back from the end, a word at a time: what is typed of a phrase narrows what is offered.
  const begun = [...text.matchAll(/(?<=^|[\s(/])\S/g)].map(({ index }) => index).reverse();
  const starts = [...(text === '' || /[\s(/]$/.test(text) ? [text.length] : []), ...begun.slice(0, 4)];
  const found = new Map<string, Next>();
  for (const from of starts) {
    const typed = text.slice(from).replace(/\s+/g, ' ').replace(/^"/, '').toLowerCase();
    for (const option of at(from)) {
      const plain = option.text.replace(/^"/, '').toLowerCase();
      if (!plain.startsWith(typed) || plain === typed.trimEnd() || found.has(option.text)) continue;
      found.set(option.text, { ...option, from });
    }
  }
  return [...found.values()].slice(0, MOST);
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
