import type { Box } from '../base/points.ts';
import type { Primitive } from '../base/primitives.ts';
import type { ValveData } from '../circuit/model.ts';
import type { PortSpec } from './contract.ts';
import { boxOf, hungText, leftOpen, port, stroke, type Pair } from './shapes.ts';
import { activeOf, drawValve, valveBounds, valveReach } from './valve-drawing.ts';
import { frameOf, HALF_HEIGHT } from './valve-frame.ts';
import { placeOperators } from './valve-operators.ts';

/** A pilot or drain port: it stands still below the strip, and a dashed line leads from it to where the operator is. */
export interface PilotPort {
  readonly id: 'X' | 'Y';
  readonly role: 'pilot' | 'drain';
  readonly end: 'left' | 'right';
}

/** Height of the ports, and of the run under a strip that has slid out over its port. */
const PORT_Y = HALF_HEIGHT + 1;
const RUN_Y = HALF_HEIGHT + 0.6;

interface Spot {
  readonly at: Pair;
  /** Where the dashed line leaves the operator, at rest. */
  readonly from: Pair;
  readonly down: boolean;
}

/** `staged`: the pilot is a stage in a box of its own and its lines leave downwards. `second`: another port of this end stands further in. */
function spotOf(data: ValveData, end: 'left' | 'right', staged: boolean, second: boolean): Spot {
  const { width } = frameOf(data);
  const active = activeOf(data, undefined);
  const sign = end === 'left' ? -1 : 1;
  const edge = (end === 'left' ? active + 0.5 : data.positions.length - active - 0.5) * width;
  const { placed } = placeOperators(data[end], staged);
  const pilot = placed.find((each) => each.operator === 'pilot') ?? { u: 0, y: 0 };
  if (staged) {
    const u = Math.ceil(edge + pilot.u + 1 + (second ? 2 : 0));
    return { at: [sign * u, PORT_Y], from: [sign * (edge + pilot.u + (second ? 1.5 : 1)), 1], down: true };
  }
  const reach = edge + pilot.u + 2.8;
  return {
    at: [sign * Math.ceil(reach + (pilot.y === 0 ? 0 : 0.2)), PORT_Y],
    from: [sign * reach, pilot.y],
    down: false,
  };
}

const spotsOf = (data: ValveData, ports: readonly PilotPort[], staged: boolean): [PilotPort, Spot][] =>
  ports.map((each, i) => [
    each,
    spotOf(
      data,
      each.end,
      staged,
      ports.slice(0, i).some((other) => other.end === each.end),
    ),
  ]);

export function pilotPorts(data: ValveData, ports: readonly PilotPort[], staged: boolean): PortSpec[] {
  return spotsOf(data, ports, staged).map(([{ id, role }, { at }]) =>
    port(
      id,
      at,
      'down',
      role,
      role === 'pilot'
        ? leftOpen(
            'caution',
            `Pilot port ${id} has no line; it counts as plugged, so it never shifts the valve.`,
            `Connect ${id} to the line that is to move the valve.`,
          )
        : leftOpen(
            'caution',
            `Pilot drain ${id} has no line; it counts as plugged.`,
            `Lead ${id} to the tank by a line of its own.`,
          ),
    ),
  );
}

/** The strip with its dashed pilot lines. */
export function drawPiloted(
  data: ValveData,
  ports: readonly PilotPort[],
  staged: boolean,
  position?: number,
): Primitive[] {
  const slid = (activeOf(data, undefined) - activeOf(data, position)) * frameOf(data).width;
  const lines = spotsOf(data, ports, staged).flatMap(([{ id }, { at, from, down }]) => {
    const [x] = at;
    const here: Pair = [from[0] + slid, from[1]];
    const outside = Math.abs(x) >= Math.abs(here[0]) && Math.sign(x) === Math.sign(here[0]);
    const way: Pair[] =
      here[0] === x
        ? [here, at]
        : outside && !down
          ? [here, [x, here[1]], at]
          : down && outside && Math.abs(slid) < 0.01
            ? [here, [here[0], 1.6], [x, 1.6], at]
            : [here, [here[0], RUN_Y], [x, RUN_Y], at];
    // Clear of the run under a strip that has slid out over the port.
    const letter = hungText(id, [x + (x < 0 ? -0.6 : 0.6), RUN_Y + 0.3], 1.2, x < 0 ? 'end' : 'start');
    return [stroke('pilot', ...way), letter];
  });
  return [...drawValve(data, position, staged), ...lines];
}

const down = (box: Box, ports: readonly PilotPort[], spots: readonly [PilotPort, Spot][]): Box => {
  if (ports.length === 0) return box;
  const left = Math.min(box.x, ...spots.map(([, { at }]) => at[0]));
  const right = Math.max(box.x + box.width, ...spots.map(([, { at }]) => at[0]));
  return boxOf(left, box.y, right - left, PORT_Y - box.y);
};

export const pilotedBounds = (data: ValveData, ports: readonly PilotPort[], staged: boolean, turned: boolean): Box =>
  down(valveBounds(data, staged, turned), ports, spotsOf(data, ports, staged));

export const pilotedReach = (data: ValveData, ports: readonly PilotPort[], staged: boolean, turned: boolean): Box =>
  down(valveReach(data, staged, turned), ports, spotsOf(data, ports, staged));
