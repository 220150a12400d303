import type { Network } from '../../network/network.ts';
import type { SettledBlock } from './block.ts';
import type { Adjacency, EdgeSet } from './edges.ts';
import type { Field } from './field.ts';
import { sourceLines } from './reach.ts';
import type { PathConditions } from './reach.ts';

/** Which lines really carry oil from a source or a moving actuator to where it is taken. */
export interface Carrying {
  /** Pump oil on its way to a moving chamber. */
  readonly working: Field;
  /** Displaced oil on its way from one actuator into another. */
  readonly displaced: Field;
}

export function carryingLines(net: Network, edges: EdgeSet, conditions: PathConditions, block: SettledBlock): Carrying {
  const { spreader: s, width, motion, reach: r } = block;
  const taken = s.field();
  const ends = s.field();
  const intoDisplaced = s.field();
  net.actuators.forEach((actuator, i) => {
    const out = motion.out[i] as Uint32Array;
    const inward = motion.in[i] as Uint32Array;
    const displaced = motion.displaced[i] as Uint32Array;
    for (let w = 0; w < width; w++) {
      const goOut = out[w] as number;
      const goIn = inward[w] as number;
      const byPump = ~(displaced[w] as number);
      orAt(taken, actuator.a * width + w, goOut & byPump);
      orAt(intoDisplaced, actuator.a * width + w, goOut & ~byPump);
      orAt(ends, actuator.a * width + w, goOut | goIn);
      if (actuator.b < 0) continue;
      orAt(taken, actuator.b * width + w, goIn & byPump);
      orAt(intoDisplaced, actuator.b * width + w, goIn & ~byPump);
      orAt(ends, actuator.b * width + w, goOut | goIn);
    }
  });
  for (const line of sourceLines(net, conditions)) if (line >= 0) s.seed(ends, line);

  s.spread(taken, edges.backward, { gate: r.fromSource });
  pruneDeadEnds(taken, ends, neighboursOf(edges), block);

  s.spread(intoDisplaced, edges.backward, { gate: r.notFreeToTank });
  const displaced = intoDisplaced;
  for (let i = 0; i < displaced.length; i++) displaced[i] = (displaced[i] as number) & (motion.pushed[i] as number);
  return { working: taken, displaced };
}

interface Neighbour {
  readonly line: number;
  readonly masks: readonly number[];
}

const KNOWN = new WeakMap<EdgeSet, Neighbour[][]>();

function neighboursOf(edges: EdgeSet): Neighbour[][] {
  const known = KNOWN.get(edges);
  if (known) return known;
  const made = neighbours(edges.forward.start.length - 1, edges.forward);
  KNOWN.set(edges, made);
  return made;
}

/** Lines joined to each line by a path in either direction, with the masks of all those paths. */
function neighbours(lines: number, edges: Adjacency): Neighbour[][] {
  const found = Array.from({ length: lines }, () => new Map<number, Set<number>>());
  const note = (from: number, to: number, mask: number): void => {
    const map = found[from] as Map<number, Set<number>>;
    const masks = map.get(to) ?? new Set<number>();
    masks.add(mask);
    map.set(to, masks);
  };
  for (let line = 0; line < lines; line++) {
    for (let e = edges.start[line] as number; e < (edges.start[line + 1] as number); e++) {
      note(line, edges.to[e] as number, edges.mask[e] as number);
      note(edges.to[e] as number, line, edges.mask[e] as number);
    }
  }
  return found.map((map) => [...map].map(([line, masks]) => ({ line, masks: [...masks] })));
}

/** A line that is no end itself and has fewer than two open neighbours that carry oil carries none. */
function pruneDeadEnds(field: Field, ends: Field, near: readonly (readonly Neighbour[])[], block: SettledBlock): void {
  const { spreader: s, width } = block;
  const queue: number[] = near.map((_, line) => line);
  const queued = new Uint8Array(near.length).fill(1);
  while (queue.length > 0) {
    const line = queue.pop() as number;
    queued[line] = 0;
    let lost = 0;
    for (let w = 0; w < width; w++) {
      const now = field[line * width + w] as number;
      if (now === 0) continue;
      let once = 0;
      let twice = 0;
      for (const { line: other, masks } of near[line] as readonly Neighbour[]) {
        let open = 0;
        for (const mask of masks) open |= s.masks[mask * width + w] as number;
        open &= field[other * width + w] as number;
        twice |= once & open;
        once |= open;
      }
      const keep = now & (twice | (ends[line * width + w] as number));
      lost |= now ^ keep;
      field[line * width + w] = keep;
    }
    if (lost === 0) continue;
    for (const { line: other } of near[line] as readonly Neighbour[]) {
      if (queued[other] === 1) continue;
      queued[other] = 1;
      queue.push(other);
    }
  }
}

function orAt(field: Field, index: number, bits: number): void {
  field[index] = (field[index] as number) | bits;
}
