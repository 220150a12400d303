import type { RowNumbers } from '../analysis/results.ts';
import { defaultUnit, formatNumber, toUnit } from '../base/units.ts';
import type { Quantity, UnitSystem } from '../base/units.ts';
import type { StateTable } from '../engine/table/state-table.ts';
import { record } from './record.ts';

/** Where the steady pressures, flows and speeds of a report come from. */
export interface NumberSource {
  readonly units: UnitSystem;
  /** Labels of the relief valves, in the order of `RowNumbers.reliefs`. */
  readonly reliefs: readonly string[];
  /** SI, in the order asked; rows 0-based. Asked in parts, since each row takes a calculation. */
  readonly of: (rows: readonly number[]) => readonly RowNumbers[];
}

/** The figures of one row in shown units, by shown names; 6 significant digits. */
export type RowFigures =
  SolvedFigures | { readonly status: Exclude<RowNumbers['status'], 'solved'>; readonly words: string };

export interface SolvedFigures {
  readonly status: 'solved';
  /** Null = sealed, and no load says what stands in it. */
  readonly lines: Readonly<Record<string, number | null>>;
  /** Null = undetermined. Of a motor: rotary speed, torque. Outwards and A→B positive. */
  readonly actuators: Readonly<Record<string, Motion>>;
  /** Pressure null = stopped, with nothing at its outlet. */
  readonly pumps: Readonly<
    Record<string, { readonly pressure: number | null; readonly flow: number; readonly power: number }>
  >;
  readonly reliefs: Readonly<Record<string, number>>;
  /** What passes each part, in the direction in which it passes: `V1 P→A`. Still ones are left out. */
  readonly flows: Readonly<Record<string, { readonly flow: number; readonly drop: number }>>;
  /** `pumps + loads + stores = useful + lost`; stores are springs and accumulators. */
  readonly power: Readonly<Record<'pumps' | 'loads' | 'stores' | 'useful' | 'lost', number>>;
  /** The same by part; what a part gives is negative while a spring or an accumulator is charged. */
  readonly powerBy: Readonly<Record<string, Readonly<Record<'given' | 'useful' | 'lost', number>>>>;
}

interface Motion {
  readonly speed: number | null;
  readonly flow: number | null;
  readonly force: number | null;
}

/** Units of the figures, by what they measure. */
export const FIGURE_QUANTITIES = {
  pressure: 'pressure',
  flow: 'flow',
  speed: 'speed',
  rotarySpeed: 'frequency',
  force: 'force',
  torque: 'torque',
  power: 'power',
} as const satisfies Record<string, Quantity>;
export type FigureUnits = Readonly<Record<keyof typeof FIGURE_QUANTITIES, string>>;

export const figureUnits = (system: UnitSystem): FigureUnits => ({
  pressure: defaultUnit('pressure', system),
  flow: defaultUnit('flow', system),
  speed: defaultUnit('speed', system),
  rotarySpeed: defaultUnit('frequency', system),
  force: defaultUnit('force', system),
  torque: defaultUnit('torque', system),
  power: defaultUnit('power', system),
});

export const NUMBERS_LEGEND =
  'Numbers are steady pressures, flows and speeds from entered and assumed values; speeds inwards and B→A are negative.';

/** m³/s (0.01 L/min): what flows less is still, as for the verdicts. */
const STILL = 0.01e-3 / 60;
/** Pa, N (N·m), W: below the accuracy of the calculation. */
const NOTHING = { pressure: 500, force: 0.1, torque: 0.1, power: 0.1 } as const;
/** Pa: what a line to tank may stand at. */
const NEAR_TANK = 5e4;
const JSON_DIGITS = 6;
const SHOWN_DIGITS = 3;

/** A figure for people, without its unit; blank = there is none. */
export const sayFigure = (figure: number | null | undefined): string =>
  figure === null || figure === undefined ? '' : formatNumber(figure, SHOWN_DIGITS);

