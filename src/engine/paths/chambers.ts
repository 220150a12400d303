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
  // got its answer from the other one, or a single-acting cylinder from itself; there, search again
  // without it.
  const misled = (field: Field, plain: Field, matters: (w: number) => number): boolean => {
    for (let w = 0; w < width; w++) {
      const [x, y] = [at(field, a, w), at(field, b, w)];
      const borrowed = b < 0 ? x & ~at(plain, a, w) : x & y & ~(at(plain, a, w) & at(plain, b, w));
      if ((borrowed & matters(w)) !== 0) return true;
    }
    return false;
  };

  let { exits, softExits, fills } = r;
  const withoutMe = (gate?: Field): Field => {
    const field = r.toTank.slice();
    takeIn(net, conditions, s, field, index);
    s.spread(field, edges.backward, { links: links.pull, without: index, ...(gate && { gate }) });
    return field;
  };
  if (misled(exits, r.toTank, () => -1)) exits = withoutMe(r.notPressed);
  // Soft exits matter only where a fed actuator has no plain one.
  const stuck = (w: number): number =>
    (at(r.anyPressed, a, w) & (b < 0 ? 0 : ~at(exits, b, w))) | (at(r.anyPressed, b, w) & ~at(exits, a, w));
  if (misled(softExits, r.toTank, stuck)) softExits = withoutMe();
  // What fills a chamber matters only where nothing feeds the actuator and something lets it go.
  const free = (w: number): number =>
    ~at(r.anyPressed, a, w) & ~at(r.anyPressed, b, w) & (b < 0 ? -1 : at(exits, a, w) | at(exits, b, w));
  if (misled(fills, r.plainFills, free)) {
    fills = r.plainFills.slice();
    s.spread(fills, edges.forward, { links: links.push, without: index, fromTank: true });
  }

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
    exitA: plane(exits, a),
    exitB: b < 0 ? all : plane(exits, b),
    softExitA: plane(softExits, a),
    softExitB: b < 0 ? all : plane(softExits, b),
    fillA: plane(fills, a),
    fillB: b < 0 ? all : plane(fills, b),
    fromBtoA: across(b, a),
    fromAtoB: across(a, b),
  };
}
