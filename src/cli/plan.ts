import { checkPlan } from '../analysis/plan.ts';
import type { Circuit } from '../circuit/model.ts';
import { writePlanJson, writePlanText } from '../report/plan.ts';
import type { Command } from './arguments.ts';
import type { Written } from './bleed.ts';
import { conditionsOf } from './conditions.ts';
import { EXIT, Failure } from './failure.ts';
import { showPlans } from './plan-shows.ts';

/** Plays the plans of the circuit, or the one that is named, by its name or id. */
export function plan(
  { file, format, load, plan: wanted, units, shows }: Extract<Command, { name: 'plan' }>,
  circuit: Circuit,
  version: string,
): Written {
  const ids = idsOf(file, wanted, circuit);
  const conditions = conditionsOf({ file, pumps: 'running', load }, circuit);
  if (shows) return showPlans(shows, { file, ids, units, format, conditions }, circuit, version);
  const reports = ids.map((id) => checkPlan(circuit, id, conditions));
  const source = { version, circuit: circuit.name, loadCases: circuit.loadCases ?? [], units, reports };
  return {
    pieces: format === 'json' ? [writePlanJson(source)] : writePlanText(source),
    exit: reports.every(({ good }) => good) ? EXIT.done : EXIT.checkFailed,
  };
}

/** An id goes before a name, since names may be given twice. */
function idsOf(file: string, wanted: string | undefined, { plans = [] }: Circuit): readonly string[] {
  if (plans.length === 0)
    throw new Failure(`${file}: The circuit has no step plan. Add one under "plans" in the file.`);
  if (wanted === undefined) return plans.map(({ id }) => id);
  const found = plans.filter(({ id }) => id === wanted);
  const named = found.length > 0 ? found : plans.filter(({ name }) => name === wanted);
  if (named.length > 0) return named.map(({ id }) => id);
  const known = plans.map(({ id, name }) => (name === id ? name : `${name} (${id})`)).join(', ');
  throw new Failure(`${file}: --plan: There is no step plan "${wanted}". Use one of ${known}.`);
}
