import type { NetActuator, Network } from '../../network/network.ts';
import type { EdgeSet } from './edges.ts';
import { complement } from './field.ts';
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
  const all = s.masks.slice(0, s.width);
  const none = new Uint32Array(s.width);
  const plane = (field: Field, line: number): Uint32Array => field.slice(line * s.width, (line + 1) * s.width);

  // A search that includes this actuator's own link is exact wherever plain paths say the same;
  // only where they differ it is worth a search without that link.
  const doubtful = (field: Field, plain: Field): boolean =>
    [a, b].some((line) => line >= 0 && differs(field, plain, line, s.width));

  let { exits, softExits, fills } = r;
  if (doubtful(softExits, r.toTank)) {
    const start = r.toTank.slice();
    takeIn(net, conditions, s, start, index);
    exits = start.slice();
    s.spread(exits, edges.backward, { gate: r.notPressed, links: links.pull, without: index });
    softExits = start;
    s.spread(softExits, edges.backward, { links: links.pull, without: index });
  }
  if (doubtful(fills, r.fromSource)) {
    fills = r.fromSource.slice();
    net.lines.forEach((line, l) => {
      if (line.tank) s.seed(fills, l);
    });
    s.spread(fills, edges.forward, { links: links.push, without: index, fromTank: true });
  }

  const across = (from: number, to: number): Uint32Array => {
    if (from < 0 || to < 0) return none;
    if (from === to) return all;
    const field = s.field();
    let any = 0;
    for (let w = 0; w < s.width; w++) {
      const word = ~(r.toTank[from * s.width + w] as number) & (all[w] as number);
      field[from * s.width + w] = word;
      any |= word;
    }
    if (any === 0) return none;
    s.spread(field, edges.forward, { gate: complement(r.toTank, s.masks, s.width) });
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

function differs(field: Field, plain: Field, line: number, width: number): boolean {
  for (let i = line * width; i < (line + 1) * width; i++) if (field[i] !== plain[i]) return true;
  return false;
}
