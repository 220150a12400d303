import type { Influence, SubCircuit } from '../analysis/results.ts';

const say = (n: bigint): string => n.toLocaleString('en');
const list = (names: readonly string[]): string =>
  names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1) ?? ''}`;

/** Levers and positions that change nothing, a sentence each. */
export function idleWords({ inputs, alike }: Influence): string[] {
  return inputs.flatMap(({ label, positions }, i) => {
    const groups = alike[i] ?? [];
    if (groups.length === 1) return [`${label} changes nothing in any position.`];
    return groups
      .filter((group) => group.length > 1)
      .map((group) => `${label}: between ${list(group.map((p) => positions[p] ?? ''))} nothing changes.`);
  });
}

/** `2 parts that have nothing to do with each other: 3 × 9 = 27 combinations.` */
export function sayProduct({ parts, combinations }: Influence): string {
  const counts = parts.filter(({ inputs }) => inputs.length > 0).map((part) => say(part.combinations));
  return `${counts.length} parts that have nothing to do with each other: ${counts.join(' × ')} = ${say(combinations)} combinations.`;
}

/** `V1, V2 with LIFT; pump P1`. */
export function partWords({ inputs, rows }: Influence, part: SubCircuit): string {
  const labels = (of: 'actuator' | 'pump', numbers: readonly number[]): string[] =>
    numbers.map((index) => rows.find((row) => row.of === of && row.index === index)?.label ?? '');
  const levers = part.inputs.map((i) => inputs[i]?.label ?? '').join(', ');
  const actuators = labels('actuator', part.actuators);
  const pumps = labels('pump', part.pumps);
  const works = actuators.length > 0 ? ` with ${list(actuators)}` : '';
  const fed = pumps.length > 0 ? `; ${list(pumps)}` : '';
  return `${levers}${works}${fed}${works === '' && fed === '' ? ': works nothing' : ''}`;
}
