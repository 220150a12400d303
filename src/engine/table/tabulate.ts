import { emptySet, isEmpty, wordsFor } from '../../base/bits.ts';
import type { Budget } from '../../base/budget.ts';
import { Cancelled, part } from '../../base/budget.ts';
import { dependentLabel } from '../../network/dependents.ts';
import type { Network } from '../../network/network.ts';
import { PathSolver } from '../paths/block.ts';
import { compileEdges } from '../paths/edges.ts';
import { REST_REASONS } from '../paths/motion-bits.ts';
import type { PathConditions } from '../paths/reach.ts';
import { actuatorOutcome } from './actuator-outcomes.ts';
import { dependentPlanes, doubt } from './doubt.ts';
import { settleRows } from './dependents.ts';
import type { DependentRows } from './dependents.ts';
import { lineOutcomes } from './line-outcomes.ts';
import { PlanePool, PlaneSheet } from './planes.ts';
import { resolveBlock } from './resolve-block.ts';
import type { Allowance, Resolved } from './resolve-block.ts';
import { PressureSolver } from './resolve.ts';
import { pumpOutcome } from './pump-outcomes.ts';
import { pathPlanes } from './sets/path-planes.ts';
import type { Plane, TableData } from './table-data.ts';
import { TouchFinder } from './touched.ts';
import { leftBehind, leverMoves, standingReasons } from './trapped.ts';
import {
  ACTUATOR_NOTES,
  ACTUATOR_VERDICTS,
  BLOCKED_KINDS,
  LINE_CLASSES,
  PUMP_VERDICTS,
  TRAP_REASONS,
} from './words.ts';

/** Words of one block: 4,096 states; small enough for the cache, large enough to hide the overhead. */
const BLOCK = 128;
const CUT_OFF = LINE_CLASSES.indexOf('cut off');
const FED = LINE_CLASSES.indexOf('fed');
const LOAD = TRAP_REASONS.indexOf('load');
const LEFT_BEHIND = TRAP_REASONS.indexOf('left behind');
const STOPPED = TRAP_REASONS.indexOf('stopped');
const STORED = TRAP_REASONS.indexOf('stored');
const HEAT = TRAP_REASONS.indexOf('heat');

interface Sheets {
  readonly actuators: PlaneSheet;
  readonly notes: PlaneSheet;
  readonly rests: PlaneSheet;
  readonly pumps: PlaneSheet;
  readonly lines: PlaneSheet;
  readonly blocked: PlaneSheet;
  readonly trapped: PlaneSheet;
  /** One kind only: what the state may leave under pressure. */
  readonly under: PlaneSheet;
  /** One item and kind: rows whose verdicts rest on entered or assumed values. */
  readonly valued: PlaneSheet;
  /** One kind: the same by actuator, pump. */
  readonly valuedActuators: PlaneSheet;
  readonly valuedPumps: PlaneSheet;
  /** One kind only: oil passes it over a valve that pressures open. */
  readonly flowing: PlaneSheet;
  readonly dependents: DependentRows | undefined;
}

export interface TableOptions {
  /** Rows that the pressure layer may solve where open paths leave the verdict to it; 0 = open paths alone. */
  readonly pressureRows: number;
  /** Go through the rows also where sets of rows are faster; the table is the same. */
  readonly rowByRow?: boolean;
}

/**
 * The whole state table of a network: open paths, and pressures where those leave the verdict to them.
 * Throws `Cancelled` when the budget says so.
 * Open paths alone are found as sets of rows (`pathPlanes`), whose cost is that of the circuit rather than of
 * its rows. Where the sets get entangled, or pressures are asked for, the cost grows with states × paths / 32.
 * Memory is the planes that come out, equal ones kept once.
 */
