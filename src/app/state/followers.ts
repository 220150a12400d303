import type { Circuit } from '../../circuit/model.ts';
import { labelOf } from '../../circuit/model.ts';
import { kindOf } from '../../parts/catalogue.ts';

/** A valve that no lever moves: pressures do, or an actuator that runs on to its roller. */
export interface Follower {
  readonly part: string;
  readonly label: string;
  readonly positions: readonly string[];
  readonly rest: number | undefined;
  /** `by pilot`, `by roller of PUSH`. */
  readonly by: string;
}

/** In circuit order, as drawn now: where they stand is for the table to say. */
export function followersOf(circuit: Circuit): Follower[] {
  const labels = new Map(circuit.parts.map((part) => [part.id, labelOf(part)]));
  return circuit.parts.flatMap((part): Follower[] => {
    const spec = kindOf(part.kind)?.dependent?.(part);
    if (!spec) return [];
    const roller = spec.shifts.find((shift) => shift.by === 'roller');
    const who = roller?.by === 'roller' ? labels.get(roller.actuator) : undefined;
    const by = roller ? `by roller${who === undefined ? '' : ` of ${who}`}` : 'by pilot';
    const label = labelOf(part);
    return [
      {
        part: part.id,
        label: spec.called === undefined ? label : `${label} ${spec.called}`,
        positions: spec.positions,
        rest: spec.rest,
        by,
      },
    ];
  });
}
