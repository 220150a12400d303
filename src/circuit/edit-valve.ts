import { checkCoilTag } from './coil-tags.ts';
import { isCoilTag } from '../base/coil-names.ts';
import { all, changeCircuit, changeConnection, changePart, type Edit } from './edit.ts';
import type { Circuit, Connection, PortRef, ValveData } from './model.ts';
import { partOf } from './place.ts';
import type { StepPlan } from './plan.ts';

/** What got another name in a change of a valve, from the old name to the new one; lines and step plans follow. */
export interface Renamed {
  readonly port?: readonly [string, string];
  readonly position?: readonly [string, string];
  readonly coil?: readonly [string, string];
}

/**
 * Gives a part other valve data than it had `before` in one undo step. Lines at ports that go are removed, never
 * joined to anything else; `linesLost` tells which. Refuses a coil's new name if it is the tag of another valve's.
 */
export function changeValve(
  circuit: Circuit,
  id: string,
  before: ValveData,
  valve: ValveData,
  renamed: Renamed = {},
): Edit {
  const tag = renamed.coil?.[1];
  if (tag !== undefined && isCoilTag(tag)) checkCoilTag(circuit, id, tag);
  const lost = linesLost(circuit, id, before, valve, renamed);
  const edits: Edit[] = [
    ...lost.map((c): Edit => ({ type: 'remove-connection', id: c.id })),
    changePart(id, { valve }),
  ];
  const { port } = renamed;
  if (port) edits.push(...movedEnds(circuit, id, port));
  const plans = circuit.plans && renamedPlans(circuit.plans, id, renamed);
  if (plans && plans !== circuit.plans) edits.push(changeCircuit({ plans }));
  return all(edits);
}

/** Connections that end at ports which the valve would have no more. */
export function linesLost(
  circuit: Circuit,
  id: string,
  before: ValveData,
  valve: ValveData,
  { port }: Renamed = {},
): readonly Connection[] {
  partOf(circuit, id);
  // Ports that are no data of the valve, such as those of pilots, stay as they are.
  const had = before.ports.map((each) => each.id);
  const gone = new Set(had.filter((each) => each !== port?.[0] && !valve.ports.some((now) => now.id === each)));
  const isGone = (ref: PortRef): boolean => ref.part === id && gone.has(ref.port);
  return circuit.connections.filter(({ from, to }) => isGone(from) || isGone(to));
}

function movedEnds(circuit: Circuit, id: string, [before, after]: readonly [string, string]): Edit[] {
  const isIt = (ref: PortRef): boolean => ref.part === id && ref.port === before;
  const renamed = (ref: PortRef): PortRef => (isIt(ref) ? { ...ref, port: after } : ref);
  return circuit.connections
    .filter(({ from, to }) => isIt(from) || isIt(to))
    .map((c) => changeConnection(c.id, { from: renamed(c.from), to: renamed(c.to) }));
}

/** Step plans name coils and positions in words. The same list if none names what was renamed. */
function renamedPlans(plans: readonly StepPlan[], id: string, { coil, position }: Renamed): readonly StepPlan[] {
  let touched = false;
  const swap = (text: string, names: readonly [string, string] | undefined, prefix = ''): string => {
    if (!names || text !== prefix + names[0]) return text;
    touched = true;
    return prefix + names[1];
  };
  const placed = (list: Readonly<Record<string, string>>): Readonly<Record<string, string>> => {
    const at = Object.hasOwn(list, id) ? list[id] : undefined;
    return at === undefined ? list : { ...list, [id]: swap(at, position) };
  };
  const now = plans.map((plan) => ({
    ...plan,
    ...(plan.standing && { standing: placed(plan.standing) }),
    steps: plan.steps.map((step) => ({
      ...step,
      ...(step.coils && { coils: step.coils.map((each) => swap(each, coil, `${id}.`)) }),
      ...(step.levers && { levers: placed(step.levers) }),
    })),
  }));
  return touched ? now : plans;
}
