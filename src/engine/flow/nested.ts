import { HI, WIDTH } from './assemble.ts';
import { newtonOnFlows } from './pilot-newton.ts';
import { couple, gap, sense, settleAt } from './pilotage.ts';
import type { Pilotage } from './pilotage.ts';
import type { Outcome } from './workspace.ts';

const HALVINGS = 60;
/** Newton iterations that the search may take in all: about a fifth of a second. */
const SPEND = 50_000;
/** Gap of an inner valve that counts as none, as a share of the flow scale: the coupled iteration does the rest. */
const NEARLY = 1e-7;

/**
 * The last valve's flow is bracketed between shut and `most` while the others are made to agree at each of its
 * values, by Newton's method or by a bracket of their own. What a pilot asks and what passes always cross between
 * the two ends, so that this finds an answer wherever those of the inner valves hang together.
 */
export function nestBrackets(at: Pilotage, most: number): Outcome {
  at.h.fill(0);
  return agree(at, at.h.length, most, at.work.counts.iterations + SPEND);
}

function agree(at: Pilotage, count: number, most: number, end: number): Outcome {
  const { system, valves, h, scale, work } = at;
  const inner: Pilotage = {
    ...at,
    valves: valves.subarray(0, count),
    h: h.subarray(0, count),
    open: at.open.subarray(0, count),
  };
  if (count === 0) return settleAt(inner);
  const quick = newtonOnFlows(inner);
  if (quick !== 'stuck') return quick;
  const v = count - 1;
  const bound = WIDTH * (system.pilots.branch[valves[v] as number] as number) + HI;
  const below = new Float64Array(system.n);
  const above = new Float64Array(system.n);
  let low = 0;
  let high = most;
  let excessLow = 0;
  let excessHigh = 0;
  for (let round = 0; round < HALVINGS && work.counts.iterations < end; round++) {
    h[v] = round === 0 ? 0 : round === 1 ? most : low > 0 ? 0.5 * (low + high) : Math.min(scale, 0.1 * high);
    if (round > 1 && (h[v] === low || h[v] === high)) break;
    system.law[bound] = h[v] as number;
    const outcome = agree(at, count - 1, most, end);
    if (outcome === 'cancelled') return outcome;
    sense(at);
    const excess = gap(at, v);
    if (outcome === 'converged' && Math.abs(excess) <= 1e-10 * scale) return 'converged';
    if (excess > 0) {
      high = h[v] as number;
      excessHigh = excess;
      keep(above, work.now.p);
    } else {
      low = h[v] as number;
      excessLow = excess;
      keep(below, work.now.p);
    }
  }
  if (count < h.length) return Math.min(excessHigh, -excessLow) <= NEARLY * scale ? 'converged' : 'stuck';
  for (const share of [excessLow / (excessLow - excessHigh), 0, 1, 0.5]) {
    for (let i = 0; i < system.n; i++)
      work.now.p[i] = (below[i] as number) + share * ((above[i] as number) - (below[i] as number));
    const found = couple(at);
    if (found !== 'stuck') return found;
  }
  return 'stuck';
}

function keep(into: Float64Array, p: Float64Array): void {
  for (let i = 0; i < into.length; i++) into[i] = p[i] as number;
}
