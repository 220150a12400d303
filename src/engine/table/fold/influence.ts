import type { Network } from '../../../network/network.ts';
import type { Diagram, Diagrams } from '../../paths/diagrams/diagrams.ts';
import { ALL } from '../../paths/diagrams/diagrams.ts';

/** What the inputs have to do with a list of sets. */
export interface Support {
  /** Inputs that some combination depends on, rising. */
  readonly inputs: readonly number[];
  /** Per input its positions in groups that no set tells apart, each group rising. */
  readonly alike: readonly (readonly (readonly number[])[])[];
}

/**
 * Which inputs decide membership. Exact: an input has a node in a reduced diagram if and only if the set
 * depends on it, and two positions are alike if and only if they lead to the same child at every such node.
 */
export function supportOf(sets: Diagrams, list: readonly Diagram[]): Support {
  const levels = sets.order.length;
  // Per level the group of each position; groups only ever split.
  const groups = Array.from({ length: levels }, (_, level) => new Array<number>(sets.arity(level)).fill(0));
  const seen = new Set<Diagram>();
  const stack = [...list];
  for (let node = stack.pop(); node !== undefined; node = stack.pop()) {
    if (node <= ALL || seen.has(node)) continue;
    seen.add(node);
    const level = sets.level(node);
    const group = groups[level] as number[];
    const names = new Map<string, number>();
    for (let p = 0; p < group.length; p++) {
      const kid = sets.child(node, level, p);
      stack.push(kid);
      const name = `${group[p] as number} ${kid}`;
      if (!names.has(name)) names.set(name, names.size);
      group[p] = names.get(name) as number;
    }
  }
  const alike = sets.radices.map((radix, input) => {
    const group = groups[sets.levelOf[input] as number] as number[];
    const out: number[][] = [];
    for (let p = 0; p < radix; p++) {
      const at = group.indexOf(group[p] as number);
      if (at === p) out.push([p]);
      else out.find(([first]) => first === at)?.push(p);
    }
    return out;
  });
  return { inputs: alike.flatMap((parts, input) => (parts.length > 1 ? [input] : [])), alike };
}

/** Sets of things that have to do with each other. */
export class Unions {
  readonly #root: number[];

  constructor(size: number) {
    this.#root = Array.from({ length: size }, (_, i) => i);
  }

  find(one: number): number {
    let at = one;
    while (this.#root[at] !== at) {
      this.#root[at] = this.#root[this.#root[at] as number] as number;
      at = this.#root[at] as number;
    }
    return at;
  }

  /** The lower number stays the root. */
  join(a: number, b: number): void {
    const [x, y] = [this.find(a), this.find(b)];
    this.#root[Math.max(x, y)] = Math.min(x, y);
  }
}

/** What the oil of one pump or accumulator can get to, whatever the levers: a shared source ties verdicts together by its flow. */
export interface Fed {
  readonly lines: readonly number[];
  readonly inputs: readonly number[];
  readonly actuators: readonly number[];
}

/** Follows every path that some position opens, pressure valves and actuators included; tanks end the search. */
export function fedFrom(net: Network, start: number): Fed {
  const lines = new Set([start]);
  const inputs = new Set<number>();
  const actuators = new Set<number>();
  const queue = [start];
  const get = (line: number): void => {
    if (line < 0 || lines.has(line)) return;
    lines.add(line);
    queue.push(line);
  };
  /** What moves a dependent valve has a bearing on what it gates. */
  const follow = (dependent: number): void => {
    for (const shift of net.dependents[dependent]?.shifts ?? []) {
      if (shift.by === 'roller') {
        if (shift.actuator >= 0) actuators.add(shift.actuator);
        continue;
      }
      if (shift.input >= 0 && shift.input < net.inputs.length) inputs.add(shift.input);
      for (const { line } of shift.signals) get(line);
    }
  };
  for (let line = queue.pop(); line !== undefined; line = queue.pop()) {
    if (net.lines[line]?.tank) continue;
    for (const path of net.paths) {
      const on = path.from === line ? path.to : path.to === line && !path.oneWay ? path.from : -1;
      if (on < 0) continue;
      if (path.input >= net.inputs.length) follow(path.input - net.inputs.length);
      else if (path.input >= 0) inputs.add(path.input);
      get(on);
    }
    for (const { from, to } of [...net.reliefs, ...net.valves]) if (from === line) get(to);
    net.actuators.forEach(({ a, b }, i) => {
      if (a !== line && b !== line) return;
      actuators.add(i);
      get(a);
      get(b);
    });
  }
  return {
    lines: [...lines].filter((line) => line < net.shown && !net.lines[line]?.tank),
    inputs: [...inputs],
    actuators: [...actuators],
  };
}