export function rowFigures(numbers: RowNumbers, table: StateTable, { units, reliefs }: NumberSource): RowFigures {
  const { row, status } = numbers;
  if (status !== 'solved') return { status, words: numbers.words ?? 'No steady state was found.' };
  const { lines, actuators, pumps } = table.data;
  const figure = (si: number, quantity: Quantity, nothing: number): number =>
    Math.abs(si) < nothing ? 0 : Number(toUnit(si, quantity, defaultUnit(quantity, units)).toPrecision(JSON_DIGITS));
  const pressure = (si: number): number => figure(si, 'pressure', NOTHING.pressure);
  const flow = (si: number): number => figure(si, 'flow', STILL);
  const power = (si: number): number => figure(si, 'power', NOTHING.power);

  const motion = (i: number): Motion => {
    const state = numbers.actuators[i];
    if (!state || table.actuator(i, row) === 'undetermined') return { speed: null, flow: null, force: null };
    const rotary = actuators[i]?.motion === 'rotary';
    const still = state.flow <= STILL;
    const speed = rotary ? figure(state.speed / (2 * Math.PI), 'frequency', 0) : figure(state.speed, 'speed', 0);
    return {
      speed: still ? 0 : speed,
      flow: flow(state.flow),
      force: rotary ? figure(state.force, 'torque', NOTHING.torque) : figure(state.force, 'force', NOTHING.force),
    };
  };
  const pump = (i: number): SolvedFigures['pumps'][string] => {
    const state = numbers.pumps[i];
    const stands = state !== undefined && !(table.pump(i, row) === 'stopped' && state.pressure < NEAR_TANK);
    return {
      pressure: stands ? pressure(state.pressure) : null,
      flow: flow(state?.delivered ?? 0),
      power: power(state?.power ?? 0),
    };
  };
  const { power: given } = numbers;
  return {
    status,
    lines: record(
      lines.map(({ name }) => name),
      (i) => (isUnknown(table, i, row) ? null : pressure(numbers.lines[i] ?? 0)),
    ),
    actuators: record(
      actuators.map(({ label }) => label),
      motion,
    ),
    pumps: record(
      pumps.map(({ label }) => label),
      pump,
    ),
    reliefs: record(reliefs, (i) => flow(numbers.reliefs[i]?.flow ?? 0)),
    flows: record(numbers.flows.map(sayWay), (i) => {
      const through = numbers.flows[i];
      return { flow: flow(Math.abs(through?.flow ?? 0)), drop: pressure(Math.abs(through?.drop ?? 0)) };
    }),
    power: {
      pumps: power(given.pumps),
      loads: power(given.loads),
      stores: power(given.stores),
      useful: power(given.useful),
      lost: power(given.lost),
    },
    powerBy: record(
      numbers.shares.map(({ label }) => label),
      (i) => {
        const share = numbers.shares[i];
        return { given: power(share?.given ?? 0), useful: power(share?.useful ?? 0), lost: power(share?.lost ?? 0) };
      },
    ),
  };
}

/** `V1 P→A`, from where the oil comes to where it goes; of an accumulator `ACC in` or `ACC out`. */
function sayWay({ label, from, to, flow }: RowNumbers['flows'][number]): string {
  if (to === undefined) return `${label} ${flow > 0 ? 'in' : 'out'}`;
  return flow > 0 ? `${label} ${from}→${to}` : `${label} ${to}→${from}`;
}

/** A sealed line keeps what was in it; only a load gives it a pressure that can be worked out. */
function isUnknown(table: StateTable, line: number, row: number): boolean {
  return table.blocked(line, row) === 'cut off' && !table.trapped(line, row).includes('load');
}

/** Why the row lacks figures, for its notes. */
export function figureNotes(figures: RowFigures): string[] {
  if (figures.status !== 'solved') return [`no steady numbers: ${figures.words}`];
  const open = Object.entries(figures.actuators).flatMap(([label, { speed }]) => (speed === null ? [label] : []));
  return open.length === 0 ? [] : [`${open.join(', ')}: undetermined, so no speed is given`];
}
