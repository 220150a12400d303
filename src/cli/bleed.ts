import { networkOf } from '../analysis/analyse.ts';
import { bleedPlan, trappedSummary } from '../analysis/bleed.ts';
import type { Conditions } from '../analysis/results.ts';
import { trappedPanel } from '../analysis/trapped-panel.ts';
import { unlimited } from '../base/budget.ts';
import type { Circuit } from '../circuit/model.ts';
import type { StateTable } from '../engine/table/state-table.ts';
import { writeBleedJson, writeBleedText } from '../report/bleed.ts';
import { bleedPages } from '../report/pages/bleed.ts';
import { writePrintDocument } from '../report/pages/document.ts';
import { writeTrappedJson, writeTrappedPanelJson, writeTrappedPanelText, writeTrappedText } from '../report/trapped.ts';
import type { Command } from './arguments.ts';
import { conditionsOf } from './conditions.ts';
import { EXIT, Failure, sayProblems } from './failure.ts';
import { listedRow, stateOf } from './standing.ts';

/** What a command writes, and the exit code once it is written. */
export interface Written {
  readonly pieces: Iterable<string>;
  readonly exit: number;
  /** A second file, whatever becomes of the first. */
  readonly dump?: { readonly file: string; readonly text: string };
}

export function bleed(
  { file, format, load, state }: Extract<Command, { name: 'bleed' }>,
  circuit: Circuit,
  version: string,
): Written {
  const net = networkOf(circuit);
  const { positions, ...standing } = stateOf(file, net, state);
  const row = listedRow(file, net, positions);
  const conditions = conditionsOf({ file, pumps: 'stopped', load }, circuit);
  const answer = bleedPlan(circuit, conditions, row);
  const source = {
    version,
    circuit: circuit.name,
    conditions,
    loadCases: circuit.loadCases ?? [],
    answer,
    ...standing,
  };
  const sheet = (): Iterable<string> =>
    writePrintDocument(`${circuit.name}, bleed-down`, bleedPages({ circuit, conditions, answer, ...standing }));
  return {
    pieces: format === 'json' ? [writeBleedJson(source)] : format === 'html' ? sheet() : writeBleedText(source),
    exit: answer.left.length > 0 ? EXIT.checkFailed : EXIT.done,
  };
}

/** Of a panel too large to list: exact counts by open paths alone. */
export function trappedSets(
  { file, format, ...rest }: Extract<Command, { name: 'trapped' }>,
  circuit: Circuit,
  version: string,
): Written {
  const conditions = conditionsOf({ file, ...rest }, circuit);
  const found = trappedPanel(circuit, conditions, unlimited);
  if (!found.ok) throw new Failure(sayProblems(file, found.problems));
  const panel = found.value;
  const source = { version, circuit: circuit.name, conditions, loadCases: circuit.loadCases ?? [], panel };
  return {
    pieces: format === 'json' ? [writeTrappedPanelJson(source)] : writeTrappedPanelText(source),
    exit: EXIT.done,
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
