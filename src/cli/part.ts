import { MOST_ROWS } from '../analysis/analyse.ts';
import { influenceFrom } from '../analysis/influence.ts';
import type { Conditions, Influence, SubCircuit } from '../analysis/results.ts';
import { unlimited } from '../base/budget.ts';
import type { Circuit } from '../circuit/model.ts';
import { Failure, sayProblems } from './failure.ts';
import { setsOf } from './whole.ts';

/**
 * The conditions with every lever held at rest that is not in the independent part of this actuator, pump or lever.
 * Throws a `Failure` that names the parts there are.
 */
export function partOnly(file: string, circuit: Circuit, conditions: Conditions, name: string): Conditions {
  const found = influenceFrom(setsOf(file, circuit, conditions), unlimited);
  if (!found.ok) throw new Failure(sayProblems(file, found.problems));
  const { inputs } = found.value;
  const part = partOf(file, found.value, name);
  if (part.combinations > BigInt(MOST_ROWS)) {
    throw new Failure(
      `${file}: --part: The part of ${name} alone has ${part.combinations.toLocaleString('en')} combinations of positions; up to ${MOST_ROWS.toLocaleString('en')} can be listed.`,
    );
  }
  const others = inputs.flatMap(({ part: id, rest = 0 }, i): [string, number][] =>
    part.inputs.includes(i) ? [] : [[id, rest]],
  );
  return others.length === 0 ? conditions : { ...conditions, held: Object.fromEntries(others) };
}

function partOf(file: string, found: Influence, name: string): SubCircuit {
  const { inputs, rows, parts } = found;
  const members = ({ inputs: levers, actuators, pumps }: SubCircuit): string[] => {
    const labels = (of: 'actuator' | 'pump', numbers: readonly number[]): string[] =>
      rows.filter((row) => row.of === of && numbers.includes(row.index)).map(({ label }) => label);
    return [...labels('actuator', actuators), ...labels('pump', pumps), ...levers.map((i) => inputs[i]?.label ?? '')];
  };
  const worked = parts.filter(({ inputs: levers }) => levers.length > 0);
  const matching = worked.filter((part) => members(part).includes(name));
  const [part, second] = matching;
  if (part && !second) return part;
  const known = worked.map((each) => members(each)[0] ?? '').join(', ');
  throw new Failure(
    second
      ? `${file}: --part: "${name}" is in ${matching.length} independent parts, since more than one thing has that name. Use another name of the part: ${matching.map((each) => members(each).join(', ')).join('; or ')}.`
      : `${file}: --part: No independent part has an actuator, pump or lever "${name}". Parts by one name each: ${known}.`,
  );
}
