import type { Part, ValveData } from '../circuit/model.ts';
import type { DependentSpec, PartKind, PartProblem, ShiftSpec } from './contract.ts';
import { lossSettings, readLoss } from './losses.ts';
import { quantitySetting, readSi } from './settings.ts';
import { checkValve } from './valve-check.ts';
import { dataOf, PILOT_FORMS } from './valve-forms-dependent.ts';
import { isTurned } from './valve-drawing.ts';
import { valvePorts } from './valve-frame.ts';
import { valveElements } from './valve-paths.ts';
import { drawPiloted, pilotedBounds, pilotedReach, pilotPorts, type PilotPort } from './valve-pilots.ts';

const LEAST = quantitySetting(
  {
    id: 'leastPilot',
    title: 'Least pilot pressure',
    help: 'Pressure of one pilot, less that of the other, from which it shifts.',
  },
  'pressure',
  '5 bar',
  { min: '0.1 bar', max: '350 bar' },
);
const LOSS = lossSettings('40 L/min', '5 bar');
const DEFAULT = dataOf(PILOT_FORMS);

const valveOf = (part: Part): ValveData => part.valve ?? DEFAULT;

/** X leads to the first position, Y to the last, each from its own end. */
function pilotsOf(data: ValveData): PilotPort[] {
  return [
    ...(data.left.includes('pilot') ? [{ id: 'X', role: 'pilot', end: 'left' } as const] : []),
    ...(data.right.includes('pilot') ? [{ id: 'Y', role: 'pilot', end: 'right' } as const] : []),
  ];
}

function dependentOf(part: Part): DependentSpec {
  const data = valveOf(part);
  const { positions, rest } = data;
  const pilots = pilotsOf(data);
  const setting = readSi(part, LEAST);
  const shifts = pilots.map(({ id }): ShiftSpec => ({
    by: 'pressure',
    position: id === 'X' ? 0 : positions.length - 1,
    signals: pilots.map((other) => ({ port: other.id, factor: other.id === id ? 1 : -1 })),
    setting,
  }));
  const atRest = rest !== undefined && Number.isInteger(rest) && rest >= 0 && rest < positions.length ? { rest } : {};
  return { positions: positions.map((each) => each.name), ...atRest, shifts };
}

function checkPilots(data: ValveData): PartProblem[] {
  const problems = checkValve(data, ['pilot']);
  const operators = [...data.left, ...data.right];
  if (!operators.includes('pilot')) {
    problems.push({
      where: 'valve.left',
      what: 'No pilot is drawn, so nothing moves the valve.',
      remedy: 'Draw a pilot at one end or at both.',
    });
  }
  for (const operator of ['coil', 'lever', 'pedal', 'button', 'hand', 'roller'] as const) {
    if (!operators.includes(operator)) continue;
    problems.push({
      level: 'warning',
      where: 'valve.left',
      what: `A ${operator} is drawn, but pilot pressures alone move this valve here.`,
      remedy: 'Take a two-stage valve if a pilot stage commands it.',
    });
  }
  const taken = data.ports.filter(({ id }) => pilotsOf(data).some((pilot) => pilot.id === id));
  for (const { id } of taken) {
    problems.push({
      where: 'valve.ports',
      what: `A way is called ${id}, as the pilot port is.`,
      remedy: 'Give the way another letter.',
    });
  }
  return problems;
}

export const pilotValve: PartKind = {
  kind: 'pilot-valve',
  title: 'Pilot-operated directional valve',
  group: 'Direction',
  help: 'Its position follows from the pressures at X and Y in the same state; no input of the table.',
  words: ['hydraulically operated', 'pilot operated', 'spool valve', 'DCV'],
  prefix: 'V',
  settings: [LEAST, ...LOSS.all],
  readyMade: PILOT_FORMS,
  ports: (part) => [...valvePorts(valveOf(part)), ...pilotPorts(valveOf(part), pilotsOf(valveOf(part)), false)],
  elements: (part) => valveElements(valveOf(part), readLoss(part, LOSS)),
  dependent: dependentOf,
  draw: (part, look) => drawPiloted(valveOf(part), pilotsOf(valveOf(part)), false, look.position),
  bounds: (part) => pilotedBounds(valveOf(part), pilotsOf(valveOf(part)), false, isTurned(part)),
  reach: (part) => pilotedReach(valveOf(part), pilotsOf(valveOf(part)), false, isTurned(part)),
  check: (part) => (part.valve ? checkPilots(part.valve) : []),
};
