import type { Part } from '../circuit/model.ts';
import type { ActuatorElement, PartProblem } from './contract.ts';
import { choiceSetting, quantitySetting, readChoice, readSi, type ChoiceSpec, type QuantitySpec } from './settings.ts';

/** The load of an actuator: its size, the way it acts, and the friction. */
export interface LoadSpecs {
  readonly size: QuantitySpec;
  readonly sense: ChoiceSpec;
  /** Resists motion besides a load that presses. */
  readonly work: QuantitySpec;
  readonly friction: QuantitySpec;
  readonly all: readonly [QuantitySpec, ChoiceSpec, QuantitySpec, QuantitySpec];
}

const SENSE_HELP = 'A resisting load only acts against motion; the others press at rest too, as gravity does.';

const WORK_HELP = 'Resists motion both ways, besides the load: a tool that cuts, a slide that drags. None at rest.';

function specs(size: QuantitySpec, senses: readonly string[], work: QuantitySpec, friction: QuantitySpec): LoadSpecs {
  const sense = choiceSetting(
    { id: 'loadSense', title: 'Load acts', help: SENSE_HELP },
    ['none', 'resisting', ...senses],
    'none',
  );
  return { size, sense, work, friction, all: [size, sense, work, friction] };
}

export const CYLINDER_LOAD = specs(
  quantitySetting({ id: 'load', title: 'Load', help: 'Force from outside on the rod.' }, 'force', '0 kN', {
    min: '0 kN',
    max: '100000 kN',
  }),
  ['pushes in', 'pulls out'],
  quantitySetting({ id: 'work', title: 'Work against motion', help: WORK_HELP, optional: true }, 'force', '0 kN', {
    min: '0 kN',
    max: '100000 kN',
  }),
  quantitySetting(
    { id: 'friction', title: 'Friction', help: 'Force of seals and guides against any motion.' },
    'force',
    '0.2 kN',
    { min: '0 kN', max: '1000 kN' },
  ),
);

export const MOTOR_LOAD = specs(
  quantitySetting({ id: 'load', title: 'Load torque', help: 'Torque from outside on the shaft.' }, 'torque', '0 N·m', {
    min: '0 N·m',
    max: '10000000 N·m',
  }),
  ['drives A to B', 'drives B to A'],
  quantitySetting({ id: 'work', title: 'Work against motion', help: WORK_HELP, optional: true }, 'torque', '0 N·m', {
    min: '0 N·m',
    max: '10000000 N·m',
  }),
  quantitySetting(
    { id: 'friction', title: 'Friction torque', help: 'Torque of the motor itself against any motion.' },
    'torque',
    '1 N·m',
    { min: '0 N·m', max: '100000 N·m' },
  ),
);

const SENSES: Readonly<Record<string, ActuatorElement['load']['sense']>> = {
  none: 'none',
  resisting: 'resisting',
  'pushes in': 'in',
  'pulls out': 'out',
  'drives B to A': 'in',
  'drives A to B': 'out',
};

/** N or N·m; no direction means no load. */
export function readLoad(part: Part, load: LoadSpecs): Pick<ActuatorElement, 'load' | 'work' | 'friction'> {
  const sense = SENSES[readChoice(part, load.sense)] ?? 'none';
  return {
    load: { sense, size: sense === 'none' ? 0 : readSi(part, load.size) },
    work: readSi(part, load.work),
    friction: readSi(part, load.friction),
  };
}

/** A size without a direction would be dropped in silence, and so would the reverse. */
export function checkLoad(part: Part, load: LoadSpecs): PartProblem[] {
  const size = readSi(part, load.size);
  const sense = readChoice(part, load.sense);
  if (sense === 'none' && size > 0) {
    return [
      {
        level: 'warning',
        where: 'settings.loadSense',
        what: 'A load is given, but not the way it acts, so it counts as none.',
        remedy: `Choose one of: ${load.sense.value.options.slice(1).join(', ')}.`,
      },
    ];
  }
  if (sense !== 'none' && size === 0) {
    return [
      {
        level: 'warning',
        where: 'settings.load',
        what: `The load is said to act ("${sense}"), but its size is 0.`,
        remedy: 'Give its size, or choose none.',
      },
    ];
  }
  return [];
}
