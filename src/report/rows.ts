import type { Conditions, Explanation, Finding } from '../analysis/results.ts';
import { has } from '../base/bits.ts';
import { coilNames } from '../base/coil-names.ts';
import { labelOf } from '../circuit/model.ts';
import type { Circuit } from '../circuit/model.ts';
import type { StateTable } from '../engine/table/state-table.ts';
import type { TableData } from '../engine/table/table-data.ts';
import type { ActuatorVerdict, LineClass, PumpVerdict, RestReason, TrapReason } from '../engine/table/words.ts';
import { nameOfCase, sayConditions } from './conditions.ts';
import { figureNotes, figureUnits, rowFigures } from './figures.ts';
import type { FigureUnits, NumberSource, RowFigures } from './figures.ts';
import { record } from './record.ts';

/** What a report is made from. */
export interface ReportSource {
  /** Of this program. */
  readonly version: string;
  readonly circuit: Circuit;
  readonly conditions: Conditions;
  readonly table: StateTable;
  readonly findings: readonly Finding[];
  /** Asked for the rows that rest on pressures or are undetermined; absent = the report gives no reasons. */
  readonly explain?: (row: number) => Explanation;
  /** Absent = the report gives verdicts only. */
  readonly numbers?: NumberSource;
}

/** A state table in words, ready to be written; rows come one by one, because there may be millions. */
export interface Report {
  readonly version: string;
  readonly circuit: string;
  readonly conditions: Conditions;
  /** The conditions in words. */
  readonly under: string;
  /** Shown name; absent = the loads that the parts say. */
  readonly loadCase?: string;
  readonly inputs: readonly ReportInput[];
  readonly coils: readonly string[];
  /** Valves whose position follows from pressures or from where an actuator stands. */
  readonly dependents: readonly Omit<ReportInput, 'coils'>[];
  readonly actuators: readonly string[];
  /** Those of the actuators that turn. */
  readonly motors: readonly string[];
  readonly pumps: readonly string[];
  readonly lines: readonly string[];
  readonly count: number;
  /** 1-based. */
  readonly restRow: number;
  readonly notPermitted: number;
  readonly commandCombinations: number;
  /** Set if the rows have numbers. */
  readonly figures?: { readonly units: FigureUnits; readonly reliefs: readonly string[] };
  /** `bare`: without the numbers, which take a calculation for each row. */
  readonly rows: (bare?: boolean) => Generator<ReportRow>;
  /** `row` is 0-based here, as in the table. */
  readonly rowAt: (row: number) => ReportRow;
  readonly findings: readonly ReportFinding[];
}

export interface ReportInput {
  readonly label: string;
  readonly positions: readonly string[];
  /** Absent = it stays where it was left. */
  readonly rest?: string;
  readonly coils: readonly { readonly name: string; readonly position: string }[];
}

/** Every key is a shown name: a label, a coil, a line. */
export interface ReportRow {
  /** 1-based, the same in every view of the table. */
  readonly row: number;
  readonly state: Readonly<Record<string, string>>;
  readonly coils: Readonly<Record<string, 'on' | 'off'>>;
  /** Positions that follow; absent where the circuit has no such valve. */
  readonly dependents?: Readonly<Record<string, string>>;
  readonly actuators: Readonly<Record<string, ActuatorVerdict>>;
  readonly pumps: Readonly<Record<string, PumpVerdict>>;
  readonly lines: Readonly<Record<string, LineClass>>;
  readonly blocked: { readonly underPressure: readonly string[]; readonly cutOff: readonly string[] };
  readonly trapped: readonly { readonly line: string; readonly reasons: readonly TrapReason[] }[];
  readonly rests: Readonly<Record<string, Rests>>;
  readonly notes: readonly string[];
  /** Pressures decided here what open paths leave to them: it rests on entered or assumed values. */
  readonly valued: boolean;
  /** Actuators and pumps whose verdict that is; the others hold for any values, as far as they are decided. */
  readonly fromValues: readonly string[];
  /** In the units of the report; set if numbers are asked for. */
  readonly numbers?: RowFigures;
}

/** Why open paths leave a verdict to pressures; with an explanation also in a sentence, and which verdicts are possible. */
export interface Rests {
  readonly reasons: readonly RestReason[];
  readonly why?: string;
  readonly candidates?: readonly string[];
}

