import type { Conditions } from '../analysis/results.ts';
import type { LoadCase } from '../circuit/model.ts';

/** `pumps running, load case Full tub, 17 levers held`; a circuit without load cases has nothing to tell them apart. */
export function sayConditions({ pumps, loadCase, held }: Conditions, cases: readonly LoadCase[] = []): string {
  const name = nameOfCase(loadCase, cases);
  const loads = name === undefined ? (cases.length > 0 ? ', loads as the parts say' : '') : `, load case ${name}`;
  const levers = Object.keys(held ?? {}).length;
  return `pumps ${pumps}${loads}${levers > 0 ? `, ${levers} ${levers === 1 ? 'lever' : 'levers'} held` : ''}`;
}

/** The name that a load case has on the sheet. */
export const nameOfCase = (id: string | undefined, cases: readonly LoadCase[] = []): string | undefined =>
  id === undefined ? undefined : (cases.find((entry) => entry.id === id)?.name ?? id);
