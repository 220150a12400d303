import type { Part, ValveData } from '../circuit/model.ts';
import type { DependentSpec, PartKind, PartProblem, ShiftSpec } from './contract.ts';
import { valveInput } from './directional-valve.ts';
import { lossSettings, readLoss } from './losses.ts';
import { choiceSetting, quantitySetting, readChoice, readSi } from './settings.ts';
import { checkValve } from './valve-check.ts';
import { dataOf, TWO_STAGE_FORMS } from './valve-forms-dependent.ts';
import { isTurned } from './valve-drawing.ts';
import { valvePorts } from './valve-frame.ts';
import { valveElements } from './valve-paths.ts';
import { drawPiloted, pilotedBounds, pilotedReach, pilotPorts, type PilotPort } from './valve-pilots.ts';

const SUPPLY = choiceSetting(
  {
    id: 'pilotSupply',
    title: 'Pilot supply',
    help: 'Internal: from P of the valve. External: from port X.',
  },
  ['internal', 'external'],
  'internal',
);
const DRAIN = choiceSetting(
  {
    id: 'pilotDrain',
    title: 'Pilot drain',
    help: 'Internal: into T of the valve, whose pressure then stands against the pilot. External: from port Y.',
  },
  ['internal', 'external'],
  'internal',
);
const LEAST = quantitySetting(
  {
    id: 'leastPilot',
    title: 'Least pilot pressure',
    help: 'Pressure of the pilot supply, less that of the drain, that moves the main spool.',
  },
  'pressure',
  '5 bar',
  { min: '0.1 bar', max: '350 bar' },
);
const LOSS = lossSettings('100 L/min', '5 bar');
const DEFAULT = dataOf(TWO_STAGE_FORMS);

const valveOf = (part: Part): ValveData => part.valve ?? DEFAULT;
const startsWith = (data: ValveData, letters: string): string | undefined =>
  data.ports.find(({ id }) => letters.includes(id.charAt(0)))?.id;

function pilotsOf(part: Part): PilotPort[] {
  const { left, right } = valveOf(part);
  const first = left.includes('pilot') ? 'left' : 'right';
  const last = right.includes('pilot') ? 'right' : 'left';
  return [
    ...(readChoice(part, SUPPLY) === 'external' ? [{ id: 'X', role: 'pilot', end: first } as const] : []),
    ...(readChoice(part, DRAIN) === 'external' ? [{ id: 'Y', role: 'drain', end: last } as const] : []),
  ];
}

/** The main spool: it goes where the pilot stage leads as long as the pilot pressure is enough. */
function dependentOf(part: Part): DependentSpec {
  const data = valveOf(part);
  const { positions, rest } = valveInput(data);
  const supply = readChoice(part, SUPPLY) === 'external' ? 'X' : startsWith(data, 'P');
  const drain = readChoice(part, DRAIN) === 'external' ? 'Y' : startsWith(data, 'TR');
  const shifts = positions.flatMap((_, position): ShiftSpec[] =>
    position === rest || supply === undefined
      ? []
      : [
          {
            by: 'pressure',
            position,
            stage: [position],
            signals: [{ port: supply, factor: 1 }, ...(drain === undefined ? [] : [{ port: drain, factor: -1 }])],
            setting: readSi(part, LEAST),
          },
        ],
  );
  return { called: 'main spool', positions, ...(rest !== undefined && { rest }), shifts };
}

function checkStages(part: Part): PartProblem[] {
  if (!part.valve) return [];
  const problems = checkValve(part.valve, ['pilot']);
  const operators = [...part.valve.left, ...part.valve.right];
  if (!operators.includes('pilot')) {
    problems.push({
      level: 'warning',
      where: 'valve.left',
      what: 'No pilot stage is drawn.',
      remedy: 'Draw a pilot between the box and what commands it.',
    });
  }
  if (operators.every((each) => ['pilot', 'spring', 'detent', 'roller'].includes(each))) {
    problems.push({
      level: 'warning',
      where: 'valve.left',
      what: 'Nothing is drawn that commands the pilot stage; the table takes it as moved by hand.',
      remedy: 'Draw a coil or a lever, or take a pilot-operated valve.',
    });
  }
  if (readChoice(part, SUPPLY) === 'internal' && startsWith(part.valve, 'P') === undefined) {
    problems.push({
      where: 'settings.pilotSupply',
      what: 'The pilot supply is internal, but the valve has no port P.',
      remedy: 'Set the pilot supply to external.',
    });
  }
  for (const { id } of part.valve.ports.filter((port) => ['X', 'Y'].includes(port.id))) {
    problems.push({
      where: 'valve.ports',
      what: `A way is called ${id}, as a pilot port is.`,
      remedy: 'Give the way another letter.',
    });
  }
  return problems;
}

export const twoStageValve: PartKind = {
  kind: 'two-stage-valve',
  title: 'Two-stage directional valve',
  group: 'Direction',
  help: 'A coil or lever moves its pilot stage, and pilot pressure the main spool: without enough of it the main spool stays at rest.',
  words: ['solenoid controlled pilot operated', 'electrohydraulic', 'pilot stage', 'main stage', 'DCV'],
  prefix: 'V',
  settings: [SUPPLY, DRAIN, LEAST, ...LOSS.all],
  readyMade: TWO_STAGE_FORMS,
  ports: (part) => [...valvePorts(valveOf(part)), ...pilotPorts(valveOf(part), pilotsOf(part), true)],
  elements: (part) => valveElements(valveOf(part), readLoss(part, LOSS)),
  input: (part) => valveInput(valveOf(part)),
  dependent: dependentOf,
  draw: (part, look) => drawPiloted(valveOf(part), pilotsOf(part), true, look.position),
  bounds: (part) => pilotedBounds(valveOf(part), pilotsOf(part), true, isTurned(part)),
  reach: (part) => pilotedReach(valveOf(part), pilotsOf(part), true, isTurned(part)),
  check: checkStages,
};
