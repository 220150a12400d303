import { withLoadCase } from '../../circuit/load-case.ts';
import type { Circuit } from '../../circuit/model.ts';
import type { Conditions } from '../../worker/client.ts';

/** The same conditions, less a load case that the circuit does not have: it was removed, or its adding was undone. */
export function conditionsIn(circuit: Circuit, conditions: Conditions): Conditions {
  const { loadCase } = conditions;
  const known = loadCase === undefined || (circuit.loadCases ?? []).some(({ id }) => id === loadCase);
  return known ? conditions : withCase(conditions, undefined);
}

/** Undefined = the loads as drawn. */
export function withCase(conditions: Conditions, id: string | undefined): Conditions {
  const { loadCase: _, ...others } = conditions;
  return id === undefined ? others : { ...others, loadCase: id };
}

/** `between` its stops, or at one. */
export function withPlace(conditions: Conditions, partId: string, place: 'between' | 'in' | 'out'): Conditions {
  const { [partId]: _, ...others } = conditions.places ?? {};
  return { ...conditions, places: place === 'between' ? others : { ...others, [partId]: place } };
}

/** The circuit with the loads that these conditions put on it. */
export const loaded = (circuit: Circuit, conditions: Conditions): Circuit =>
  withLoadCase(circuit, conditionsIn(circuit, conditions).loadCase);
