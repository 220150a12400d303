import type { Primitive } from '../base/primitives.ts';
import type { Part } from '../circuit/model.ts';
import type { ActuatorElement, PartProblem } from './contract.ts';
import { choiceSetting, quantitySetting, readChoice, readSi } from './settings.ts';
import { spring } from './shapes.ts';

const SENSE = choiceSetting(
  { id: 'spring', title: 'Spring', help: 'A spring in the cylinder, and the way it pushes the rod.' },
  ['none', 'pushes in', 'pushes out'],
  'none',
);
const FORCE = quantitySetting(
  { id: 'springForce', title: 'Spring force', help: 'Force of that spring at mid stroke.', optional: true },
  'force',
  '0 kN',
  { min: '0 kN', max: '1000 kN' },
);

/** Settings of a double-acting cylinder that a spring helps. */
export const SPRING = { sense: SENSE, force: FORCE, all: [SENSE, FORCE] } as const;

/** Nothing without a direction or a force. N at mid stroke. */
export function readSpring(part: Part): Pick<ActuatorElement, 'spring' | 'springForce'> {
  const sense = readChoice(part, SENSE);
  const force = readSi(part, FORCE);
  return sense === 'none' || force === 0 ? {} : { spring: sense === 'pushes in' ? 'in' : 'out', springForce: force };
}

/** Drawn between the piston, whose cap-side face stands at `face` (modules), and the end that it leans on. */
export function drawnSpring(part: Part, face: number): Primitive[] {
  const sense = readChoice(part, SENSE);
  if (sense === 'none') return [];
  return [sense === 'pushes in' ? spring('fine', face + 1, 6, 0, 1.6, 5) : spring('fine', -6, face, 0, 1.6, 5)];
}

/** A spring without force, or a force without direction, would be dropped in silence. */
export function checkSpring(part: Part): PartProblem[] {
  const drawn = readChoice(part, SENSE) !== 'none';
  const force = readSi(part, FORCE);
  if (drawn === force > 0) return [];
  return [
    {
      level: 'warning',
      where: drawn ? 'settings.springForce' : 'settings.spring',
      what: drawn ? 'The spring has no force, so it counts as none.' : 'A spring force is given, but no spring.',
      remedy: drawn ? 'Give its force at mid stroke, or choose none.' : 'Say which way it pushes.',
    },
  ];
}
