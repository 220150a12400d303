import type { NetInput, Network } from '../../../network/network.ts';
import type { Machine } from './machine.ts';
import type { Travel } from './next-event.ts';
import type { Run } from './player.ts';
import type { Steady } from './steady.ts';

/** A motion that is asked for: `+` out (motor: A→B), `-` in, `0` a motor comes to rest. */
export interface Wanted {
  readonly actuator: number;
  readonly way: '+' | '-' | '0';
}

/** A step of a plan in numbers of the network; SI. */
export interface PlayStep {
  /** Coils that are on: input, and number in its list. */
  readonly coils: readonly { readonly input: number; readonly coil: number }[];
  /** Input → position in which it is held by hand. */
  readonly levers: ReadonlyMap<number, number>;
  /** Per pump. */
  readonly running: readonly boolean[];
  /** Groups in their order; the motions of one group may come in any. */
  readonly expect: readonly (readonly Wanted[])[];
  readonly ends: PlayEnd;
  /** s that it may take. */
  readonly limit: number;
}

export type PlayEnd =
  | { readonly by: 'motion' }
  | { readonly by: 'sensor'; readonly actuator: number; readonly at: 'in' | 'out' | number }
  | { readonly by: 'pressure'; readonly switch: number; readonly on: boolean }
  | { readonly by: 'time'; readonly after: number };

/** Two coils of one valve that lead to different positions are on: not permitted. */
export const bothCoilsOn = (net: Network, { coils }: Pick<PlayStep, 'coils'>): number[] =>
  net.inputs.flatMap((spec, input) => (new Set(coilPositions(spec, input, coils)).size > 1 ? [input] : []));

/**
 * Where the inputs go: held by hand, else drawn by a coil, else to their rest, else they stay (detent). With two
 * coils on against each other the valve is taken to stay as without any.
 */
export function commanded(
  net: Network,
  before: readonly number[],
  { coils, levers }: Pick<PlayStep, 'coils' | 'levers'>,
): number[] {
  return net.inputs.map((spec, input) => {
    const held = levers.get(input);
    if (held !== undefined) return held;
    const drawn = new Set(coilPositions(spec, input, coils));
    const [position] = drawn;
    if (drawn.size === 1 && position !== undefined) return position;
    return spec.rest ?? before[input] ?? 0;
  });
}

function coilPositions(spec: NetInput, input: number, coils: PlayStep['coils']): number[] {
  return coils.flatMap((on) => {
    const position = on.input === input ? spec.coils[on.coil]?.position : undefined;
    return position === undefined ? [] : [position];
  });
}

/** Every coil of the circuit: input, and number in its list. */
export const allCoils = (net: Network): { readonly input: number; readonly coil: number }[] =>
  net.inputs.flatMap(({ coils }, input) => coils.map((_, coil) => ({ input, coil })));

/** m within which a sensor sees its actuator. */
const SEEN = 1e-9;

/** The step as a run of the player. */
export function runOf(net: Network, index: number, step: PlayStep, positions: readonly number[]): Run {
  const { ends } = step;
  const travels: Travel[] =
    ends.by === 'sensor' && typeof ends.at === 'number' ? [{ actuator: ends.actuator, at: ends.at }] : [];
  return {
    step: index,
    positions,
    running: step.running,
    coils: allCoils(net).map(({ input, coil }) => step.coils.some((on) => on.input === input && on.coil === coil)),
    travels,
    done: doneBy(step),
    ...(ends.by === 'time' ? { after: ends.after, limit: Infinity } : { limit: step.limit }),
  };
}

function doneBy({ ends, expect }: PlayStep): (machine: Machine, steady: Steady) => boolean {
  switch (ends.by) {
    case 'motion': {
      const wanted = expect.flat();
      if (wanted.length === 0) return (_, { speeds, stores }) => [...speeds, ...stores].every((flow) => flow === 0);
      return (machine, steady) => wanted.every((motion) => isThere(motion, machine, steady));
    }
    case 'sensor': {
      const { actuator, at } = ends;
      return ({ strokes, stops }) =>
        typeof at === 'number' ? Math.abs((strokes[actuator] ?? 0) - at) <= SEEN : stops[actuator] === at;
    }
    case 'pressure':
      return ({ switches }) => switches[ends.switch] === ends.on;
    case 'time':
      return () => false;
  }
}

/** At the stop that lies this way; a motor: turning this way, or at rest. */
function isThere({ actuator, way }: Wanted, { stops }: Machine, { speeds }: Steady): boolean {
  const speed = speeds[actuator] ?? 0;
  if (way === '0') return speed === 0;
  return stops[actuator] === (way === '+' ? 'out' : 'in');
}
