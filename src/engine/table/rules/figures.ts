import { add, emptySet, fullSet } from '../../../base/bits.ts';
import type { Budget } from '../../../base/budget.ts';
import { Cancelled } from '../../../base/budget.ts';
import { parseQuantity } from '../../../base/units.ts';
import type { Quantity } from '../../../base/units.ts';
import type { PressureSolver } from '../resolve.ts';
import { rowNumbers } from '../row-numbers.ts';
import type { RowNumbers } from '../row-numbers.ts';
import { StateTable } from '../state-table.ts';
import type { Plane, TableData } from '../table-data.ts';
import { COMPARISONS } from './condition.ts';
import type { Comparison, FigureCondition } from './condition.ts';
import type { Truth } from './evaluate.ts';
import { Fault } from './reader.ts';
import type { Reader } from './reader.ts';

/** `over`, `under`, `at least`, `at most`; `above` and `below` are taken for the first two. */
export function readComparison(reader: Reader): Comparison {
  const words = [...COMPARISONS, 'above', 'below'];
  const found = reader.oneOf(words);
  if (found < 0)
    throw new Fault(
      reader.at,
      reader.ended ? 'Nothing is said of this pressure.' : `"${reader.next}" cannot be said of a pressure.`,
      `Say one of: ${COMPARISONS.join('; ')}; then a figure with its unit.`,
    );
  return COMPARISONS[found % COMPARISONS.length] as Comparison;
}

const EXAMPLES: Partial<Record<Quantity, readonly string[]>> = {
  pressure: ['160 bar', '2300 psi'],
  speed: ['100 mm/s', '4 in/s'],
  frequency: ['100 rpm'],
};

/** `160 bar`: a figure with its unit, SI. */
export function readFigure(reader: Reader, quantity: Quantity): number {
  for (const example of EXAMPLES[quantity] ?? []) reader.want('figure', example);
  // A unit may have a slash, and a full stop inside a figure is none at its end.
  const match = /^([+-]?[\d.,]+)\s*([^\s(),"]*)/.exec(reader.text.slice(reader.at));
  const [whole = '', number = '', unit = ''] = match ?? [];
  const text = match ? `${number} ${unit}` : reader.next;
  const read = parseQuantity(text.trim(), quantity);
  if (!read.ok) {
    const [problem] = read.problems;
    throw new Fault(reader.at, problem?.what ?? 'This is no figure.', problem?.remedy ?? '');
  }
  reader.at += whole.length;
  reader.skip();
  return read.value;
}

/** m³/s (0.01 L/min): what flows less is still, as for the verdicts. */
const STILL = 0.01e-3 / 60;
/** Pa: what a line to tank may stand at. */
const NEAR_TANK = 5e4;
/** Share of the limit within which a figure counts as equal to it: the accuracy of the calculation. */
const EQUAL = 1e-6;

const keyOf = (condition: FigureCondition): string => JSON.stringify(condition);

/**
 * Where conditions on pressures and speeds hold, each row solved once. Not decided: rows without a steady state,
 * the speed of an undetermined actuator, and the pressure of a sealed line that no load presses on, which keeps
 * whatever was in it. Throws `Cancelled` when the budget says so.
 */
export function figurePlanes(
  solver: PressureSolver,
  data: TableData,
  wanted: readonly FigureCondition[],
  budget: Budget,
): (condition: FigureCondition) => Truth<Plane> {
  const table = new StateTable(data);
  const planes = new Map(
    wanted.map((condition) => [
      keyOf(condition),
      { condition, truth: { sure: emptySet(data.count), maybe: emptySet(data.count) } },
    ]),
  );
  for (let row = 0; row < data.count; row++) {
    if (row % 64 === 0) {
      if (budget.cancelled()) throw new Cancelled();
      budget.progress(row / data.count);
    }
    const numbers = rowNumbers(solver, row);
    for (const { condition, truth } of planes.values()) {
      const figure = figureOf(table, numbers, condition);
      const holds = figure === undefined || compare(figure, condition);
      if (holds) add(truth.maybe, row);
      if (holds && figure !== undefined) add(truth.sure, row);
    }
  }
  return (condition) =>
    planes.get(keyOf(condition))?.truth ?? { sure: emptySet(data.count), maybe: fullSet(data.count) };
}

/** SI; undefined = there is no such figure in this row. */
function figureOf(table: StateTable, numbers: RowNumbers, condition: FigureCondition): number | undefined {
  const { row, status } = numbers;
  if (status !== 'solved') return undefined;
  if (condition.type === 'speed') {
    const state = numbers.actuators[condition.actuator];
    if (!state || table.actuator(condition.actuator, row) === 'undetermined') return undefined;
    return state.flow <= STILL ? 0 : Math.abs(state.speed);
  }
  const { of, index } = condition;
  if (of === 'pump') {
    const pressure = numbers.pumps[index]?.pressure;
    const stands = pressure !== undefined && !(table.pump(index, row) === 'stopped' && pressure < NEAR_TANK);
    return stands ? pressure : undefined;
  }
  const sealed = table.blocked(index, row) === 'cut off' && !table.trapped(index, row).includes('load');
  return sealed ? undefined : numbers.lines[index];
}

function compare(figure: number, { is, than }: FigureCondition): boolean {
  const near = EQUAL * Math.max(Math.abs(than), 1e-9);
  switch (is) {
    case 'over':
      return figure > than + near;
    case 'under':
      return figure < than - near;
    case 'at least':
      return figure >= than - near;
    case 'at most':
      return figure <= than + near;
  }
}
