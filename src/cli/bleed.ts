import { networkOf, MOST_ROWS } from '../analysis/analyse.ts';
import { bleedPlan, trappedSummary } from '../analysis/bleed.ts';
import type { Conditions } from '../analysis/results.ts';
import type { Circuit } from '../circuit/model.ts';
import type { StateTable } from '../engine/table/state-table.ts';
import { writeBleedJson, writeBleedText } from '../report/bleed.ts';
import { writeTrappedJson, writeTrappedText } from '../report/trapped.ts';
import type { Command } from './arguments.ts';
import { conditionsOf } from './conditions.ts';
import { EXIT, Failure, sayProblems } from './failure.ts';
import { readState } from './state.ts';

/** What a command writes, and the exit code once it is written. */
export interface Written {
  readonly pieces: Iterable<string>;
  readonly exit: number;
}

export function bleed(
  { file, format, load, state }: Extract<Command, { name: 'bleed' }>,
  circuit: Circuit,
  version: string,
): Written {
  const net = networkOf(circuit);
  const count = net.inputs.reduce((n, input) => n * input.positions.length, 1);
  if (count > MOST_ROWS) {
    throw new Failure(
      `${file}: It has ${count.toLocaleString('en')} combinations of positions; up to ${MOST_ROWS.toLocaleString('en')} can be listed. Plan a part of it by itself.`,
    );
  }
  const inputs = net.inputs.map(({ part, positions, rest }) => ({
    label: net.parts[part]?.label ?? '',
    positions,
    ...(rest === undefined ? {} : { rest }),
  }));
  const read = readState(state, inputs);
  if (!read.ok) throw new Failure(sayProblems(file, read.problems));
  const { positions, assumed } = read.value;
  const row = positions.reduce((at, position, i) => at * (inputs[i]?.positions.length ?? 1) + position, 0);
  const conditions = conditionsOf({ file, pumps: 'stopped', load }, circuit);
  const answer = bleedPlan(circuit, conditions, row);
  const named = inputs.map(({ label, positions: names }, i): [string, string] => [
    label,
    names[positions[i] ?? 0] ?? '',
  ]);
  const source = {
    version,
    circuit: circuit.name,
    conditions,
    loadCases: circuit.loadCases ?? [],
    answer,
    state: Object.fromEntries(named),
    assumed,
  };
  return {
    pieces: format === 'json' ? [writeBleedJson(source)] : writeBleedText(source),
    exit: answer.left.length > 0 ? EXIT.checkFailed : EXIT.done,
  };
}

export function trapped(
  { format }: Extract<Command, { name: 'trapped' }>,
  circuit: Circuit,
  conditions: Conditions,
  version: string,
  table: StateTable,
): Written {
  const summary = trappedSummary(circuit, conditions, table);
  const source = {
    version,
    circuit: circuit.name,
    conditions,
    loadCases: circuit.loadCases ?? [],
    summary,
    count: table.count,
  };
  return { pieces: format === 'json' ? [writeTrappedJson(source)] : writeTrappedText(source), exit: EXIT.done };
}
