import type { BitSet } from '../../../base/bits.ts';
import type { Network } from '../../../network/network.ts';
import type { Diagram } from '../../paths/diagrams/diagrams.ts';
import { ALL, Diagrams, NONE } from '../../paths/diagrams/diagrams.ts';
import type { SettledPaths } from '../../paths/diagrams/settled-paths.ts';
import { planeToDiagram } from '../../paths/diagrams/plane.ts';
import type { PathConditions } from '../../paths/reach.ts';
import { PanelSets } from '../sets/panel-sets.ts';
import type { TableData } from '../table-data.ts';
import { ACTUATOR_VERDICTS, BLOCKED_KINDS, LINE_CLASSES, PUMP_VERDICTS, TRAP_REASONS } from '../words.ts';

/** An outcome, and the combinations that have it. */
export interface OutcomeSet {
  readonly word: string;
  readonly set: Diagram;
}

export type OutcomeOf = 'actuator' | 'pump' | 'line';

/** What comes out in which combinations, whether there is a table or open paths alone. */
export interface OutcomeSource {
  readonly sets: Diagrams;
  /** The outcomes of one item: they exclude each other, and leave no combination out. */
  readonly of: (kind: OutcomeOf, index: number) => readonly OutcomeSet[];
  /** Kinds of blockage of a line; in the other combinations it is not blocked. */
  readonly blocked: (line: number) => readonly OutcomeSet[];
  /** Reasons for pressure trapped in a line, which may hold at once. */
  readonly trapped: (line: number) => readonly OutcomeSet[];
}

type Planes = readonly (BitSet | undefined)[] | undefined;

/** From a listed table, pressures included as far as they were solved. */
export function tableOutcomes(data: TableData, heartbeat: () => void = () => undefined): OutcomeSource {
  const sets = new Diagrams(
    data.inputs.map((input) => input.positions.length),
    { heartbeat },
  );
  // Tables share equal planes, so most of them are met more than once.
  const known = new Map<BitSet, Diagram>();
  const setOf = (plane: BitSet | undefined): Diagram => {
    if (plane === undefined) return NONE;
    const found = known.get(plane) ?? planeToDiagram(sets, plane);
    known.set(plane, found);
    return found;
  };
  const list = (planes: Planes, words: readonly string[]): OutcomeSet[] =>
    words.map((word, i) => ({ word, set: setOf(planes?.[i]) }));
  const of: OutcomeSource['of'] = (kind, index) => {
    switch (kind) {
      case 'actuator':
        return list(data.actuatorPlanes[index], ACTUATOR_VERDICTS);
      case 'pump':
        return list(data.pumpPlanes[index], PUMP_VERDICTS);
      case 'line':
        return list(data.linePlanes[index], LINE_CLASSES);
    }
  };
  return {
    sets,
    of,
    blocked: (line) => list(data.blockedPlanes[line], BLOCKED_KINDS),
    trapped: (line) => list(data.trapPlanes[line], TRAP_REASONS),
  };
}

/** From exact sets of open paths, however many combinations there are. Asking throws `TooManyNodes` where they do not fit. */
export function pathOutcomes(net: Network, conditions: PathConditions, paths: SettledPaths): OutcomeSource {
  const panel = new PanelSets(net, conditions, paths);
  const list = (found: readonly Diagram[] | undefined, words: readonly string[]): OutcomeSet[] =>
    words.map((word, i) => ({ word, set: found?.[i] ?? NONE }));
  const of: OutcomeSource['of'] = (kind, index) => {
    switch (kind) {
      case 'actuator':
        return list(panel.actuator(index).verdicts, ACTUATOR_VERDICTS);
      case 'pump':
        return list(panel.pump(index), PUMP_VERDICTS);
      case 'line':
        return list(panel.lines.classes[index], LINE_CLASSES);
    }
  };
  return {
    sets: paths.sets,
    of,
    blocked: (line) => list(panel.lines.blocked[line], BLOCKED_KINDS),
    trapped: (line) => list(panel.traps[line], TRAP_REASONS),
  };
}

/**
 * Outcomes of several items at once, every mixture that occurs with its combinations; undefined when there are
 * more than `most`.
 */
export function jointOutcomes(
  sets: Diagrams,
  lists: readonly (readonly OutcomeSet[])[],
  most: number,
): { readonly word: readonly string[]; readonly set: Diagram }[] | undefined {
  let joint: { readonly word: readonly string[]; readonly set: Diagram }[] = [{ word: [], set: ALL }];
  for (const list of lists) {
    const next: typeof joint = [];
    for (const { word, set } of joint) {
      for (const outcome of list) {
        const both = sets.and(set, outcome.set);
        if (both !== NONE) next.push({ word: [...word, outcome.word], set: both });
      }
      if (next.length > most) return undefined;
    }
    joint = next;
  }
  return joint;
}
