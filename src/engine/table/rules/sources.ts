import { emptySet, fullSet, orInto, trim } from '../../../base/bits.ts';
import type { Network } from '../../../network/network.ts';
import type { Diagram } from '../../paths/diagrams/diagrams.ts';
import { ALL, NONE } from '../../paths/diagrams/diagrams.ts';
import { motionSets } from '../../paths/diagrams/motion-sets.ts';
import type { MotionSets } from '../../paths/diagrams/motion-sets.ts';
import { classSet } from '../../paths/diagrams/open-paths.ts';
import type { OpenPathSets } from '../../paths/diagrams/open-paths.ts';
import { positionMask } from '../../paths/edges.ts';
import type { PathConditions } from '../../paths/reach.ts';
import { verdictSets } from '../fold/verdict-sets.ts';
import type { Plane, TableData } from '../table-data.ts';
import { ACTUATOR_VERDICTS, BLOCKED_KINDS, LINE_CLASSES, PUMP_VERDICTS, TRAP_REASONS } from '../words.ts';
import type { ActuatorVerdict } from '../words.ts';
import type { RuleSource, Truth } from './evaluate.ts';
import { sealedSets } from './sealed-sets.ts';

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
 * Rules on a panel of any size, from exact sets of open paths: lever and coil positions, actuator verdicts,
 * line classes, blocked and trapped lines as far as open paths are sure of them, and whether a pump is unloaded by a free path to tank. Throws `NeedsTable` at everything else,
 * and `TooManyNodes` where motions are too entangled.
 */
export function openPathSource(net: Network, conditions: PathConditions, paths: OpenPathSets): RuleSource<Diagram> {
  const { sets } = paths;
  // Motions take more than open paths, so they are sought when a rule speaks of them.
  let motions: MotionSets | undefined;
  const moving = (): MotionSets => (motions ??= motionSets(net, conditions, paths));
  const sealed = sealedSets(net, conditions, paths, moving);
  const verdicts = new Map<number, ReadonlyMap<ActuatorVerdict, Diagram>>();
  const verdictsOf = (i: number): ReadonlyMap<ActuatorVerdict, Diagram> => {
    const found = verdicts.get(i) ?? verdictSets(net, conditions, paths, moving(), i);
    verdicts.set(i, found);
    return found;
  };
  const known = (set: Diagram): Truth<Diagram> => ({ sure: set, maybe: set });
  return {
    none: NONE,
    all: ALL,
    and: (a, b) => sets.and(a, b),
    or: (a, b) => sets.or(a, b),
    not: (a) => sets.not(a),
    position: (input, positions) => sets.literal(input, positions),
    actuator: (i, verdicts) => {
      const found = verdictsOf(i);
      const union = (words: readonly ActuatorVerdict[]): Diagram =>
        words.reduce((set: Diagram, word) => sets.or(set, found.get(word) ?? NONE), NONE);
      return { sure: union(verdicts), maybe: union([...verdicts, 'undetermined', 'rests on pressure']) };
    },
    pump: (i, verdicts) => {
      const pump = net.pumps[i];
      const label = net.parts[pump?.part ?? -1]?.label ?? 'a pump';
      if (!conditions.pumpsRunning || pump?.atRest) return known(verdicts.includes('stopped') ? ALL : NONE);
      if (verdicts.some((word) => word !== 'unloaded') || pump === undefined)
        throw new NeedsTable(`More of ${label} than whether a free path to tank unloads it`);
      // Pressures may find it unloaded over a throttle too.
      return {
        sure: sets.minus(paths.freeToTank[pump.outlet] as Diagram, paths.hunts),
        maybe: sets.or(paths.toTank[pump.outlet] as Diagram, paths.hunts),
      };
    },
    line: (i, classes) => {
      let sure: Diagram = NONE;
      for (const word of classes)
        if (word !== 'carries displaced oil' && word !== 'cut off') sure = sets.or(sure, classSet(paths, i, word));
      const [cutOff, carries] = [classes.includes('cut off'), classes.includes('carries displaced oil')];
      if (!cutOff && !carries) return known(sure);
      const shut = classSet(paths, i, 'cut off');
      if (cutOff && carries) return known(sets.or(sure, shut));
      // Only motions tell a line that carries displaced oil from one that is cut off.
      const displaced = sets.and(shut, moving().carries[i] as Diagram);
      return known(sets.or(sure, carries ? displaced : sets.minus(shut, displaced)));
    },
    blocked: sealed.blocked,
    trapped: sealed.trapped,
    figure: ({ type }) => {
      throw new NeedsTable(type === 'pressure' ? 'A pressure' : 'A speed');
    },
  };
}