export interface ReportFinding {
  readonly rule: string;
  readonly level: Finding['level'];
  readonly title: string;
  readonly what: string;
  readonly remedy: string;
  readonly parts: readonly string[];
  readonly lines: readonly string[];
  /** 1-based, at most a few of `rowCount`. */
  readonly rows: readonly number[];
  readonly rowCount: number;
}

/** Rows whose numbers are worked out at a time. */
const CHUNK = 500;

export function makeReport(source: ReportSource): Report {
  const { table, numbers } = source;
  const { data } = table;
  const names = namesOf(table);
  const { coils } = names;
  const { loadCases } = source.circuit;
  const loadCase = nameOfCase(source.conditions.loadCase, loadCases);
  const withFigures = (rows: readonly number[]): ReportRow[] => {
    const found = numbers?.of(rows) ?? [];
    return rows.map((row, i) => {
      const bare = reportRow(source, names, row);
      const si = found[i];
      if (!numbers || !si) return bare;
      const figures = rowFigures(si, table, numbers);
      return { ...bare, notes: [...bare.notes, ...figureNotes(figures)], numbers: figures };
    });
  };
  return {
    version: source.version,
    circuit: source.circuit.name,
    conditions: source.conditions,
    under: sayConditions(source.conditions, loadCases),
    ...(loadCase === undefined ? {} : { loadCase }),
    inputs: data.inputs.map((input, i) => ({
      label: input.label,
      positions: input.positions,
      ...(input.rest === undefined ? {} : { rest: input.positions[input.rest] ?? String(input.rest) }),
      coils: coils
        .filter((c) => c.input === i)
        .map((c) => ({ name: c.name, position: input.positions[c.position] ?? '' })),
    })),
    coils: names.coilNames,
    dependents: data.dependents.map(({ label, positions, rest }) => ({
      label,
      positions,
      ...(rest === undefined ? {} : { rest: positions[rest] ?? String(rest) }),
    })),
    actuators: names.actuators,
    motors: data.actuators.filter(({ motion }) => motion === 'rotary').map(({ label }) => label),
    pumps: names.pumps,
    lines: names.lines,
    ...(numbers ? { figures: { units: figureUnits(numbers.units), reliefs: numbers.reliefs } } : {}),
    count: table.count,
    restRow: table.restRow() + 1,
    notPermitted: data.notPermitted,
    commandCombinations: data.commandCombinations,
    *rows(bare = false) {
      if (bare || !numbers) {
        for (let row = 0; row < table.count; row++) yield reportRow(source, names, row);
        return;
      }
      for (let from = 0; from < table.count; from += CHUNK) {
        const length = Math.min(CHUNK, table.count - from);
        yield* withFigures(Array.from({ length }, (_, i) => from + i));
      }
    },
    rowAt: (row) => withFigures([row])[0] as ReportRow,
    findings: source.findings.map((finding) => ({
      ...finding,
      parts: finding.parts.map((id) => labelOfPart(source.circuit, id)),
      lines: finding.lines.map((index) => data.lines[index]?.name ?? String(index)),
      rows: finding.rows.map((row) => row + 1),
    })),
  };
}

interface Coil {
  readonly name: string;
  readonly input: number;
  readonly position: number;
}

function coilsOf(table: StateTable): Coil[] {
  const coils = table.data.inputs.flatMap(({ label, coils: own }, input) =>
    own.map(({ name, position }) => ({ label, name, input, position })),
  );
  const names = coilNames(coils);
  return coils.map(({ input, position }, i) => ({ name: names[i] ?? '', input, position }));
}

/** The shown names of a table, drawn out once. */
interface Names {
  readonly inputs: readonly string[];
  readonly coils: readonly Coil[];
  readonly coilNames: readonly string[];
  readonly dependents: readonly string[];
  readonly actuators: readonly string[];
  readonly pumps: readonly string[];
  readonly lines: readonly string[];
}

function namesOf(table: StateTable): Names {
  const { inputs, actuators, pumps, lines } = table.data;
  const coils = coilsOf(table);
  return {
    inputs: inputs.map((input) => input.label),
    coils,
    coilNames: coils.map((coil) => coil.name),
    dependents: table.data.dependents.map((valve) => valve.label),
    actuators: actuators.map((a) => a.label),
    pumps: pumps.map((p) => p.label),
    lines: lines.map((line) => line.name),
  };
}

