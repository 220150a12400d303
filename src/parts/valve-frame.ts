import type { ValveData } from '../circuit/model.ts';
import type { PortSpec } from './contract.ts';
import { leftOpen, port, type LeftOpen, type Pair } from './shapes.ts';

/** Where the ports of a valve box stand: 2 M apart, the middle of the box at (0, 0), so turning and flipping keep it in place. */
export const HALF_HEIGHT = 2;

const along = (count: number): number[] => Array.from({ length: count }, (_, index) => 2 * index - (count - 1));

export interface Frame {
  /** Width of one box. */
  readonly width: number;
  readonly places: ReadonlyMap<string, Pair>;
}

export function frameOf(data: ValveData): Frame {
  const top = data.ports.filter((each) => each.side === 'top');
  const bottom = data.ports.filter((each) => each.side === 'bottom');
  const most = Math.max(top.length, bottom.length);
  // A lone port faces the first one of a pair, so that P–A of a 3/2 valve is drawn upright.
  const xs = (count: number): number[] => (count === 1 && most === 2 ? [-1] : along(count));
  const places = new Map<string, Pair>();
  const put = (ports: readonly { id: string }[], y: number): void => {
    const x = xs(ports.length);
    ports.forEach((each, index) => places.set(each.id, [x[index] as number, y]));
  };
  put(top, -HALF_HEIGHT);
  put(bottom, HALF_HEIGHT);
  return { width: 2 * Math.max(2, most), places };
}

const ROLES: Readonly<Record<string, PortSpec['role']>> = {
  P: 'supply',
  T: 'return',
  R: 'return',
  A: 'working',
  B: 'working',
  C: 'working',
  X: 'pilot',
  Y: 'drain',
  L: 'drain',
  M: 'measure',
};

function openOf(id: string): LeftOpen {
  switch (id.charAt(0)) {
    case 'P':
      return leftOpen(
        'caution',
        `Port ${id} of the valve has no supply; it counts as plugged.`,
        `Connect ${id} to a pump line, or plug it on purpose.`,
      );
    case 'T':
    case 'R':
      return leftOpen(
        'caution',
        `Port ${id} of the valve has no return; it counts as plugged, so nothing can leave through it.`,
        `Lead ${id} to a tank, or plug it on purpose.`,
      );
    case 'C':
      return leftOpen(
        'caution',
        `Carry-over port ${id} has no line; it counts as plugged, so at rest the flow cannot pass through.`,
        'Lead C1 to the pump or the section before, C2 to the next section or the tank.',
      );
    case 'X':
      return leftOpen(
        'caution',
        `Pilot port ${id} has no line; it counts as plugged.`,
        `Connect ${id} to the line that is to move the valve.`,
      );
    default:
      return leftOpen(
        'note',
        `Port ${id} of the valve has no line; it counts as plugged.`,
        `Connect ${id}, or put a plug on it to say that this is meant.`,
      );
  }
}

export function valvePorts(data: ValveData): PortSpec[] {
  const { places } = frameOf(data);
  return data.ports.map(({ id, side }) =>
    port(id, places.get(id) as Pair, side === 'top' ? 'up' : 'down', ROLES[id.charAt(0)] ?? 'working', openOf(id)),
  );
}
