import type { Network } from '../../network/network.ts';
import type { BleedModel } from './bleed-model.ts';
import type { Held } from './pressure-state.ts';

/**
 * Levers that have to be moved before every line can have been open to tank. A lever counts if some line under
 * pressure has no way to tank with this lever where it stands and every other one wherever it serves best, so no
 * list of moves is shorter than their number.
 */
export class LeversNeeded {
  readonly #model: BleedModel;
  /** By lever and position: 1 = this line can still be opened to tank. */
  readonly #open: readonly (readonly Uint8Array[])[];

  constructor(model: BleedModel) {
    this.#model = model;
    this.#open = model.net.inputs.map(({ positions }, input) =>
      positions.map((_, position) => openable(model.net, model.points, input, position)),
    );
  }

  count(row: number, { lines }: Held): number {
    const { net, strides } = this.#model;
    const never = this.#model.neverOpen();
    let count = 0;
    this.#open.forEach((positions, input) => {
      const open = positions[Math.floor(row / (strides[input] as number)) % positions.length] as Uint8Array;
      for (let line = 0; line < net.shown; line++) {
        if (lines[line] !== 1 || never[line] === 1 || open[line] === 1) continue;
        count += 1;
        return;
      }
    });
    return count;
  }
}

/** Lines with a way to tank, the pumps being stopped, if this lever stands so; pilots and dependent valves as it suits. */
function openable(net: Network, points: readonly number[], input: number, position: number): Uint8Array {
  const back = net.lines.map((): number[] => []);
  for (const path of net.paths) {
    if (path.input === input && ((path.positions >>> position) & 1) === 0) continue;
    back[path.to]?.push(path.from);
    if (!path.oneWay) back[path.from]?.push(path.to);
  }
  const seen = new Uint8Array(net.lines.length);
  const queue: number[] = [];
  const reach = (line: number): void => {
    if (seen[line] === 1) return;
    seen[line] = 1;
    queue.push(line);
  };
  net.lines.forEach(({ tank }, line) => tank && reach(line));
  for (const pump of net.pumps) if (!pump.tightWhenStopped) reach(pump.outlet);
  points.forEach(reach);
  for (let head = 0; head < queue.length; head++) back[queue[head] as number]?.forEach(reach);
  return seen;
}
