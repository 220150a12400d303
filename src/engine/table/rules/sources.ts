import { emptySet, fullSet, orInto, trim } from '../../../base/bits.ts';
import type { Network } from '../../../network/network.ts';
import type { Diagram } from '../../paths/diagrams/diagrams.ts';
import { ALL, NONE } from '../../paths/diagrams/diagrams.ts';
import { classSet, PATH_CLASSES } from '../../paths/diagrams/open-paths.ts';
import type { SettledPaths } from '../../paths/diagrams/settled-paths.ts';
import { positionMask } from '../../paths/edges.ts';
import type { PathConditions } from '../../paths/reach.ts';
import { PanelSets } from '../sets/panel-sets.ts';
import type { Plane, TableData } from '../table-data.ts';
import { ACTUATOR_VERDICTS, BLOCKED_KINDS, LINE_CLASSES, PUMP_VERDICTS, TRAP_REASONS } from '../words.ts';
import type { RuleSource, Truth } from './evaluate.ts';

const unsolved = (): never => {
  throw new Error('pressures and speeds were not solved for this question');
};

/** Rules on a listed table: bit planes over its rows. `figure` answers for pressures and speeds, see `figurePlanes`. */
export function tableSource(data: TableData, figure: RuleSource<Plane>['figure'] = unsolved): RuleSource<Plane> {
  const { count } = data;
  const radices = data.inputs.map((input) => input.positions.length);
  const union = <W>(
    planes: readonly (Plane | undefined)[] | undefined,
    words: readonly W[],
    wanted: readonly W[],
  ): Plane => {
    const any = emptySet(count);
    for (const word of wanted) {
      const plane = planes?.[words.indexOf(word)];
      if (plane) orInto(any, plane);
    }
    return any;
  };
  const known = (set: Plane): Truth<Plane> => ({ sure: set, maybe: set });
  /** `open`: words that leave the answer open. */
  const open = <W>(
    planes: readonly (Plane | undefined)[] | undefined,
    words: readonly W[],
    wanted: readonly W[],
    undecided: readonly W[],
  ): Truth<Plane> => ({
    sure: union(planes, words, wanted),
    maybe: union(planes, words, [...wanted, ...undecided]),
  });
  return {
    none: emptySet(count),
    all: fullSet(count),
    and: (a, b) => a.map((word, i) => word & (b[i] as number)),
    or: (a, b) => a.map((word, i) => word | (b[i] as number)),
    not: (a) =>
      trim(
        a.map((word) => ~word),
        count,
      ),
    position: (input, positions) => positionMask(radices, input, positions, count),
    actuator: (i, verdicts) =>
      open(data.actuatorPlanes[i], ACTUATOR_VERDICTS, verdicts, ['undetermined', 'rests on pressure']),
    pump: (i, verdicts) => open(data.pumpPlanes[i], PUMP_VERDICTS, verdicts, ['rests on pressure']),
    line: (i, classes) => known(union(data.linePlanes[i], LINE_CLASSES, classes)),
    blocked: (i, kinds) => known(union(data.blockedPlanes[i], BLOCKED_KINDS, kinds)),
    trapped: (i, reasons) => known(union(data.trapPlanes[i], TRAP_REASONS, reasons)),
    figure,
  };
}

/** Asked of a panel too large to list: what open paths alone do not decide. */
export class NeedsTable extends Error {
  constructor(what: string) {
    super(`${what} is decided row by row, and this circuit has too many rows to list`);
    this.name = 'NeedsTable';
  }
}

/**
 * Rules on a panel of any size, from exact sets of open paths: lever and coil positions, verdicts of actuators and
 * pumps, line classes, blocked and trapped lines. Throws `NeedsTable` at everything else, and `TooManyNodes` where motions are too entangled.
 */
export function openPathSource(net: Network, conditions: PathConditions, paths: SettledPaths): RuleSource<Diagram> {
  const { sets } = paths;
  // Motions take more than open paths, so they are sought when a rule speaks of them.
  const panel = new PanelSets(net, conditions, paths);
  // Where a dependent valve may stand elsewhere, nothing is sure of any line.
  const moved = (paths.settled?.open ?? []).reduce((all: Diagram, set) => sets.or(all, set), NONE);
  const known = (set: Diagram): Truth<Diagram> => ({ sure: sets.minus(set, moved), maybe: sets.or(set, moved) });
  const union = <W>(found: readonly Diagram[] | undefined, words: readonly W[], wanted: readonly W[]): Diagram =>
    wanted.reduce((all: Diagram, word) => sets.or(all, found?.[words.indexOf(word)] ?? NONE), NONE);
  return {
    none: NONE,
    all: ALL,
    and: (a, b) => sets.and(a, b),
    or: (a, b) => sets.or(a, b),
    not: (a) => sets.not(a),
    position: (input, positions) => sets.literal(input, positions),
    actuator: (i, verdicts) => {
      const found = panel.actuator(i).verdicts;
      return {
        sure: union(found, ACTUATOR_VERDICTS, verdicts),
        maybe: union(found, ACTUATOR_VERDICTS, [...verdicts, 'undetermined', 'rests on pressure']),
      };
    },
    pump: (i, verdicts) => {
      const found = panel.pump(i);
      return {
        sure: union(found, PUMP_VERDICTS, verdicts),
        maybe: union(found, PUMP_VERDICTS, [...verdicts, 'rests on pressure']),
      };
    },
    line: (i, classes) => {
      // Only motions tell a line that carries displaced oil from one that is cut off.
      if (!classes.includes('cut off') && !classes.includes('carries displaced oil')) {
        const plain = PATH_CLASSES.filter((word) => classes.includes(word));
        return known(plain.reduce((all: Diagram, word) => sets.or(all, classSet(paths, i, word)), NONE));
      }
      return known(union(panel.lines.classes[i], LINE_CLASSES, classes));
    },
    blocked: (i, kinds) => {
      const found = union(panel.lines.blocked[i], BLOCKED_KINDS, kinds);
      // Where pressures decide what moves, they also decide whether oil gets on.
      const away = kinds.map((kind) => classSet(paths, i, kind === 'cut off' ? 'cut off' : 'fed'));
      const perhaps = sets.and(
        panel.open,
        away.reduce((all, set) => sets.or(all, set), NONE),
      );
      return { sure: sets.minus(found, sets.or(panel.open, moved)), maybe: sets.or(found, sets.or(perhaps, moved)) };
    },
    trapped: (i, reasons) => {
      const found = union(panel.traps[i], TRAP_REASONS, reasons);
      return { sure: sets.minus(found, sets.or(panel.moving, moved)), maybe: sets.or(found, moved) };
    },
    figure: ({ type }) => {
      throw new NeedsTable(type === 'pressure' ? 'A pressure' : 'A speed');
    },
  };
}
