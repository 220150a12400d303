import type { Network } from '../../network/network.ts';
import type { EdgeSet } from './edges.ts';
import { Spreader } from './field.ts';
import type { Field } from './field.ts';
import { findMotion } from './motion.ts';
import type { Motion } from './motion-bits.ts';
import { compileLinks, compileOrders, reach } from './reach.ts';
import type { Links, Orders, PathConditions, Reach } from './reach.ts';

/** One block of states, settled: every lock check agrees with the pressures it causes. */
export interface SettledBlock {
  /** First word of the block in the planes of the whole table, and how many words. */
  readonly at: number;
  readonly width: number;
  /** The states that exist (the last word may be partly used). */
  readonly all: Uint32Array;
  readonly reach: Reach;
  readonly motion: Motion;
  /** States in which no setting of the lock checks agrees with itself. */
  readonly hunts: Uint32Array;
  readonly spreader: Spreader;
}

/** Runs the path layer block by block. */
export class PathSolver {
  readonly net: Network;
  readonly edges: EdgeSet;
  readonly conditions: PathConditions;
  readonly links: Links;
  readonly #orders: Orders;
  readonly #spreader: Spreader;

  constructor(net: Network, edges: EdgeSet, conditions: PathConditions, maxWidth: number) {
    this.net = net;
    this.edges = edges;
    this.conditions = conditions;
    this.links = compileLinks(net, conditions.places);
    this.#orders = compileOrders(net, edges, this.links);
    const maskCount =
      edges.masks.length + edges.pilots.length + edges.reliefs.length + edges.loadPilots.length + edges.backs.length;
    this.#spreader = new Spreader(
      net.lines.length,
      net.lines.map((line) => line.tank),
      maskCount,
      maxWidth,
    );
  }

  /** Words `at` … `at + width - 1` of the state planes. The result's memory is the block's own. */
  solve(at: number, width: number): SettledBlock {
    const { net, edges, conditions, links } = this;
    const s = this.#spreader;
    s.width = width;
    edges.masks.forEach((mask, index) => s.setMask(index, mask, at));
    const pilots = edges.pilots.map(() => new Uint32Array(width));
    const hunts = new Uint32Array(width);
    // Each round can settle at least one more lock check, unless they chase each other.
    const rounds = 2 * pilots.length + 2;
    for (let round = 0; ; round++) {
      pilots.forEach((plane, index) => s.setMask(edges.masks.length + index, plane, 0));
      const r = reach(net, edges, links, conditions, this.#orders, s);
      let changed = 0;
      edges.pilots.forEach((pilot, index) => {
        const plane = pilots[index] as Uint32Array;
        for (let w = 0; w < width; w++) {
          const i = pilot.line * width + w;
          const base = (edges.masks[pilot.base] as Uint32Array)[at + w] as number;
          const pressed = (r.fromSource[i] as number) | (r.underPressure[i] as number);
          const next =
            base & (pilot.vented ? ~pressed & (r.toTank[i] as number) : pressed & (r.notFreeToTank[i] as number));
          const differs = (plane[w] as number) ^ next;
          changed |= differs;
          if (round >= rounds) hunts[w] = (hunts[w] as number) | differs;
          plane[w] = next;
        }
      });
      if (changed !== 0 && round < rounds) continue;
      const motion = findMotion(net, edges, links, conditions, r, s);
      return { at, width, all: s.masks.slice(0, width), reach: r, motion, hunts, spreader: s };
    }
  }
}

/** A line's words of a field. */
export const lineWords = (field: Field, line: number, width: number): Uint32Array =>
  field.subarray(line * width, (line + 1) * width);
