import { frozenAt } from '../../network/freeze.ts';
import type { NetPath, Network } from '../../network/network.ts';

/** What is open at one moment of a move: a network of one combination, and the paths of the valve that moves. */
export interface Moment {
  readonly net: Network;
  readonly paths: readonly NetPath[];
}

/** One stage of a move of one lever, all other valves standing. */
export type Stage =
  /** Between two neighbouring positions. Where it is not known what is open there: all shut, and all joined. */
  | { readonly kind: 'crossing'; readonly from: number; readonly to: number; readonly known: Moment }
  | {
      readonly kind: 'crossing';
      readonly from: number;
      readonly to: number;
      readonly known?: never;
      readonly shut: Moment;
      readonly joined: Moment;
    }
  /** A position that is passed without a stop. */
  | { readonly kind: 'passing'; readonly position: number; readonly known: Moment };

/**
 * The stages of a move of `input` from where it stands in `positions` to `to`, in order; a move from one end to the
 * other passes the centre and both its crossovers. Empty for a valve of which only the positions count.
 */
export function stagesOf(net: Network, positions: readonly number[], input: number, to: number): Stage[] {
  const crossing = net.inputs[input]?.crossing;
  const from = positions[input] ?? 0;
  const by = Math.sign(to - from);
  const moment = (paths: readonly NetPath[]): Moment => ({ net: frozenAt(net, positions, { input, paths }), paths });
  const stages: Stage[] = [];
  for (let at = from; at !== to; at += by) {
    const next = at + by;
    if (crossing) {
      const paths = crossing.between[Math.min(at, next)];
      const ends = { kind: 'crossing' as const, from: at, to: next };
      stages.push(
        paths ? { ...ends, known: moment(paths) } : { ...ends, shut: moment([]), joined: moment(crossing.allJoined) },
      );
    }
    if (next === to) continue;
    const passed = positions.map((position, i) => (i === input ? next : position));
    const paths = net.paths.filter((path) => path.input === input && ((path.positions >>> next) & 1) === 1);
    stages.push({ kind: 'passing', position: next, known: { net: frozenAt(net, passed), paths } });
  }
  return stages;
}
