import { dumpRow, explainRow, findings, MOST_ROWS, networkOf, numbersOf, tabulate } from '../analysis/analyse.ts';
import { tabulateHeld } from '../analysis/held.ts';
import type { Conditions } from '../analysis/results.ts';
import { unlimited } from '../base/budget.ts';
import type { UnitSystem } from '../base/units.ts';
import type { Circuit } from '../circuit/model.ts';
import { StateTable } from '../engine/table/state-table.ts';
import { writeCsv } from '../report/csv.ts';
import { writeExplanationJson, writeExplanationText } from '../report/explain.ts';
import type { NumberSource } from '../report/figures.ts';
import { writeJson } from '../report/json.ts';
import { writeMarkdown } from '../report/markdown.ts';
import { makeReport } from '../report/rows.ts';
import type { Report } from '../report/rows.ts';
import { writeText } from '../report/text.ts';
import { readArguments } from './arguments.ts';
import type { Command, TableFormat } from './arguments.ts';
import { bleed, trapped, trappedSets } from './bleed.ts';
import type { Written } from './bleed.ts';
import { check } from './check.ts';
import { conditionsOf } from './conditions.ts';
import { EXIT, Failure, messageOf } from './failure.ts';
import { readCircuitFile } from './input.ts';
import { loseAllPower, moves, vent } from './moves.ts';
import { print, writeWhole } from './output.ts';
import { partOnly } from './part.ts';
import { plan } from './plan.ts';
import { parts, printed } from './print.ts';
import { heldWhereLarge, stateOf } from './standing.ts';
import { ask, fold, influence } from './whole.ts';

/** Up to here the rows of a JSON table also carry sentences and candidates, which take a search for each row. */
const MOST_EXPLAINED = 250;

/** Does what the arguments say. Throws a `Failure` for everything that the user can mend. */
export async function run(args: readonly string[], version: string): Promise<void> {
  const command = readArguments(args, version);
  if (command.name === 'say') {
    await print([command.text]);
    return;
  }
  const circuit = await readCircuitFile(command.file, note);
  const { pieces, exit, dump } = perform(command, circuit, version);
  if (dump) await writeWhole(dump.file, command.file, [dump.text]);
  if (command.out === undefined) await print(pieces);
  else await writeWhole(command.out, command.file, pieces);
  process.exitCode = exit;
}

function perform(command: Exclude<Command, { name: 'say' }>, circuit: Circuit, version: string): Written {
  switch (command.name) {
    case 'table':
      return { pieces: table(command, circuit, version), exit: EXIT.done };
    case 'explain':
      return explain(command, circuit, version);
    case 'trapped': {
      if (command.line !== undefined) return vent(command, command.line, circuit, version);
      if (rowsOf(circuit) > MOST_ROWS) return trappedSets(command, circuit, version);
      const conditions = conditionsOf(command, circuit);
      return trapped(command, circuit, conditions, version, tableOf(command.file, circuit, conditions));
    }
    case 'bleed':
      return bleed(command, circuit, version);
    case 'print':
      return printed(command, circuit, version);
    case 'parts':
      return parts(command, circuit);
    case 'powerloss':
      return loseAllPower(command, circuit, version);
    case 'moves':
      return moves(command, circuit, version);
    case 'check':
      return check(command, circuit, version);
    case 'fold':
      return fold(command, circuit, version);
    case 'influence':
      return influence(command, circuit, version);
    case 'ask':
      return ask(command, circuit, version);
    case 'plan':
      return plan(command, circuit, version);
  }
}

const rowsOf = (circuit: Circuit): number =>
  networkOf(circuit).inputs.reduce((n, input) => n * input.positions.length, 1);

/** Nobody waits at a screen here: rows that the pressure layer may solve, some thousands a second. */
const PRESSURE_ROWS = 600_000;

const note = (text: string): void => console.error(`spooltable: ${text}`);

type Table = Extract<Command, { name: 'table' }>;
type Explain = Extract<Command, { name: 'explain' }>;

const ANSWERS_ALL =
  'For all of it there are explain, moves, fold, ask, influence and check; for an independent part there is table --part.';

function tableOf(file: string, circuit: Circuit, conditions: Conditions): StateTable {
  const count = networkOf(circuit, conditions).inputs.reduce((n, input) => n * input.positions.length, 1);
  try {
    return new StateTable(tabulate(circuit, conditions, unlimited, { pressureRows: PRESSURE_ROWS }));
  } catch (error) {
    throw count > MOST_ROWS ? new Failure(`${file}: ${messageOf(error)} ${ANSWERS_ALL}`) : error;
  }
}

function table(command: Table, circuit: Circuit, version: string): Iterable<string> {
  const { file, format, out } = command;
  const given = conditionsOf(command, circuit);
  const conditions = command.part === undefined ? given : partOnly(file, circuit, given, command.part);
  const stateTable = tableOf(file, circuit, conditions);
  const running =
    conditions.pumps === 'running' ? stateTable : tableOf(file, circuit, { ...conditions, pumps: 'running' });
  const explained = format === 'json' && stateTable.count <= MOST_EXPLAINED;
  const report = makeReport({
    version,
    circuit,
    conditions,
    table: stateTable,
    findings: findings(circuit, running, conditions),
    ...(explained ? { explain: (row: number) => explainRow(circuit, conditions, row, command.units) } : {}),
    ...(command.numbers
      ? { numbers: numberSource(circuit, command.units, (rows) => numbersOf(circuit, conditions, rows)) }
      : {}),
  });
  const width = out === undefined && process.stdout.isTTY ? process.stdout.columns : undefined;
  return WRITERS[format](report, width);
}

function numberSource(circuit: Circuit, units: UnitSystem, of: NumberSource['of']): NumberSource {
  const net = networkOf(circuit);
  return { units, reliefs: net.reliefs.map(({ part }) => net.parts[part]?.label ?? ''), of };
}

const WRITERS: Record<TableFormat, (report: Report, width: number | undefined) => Iterable<string>> = {
  text: (report, width) => writeText(report, width === undefined ? {} : { width }),
  csv: writeCsv,
  json: writeJson,
  markdown: writeMarkdown,
};

function explain(command: Explain, circuit: Circuit, version: string): Written {
  const { file, format, state } = command;
  const conditions = conditionsOf(command, circuit);
  const net = networkOf(circuit);
  const { positions, assumed } = stateOf(file, net, state);
  // One row needs no table of all: where they are too many to list, every lever is held where it stands.
  const held = heldWhereLarge(net, positions);
  const where = held ? { ...conditions, held } : conditions;
  const stateTable = held ? new StateTable(tabulateHeld(circuit, where, unlimited)) : tableOf(file, circuit, where);
  const row = held ? 0 : stateTable.rowOf(positions);
  const explanation = explainRow(circuit, where, row, command.units);
  const source = {
    version,
    circuit,
    conditions: where,
    table: stateTable,
    findings: [],
    explanation,
    numbers: numberSource(circuit, command.units, () => [explanation.numbers]),
    assumed,
  };
  const pieces = format === 'json' ? [writeExplanationJson(source)] : writeExplanationText(source);
  const dump = command.dump === undefined ? undefined : { file: command.dump, text: dumpRow(circuit, where, row) };
  return { pieces, exit: EXIT.done, ...(dump && { dump }) };
}
