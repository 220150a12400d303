import { changeCircuit } from '../../circuit/edit.ts';
import type { Edit } from '../../circuit/edit.ts';
import { names } from '../../circuit/ids.ts';
import type { Circuit, RuleText } from '../../circuit/model.ts';

/** The last rule takes the list with it, so that a circuit without rules is written as before. */
const put = (rules: readonly RuleText[]): Edit => changeCircuit({ rules: rules.length > 0 ? rules : undefined });

export function addRule(circuit: Circuit, text: string): Edit {
  const rules = circuit.rules ?? [];
  return put([...rules, { id: names(rules.map(({ id }) => id)).fresh('r'), text }]);
}

export const changeRule = (circuit: Circuit, id: string, text: string): Edit =>
  put((circuit.rules ?? []).map((rule) => (rule.id === id ? { ...rule, text } : rule)));

export const removeRule = (circuit: Circuit, id: string): Edit =>
  put((circuit.rules ?? []).filter((rule) => rule.id !== id));
