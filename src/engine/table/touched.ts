import type { Network } from '../../network/network.ts';
import { PathDependents } from '../paths/dependents.ts';
import type { Choice } from '../paths/dependents.ts';
import type { PathConditions } from '../paths/reach.ts';
import { actuatorOutcome } from './actuator-outcomes.ts';
import type { DependentRows } from './dependents.ts';
import { pumpOutcome } from './pump-outcomes.ts';
import { ACTUATOR_VERDICTS } from './words.ts';

/** Planes of a block: where something would be said to do otherwise if a dependent valve stood elsewhere. */
export interface Touched {
  readonly actuators: readonly Uint32Array[];
  readonly pumps: readonly Uint32Array[];
}

const RESTS = ACTUATOR_VERDICTS.indexOf('rests on pressure');

/** Tries every valve in its other positions, one valve at a time, and looks what changes by open paths. */
export class TouchFinder {
  readonly #paths: PathDependents;
  readonly #conditions: PathConditions;
  readonly #net: Network;

  constructor(net: Network, conditions: PathConditions, maxWidth: number) {
    this.#paths = new PathDependents(net, conditions, maxWidth);
    this.#conditions = conditions;
    this.#net = net;
  }

  at(at: number, width: number, rows: DependentRows): Touched {
    const net = this.#net;
    const paths = this.#paths;
    const chosen = rows.planes as readonly Choice[];
    const base = this.#verdicts(chosen, at, width);
    const found = base.map(() => new Uint32Array(width));
    const mark = (thing: number, w: number, bits: number): void => {
      const plane = found[thing] as Uint32Array;
      plane[w] = (plane[w] as number) | bits;
    };
    net.dependents.forEach((_, d) => {
      const moved = rows.moved[d]?.subarray(at, at + width) ?? new Uint32Array(width);
      if (moved.every((word) => word === 0)) return;
      for (const choice of paths.choices[d] ?? []) {
        const other = this.#verdicts(
          chosen.map((planes, i) => (i === d ? choice : planes)),
          at,
          width,
        );
        other.forEach((planes, thing) =>
          planes.forEach((plane, verdict) => {
            for (let w = 0; w < width; w++)
              mark(thing, w, ((plane[w] as number) ^ (base[thing]?.[verdict]?.[w] as number)) & (moved[w] as number));
          }),
        );
      }
    });
    // What pressures have to decide may be decided otherwise in each setting that a hunting row runs through.
    for (let i = 0; i < net.actuators.length; i++)
      for (let w = 0; w < width; w++)
        mark(i, w, (base[i]?.[RESTS]?.[w] as number) & (rows.byPressure ? (rows.hunts[at + w] as number) : 0));
    return { actuators: found.slice(0, net.actuators.length), pumps: found.slice(net.actuators.length) };
  }

  /** Verdict planes of actuators, then pumps. */
  #verdicts(settings: readonly Choice[], at: number, width: number): (readonly Uint32Array[])[] {
    this.#paths.put(settings, at, width);
    const block = this.#paths.solve(at, width);
    return [
      ...this.#net.actuators.map((actuator, i) => actuatorOutcome(i, actuator, block, this.#conditions).verdicts),
      ...this.#net.pumps.map((pump, i) => pumpOutcome(i, pump, this.#net, block, this.#conditions)),
    ];
  }
}
