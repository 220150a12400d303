import type { Part, ValveData } from '../circuit/model.ts';
import type { DependentSpec, PartKind, PartProblem, RollerTrip } from './contract.ts';
import { lossSettings, readLoss } from './losses.ts';
import { actuatorSetting, choiceSetting, quantitySetting, readActuator, readChoice, readSi } from './settings.ts';
import { checkValve } from './valve-check.ts';
import { drawValve, isTurned, valveBounds, valveReach } from './valve-drawing.ts';
import { dataOf, ROLLER_FORMS } from './valve-forms-dependent.ts';
import { valvePorts } from './valve-frame.ts';
import { valveElements } from './valve-paths.ts';

const ACTUATOR = actuatorSetting({
  id: 'actuator',
  title: 'Tripped by',
  help: 'Actuator whose cam runs on to the roller.',
});
const TRIPS = choiceSetting(
  {
    id: 'trips',
    title: 'Tripped when',
    help: 'Where the actuator stands when it has pushed the roller down. Between its stops it is not tripped unless a travel says so.',
  },
  ['out', 'in', 'from a travel outwards', 'up to a travel'],
  'out',
);
const TRAVEL = quantitySetting(
  { id: 'travel', title: 'Travel', help: 'From the inner stop; counts only where the roller is tripped by a travel.' },
  'length',
  '100 mm',
  { min: '0 mm', max: '100000 mm' },
);
const LOSS = lossSettings('40 L/min', '5 bar');
const DEFAULT = dataOf(ROLLER_FORMS);

const valveOf = (part: Part): ValveData => part.valve ?? DEFAULT;

/** The roller's end of the strip is what it pushes to the ports. */
function dependentOf(part: Part): DependentSpec {
  const { positions, rest, left } = valveOf(part);
  const position = left.includes('roller') ? 0 : positions.length - 1;
  const travel = readSi(part, TRAVEL);
  const trips = readChoice(part, TRIPS);
  const trip: RollerTrip =
    trips === 'in' || trips === 'out'
      ? { at: trips }
      : trips === 'up to a travel'
        ? { upTo: travel }
        : { from: travel };
  const atRest = rest !== undefined && Number.isInteger(rest) && rest >= 0 && rest < positions.length ? { rest } : {};
  return {
    positions: positions.map((each) => each.name),
    ...atRest,
    shifts: [{ by: 'roller', position, actuator: readActuator(part, ACTUATOR), trip }],
  };
}

function checkRoller(part: Part): PartProblem[] {
  const data = valveOf(part);
  const problems = part.valve ? checkValve(part.valve, ['roller']) : [];
  if (![...data.left, ...data.right].includes('roller')) {
    problems.push({
      where: 'valve.left',
      what: 'No roller is drawn, so nothing moves the valve.',
      remedy: 'Draw a roller at one end.',
    });
  }
  return problems;
}

export const rollerValve: PartKind = {
  kind: 'roller-valve',
  title: 'Roller valve',
  group: 'Direction',
  help: 'An actuator pushes its roller down at the end of its stroke or from a travel on; between the stops it is not tripped.',
  words: ['cam valve', 'limit valve', 'deceleration valve', 'mechanically operated', 'trip'],
  prefix: 'V',
  settings: [ACTUATOR, TRIPS, TRAVEL, ...LOSS.all],
  readyMade: ROLLER_FORMS,
  ports: (part) => valvePorts(valveOf(part)),
  elements: (part) => valveElements(valveOf(part), readLoss(part, LOSS)),
  dependent: dependentOf,
  draw: (part, look) => drawValve(valveOf(part), look.position),
  bounds: (part) => valveBounds(valveOf(part), false, isTurned(part)),
  reach: (part) => valveReach(valveOf(part), false, isTurned(part)),
  check: checkRoller,
};