/** What is to be said of the dependent valves beside their positions. */
export function dependentNotes(table: StateTable, row: number): string[] {
  if (table.hunts(row))
    return table.data.dependents.map(
      ({ label }) => `${label}: hunts, no position agrees with the pressures that it causes`,
    );
  return table.data.dependents.flatMap(({ label, positions }, i) => {
    const others = table.dependentOthers(i, row).filter((p) => p !== table.dependent(i, row));
    return [
      ...(others.length > 0
        ? [
            `${label}: depends on what came before, could be at ${others.map((p) => positions[p] ?? '?').join(' or ')} as well`,
          ]
        : []),
      ...(table.dependentRests(i, row) ? [`${label}: by open paths, the pressures may put it elsewhere`] : []),
    ];
  });
}

function reportRow({ table, explain }: ReportSource, names: Names, row: number): ReportRow {
  const { inputs } = table.data;
  const positions = table.positionsOf(row);
  const actuators = record(names.actuators, (i) => table.actuator(i, row));
  const pumps = record(names.pumps, (i) => table.pump(i, row));
  const open = (verdict: string): boolean => verdict === 'rests on pressure' || verdict === 'undetermined';
  const explanation =
    explain && (Object.values(actuators).some(open) || Object.values(pumps).some(open)) ? explain(row) : undefined;
  const underPressure: string[] = [];
  const cutOff: string[] = [];
  const trapped: ReportRow['trapped'][number][] = [];
  names.lines.forEach((line, i) => {
    const blocked = table.blocked(i, row);
    if (blocked !== undefined) (blocked === 'cut off' ? cutOff : underPressure).push(line);
    const reasons = table.trapped(i, row);
    if (reasons.length > 0) trapped.push({ line, reasons });
  });
  return {
    row: row + 1,
    state: record(names.inputs, (i) => inputs[i]?.positions[positions[i] ?? 0] ?? ''),
    coils: record(names.coilNames, (i) => (isOn(names.coils[i], positions) ? 'on' : 'off')),
    ...(names.dependents.length > 0 && {
      dependents: record(names.dependents, (i) => table.data.dependents[i]?.positions[table.dependent(i, row)] ?? ''),
    }),
    actuators,
    pumps,
    lines: record(names.lines, (i) => table.line(i, row)),
    blocked: { underPressure, cutOff },
    trapped,
    rests: restsOf(table, row, explanation),
    notes: notesOf(table, row, explanation),
    valued: table.data.valued !== undefined && has(table.data.valued, row),
    fromValues: fromValues(table, names, row),
  };
}

function fromValues({ data }: StateTable, names: Names, row: number): string[] {
  const valued = (planes: TableData['valuedActuators']) => (_: string, i: number) => {
    const plane = planes[i];
    return plane !== undefined && has(plane, row);
  };
  return [...names.actuators.filter(valued(data.valuedActuators)), ...names.pumps.filter(valued(data.valuedPumps))];
}

const isOn = (coil: Coil | undefined, positions: readonly number[]): boolean =>
  coil !== undefined && positions[coil.input] === coil.position;

function restsOf(table: StateTable, row: number, explanation: Explanation | undefined): Record<string, Rests> {
  const rests: [string, Rests][] = [];
  table.data.actuators.forEach(({ part, label }, i) => {
    const reasons = table.actuatorRests(i, row);
    const said = explanation?.actuators.find((a) => a.part === part)?.rests;
    if (said || reasons.length > 0) rests.push([label, { reasons, ...said }]);
  });
  for (const { label, rests: said } of explanation?.pumps ?? [])
    if (said) rests.push([label, { reasons: [], ...said }]);
  return record(
    rests.map(([label]) => label),
    (i) => (rests[i] as [string, Rests])[1],
  );
}

/** An explanation may say again what the table knows. */
function notesOf(table: StateTable, row: number, explanation: Explanation | undefined): string[] {
  const notes = dependentNotes(table, row);
  table.data.actuators.forEach(({ label }, i) => {
    for (const note of table.actuatorNotes(i, row)) notes.push(`${label}: ${note}`);
  });
  return explanation ? [...new Set([...notes, ...explanation.notes])] : notes;
}

/** The shown name of a part; its id if the circuit has no such part. */
export function labelOfPart(circuit: Circuit, id: string): string {
  const part = circuit.parts.find((p) => p.id === id);
  return part ? labelOf(part) : id;
}

/** The usual caution wherever trapped pressure is listed. */
export const TRAPPED_CAUTION =
  'Caution: lines listed as trapped can hold pressure with nothing running. How to release it is for the documents of the machine, ' +
  'the local codes and qualified people to say, not for this table.';
