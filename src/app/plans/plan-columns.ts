import { coilNames } from '../../base/coil-names.ts';
import type { Circuit } from '../../circuit/model.ts';
import { labelOf } from '../../circuit/model.ts';
import type { StepPlan } from '../../circuit/plan.ts';
import { kindOf } from '../../parts/catalogue.ts';
import { inputsOf } from '../state/inputs.ts';
import type { CircuitInput } from '../state/inputs.ts';

/** One column of the coil chart: a coil, or a pump that may stand still. */
export interface Cell {
  readonly of: 'coil' | 'pump';
  /** As the step names it: `V1.a`, or the pump's part id. */
  readonly ref: string;
  /** `Y1`, or `V1.a` where the coil has no tag of its own. */
  readonly name: string;
}

/** Columns under one head: the coils of a valve, or the pumps. */
export interface CellGroup {
  readonly part: string;
  readonly label: string;
  readonly cells: readonly Cell[];
}

export interface PlanColumns {
  readonly groups: readonly CellGroup[];
  /** Valves that are held by hand: those without coils, and those that the plan holds all the same. */
  readonly levers: readonly CircuitInput[];
}

/** What a step of this plan can command, in circuit order. */
export function planColumns(circuit: Circuit, plan: StepPlan | undefined): PlanColumns {
  const inputs = inputsOf(circuit);
  const held = new Set(plan?.steps.flatMap(({ levers }) => Object.keys(levers ?? {})));
  const coils = inputs.filter(({ coils: own }) => own.length > 0);
  const pumps = partsWith(circuit, 'pump');
  const names = coilNames(coils.flatMap(({ label, coils: own }) => own.map(({ name }) => ({ label, name }))));
  let next = 0;
  return {
    groups: [
      ...coils.map(({ part, label, coils: own }) => ({
        part,
        label,
        cells: own.map(({ name }) => ({ of: 'coil' as const, ref: `${part}.${name}`, name: names[next++] ?? name })),
      })),
      ...(pumps.length > 0
        ? [
            {
              part: '',
              label: 'Pumps',
              cells: pumps.map(({ part, label }) => ({ of: 'pump' as const, ref: part, name: label })),
            },
          ]
        : []),
    ],
    levers: inputs.filter(({ part, coils: own }) => own.length === 0 || held.has(part)),
  };
}

export interface Named {
  readonly part: string;
  readonly label: string;
}

/** Parts with an element of this type, in circuit order. */
export function partsWith(circuit: Circuit, type: 'pump' | 'pressure-switch'): Named[] {
  return circuit.parts.flatMap((part) => {
    const has = kindOf(part.kind)
      ?.elements(part)
      .some((each) => each.type === type);
    return has === true ? [{ part: part.id, label: labelOf(part) }] : [];
  });
}
