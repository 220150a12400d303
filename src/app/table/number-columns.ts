import { defaultUnit, formatNumber, toUnit } from '../../base/units.ts';
import type { Quantity, UnitSystem } from '../../base/units.ts';
import type { RowNumbers, StateTable } from '../../worker/client.ts';
import { pressureKnown } from '../state/assumed.ts';
import type { NumberGroup } from '../state/view.svelte.ts';
import type { CellFigure } from './cell-figures.ts';
import type { Column, ColumnGroup } from './columns.ts';

/** What the table can show beside verdicts, if asked for. */
export const NUMBER_GROUPS: readonly { readonly id: NumberGroup; readonly title: string; readonly ask: string }[] = [
  { id: 'lines', title: 'Line pressures', ask: 'Pressure of every line' },
  { id: 'forces', title: 'Forces', ask: 'Force of every actuator' },
  { id: 'flows', title: 'Flows', ask: 'Flow of actuators, pumps and paths' },
  { id: 'power', title: 'Power', ask: 'Power: given, useful, lost, stored' },
];

/** As the power of a row adds up: `pumps + loads + stores = useful + lost`. */
const POWER = ['pumps', 'loads', 'stores', 'useful', 'lost'] as const;

const DIGITS = 3;
/** SI; less is nought: Pa, m³/s (0.01 L/min), W, N (N·m). */
const NOUGHT: Readonly<Partial<Record<Quantity, number>>> = {
  pressure: 1e4,
  flow: 0.01e-3 / 60,
  power: 0.1,
  force: 0.1,
  torque: 0.1,
};

const plain = (si: number, quantity: Quantity, units: UnitSystem): string =>
  formatNumber(Math.abs(si) < (NOUGHT[quantity] ?? 0) ? 0 : toUnit(si, quantity, defaultUnit(quantity, units)), DIGITS);

const forceOf = (motion: 'linear' | 'rotary'): Quantity => (motion === 'rotary' ? 'torque' : 'force');

/** The columns of these groups, before the lists of blocked and trapped lines. */
export function numberColumns({ data }: StateTable, groups: readonly NumberGroup[], units: UnitSystem): ColumnGroup[] {
  const column = (id: string, label: string, quantity: Quantity): Column => {
    const title = `${label}, ${defaultUnit(quantity, units)}`;
    const width = Math.ceil(Math.max(56, title.length * 7.4 + 18));
    return { id, of: 'number', index: 0, title, width, track: `${width}px` };
  };
  const through: Column = {
    id: 'through',
    of: 'number',
    index: 0,
    title: `through parts, ${defaultUnit('flow', units)}`,
    width: 220,
    track: 'minmax(220px, 1.4fr)',
  };
  const columns: Readonly<Record<NumberGroup, () => Column[]>> = {
    lines: () => data.lines.map(({ name }, i) => column(`pressure:${i}`, name, 'pressure')),
    forces: () => data.actuators.map(({ label, motion }, i) => column(`force:${i}`, label, forceOf(motion))),
    flows: () => [
      ...data.actuators.map(({ label }, i) => column(`flow:${i}`, label, 'flow')),
      ...data.pumps.map(({ label }, i) => column(`delivered:${i}`, label, 'flow')),
      through,
    ],
    power: () => POWER.map((share) => column(`power:${share}`, share, 'power')),
  };
  return NUMBER_GROUPS.filter(({ id }) => groups.includes(id))
    .map(({ id, title }) => ({ title, columns: columns[id]() }))
    .filter((group) => group.columns.length > 0);
}

/** Cells of those columns, by column id. `assumed`: values that nobody entered have a say in them. */
export function numberCells(
  table: StateTable,
  numbers: RowNumbers,
  units: UnitSystem,
  assumed: boolean,
): Map<string, CellFigure> {
  const out = new Map<string, CellFigure>();
  const { data } = table;
  if (numbers.status !== 'solved') return out;
  const put = (id: string, si: number, quantity: Quantity): void => {
    out.set(id, { text: plain(si, quantity, units), assumed });
  };
  data.lines.forEach((_, i) => {
    const unknown = { text: '?', assumed: false, why: 'It is shut in, and nobody knows what was left there' };
    if (pressureKnown(table, i, numbers.row)) put(`pressure:${i}`, numbers.lines[i] ?? 0, 'pressure');
    else out.set(`pressure:${i}`, unknown);
  });
  data.actuators.forEach(({ motion }, i) => {
    const state = numbers.actuators[i];
    if (!state || table.actuator(i, numbers.row) === 'undetermined') return;
    put(`force:${i}`, state.force, forceOf(motion));
    put(`flow:${i}`, state.flow, 'flow');
  });
  data.pumps.forEach((_, i) => put(`delivered:${i}`, numbers.pumps[i]?.delivered ?? 0, 'flow'));
  const ways = numbers.flows.map(({ label, from, to, flow }) => {
    const way = to === undefined ? (flow > 0 ? 'in' : 'out') : flow > 0 ? `${from}→${to}` : `${to}→${from}`;
    return `${label} ${way} ${plain(Math.abs(flow), 'flow', units)}`;
  });
  out.set('through', { text: ways.join(', ') || '–', assumed: assumed && ways.length > 0, why: ways.join(', ') });
  for (const share of POWER) put(`power:${share}`, numbers.power[share], 'power');
  return out;
}
