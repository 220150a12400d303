import type { Budget } from '../base/budget.ts';
import type { Circuit } from '../circuit/model.ts';
import type { StepPlan } from '../circuit/plan.ts';
import { ContactTerms } from '../engine/sequence/interlocks.ts';
import type { ContactTerm, Interlock } from '../engine/sequence/interlocks.ts';
import type { Condition } from '../engine/table/rules/condition.ts';
import { namesOfNetwork } from '../engine/table/rules/names.ts';
import { parseCondition } from '../engine/table/rules/parse.ts';
import type { Network } from '../network/network.ts';
import { checkRules, rulesOf } from './check.ts';
import type { PlanCoil } from './coil-logic-plan.ts';

export interface Locks {
  readonly interlocks: readonly Interlock[];
  readonly unexpressed: readonly { readonly rule: string; readonly why: string }[];
  readonly contacts: ContactTerms['contacts'];
}

/** The rules of the circuit as combinations of coils and lever contacts, pumps running. */
export function interlocksOf(
  circuit: Circuit,
  net: Network,
  plan: StepPlan,
  coils: readonly PlanCoil[],
  budget: Budget,
): Locks {
  const rules = rulesOf(circuit);
  if (rules.length === 0) return { interlocks: [], unexpressed: [], contacts: [] };
  const conditions = { pumps: 'running', ...(plan.loadCase !== undefined && { loadCase: plan.loadCase }) } as const;
  const checked = checkRules(circuit, conditions, rules, budget);
  if (!checked.ok) {
    const why = checked.problems.map(({ where, what }) => `${where}: ${what}`).join(' ');
    return { interlocks: [], unexpressed: rules.map(({ text }) => ({ rule: text, why })), contacts: [] };
  }
  const names = namesOfNetwork(net);
  const terms = new ContactTerms(
    names.inputs.map(({ label, positions, rest }, input) => ({
      label,
      positions,
      ...(rest !== undefined && { rest }),
      coils: coils.flatMap((coil, i) => (coil.input === input ? [{ coil: i, position: coil.position }] : [])),
    })),
  );
  const interlocks: Interlock[] = [];
  const unexpressed: { rule: string; why: string }[] = [];
  for (const { text, answer } of checked.value.rules) {
    const found: ContactTerm[] = [];
    for (const term of answer.broken?.terms ?? []) {
      const parsed = parseCondition(term, names);
      const combination = parsed.ok ? combinationOf(parsed.value) : undefined;
      const told = combination ? terms.terms(combination) : 'it is broken in every combination, or beyond positions';
      if (typeof told === 'string') unexpressed.push({ rule: text, why: `${told} (${term})` });
      else found.push(...told);
    }
    if (found.length > 0) interlocks.push({ reason: text, terms: found });
    if (answer.undecided)
      unexpressed.push({ rule: text, why: `a verdict is left open in ${answer.undecided.count} combinations` });
  }
  return { interlocks, unexpressed, contacts: terms.contacts };
}

/** Masks of positions; undefined if the condition is more than positions joined by "and". */
function combinationOf(condition: Condition): Map<number, number> | undefined {
  const parts = condition.type === 'every' ? condition.of : [condition];
  const masks = new Map<number, number>();
  for (const part of parts) {
    if (part.type !== 'position') return undefined;
    masks.set(part.input, part.positions & (masks.get(part.input) ?? -1));
  }
  return masks;
}