export function tabulate(
  net: Network,
  conditions: PathConditions,
  budget: Budget,
  options: TableOptions = { pressureRows: 0 },
): TableData {
  if (options.pressureRows === 0 && options.rowByRow !== true && net.dependents.length === 0) {
    const planes = pathPlanes(net, conditions, budget);
    if (planes) {
      budget.progress(1);
      return {
        pumpsRunning: conditions.pumpsRunning,
        ...describe(net),
        count: net.inputs.reduce((n, input) => n * input.positions.length, 1),
        ...commandCounts(net),
        ...planes,
        valued: undefined,
        valuedActuators: [],
        valuedPumps: [],
        ...dependentPlanes(undefined, new PlanePool()),
      };
    }
  }
  const radices = net.inputs.map((input) => input.positions.length);
  const states = radices.reduce((n, r) => n * r, 1);
  const share = conditions.pumpsRunning ? 1 : 0.5;
  const running = runBlocks(
    net,
    { ...conditions, pumpsRunning: true },
    part(budget, 0, share),
    conditions.pumpsRunning ? options.pressureRows : 0,
    options.pressureRows,
  );
  const moves = leverMoves(radices, states);
  const left = net.lines
    .slice(0, net.shown)
    .map((_, line) => leftBehind(moves, running.lines.get(line, CUT_OFF), running.under.get(line, 0), states));
  let sheets = running;
  if (conditions.pumpsRunning) {
    left.forEach((plane, line) => putTrap(running, line, LEFT_BEHIND, plane));
  } else {
    sheets = runBlocks(net, conditions, part(budget, share, 1), options.pressureRows, options.pressureRows);
    for (let line = 0; line < net.shown; line++) {
      const cutOff = sheets.lines.get(line, CUT_OFF);
      putTrap(sheets, line, LEFT_BEHIND, meet(cutOff, left[line], states));
      putTrap(sheets, line, STOPPED, meet(cutOff, running.under.get(line, 0), states));
      // With the pumps stopped only a charged accumulator can feed a line.
      const stored = sheets.lines.get(line, FED);
      if (stored) putTrap(sheets, line, STORED, stored.slice());
    }
  }
  const pool = new PlanePool();
  return {
    pumpsRunning: conditions.pumpsRunning,
    ...describe(net),
    count: states,
    ...commandCounts(net),
    actuatorPlanes: sheets.actuators.finish(pool),
    actuatorNotes: sheets.notes.finish(pool),
    actuatorRests: sheets.rests.finish(pool),
    pumpPlanes: sheets.pumps.finish(pool),
    linePlanes: sheets.lines.finish(pool),
    blockedPlanes: sheets.blocked.finish(pool),
    trapPlanes: sheets.trapped.finish(pool),
    valued: sheets.valued.finish(pool)[0]?.[0],
    valuedActuators: sheets.valuedActuators.finish(pool).map(([plane]) => plane),
    valuedPumps: sheets.valuedPumps.finish(pool).map(([plane]) => plane),
    ...dependentPlanes(sheets.dependents, pool),
  };
}

/** `pressureRows`: rows whose verdicts the pressures may decide; `settledRows`: rows whose dependent valves they may. */
function runBlocks(
  net: Network,
  conditions: PathConditions,
  budget: Budget,
  pressureRows: number,
  settledRows: number,
): Sheets {
  let pressures = net.dependents.length > 0 && settledRows > 0 ? new PressureSolver(net, conditions) : undefined;
  const dependents = settleRows(net, conditions, budget, settledRows, pressures);
  if (pressures) pressures.settings = dependents?.planes;
  const edges = compileEdges(net, dependents?.planes);
  const { states } = edges;
  const words = wordsFor(states);
  const sheets: Sheets = {
    actuators: new PlaneSheet(net.actuators.length, ACTUATOR_VERDICTS.length, states),
    notes: new PlaneSheet(net.actuators.length, ACTUATOR_NOTES.length, states),
    rests: new PlaneSheet(net.actuators.length, REST_REASONS.length, states),
    pumps: new PlaneSheet(net.pumps.length, PUMP_VERDICTS.length, states),
    lines: new PlaneSheet(net.shown, LINE_CLASSES.length, states),
    blocked: new PlaneSheet(net.shown, BLOCKED_KINDS.length, states),
    trapped: new PlaneSheet(net.shown, TRAP_REASONS.length, states),
    under: new PlaneSheet(net.shown, 1, states),
    valued: new PlaneSheet(1, 1, states),
    flowing: new PlaneSheet(net.shown, 1, states),
    valuedActuators: new PlaneSheet(net.actuators.length, 1, states),
    valuedPumps: new PlaneSheet(net.pumps.length, 1, states),
    dependents,
  };
  const allowance: Allowance = { rows: pressureRows, every: states <= pressureRows };
  const touch = dependents && new TouchFinder(net, conditions, Math.min(BLOCK, words));
  const solver = new PathSolver(net, edges, conditions, Math.min(BLOCK, words));
  for (let at = 0; at < words; at += BLOCK) {
    if (budget.cancelled()) throw new Cancelled();
    budget.progress(at / words);
    const width = Math.min(BLOCK, words - at);
    const block = solver.solve(at, width);
    const write = (sheet: PlaneSheet, item: number, planes: readonly Uint32Array[]): void =>
      planes.forEach((plane, kind) => sheet.write(item, kind, at, plane));

    const actuators = net.actuators.map((actuator, i) => actuatorOutcome(i, actuator, block, conditions));
    const pumps = net.pumps.map((pump, i) => pumpOutcome(i, pump, net, block, conditions));
    let flowing: Resolved['flowing'] = new Map();
    if (allowance.rows > 0) {
      pressures ??= new PressureSolver(net, conditions, dependents?.planes);
      const resolved = resolveBlock(
        block,
        actuators,
        pumps,
        pressures,
        allowance,
        part(budget, at / words, (at + width) / words),
      );
      flowing = resolved.flowing;
      sheets.valued.write(0, 0, at, resolved.valued);
      resolved.actuators.forEach((plane, i) => sheets.valuedActuators.write(i, 0, at, plane));
      resolved.pumps.forEach((plane, i) => sheets.valuedPumps.write(i, 0, at, plane));
    }
    if (touch && dependents)
      doubt(sheets, dependents, touch.at(at, width, dependents), at, width, block, actuators, pumps);
    actuators.forEach((outcome, i) => {
      write(sheets.actuators, i, outcome.verdicts);
      write(sheets.notes, i, outcome.notes);
      write(sheets.rests, i, block.motion.rests[i] ?? []);
    });
    pumps.forEach((planes, i) => write(sheets.pumps, i, planes));
    const { classes, blocked } = lineOutcomes(net, edges, conditions, block);
    const standing = standingReasons(net, edges, conditions, block, (line) => classes[line]?.[CUT_OFF]);
    for (const [line, plane] of flowing) {
      sheets.flowing.write(line, 0, at, plane);
      for (const other of [...(blocked[line] ?? []), standing[line]?.load, standing[line]?.heat]) remove(other, plane);
    }
    for (let line = 0; line < net.shown; line++) {
      write(sheets.lines, line, classes[line] ?? []);
      write(sheets.blocked, line, blocked[line] ?? []);
      sheets.under.write(line, 0, at, block.reach.leaves.slice(line * width, (line + 1) * width));
      sheets.trapped.write(line, LOAD, at, standing[line]?.load ?? new Uint32Array(width));
      sheets.trapped.write(line, HEAT, at, standing[line]?.heat ?? new Uint32Array(width));
    }
  }
  budget.progress(1);
  return sheets;
}

