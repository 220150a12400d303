import type { UnitSystem } from '../../base/units.ts';
import { lineAssumed, speedsAssumed } from '../state/assumed.ts';
import type { Assumed } from '../state/assumed.ts';
import { NEAR_NOTHING, pressureUnit, sayPressure, sayPump, saySpeed, speedUnit } from '../state/figure-texts.ts';
import type { RowNumbers, StateTable } from '../../worker/client.ts';
import type { FigureHeads } from './columns.ts';

/** A figure beside a verdict, in the unit of its column's head. */
export interface CellFigure {
  readonly text: string;
  readonly assumed: boolean;
  readonly why?: string | undefined;
}

/** By column id; `line:` and its index for pressures that a load keeps in a line. */
export type RowFigures = ReadonlyMap<string, CellFigure>;

export const figureHeads = ({ data }: StateTable, units: UnitSystem, assumed: Assumed): FigureHeads => ({
  actuators: data.actuators.map(({ motion }) => ({ unit: speedUnit(motion, units), assumed: false })),
  // Every pressure of a pump comes about by flow through the whole circuit.
  pumps: data.pumps.map(() => ({ unit: pressureUnit(units), assumed: assumed.anywhere })),
});

const ASSUMED = 'Rests on assumed values that nobody entered';

export function rowFigures(table: StateTable, numbers: RowNumbers, units: UnitSystem, assumed: Assumed): RowFigures {
  const out = new Map<string, CellFigure>();
  const put = (id: string, text: string | undefined, rests: boolean): void => {
    if (text !== undefined) out.set(id, { text, assumed: rests, why: rests ? ASSUMED : undefined });
  };
  const solved = numbers.status === 'solved';
  const rests = solved ? speedsAssumed(assumed, table, numbers) : [];
  const none = { text: '–', assumed: false, why: numbers.words };
  table.data.actuators.forEach(({ motion }, i) => {
    if (table.actuator(i, numbers.row) === 'undetermined')
      out.set(`actuator:${i}`, { text: '–', assumed: false, why: 'The circuit leaves open how fast it goes' });
    else if (solved) {
      put(`actuator:${i}`, saySpeed(numbers.actuators[i]?.speed ?? 0, motion, units, true), rests[i] ?? false);
    } else out.set(`actuator:${i}`, none);
  });
  table.data.pumps.forEach((_, i) => {
    if (solved)
      put(`pump:${i}`, sayPump(numbers.pumps[i]?.pressure, table.pump(i, numbers.row), units, true), assumed.anywhere);
    else out.set(`pump:${i}`, none);
  });
  // Only a load gives shut-in oil a pressure that can be worked out.
  if (solved) {
    table.data.lines.forEach((_, line) => {
      if (!table.trapped(line, numbers.row).includes('load')) return;
      const pressure = numbers.lines[line] ?? 0;
      if (pressure >= NEAR_NOTHING)
        put(`line:${line}`, sayPressure(pressure, units), lineAssumed(assumed, table, line, numbers.row));
    });
  }
  return out;
}
