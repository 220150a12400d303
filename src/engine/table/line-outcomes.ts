import type { Network } from '../../network/network.ts';
import type { SettledBlock } from '../paths/block.ts';
import type { EdgeSet } from '../paths/edges.ts';
import { carryingLines } from '../paths/flow-lines.ts';
import type { Field } from '../paths/field.ts';
import type { PathConditions } from '../paths/reach.ts';
import { BLOCKED_KINDS, LINE_CLASSES } from './words.ts';

/** Planes of one block for every line, by index of class and of kind of blockage. */
export interface LineOutcomes {
  readonly classes: readonly (readonly Uint32Array[])[];
  readonly blocked: readonly (readonly Uint32Array[])[];
  readonly carriesOil: Field;
}

export function lineOutcomes(
  net: Network,
  edges: EdgeSet,
  conditions: PathConditions,
  block: SettledBlock,
): LineOutcomes {
  const { width, all, reach: r } = block;
  const { working, displaced } = carryingLines(net, edges, conditions, block);
  const classes: Uint32Array[][] = [];
  const blocked: Uint32Array[][] = [];
  for (let line = 0; line < net.shown; line++) {
    const planes = LINE_CLASSES.map(() => new Uint32Array(width)) as [
      Uint32Array,
      Uint32Array,
      Uint32Array,
      Uint32Array,
      Uint32Array,
    ];
    const kinds = BLOCKED_KINDS.map(() => new Uint32Array(width)) as [Uint32Array, Uint32Array];
    const [fed, flows, vented, cutOff, carries] = planes;
    for (let w = 0; w < width; w++) {
      const i = line * width + w;
      const exists = all[w] as number;
      const source = r.fromSource[i] as number;
      const tank = r.toTank[i] as number;
      const passes = displaced[i] as number;
      fed[w] = source & ~tank;
      flows[w] = source & tank;
      vented[w] = ~source & tank;
      const shut = ~source & ~tank & ~passes & exists;
      cutOff[w] = shut;
      carries[w] = ~source & ~tank & passes & exists;
      kinds[0][w] = source & ~tank & ~(working[i] as number) & ~passes;
      kinds[1][w] = shut;
    }
    classes.push(planes);
    blocked.push(kinds);
  }
  return { classes, blocked, carriesOil: working };
}