function putTrap(sheets: Sheets, line: number, reason: number, plane: Plane): void {
  remove(plane, sheets.flowing.get(line, 0));
  if (!isEmpty(plane)) sheets.trapped.put(line, reason, plane);
}

function remove(plane: Plane | undefined, other: Plane | undefined): void {
  if (plane && other) for (let w = 0; w < plane.length; w++) plane[w] = (plane[w] as number) & ~(other[w] as number);
}

function meet(a: Plane | undefined, b: Plane | undefined, states: number): Plane {
  const out = emptySet(states);
  if (a && b) for (let w = 0; w < out.length; w++) out[w] = (a[w] as number) & (b[w] as number);
  return out;
}

function describe(net: Network): Pick<TableData, 'inputs' | 'dependents' | 'actuators' | 'pumps' | 'lines'> {
  const named = (part: number): { part: string; label: string } => {
    const entry = net.parts[part];
    return { part: entry?.id ?? '', label: entry?.label ?? '' };
  };
  return {
    inputs: net.inputs.map(({ part, positions, rest, by, coils }) => ({
      ...named(part),
      positions,
      ...(rest === undefined ? {} : { rest }),
      by,
      coils,
    })),
    dependents: net.dependents.map(({ part, positions, rest }, d) => ({
      part: net.parts[part]?.id ?? '',
      label: dependentLabel(net, d),
      positions,
      ...(rest === undefined ? {} : { rest }),
    })),
    actuators: net.actuators.map(({ part, rotary }) => ({
      ...named(part),
      motion: rotary ? ('rotary' as const) : ('linear' as const),
    })),
    pumps: net.pumps.map(({ part }) => named(part)),
    lines: net.lines.slice(0, net.shown).map(({ name, ports, connections }) => ({ name, ports, connections })),
  };
}

/** Coil and lever combinations in all, and those with opposed coils of one valve on at once. */
export function commandCounts(net: Network): { commandCombinations: number; notPermitted: number } {
  let all = 1;
  let permitted = 1;
  for (const { positions, coils } of net.inputs) {
    if (coils.length === 0) {
      all *= positions.length;
      permitted *= positions.length;
    } else {
      all *= 2 ** coils.length;
      permitted *= coils.length + 1;
    }
  }
  return { commandCombinations: all, notPermitted: all - permitted };
}
