import { formatQuantity } from '../../base/units.ts';
import type { UnitSystem } from '../../base/units.ts';
import { pressureKnown } from '../state/assumed.ts';
import { sayPressure, saySpeed } from '../state/figure-texts.ts';
import type { Subject } from '../state/session.svelte.ts';
import type { Conditions, Explanation, RowNumbers, StateTable } from '../../worker/client.ts';

/** What the verdict stands on: `Holds for any values, between its stops.` Undefined for lines. */
export function sayStanding(
  explanation: Explanation,
  table: StateTable,
  { of, key }: Subject,
  places: Conditions['places'],
  assumed: boolean,
): string | undefined {
  if (of === 'line' || of === 'dependent') return undefined;
  const reason = (of === 'actuator' ? explanation.actuators : explanation.pumps).find(({ part }) => part === key);
  if (!reason) return undefined;
  const words = reason.onValues
    ? `Rests on ${assumed ? 'entered and assumed' : 'entered'} values`
    : 'Holds for any values';
  const linear = table.data.actuators.some(({ part, motion }) => part === key && motion === 'linear');
  if (!linear) return `${words}.`;
  const place = places?.[key];
  return `${words}, ${place === undefined ? 'between its stops' : `at its ${place === 'in' ? 'inner' : 'outer'} stop`}.`;
}

/** The figures of the subject; the steps give them in metric units. */
export function sayFigures(
  table: StateTable,
  numbers: RowNumbers,
  { of, key }: Subject,
  units: UnitSystem,
): string | undefined {
  if (numbers.status !== 'solved' || of === 'dependent') return undefined;
  const flow = (si: number): string => formatQuantity(si, 'flow', units, { digits: 2 });
  const pressureIn = (line: number): string | undefined => {
    const pressure = numbers.lines[line];
    return pressure === undefined || !pressureKnown(table, line, numbers.row)
      ? undefined
      : sayPressure(pressure, units);
  };
  if (of === 'pump') {
    const pump = numbers.pumps[table.data.pumps.findIndex(({ part }) => part === key)];
    return pump && `${sayPressure(pump.pressure, units)}, ${flow(pump.delivered)}`;
  }
  if (of === 'line') {
    return pressureIn(table.data.lines.findIndex(({ name }) => name === key));
  }
  const index = table.data.actuators.findIndex(({ part }) => part === key);
  const actuator = numbers.actuators[index];
  const motion = table.data.actuators[index]?.motion;
  if (!actuator || !motion) return undefined;
  const sides = ['A', 'B'].flatMap((port) => {
    const pressure = pressureIn(table.data.lines.findIndex(({ ports }) => ports.includes(`${key}.${port}`)));
    return pressure === undefined ? [] : [`${port} ${pressure}`];
  });
  const speed = saySpeed(actuator.speed, motion, units);
  const said = [...(speed === undefined ? [] : [speed, flow(actuator.flow)]), ...sides];
  return said.length > 0 ? said.join(', ') : undefined;
}
