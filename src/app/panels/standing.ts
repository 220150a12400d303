import type { Subject } from '../state/session.svelte.ts';
import type { Conditions, Explanation, StateTable } from '../../worker/client.ts';

/** What the verdict stands on: `Holds for any values, between its stops.` Undefined for lines. */
export function sayStanding(
  explanation: Explanation,
  table: StateTable,
  { of, key }: Subject,
  places: Conditions['places'],
  assumed: boolean,
): string | undefined {
  if (of === 'line' || of === 'dependent') return undefined;
  const reason = (of === 'actuator' ? explanation.actuators : explanation.pumps).find(({ part }) => part === key);
  if (!reason) return undefined;
  const words = reason.onValues
    ? `Rests on ${assumed ? 'entered and assumed' : 'entered'} values`
    : 'Holds for any values';
  const linear = table.data.actuators.some(({ part, motion }) => part === key && motion === 'linear');
  if (!linear) return `${words}.`;
  const place = places?.[key];
  return `${words}, ${place === undefined ? 'between its stops' : `at its ${place === 'in' ? 'inner' : 'outer'} stop`}.`;
}
