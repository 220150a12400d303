import type { NetActuator, Network } from '../../../network/network.ts';
import type { PathConditions } from '../reach.ts';
import type { ChamberSets } from './actuator-motion.ts';
import { spreadApart } from './apart.ts';
import type { Ends } from './apart.ts';
import type { Diagram } from './diagrams.ts';
import { ALL, NONE } from './diagrams.ts';
import type { OpenPathSets } from './open-paths.ts';
import { at, none, operations, swallowsAt } from './reach-sets.ts';
import type { ReachSets } from './reach-sets.ts';
import type { SetAlgebra } from './set-algebra.ts';
import type { LineSets } from './set-edges.ts';

/** What the chambers of every actuator can do. */
export function chamberSets(
  net: Network,
  conditions: PathConditions,
  paths: OpenPathSets<SetAlgebra>,
  r: ReachSets,
): ChamberSets[] {
  const { and, or, minus } = operations(paths);
  const { toTank, edges } = paths;
  // The shared searches pass through the actuator itself too; where that can mislead, search again without it.
  const apart = (
    shared: LineSets,
    plain: LineSets,
    matters: (index: number) => Diagram,
    again: (asked: readonly number[]) => Map<number, Ends>,
  ): [Diagram, Diagram][] => {
    const misled = net.actuators.map(({ a, b }, i) => {
      const [x, y] = [at(shared, a), at(shared, b)];
      const borrowed = b < 0 ? minus(x, at(plain, a)) : minus(and(x, y), and(at(plain, a), at(plain, b)));
      return and(borrowed, matters(i));
    });
    const found = again(misled.flatMap((set, i) => (set === NONE ? [] : [i])));
    return net.actuators.map(({ a, b }, i) => {
      const set = misled[i] as Diagram;
      const mended = (side: Diagram, alone: Diagram): Diagram => or(minus(side, set), and(alone, set));
      const [aloneA, aloneB] = found.get(i) ?? [NONE, NONE];
      return [mended(at(shared, a), aloneA), b < 0 ? ALL : mended(at(shared, b), aloneB)];
    });
  };
  const open = edges.open;
  const stores = new Set(net.accumulators.filter(({ charged }) => !charged).map(({ line }) => line));
  const plainExits = toTank.map((set, line) => (stores.has(line) ? ALL : set));
  const out = (gate: LineSets | undefined) => (asked: readonly number[]) =>
    spreadApart(
      paths.sets,
      net,
      { edges: edges.backward, open, links: r.links.pull, gate, fromTank: true },
      plainExits,
      asked,
      (actuator) => swallowsAt(net, conditions, actuator),
    );
  const exits = apart(r.exits, toTank, () => ALL, out(r.notPressed));
  const exit = (i: number): [Diagram, Diagram] => exits[i] as [Diagram, Diagram];
  const fed = ({ a, b }: NetActuator): [Diagram, Diagram] => [at(r.anyPressed, a), at(r.anyPressed, b)];
  const stuck = net.actuators.map((actuator, i) => {
    const [fedA, fedB] = fed(actuator);
    const [exitA, exitB] = exit(i);
    return or(actuator.b < 0 ? NONE : minus(fedA, exitB), minus(fedB, exitA));
  });
  const softExits = apart(r.softExits, toTank, (i) => stuck[i] as Diagram, out(undefined));
  const fills = apart(
    r.fills,
    r.plainFills,
    (i) => {
      const actuator = net.actuators[i] as NetActuator;
      const [fedA, fedB] = fed(actuator);
      const free = minus(actuator.b < 0 ? ALL : or(...exit(i)), or(fedA, fedB));
      const bled = and(stuck[i] as Diagram, or(and(fedA, at(toTank, actuator.a)), and(fedB, at(toTank, actuator.b))));
      return or(free, bled);
    },
    (asked) =>
      spreadApart(
        paths.sets,
        net,
        { edges: edges.forward, open, links: r.links.push, fromTank: true },
        r.plainFills,
        asked,
      ),
  );
  const across = (from: number, to: number): Diagram => {
    if (from < 0 || to < 0) return NONE;
    if (from === to) return ALL;
    const field = none(net);
    field[from] = and(at(r.notToTank, from), at(r.notToTank, to));
    if (field[from] === NONE) return NONE;
    return at(r.aheadShut.spread(field, [to]), to);
  };
  return net.actuators.map(({ a, b }, i) => {
    const [exitA, exitB] = exit(i);
    const [softExitA, softExitB] = softExits[i] as [Diagram, Diagram];
    const [fillA, fillB] = fills[i] as [Diagram, Diagram];
    return { exitA, exitB, softExitA, softExitB, fillA, fillB, fromBtoA: across(b, a), fromAtoB: across(a, b) };
  });
}
