import type { Conditions, Explanation, Finding } from '../analysis/results.ts';
import { labelOf } from '../circuit/model.ts';
import type { Circuit } from '../circuit/model.ts';
import type { StateTable } from '../engine/table/state-table.ts';
import type {
  ActuatorVerdict,
  BlockedKind,
  LineClass,
  PumpVerdict,
  RestReason,
  TrapReason,
} from '../engine/table/words.ts';

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
}

/** A state table in words, ready to be written; rows come one by one, because there may be millions. */
export interface Report {
  readonly version: string;
  readonly circuit: string;
  readonly conditions: Conditions;
  readonly inputs: readonly ReportInput[];
  readonly coils: readonly string[];
  readonly actuators: readonly string[];
  readonly pumps: readonly string[];
  readonly lines: readonly string[];
  readonly count: number;
  /** 1-based. */
  readonly restRow: number;
  readonly notPermitted: number;
  readonly commandCombinations: number;
  readonly rows: () => Generator<ReportRow>;
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
  readonly actuators: Readonly<Record<string, ActuatorVerdict>>;
  readonly pumps: Readonly<Record<string, PumpVerdict>>;
  readonly lines: Readonly<Record<string, LineClass>>;
  readonly blocked: { readonly underPressure: readonly string[]; readonly cutOff: readonly string[] };
  readonly trapped: readonly { readonly line: string; readonly reasons: readonly TrapReason[] }[];
  readonly rests: Readonly<Record<string, Rests>>;
  readonly notes: readonly string[];
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

export function makeReport(source: ReportSource): Report {
  const { table } = source;
  const { data } = table;
  const coils = coilNames(table);
  return {
    version: source.version,
    circuit: source.circuit.name,
    conditions: source.conditions,
    inputs: data.inputs.map((input, i) => ({
      label: input.label,
      positions: input.positions,
      ...(input.rest === undefined ? {} : { rest: input.positions[input.rest] ?? String(input.rest) }),
      coils: coils
        .filter((c) => c.input === i)
        .map((c) => ({ name: c.name, position: input.positions[c.position] ?? '' })),
    })),
    coils: coils.map((coil) => coil.name),
    actuators: data.actuators.map((a) => a.label),
    pumps: data.pumps.map((p) => p.label),
    lines: data.lines.map((line) => line.name),
    count: table.count,
    restRow: table.restRow() + 1,
    notPermitted: data.notPermitted,
    commandCombinations: data.commandCombinations,
    *rows() {
      for (let row = 0; row < table.count; row++) yield reportRow(source, coils, row);
    },
    rowAt: (row) => reportRow(source, coils, row),
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

/** Coils of all inputs; a name that two valves use gets the valve's label in front. */
function coilNames(table: StateTable): Coil[] {
  const { inputs } = table.data;
  const uses = new Map<string, number>();
  for (const input of inputs) for (const { name } of input.coils) uses.set(name, (uses.get(name) ?? 0) + 1);
  return inputs.flatMap((input, i) =>
    input.coils.map(({ name, position }) => ({
      name: uses.get(name) === 1 ? name : `${input.label}.${name}`,
      input: i,
      position,
    })),
  );
}

const notesOf = (table: StateTable, row: number): string[] =>
  table.data.actuators.flatMap(({ label }, i) => table.actuatorNotes(i, row).map((note) => `${label}: ${note}`));

/** The shown name of a part; its id if the circuit has no such part. */
export function labelOfPart(circuit: Circuit, id: string): string {
  const part = circuit.parts.find((p) => p.id === id);
  return part ? labelOf(part) : id;
}

// Built from entries, so that a label such as `__proto__` is a key like any other.
const record = <T>(entries: readonly (readonly [string, T])[]): Record<string, T> => Object.fromEntries(entries);

function reportRow(source: ReportSource, coils: readonly Coil[], row: number): ReportRow {
  const { table } = source;
  const { data } = table;
  const positions = table.positionsOf(row);
  const actuators = data.actuators.map((a, i) => [a.label, table.actuator(i, row)] as const);
  const pumps = data.pumps.map((p, i) => [p.label, table.pump(i, row)] as const);
  const open = [...actuators, ...pumps].some(
    ([, verdict]) => verdict === 'rests on pressure' || verdict === 'undetermined',
  );
  const explanation = open ? source.explain?.(row) : undefined;
  const names = data.lines.map((line) => line.name);
  const blocked = (kind: BlockedKind): string[] => names.filter((_, i) => table.blocked(i, row) === kind);
  return {
    row: row + 1,
    state: record(data.inputs.map((input, i) => [input.label, input.positions[positions[i] ?? 0] ?? ''])),
    coils: record(coils.map((coil) => [coil.name, positions[coil.input] === coil.position ? 'on' : 'off'])),
    actuators: record(actuators),
    pumps: record(pumps),
    lines: record(names.map((name, i) => [name, table.line(i, row)])),
    blocked: { underPressure: blocked('under pressure'), cutOff: blocked('cut off') },
    trapped: names
      .map((name, i) => ({ line: name, reasons: table.trapped(i, row) }))
      .filter(({ reasons }) => reasons.length > 0),
    rests: record(restsOf(table, row, explanation)),
    // An explanation may say again what the table knows.
    notes: [...new Set([...notesOf(table, row), ...(explanation?.notes ?? [])])],
  };
}

export function restsOf(table: StateTable, row: number, explanation: Explanation | undefined): [string, Rests][] {
  const said = new Map(
    [...(explanation?.actuators ?? []), ...(explanation?.pumps ?? [])].map((r) => [r.part, r.rests]),
  );
  const { actuators, pumps } = table.data;
  const all = [
    ...actuators.map((a, i) => ({ ...a, reasons: table.actuatorRests(i, row) })),
    ...pumps.map((p) => ({ ...p, reasons: [] })),
  ];
  return all.flatMap(({ part, label, reasons }): [string, Rests][] => {
    const rests = said.get(part);
    return rests || reasons.length > 0 ? [[label, { reasons, ...rests }]] : [];
  });
}

/** The usual caution wherever trapped pressure is listed. */
export const TRAPPED_CAUTION =
  'Caution: lines listed as trapped can hold pressure with nothing running. How to release it is for the documents of the machine, ' +
  'the local codes and qualified people to say, not for this table.';
