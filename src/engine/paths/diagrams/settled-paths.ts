import { trips } from '../../../network/dependents.ts';
import type { NetDependent, NetPressureShift, Network } from '../../../network/network.ts';
import { compileLinks, sourceLines } from '../reach.ts';
import type { PathConditions } from '../reach.ts';
import type { Diagram, DiagramOptions } from './diagrams.ts';
import { ALL, Diagrams, NONE } from './diagrams.ts';
import { openPathSets, openPathsOver } from './open-paths.ts';
import type { OpenPathSets } from './open-paths.ts';
import { orderInputs } from './order.ts';
import { at, eliminate, operations, reachSets } from './reach-sets.ts';
import type { SetAlgebra } from './set-algebra.ts';
import type { LineSets, SetPositions } from './set-edges.ts';

/** Where the dependent valves stand, as sets; see `PathSettled` for the same over bit planes. */
export interface SettledSets {
  readonly positions: SetPositions;
  /** Per valve: combinations in which the pressures may put it elsewhere. */
  readonly open: readonly Diagram[];
  /** Per valve: the ways it may stand. */
  readonly choices: readonly SetPositions[];
}

/** Open paths with the dependent valves where those put them. */
export interface SettledPaths<S extends SetAlgebra = Diagrams> extends OpenPathSets<S> {
  readonly settled?: SettledSets;
}

/** Settings of all valves together that are tried; as in `settleByPaths`. */
const MOST_SETTINGS = 128;

/** `openPathSets` for circuits that may have dependent valves. Throws `TooManyNodes` when the sets do not fit. */
export function settledPathSets(net: Network, conditions: PathConditions, options: DiagramOptions = {}): SettledPaths {
  if (net.dependents.length === 0) return openPathSets(net, conditions, options);
  const radices = net.inputs.map((input) => input.positions.length);
  return settledPathsOver(
    net,
    conditions,
    new Diagrams(radices, { ...options, order: options.order ?? orderInputs(net) }),
  );
}

/** The same with sets of another kind. */
export function settledPathsOver<S extends SetAlgebra>(
  net: Network,
  conditions: PathConditions,
  sets: S,
): SettledPaths<S> {
  if (net.dependents.length === 0) return openPathsOver(net, conditions, sets);
  const settled = new Settler(net, conditions, sets).settle();
  return { ...openPathsOver(net, conditions, sets, settled.positions), settled };
}

/** The rules of `PathDependents` and `settleByPaths`, for all combinations at once. */
class Settler {
  readonly #net: Network;
  readonly #conditions: PathConditions;
  readonly #sets: SetAlgebra;
  readonly #tripped: readonly number[];

