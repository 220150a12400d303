import type { Operator, Part, ValveData } from '../circuit/model.ts';
import type { InputSpec, PartKind } from './contract.ts';
import { lossSettings, readLoss } from './losses.ts';
import { ratingSetting, readRating, TANK_PORT_RATING } from './ratings.ts';
import { checkValve } from './valve-check.ts';
import { drawValve, isTurned, valveBounds, valveReach } from './valve-drawing.ts';
import { DEFAULT_VALVE, VALVE_FORMS } from './valve-forms.ts';
import { valvePorts } from './valve-frame.ts';
import { valveCrossing, valveElements } from './valve-paths.ts';

const LOSS = lossSettings('40 L/min', '5 bar');
const RATING = ratingSetting('350 bar');

export const valveOf = (part: Part): ValveData => part.valve ?? DEFAULT_VALVE;

/** What a person or a controller moves it by; coils before hands. */
const COMMANDS: readonly (readonly [Operator, InputSpec['by']])[] = [
  ['coil', 'coil'],
  ['lever', 'lever'],
  ['pedal', 'pedal'],
  ['button', 'button'],
  ['hand', 'hand'],
];

export function valveInput(data: ValveData): InputSpec {
  const { left, right, positions, rest, coils } = data;
  const by = COMMANDS.find(([operator]) => left.includes(operator) || right.includes(operator))?.[1] ?? 'hand';
  // A rest position that does not exist is reported by the check and must not lead the engines astray.
  const atRest = rest !== undefined && Number.isInteger(rest) && rest >= 0 && rest < positions.length ? { rest } : {};
  return { positions: positions.map((each) => each.name), ...atRest, by, coils: by === 'coil' ? (coils ?? []) : [] };
}

export const directionalValve: PartKind = {
  kind: 'directional-valve',
  title: 'Directional valve',
  group: 'Direction',
  help: 'Joins and shuts its ports by position. Ways, positions, paths and operators are free. One input of the table.',
  words: ['DCV', 'spool valve', 'control valve', 'way valve'],
  prefix: 'V',
  settings: [...LOSS.all, RATING, TANK_PORT_RATING],
  readyMade: VALVE_FORMS,
  ports: (part) => valvePorts(valveOf(part)),
  ratings: (part) => {
    const returns = new Set(valvePorts(valveOf(part)).flatMap(({ id, role }) => (role === 'return' ? [id] : [])));
    const others = valvePorts(valveOf(part)).flatMap(({ id }) => (returns.has(id) ? [] : [id]));
    return [readRating(part, RATING, others), readRating(part, TANK_PORT_RATING, [...returns], true)];
  },
  elements: (part) => valveElements(valveOf(part), readLoss(part, LOSS)),
  input: (part) => ({ ...valveInput(valveOf(part)), crossing: valveCrossing(valveOf(part), readLoss(part, LOSS)) }),
  draw: (part, look) => drawValve(valveOf(part), look.position),
  bounds: (part) => valveBounds(valveOf(part), false, isTurned(part)),
  reach: (part) => valveReach(valveOf(part), false, isTurned(part)),
  check: (part) =>
    part.valve
      ? checkValve(part.valve)
      : [
          {
            level: 'warning',
            where: 'valve',
            what: 'The valve has no data of its own; it is taken as a 4/3 lever valve with all ports shut.',
            remedy: 'Give its ports, positions and operators.',
          },
        ],
};
