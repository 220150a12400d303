import type { NetActuator, Network } from '../../network/network.ts';
import type { EdgeSet } from './edges.ts';
import type { Field, Spreader } from './field.ts';
import { takeIn } from './reach.ts';
import type { Links, PathConditions, Reach } from './reach.ts';

/** What the two chambers of one actuator can do, one plane of the block each. */
export interface Chambers {
  /** Oil can leave chamber A / B without going through this actuator itself. */
  readonly exitA: Uint32Array;
  readonly exitB: Uint32Array;
  /** The same, also into lines under pump pressure. */
  readonly softExitA: Uint32Array;
  readonly softExitB: Uint32Array;
  readonly fillA: Uint32Array;
  readonly fillB: Uint32Array;
  /** Oil from chamber B can run into chamber A by open paths, and the reverse. */
  readonly fromBtoA: Uint32Array;
  readonly fromAtoB: Uint32Array;
}

export function chambersOf(
  index: number,
  actuator: NetActuator,
  net: Network,
  edges: EdgeSet,
  links: Links,
  conditions: PathConditions,
  r: Reach,
  s: Spreader,
): Chambers {
  const { a, b } = actuator;
  const { width } = s;
  const all = s.masks.slice(0, width);
  const none = new Uint32Array(width);
  const plane = (field: Field, line: number): Uint32Array => field.slice(line * width, (line + 1) * width);
  const at = (field: Field, line: number, w: number): number => (line < 0 ? 0 : (field[line * width + w] as number));

  // The shared searches also pass through this actuator itself. That can mislead only where one side
  // got its answer from the other one, or a single-acting cylinder from itself; there, and where the answer
  // matters, take that of a search without it. State by state, so that no state hangs on its neighbours.
  const apart = (
    shared: Field,
    plain: Field,
    matters: (w: number) => number,
    again: () => Field,
  ): [Uint32Array, Uint32Array] => {
    const misled = new Uint32Array(width);
    let any = 0;
    for (let w = 0; w < width; w++) {
      const [x, y] = [at(shared, a, w), at(shared, b, w)];
      const borrowed = b < 0 ? x & ~at(plain, a, w) : x & y & ~(at(plain, a, w) & at(plain, b, w));
      const bits = borrowed & matters(w);
      misled[w] = bits;
      any |= bits;
    }
    const sides: [Uint32Array, Uint32Array] = [plane(shared, a), b < 0 ? all : plane(shared, b)];
    if (any === 0) return sides;
    const found = again();
    for (const [side, line] of [a, b].entries()) {
      const words = sides[side] as Uint32Array;
      if (line < 0) continue;
      for (let w = 0; w < width; w++) {
        const bits = misled[w] as number;
        words[w] = ((words[w] as number) & ~bits) | (at(found, line, w) & bits);
      }
    }
    return sides;
  };

  const withoutMe = (gate?: Field): Field => {
    const field = r.toTank.slice();
    takeIn(net, conditions, s, field, index);
    s.spread(field, edges.backward, { links: links.pull, without: index, fromTank: true, ...(gate && { gate }) });
    return field;
  };
  const [exitA, exitB] = apart(
    r.exits,
    r.toTank,
    () => -1,
    () => withoutMe(r.notPressed),
  );
  const fed = (line: number, w: number): number => at(r.anyPressed, line, w);
  // Soft exits matter only where a fed actuator has no plain one.
  const stuck = (w: number): number =>
    (fed(a, w) & (b < 0 ? 0 : ~(exitB[w] as number))) | (fed(b, w) & ~(exitA[w] as number));
  const [softExitA, softExitB] = apart(r.softExits, r.toTank, stuck, () => withoutMe());
  // What fills a chamber matters where nothing feeds the actuator and something lets it go, and where it
  // is stuck but bleeds to tank.
  const free = (w: number): number =>
    ~fed(a, w) & ~fed(b, w) & (b < 0 ? -1 : (exitA[w] as number) | (exitB[w] as number));
  const bled = (w: number): number => stuck(w) & ((fed(a, w) & at(r.toTank, a, w)) | (fed(b, w) & at(r.toTank, b, w)));
  const [fillA, fillB] = apart(
    r.fills,
    r.plainFills,
    (w) => free(w) | bled(w),
    () => {
      const field = r.plainFills.slice();
      s.spread(field, edges.forward, { links: links.push, without: index, fromTank: true });
      return field;
    },
  );

  // Oil that can also run to tank needs no loop, so only states with both sides shut off from it count.
  const across = (from: number, to: number): Uint32Array => {
    if (from < 0 || to < 0) return none;
    if (from === to) return all;
    const field = s.field();
    let any = 0;
    for (let w = 0; w < width; w++) {
      const word = ~at(r.toTank, from, w) & ~at(r.toTank, to, w) & (all[w] as number);
      field[from * width + w] = word;
      any |= word;
    }
    if (any === 0) return none;
    s.spread(field, edges.forward, { gate: r.notToTank });
    return plane(field, to);
  };

  return {
    exitA,
    exitB,
    softExitA,
    softExitB,
    fillA,
    fillB,
    fromBtoA: across(b, a),
    fromAtoB: across(a, b),
  };
}
