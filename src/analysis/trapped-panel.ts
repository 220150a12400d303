import type { Budget } from '../base/budget.ts';
import { Cancelled } from '../base/budget.ts';
import { bad } from '../base/result.ts';
import type { Result } from '../base/result.ts';
import type { UnitSystem } from '../base/units.ts';
import type { Circuit } from '../circuit/model.ts';
import type { Diagram, Diagrams } from '../engine/paths/diagrams/diagrams.ts';
import { NONE } from '../engine/paths/diagrams/diagrams.ts';
import { openPathSets } from '../engine/paths/diagrams/open-paths.ts';
import type { PathConditions } from '../engine/paths/reach.ts';
import { explain } from '../engine/table/explain.ts';
import { supportOf } from '../engine/table/fold/influence.ts';
import { pathOutcomes } from '../engine/table/fold/outcome-sets.ts';
import { solveOne } from '../engine/table/one-state.ts';
import type { TrapReason } from '../engine/table/words.ts';
import { frozenAt } from '../network/freeze.ts';
import type { Network } from '../network/network.ts';
import { networkOf, pathConditions } from './analyse.ts';
import { BleedWords } from './bleed-words.ts';
import type { TrappedPanel, TrappedPanelReason } from './bleed-results.ts';
import { entangled, refuseDependents } from './outcomes.ts';
import type { Conditions } from './results.ts';

/**
 * Every line that pressure stays trapped in, with exact counts of combinations however many there are, by open paths
 * alone; and for each reason one combination in words. Throws `Cancelled`.
 */
export function trappedPanel(
  circuit: Circuit,
  conditions: Conditions,
  budget: Budget,
  units: UnitSystem = 'metric',
): Result<TrappedPanel> {
  const net = networkOf(circuit, conditions);
  const refused = refuseDependents(net);
  if (refused) return bad(refused);
  const where = pathConditions(net, conditions);
  const words = new BleedWords(net, circuit);
  const heartbeat = (): void => {
    if (budget.cancelled()) throw new Cancelled();
  };
  return entangled(() => {
    const { sets, trapped } = pathOutcomes(net, where, openPathSets(net, where, { heartbeat }));
    const lines = Array.from({ length: net.shown }, (_, line) => line).flatMap((line) => {
      budget.progress(line / net.shown);
      const reasons = trapped(line).flatMap(({ word, set }): TrappedPanelReason[] => {
        if (set === NONE) return [];
        const kind = word as TrapReason;
        const found = exampleOf(net, where, sets, set, line, kind, units);
        return [{ kind, count: sets.count(set), ...found }];
      });
      return reasons.length > 0 ? [{ ...words.line(line), reasons }] : [];
    });
    return { total: sets.total, lines };
  });
}

/** One combination of the set, the other levers at rest, and what is said of it. */
function exampleOf(
  net: Network,
  where: PathConditions,
  sets: Diagrams,
  set: Diagram,
  line: number,
  kind: TrapReason,
  units: UnitSystem,
): Pick<TrappedPanelReason, 'levers' | 'text'> {
  const rest = net.inputs.map((input) => input.rest ?? 0);
  const positions = sets.example(set, rest) ?? rest;
  const { inputs } = supportOf(sets, [set]);
  const name = (input: number, position: number): string => net.inputs[input]?.positions[position] ?? '';
  const label = (input: number): string => net.parts[net.inputs[input]?.part ?? -1]?.label ?? '';
  const levers = inputs.map((input) => ({ label: label(input), position: name(input, positions[input] ?? 0) }));
  if (kind !== 'left behind') {
    const said = explain(frozenAt(net, positions), where, 0, units).trapped.find((entry) => entry.line === line);
    return { levers, text: said?.reasons.find((reason) => reason.kind === kind)?.text ?? '' };
  }
  const moves = inputs.flatMap((input) =>
    (net.inputs[input]?.positions ?? []).flatMap((from, p) => {
      if (p === positions[input]) return [];
      const before = frozenAt(
        net,
        positions.map((position, i) => (i === input ? p : position)),
      );
      const state = solveOne(before, { ...where, pumpsRunning: true }, 0);
      return state.on(state.block.reach.leaves, line)
        ? [`${label(input)} from ${from} to ${name(input, positions[input] ?? 0)}`]
        : [];
    }),
  );
  return { levers, text: `Under pressure before this move of one lever: ${moves.join('; ')}.` };
}