  constructor(net: Network, conditions: PathConditions, sets: SetAlgebra) {
    const places = conditions.places.map((stop) => ({ stop }));
    this.#net = net;
    this.#conditions = conditions;
    this.#sets = sets;
    this.#tripped = net.dependents.map(
      ({ shifts }) => shifts.find((shift) => shift.by === 'roller' && trips(shift, places))?.position ?? -1,
    );
  }

  settle(): SettledSets {
    const { and, or, minus } = operations({ sets: this.#sets });
    const { dependents } = this.#net;
    const choices = dependents.map((valve, d) => this.#choicesOf(valve, d));
    const settings = choices.reduce((n, list) => n * list.length, 1);
    const all =
      settings <= MOST_SETTINGS
        ? choices.reduce<SetPositions[]>((sofar, list) => sofar.flatMap((one) => list.map((c) => [...one, c])), [[]])
        : [];
    const rest = dependents.map((valve) => this.#constant(valve, valve.rest ?? 0));
    const rounds = Math.min(settings, 4 * dependents.length) + 2;
    let chosen: SetPositions = rest;
    let moving: Diagram = NONE;
    for (let round = 0; round < rounds; round++) {
      const next = this.#next(this.#paths(chosen), chosen);
      moving = this.#differ(next, chosen);
      chosen = next;
      if (moving === NONE) break;
    }
    const agreeing = all.map((setting) =>
      all.length === 1 ? NONE : minus(ALL, this.#differ(this.#next(this.#paths(setting), setting), setting)),
    );
    // Combinations that came to no end take the first setting that agrees.
    all.forEach((setting, i) => {
      const take = and(moving, agreeing[i] as Diagram);
      if (take === NONE) return;
      moving = minus(moving, take);
      chosen = chosen.map((positions, d) =>
        positions.map((set, p) => or(minus(set, take), and(setting[d]?.[p] ?? NONE, take))),
      );
    });
    // It has moved, or could have been elsewhere before, or a pressure may yet move it.
    const elsewhere = all.map((setting, i) => and(this.#differ(chosen, setting), agreeing[i] as Diagram));
    const any = or(this.#differ(chosen, rest), ...elsewhere, this.#mayShift(chosen));
    return { positions: chosen, open: dependents.map((_, d) => and(any, this.#staged(d))), choices };
  }

  #paths(positions: SetPositions): OpenPathSets<SetAlgebra> {
    return openPathsOver(this.#net, this.#conditions, this.#sets, positions);
  }

  #constant(valve: NetDependent, position: number): Diagram[] {
    return valve.positions.map((_, p) => (p === position ? ALL : NONE));
  }

  #stage({ input, stages }: NetPressureShift): Diagram {
    return input < 0 ? ALL : this.#sets.literal(input, stages);
  }

  /** Combinations in which two settings put some valve differently. */
  #differ(a: SetPositions, b: SetPositions): Diagram {
    const { or, minus } = operations({ sets: this.#sets });
    return or(
      ...a.flatMap((positions, d) =>
        positions.flatMap((set, p) => {
          const other = b[d]?.[p] ?? NONE;
          return set === other ? [] : [minus(set, other), minus(other, set)];
        }),
      ),
    );
  }

  /** Where each valve goes from where they stand. */
  #next(paths: OpenPathSets<SetAlgebra>, now: SetPositions): Diagram[][] {
    const { and, or, minus } = operations(paths);
    const underPressure = this.#underPressure(paths);
    const pressed = (line: number): Diagram =>
      minus(or(at(paths.fromSource, line), at(underPressure, line)), at(paths.freeToTank, line));
    return this.#net.dependents.map((valve, d) => {
      const to: Diagram[] = valve.positions.map(() => NONE);
      let left: Diagram = ALL;
      const give = (position: number, set: Diagram): void => {
        if (position < to.length) to[position] = or(to[position] as Diagram, and(set, left));
        left = minus(left, set);
      };
      const tripped = this.#tripped[d] as number;
      if (tripped >= 0) give(tripped, ALL);
      for (const shift of valve.shifts) {
        if (shift.by !== 'pressure') continue;
        let acts = and(this.#stage(shift), left);
        for (const { line, factor } of shift.signals)
          acts = factor > 0 ? and(acts, pressed(line)) : minus(acts, pressed(line));
        give(shift.position, acts);
      }
      if (valve.rest !== undefined) give(valve.rest, ALL);
      else valve.positions.forEach((_, p) => give(p, now[d]?.[p] ?? NONE));
      return to;
    });
  }

  /** Under pressure by a source, or through an actuator; found already where lock checks ask for it. */
  #underPressure(paths: OpenPathSets<SetAlgebra>): LineSets {
    if (paths.edges.pilots.length > 0) return paths.underPressure;
    return reachUnderPressure(this.#net, this.#conditions, paths);
  }

  /** Combinations in which a pressure that open paths do not rule out could shift some valve. */
  #mayShift(chosen: SetPositions): Diagram {
    const paths = this.#paths(chosen);
    const { and, or, minus } = operations(paths);
    const { valves } = reachSets(this.#net, this.#conditions, paths);
    const may = (line: number): Diagram =>
      or(at(paths.fromSource, line), valves ? at(valves.pressed, line) : NONE, minus(ALL, at(paths.toTank, line)));
    const shifts = this.#net.dependents.flatMap((valve, d) => ((this.#tripped[d] as number) >= 0 ? [] : valve.shifts));
    return or(
      ...shifts.map((shift) => {
        if (shift.by !== 'pressure') return NONE;
        const lines = shift.signals.filter(({ factor }) => factor > 0).map(({ line }) => may(line));
        return and(this.#stage(shift), ...lines);
      }),
    );
  }

  /** Combinations in which the valve has a shift that its pilot stage lets act. */
  #staged(d: number): Diagram {
    if ((this.#tripped[d] as number) >= 0) return NONE;
    const { or } = operations({ sets: this.#sets });
    const shifts = this.#net.dependents[d]?.shifts ?? [];
    return or(...shifts.map((shift) => (shift.by === 'pressure' ? this.#stage(shift) : NONE)));
  }

  #choicesOf(valve: NetDependent, d: number): Diagram[][] {
    const tripped = this.#tripped[d] as number;
    if (tripped >= 0) return [this.#constant(valve, tripped)];
    if (valve.rest === undefined) return valve.positions.map((_, p) => this.#constant(valve, p));
    const shifts = valve.shifts.filter((shift) => shift.by === 'pressure');
    const piloted = shifts.filter((shift) => shift.input < 0).map((shift) => this.#constant(valve, shift.position));
    const rest = this.#constant(valve, valve.rest);
    const commanded = shifts.filter((shift) => shift.input >= 0);
    if (commanded.length === 0) return [rest, ...piloted];
    // A pilot stage leaves the main spool two choices: where it leads, and rest.
    const { and, or, minus } = operations({ sets: this.#sets });
    const led: Diagram[] = valve.positions.map(() => NONE);
    let still: Diagram = ALL;
    for (const shift of commanded) {
      const stage = this.#stage(shift);
      led[shift.position] = or(led[shift.position] as Diagram, and(stage, still));
      still = minus(still, stage);
    }
    led[valve.rest] = or(led[valve.rest] as Diagram, still);
    return [rest, ...piloted, led];
  }
}

function reachUnderPressure(net: Network, conditions: PathConditions, paths: OpenPathSets<SetAlgebra>): LineSets {
  const gate = paths.freeToTank.map((set) => paths.sets.not(set));
  const field: LineSets = net.lines.map(() => NONE);
  for (const line of sourceLines(net, conditions)) if (line >= 0) field[line] = gate[line] as Diagram;
  const { push } = compileLinks(net, conditions.places);
  return eliminate(net, paths, { edges: paths.edges.forward, gate, links: push }).spread(field);
}
