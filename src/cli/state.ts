import { bad, good } from '../base/result.ts';
import type { Problem, Result } from '../base/result.ts';
import type { TableInput } from '../engine/table/table-data.ts';

export type StateInput = Pick<TableInput, 'label' | 'positions' | 'rest'>;

export interface State {
  /** Index of the position of each input. */
  readonly positions: readonly number[];
  /** Label → position of the inputs that were not given. */
  readonly assumed: Readonly<Record<string, string>>;
}

/** Reads `V1=a,V2=0`. An input that is left out stands at rest, one without rest in its first position. */
export function readState(texts: readonly string[], inputs: readonly StateInput[]): Result<State> {
  const given = new Map<number, number>();
  const problems: Problem[] = [];
  for (const item of texts.flatMap((text) => itemsOf(text, inputs))) {
    const found = readItem(item, inputs);
    if ('problem' in found) problems.push(found.problem);
    else if (given.has(found.input)) {
      problems.push({
        where: '--state',
        what: `${inputs[found.input]?.label ?? ''} is given twice.`,
        remedy: 'Give each valve one position.',
      });
    } else given.set(found.input, found.position);
  }
  if (problems.length > 0) return bad(...problems);
  const positions = inputs.map((input, i) => given.get(i) ?? input.rest ?? 0);
  const assumed = inputs.flatMap((input, i): [string, string][] =>
    given.has(i) ? [] : [[input.label, input.positions[positions[i] ?? 0] ?? '']],
  );
  return good({ positions, assumed: Object.fromEntries(assumed) });
}

/** Parts at commas, but not inside a label or position name that has a comma itself. */
function itemsOf(text: string, inputs: readonly StateInput[]): string[] {
  const pieces = text.split(',');
  const items: string[] = [];
  for (let from = 0; from < pieces.length;) {
    let taken = 1;
    for (let n = 1; from + n <= pieces.length; n++) {
      if ('input' in readItem(pieces.slice(from, from + n).join(','), inputs)) {
        taken = n;
        break;
      }
    }
    const item = pieces.slice(from, from + taken).join(',');
    if (item.trim() !== '') items.push(item.trim());
    from += taken;
  }
  return items;
}

type Item = { readonly input: number; readonly position: number } | { readonly problem: Problem };

function readItem(text: string, inputs: readonly StateInput[]): Item {
  const item = text.trim();
  const fault = (what: string, remedy: string): Item => ({ problem: { where: '--state', what, remedy } });
  const input = inputs.findIndex(({ label }) => item.startsWith(label) && /^\s*=/.test(item.slice(label.length)));
  const spec = inputs[input];
  if (!spec) {
    if (!item.includes('='))
      return fault(`"${item}" is not written as VALVE=POSITION.`, 'Write for example "V1=a,V2=0".');
    const label = item.slice(0, item.indexOf('=')).trim();
    const known = inputs.map((i) => i.label).join(', ');
    return fault(
      `There is no valve "${label}" to command.`,
      known === '' ? 'This circuit has none; leave --state out.' : `Use one of ${known}.`,
    );
  }
  const name = item.slice(item.indexOf('=', spec.label.length) + 1).trim();
  const position = spec.positions.indexOf(name);
  if (position < 0)
    return fault(`${spec.label} has no position "${name}".`, `Use one of ${spec.positions.join(', ')}.`);
  return { input, position };
}
