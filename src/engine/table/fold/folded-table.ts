import type { Budget } from '../../../base/budget.ts';
import { Cancelled } from '../../../base/budget.ts';
import type { Diagram } from '../../paths/diagrams/diagrams.ts';
import { ALL, Diagrams, NONE } from '../../paths/diagrams/diagrams.ts';
import { classSet, PATH_CLASSES } from '../../paths/diagrams/open-paths.ts';
import type { OpenPathSets, PathClass } from '../../paths/diagrams/open-paths.ts';
import { planeToDiagram } from '../../paths/diagrams/plane.ts';
import type { Plane, TableData } from '../table-data.ts';
import { ACTUATOR_VERDICTS, LINE_CLASSES, PUMP_VERDICTS } from '../words.ts';
import type { ActuatorVerdict, LineClass, PumpVerdict } from '../words.ts';
import { coverOf } from './cover.ts';
import { cubeCount } from './cube.ts';
import type { Cube } from './cube.ts';

/** "Valves in these positions, the rest any": what comes out, and in how many combinations. */
export interface FoldedRow<W> {
  readonly cube: Cube;
  readonly outcome: W;
  /** Combinations of this row; rows of one outcome may share some. */
  readonly count: bigint;
}

/** All combinations of one actuator, pump or line: the rows, and one outcome for everything else. */
export interface Folded<W> {
  readonly rows: readonly FoldedRow<W>[];
  readonly otherwise: W;
  readonly otherwiseCount: bigint;
  /** No description of any outcome has fewer rows; where false it is not known. */
  readonly least: boolean;
}

export interface FoldedTable {
  readonly actuators: readonly Folded<ActuatorVerdict>[];
  readonly pumps: readonly Folded<PumpVerdict>[];
  readonly lines: readonly Folded<LineClass>[];
}

/**
 * Outcomes exclude each other and leave no combination out, which is checked, as is every description against its
 * set. The commonest outcome is the rest; of several the one of the combination `usual`, or else the first. Throws
 * `TooManyCubes` where one outcome takes more than `most` rows.
 */
export function foldOutcomes<W>(
  sets: Diagrams,
  outcomes: readonly { readonly word: W; readonly set: Diagram }[],
  usual: readonly number[] = [],
  most = Infinity,
): Folded<W> {
  const counted = outcomes.map((outcome) => ({ ...outcome, count: sets.count(outcome.set) }));
  const together = outcomes.reduce((all, { set }) => sets.or(all, set), NONE);
  const sum = counted.reduce((n, { count }) => n + count, 0n);
  if (together !== ALL || sum !== sets.total) throw new Error('outcomes overlap, or leave combinations out');
  const [first, ...others] = counted;
  if (first === undefined) throw new RangeError('there is no outcome');
  const rest = others.reduce((most, outcome) => {
    if (outcome.count !== most.count) return outcome.count > most.count ? outcome : most;
    return usual.length > 0 && sets.has(outcome.set, usual) ? outcome : most;
  }, first);
  let least = true;
  const rows = counted.flatMap(({ word, set }) => {
    if (set === NONE || word === rest.word) return [];
    const cover = coverOf(sets, set, most);
    if (!cover.least) least = false;
    return cover.cubes.map((cube) => ({ cube, outcome: word, count: cubeCount(cube) }));
  });
  return { rows, otherwise: rest.word, otherwiseCount: rest.count, least };
}

/** The whole table, folded item by item. Throws `Cancelled` when the budget says so. */
export function foldTable(data: TableData, budget: Budget): FoldedTable {
  const sets = new Diagrams(data.inputs.map((input) => input.positions.length));
  const items = data.actuators.length + data.pumps.length + data.lines.length;
  let done = 0;
  const fold = <W>(planes: readonly (Plane | undefined)[], words: readonly W[]): Folded<W> => {
    if (budget.cancelled()) throw new Cancelled();
    budget.progress(done / items);
    done += 1;
    return foldOutcomes(
      sets,
      words.map((word, i) => ({ word, set: planeToDiagram(sets, planes[i]) })),
    );
  };
  return {
    actuators: data.actuatorPlanes.map((planes) => fold(planes, ACTUATOR_VERDICTS)),
    pumps: data.pumpPlanes.map((planes) => fold(planes, PUMP_VERDICTS)),
    lines: data.linePlanes.map((planes) => fold(planes, LINE_CLASSES)),
  };
}

/** The class of one line by open paths alone, for panels too large to list. */
export function foldLine(paths: OpenPathSets, line: number): Folded<PathClass> {
  return foldOutcomes(
    paths.sets,
    PATH_CLASSES.map((word) => ({ word, set: classSet(paths, line, word) })),
  );
}
