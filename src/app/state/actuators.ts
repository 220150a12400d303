import { formatQuantity } from '../../base/units.ts';
import type { UnitSystem } from '../../base/units.ts';
import type { Circuit } from '../../circuit/model.ts';
import { labelOf } from '../../circuit/model.ts';
import { kindOf } from '../../parts/catalogue.ts';
import type { ActuatorElement } from '../../parts/contract.ts';

export interface CircuitActuator {
  readonly part: string;
  readonly label: string;
  readonly motion: ActuatorElement['motion'];
  readonly load: ActuatorElement['load'];
}

/** Actuators in circuit order. */
export function actuatorsOf(circuit: Circuit): CircuitActuator[] {
  return circuit.parts.flatMap((part) => {
    const element = kindOf(part.kind)
      ?.elements(part)
      .find((each) => each.type === 'actuator');
    return element ? [{ part: part.id, label: labelOf(part), motion: element.motion, load: element.load }] : [];
  });
}

/** `20 kN in`, `110 N·m resisting`. */
export function sayLoad(actuator: CircuitActuator, units: UnitSystem): string {
  const rotary = actuator.motion === 'rotary';
  const { sense, size } = actuator.load;
  const way = rotary
    ? { in: 'B→A', out: 'A→B', resisting: 'resisting', none: '' }
    : { in: 'in', out: 'out', resisting: 'resisting', none: '' };
  return `${formatQuantity(size, rotary ? 'torque' : 'force', units)} ${way[sense]}`.trim();
}
