import type { Conditions } from '../analysis/results.ts';
import type { Circuit } from '../circuit/model.ts';
import type { Pumps } from './arguments.ts';
import { Failure } from './failure.ts';

/** The conditions that a command line asks for. Throws a `Failure` that names the load cases there are. */
export function conditionsOf(
  { file, pumps, load }: { readonly file: string; readonly pumps: Pumps; readonly load: string | undefined },
  circuit: Circuit,
): Conditions {
  return load === undefined ? { pumps } : { pumps, loadCase: caseOf(file, load, circuit) };
}

/** An id goes before a name, since names may be given twice. */
function caseOf(file: string, load: string, { loadCases = [] }: Circuit): string {
  const found = loadCases.filter(({ id }) => id === load);
  const named = found.length > 0 ? found : loadCases.filter(({ name }) => name === load);
  const [first, second] = named;
  const fault = (text: string): Failure => new Failure(`${file}: --load: ${text}`);
  if (first && !second) return first.id;
  if (second)
    throw fault(`${named.length} load cases are called "${load}". Use an id: ${named.map(({ id }) => id).join(', ')}.`);
  const known = loadCases.map(({ id, name }) => (name === id ? name : `${name} (${id})`)).join(', ');
  throw fault(
    `There is no load case "${load}". ${known === '' ? 'This circuit has none; leave --load out.' : `Use one of ${known}.`}`,
  );
}
