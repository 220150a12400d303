import type { Network } from '../../../network/network.ts';

/**
 * Order of the inputs for decision diagrams: those that share lines close together, since the sets of
 * what lies between them then stay small. FORCE (Aloul, Markov, Sakallah 2003: every input moves to the
 * centre of gravity of the groups it belongs to), started from two orders; the least total span wins.
 */
export function orderInputs(net: Network): number[] {
  const groups = groupsOf(net);
  const own = net.inputs.map((_, i) => i);
  const starts = [own, walk(own, groups)];
  let best = own;
  let least = Infinity;
  for (const start of starts) {
    let order = start;
    for (let round = 0; round <= 30; round++) {
      const cost = span(order, groups);
      if (cost < least) {
        least = cost;
        best = order;
      }
      const next = force(order, groups);
      if (next.every((input, i) => input === order[i])) break;
      order = next;
    }
  }
  return best;
}

/**
 * Inputs that have a path at the same line, lines that are always joined being one, and those that a dependent valve
 * may join. A tank is no such line: oil does not come back out of it.
 */
function groupsOf(net: Network): number[][] {
  const root = net.lines.map((_, line) => line);
  const find = (line: number): number => {
    let at = line;
    while (root[at] !== at) at = root[at] as number;
    return at;
  };
  for (const path of net.paths) {
    const commanded = path.input >= 0 && path.input < net.inputs.length;
    if (commanded || path.oneWay || net.lines[path.from]?.tank || net.lines[path.to]?.tank) continue;
    root[find(path.from)] = find(path.to);
  }
  const members = new Map<number, Set<number>>();
  for (const path of net.paths) {
    if (path.input < 0 || path.input >= net.inputs.length) continue;
    for (const line of [path.from, path.to]) {
      if (net.lines[line]?.tank) continue;
      const set = members.get(find(line)) ?? new Set<number>();
      set.add(path.input);
      members.set(find(line), set);
    }
  }
  return [...members.values()].filter((set) => set.size > 1).map((set) => [...set]);
}

/** Neighbours one after another, from the first input on. */
function walk(inputs: readonly number[], groups: readonly (readonly number[])[]): number[] {
  const near = inputs.map((): number[][] => []);
  for (const group of groups) for (const input of group) near[input]?.push([...group]);
  const seen = new Set<number>();
  const order: number[] = [];
  for (const start of inputs) {
    const stack = [start];
    for (let input = stack.pop(); input !== undefined; input = stack.pop()) {
      if (seen.has(input)) continue;
      seen.add(input);
      order.push(input);
      // The smallest group, that is the closest tie, comes off the stack first.
      const ties = [...(near[input] ?? [])].sort((a, b) => b.length - a.length);
      for (const group of ties) for (const other of [...group].reverse()) if (!seen.has(other)) stack.push(other);
    }
  }
  return order;
}

function placesOf(order: readonly number[]): number[] {
  const places = new Array<number>(order.length).fill(0);
  order.forEach((input, place) => (places[input] = place));
  return places;
}

function span(order: readonly number[], groups: readonly (readonly number[])[]): number {
  const places = placesOf(order);
  return groups.reduce((sum, group) => {
    const at = group.map((input) => places[input] as number);
    return sum + Math.max(...at) - Math.min(...at);
  }, 0);
}

function force(order: readonly number[], groups: readonly (readonly number[])[]): number[] {
  const places = placesOf(order);
  const sum = new Array<number>(order.length).fill(0);
  const ties = new Array<number>(order.length).fill(0);
  for (const group of groups) {
    const centre = group.reduce((total, input) => total + (places[input] as number), 0) / group.length;
    for (const input of group) {
      sum[input] = (sum[input] as number) + centre;
      ties[input] = (ties[input] as number) + 1;
    }
  }
  const wish = (input: number): number =>
    ties[input] === 0 ? (places[input] as number) : (sum[input] as number) / (ties[input] as number);
  return [...order].sort((a, b) => wish(a) - wish(b) || (places[a] as number) - (places[b] as number));
}
