import type { Budget } from '../base/budget.ts';
import { Cancelled, unlimited } from '../base/budget.ts';
import { bad, good } from '../base/result.ts';
import type { Result } from '../base/result.ts';
import type { UnitSystem } from '../base/units.ts';
import type { Circuit } from '../circuit/model.ts';
import type { Diagram, Diagrams } from '../engine/paths/diagrams/diagrams.ts';
import { NONE } from '../engine/paths/diagrams/diagrams.ts';
import { nearest } from '../engine/paths/diagrams/nearest.ts';
import { classSet, openPathSets, openPathsOver } from '../engine/paths/diagrams/open-paths.ts';
import type { PathConditions } from '../engine/paths/reach.ts';
import type { Network } from '../network/network.ts';
import { networkOf, pathConditions } from './analyse.ts';
import { Mover } from './moves.ts';
import type { LeverMove, VentAnswer } from './moves-results.ts';
import { entangled, outcomesOf, refuseDependents } from './outcomes.ts';
import type { Conditions } from './results.ts';

/** Other lists of the same length that are told. */
const MOST_OTHERS = 8;
/** Lists of at most so many moves are tried in every order that differs in what comes down. */
const MOST_ORDERED = 4;

/**
 * A shortest list of lever moves after which a line is open to tank by a free path or nothing feeds it any more, the
 * pumps as in the conditions. Exact for panels of any size, except that valves that follow pressures need a table.
 * Throws `Cancelled`, and a RangeError for a line (index of a shown line) or positions that are not there.
 */
export function ventLine(
  circuit: Circuit,
  conditions: Conditions,
  line: number,
  positions: readonly number[],
  options: { readonly budget?: Budget; readonly units?: UnitSystem } = {},
): Result<VentAnswer> {
  const { budget = unlimited, units = 'metric' } = options;
  const mover = new Mover(circuit, conditions, units);
  mover.check(positions);
  const { net } = mover.bench;
  if (!Number.isInteger(line) || line < 0 || line >= net.shown) throw new RangeError(`there is no line ${line}`);
  const found = ventedSets(circuit, conditions, line, budget);
  if (!found.ok) return found;
  const { sets, vented, firm, flowing } = found.value;
  const flows = vented === NONE;
  const fewest = nearest(sets, flows ? flowing : vented, positions, MOST_OTHERS + 1);
  const head = { line, name: net.lines[line]?.name ?? '', positions, ...mover.rowOf(positions) };
  if (!fewest) return good({ ...head, outcome: 'never', flows: false, slow: false, steps: [], others: [] });
  const sound = flows ? undefined : nearest(sets, firm, positions, MOST_OTHERS + 1);
  const way = sound?.moves === fewest.moves ? sound : fewest;
  const [first = positions, ...others] = way.list;
  const steps = orderMoves(mover, positions, first);
  return good({
    ...head,
    outcome: way.moves === 0 ? 'now' : 'moves',
    flows,
    slow: !flows && way !== sound,
    steps,
    others: way.moves === 0 ? [] : others.map((to) => changesOf(net, positions, to)),
  });
}

interface Vented {
  readonly sets: Diagrams;
  /** Nothing keeps pressure in it. */
  readonly vented: Diagram;
  /** The same without the leakage of stopped pumps; `vented` where that is not told apart. */
  readonly firm: Diagram;
  /** Fed and open to tank at once. */
  readonly flowing: Diagram;
}

function ventedSets(circuit: Circuit, conditions: Conditions, line: number, budget: Budget): Result<Vented> {
  const net = networkOf(circuit, conditions);
  if (net.dependents.length > 0) {
    const outcomes = outcomesOf(circuit, conditions, budget);
    if (!outcomes.ok) return outcomes;
    const follows = outcomes.value.listed ? undefined : refuseDependents(net);
    if (follows) return bad(follows);
    const { sets, of } = outcomes.value.source;
    const classOf = (word: string): Diagram => of('line', line).find((each) => each.word === word)?.set ?? NONE;
    return good({ sets, vented: classOf('vented'), firm: classOf('vented'), flowing: classOf('flows to tank') });
  }
  const heartbeat = (): void => {
    if (budget.cancelled()) throw new Cancelled();
  };
  return entangled(() => {
    const where = pathConditions(net, conditions);
    const paths = openPathSets(net, where, { heartbeat });
    const { sets, hunts } = paths;
    const free = paths.freeToTank[line] as Diagram;
    const vented = sets.minus(sets.or(classSet(paths, line, 'vented'), free), hunts);
    const leaks = !where.pumpsRunning && net.pumps.some(({ tightWhenStopped }) => !tightWhenStopped);
    return {
      sets,
      vented,
      firm: leaks ? sets.and(vented, firmly(net, where, sets, line)) : vented,
      flowing: sets.minus(classSet(paths, line, 'flows to tank'), hunts),
    };
  });
}

/** Combinations in which it is open to tank though no pump leaks. */
function firmly(net: Network, where: PathConditions, sets: Diagrams, line: number): Diagram {
  const tight = { ...net, pumps: net.pumps.map((pump) => ({ ...pump, tightWhenStopped: true })) };
  return openPathsOver(tight, where, sets).toTank[line] as Diagram;
}

function changesOf(
  net: Network,
  from: readonly number[],
  to: readonly number[],
): { readonly label: string; readonly to: string }[] {
  return net.inputs.flatMap((input, i) => {
    const position = to[i] ?? 0;
    if (position === from[i]) return [];
    return [{ label: net.parts[input.part]?.label ?? '', to: input.positions[position] ?? '' }];
  });
}

const dropsOf = ({ effects, stages }: LeverMove): number =>
  2 * effects.filter(({ kind }) => kind === 'drops' || kind === 'springs').length +
  stages.flatMap(({ notes }) => notes).filter(({ kind }) => kind === 'dips').length;

/** The order in which the least comes down; each lever moves once. */
function orderMoves(mover: Mover, from: readonly number[], to: readonly number[]): LeverMove[] {
  const levers = from.flatMap((position, i) => (to[i] === position ? [] : [i]));
  if (levers.length > MOST_ORDERED) return inOrder(mover, from, to, levers);
  let best: LeverMove[] | undefined;
  let least = Infinity;
  for (const order of permutations(levers)) {
    const moves = inOrder(mover, from, to, order);
    const drops = moves.reduce((n, move) => n + dropsOf(move), 0);
    if (drops >= least) continue;
    [best, least] = [moves, drops];
    if (drops === 0) break;
  }
  return best ?? [];
}

function inOrder(mover: Mover, from: readonly number[], to: readonly number[], order: readonly number[]): LeverMove[] {
  const moves: LeverMove[] = [];
  let at = from;
  for (const input of order) {
    const move = mover.move(at, input, to[input] ?? 0);
    moves.push(move);
    at = move.positions;
  }
  return moves;
}

const permutations = (list: readonly number[]): number[][] =>
  list.length === 0
    ? [[]]
    : list.flatMap((first, i) => permutations(list.filter((_, j) => j !== i)).map((rest) => [first, ...rest]));
