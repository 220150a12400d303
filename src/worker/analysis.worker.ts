/** Answers one question after another on its own thread. */
import { explainRow, findings, networkOf, numbersOf, tabulate } from '../analysis/analyse.ts';
import { askTable, continueText } from '../analysis/ask.ts';
import { bleedPlan, powerLoss } from '../analysis/bleed.ts';
import { checkRules, ruleProblems, rulesOf } from '../analysis/check.ts';
import { coilLogic } from '../analysis/coil-logic.ts';
import { tabulateHeld } from '../analysis/held.ts';
import { Late } from '../analysis/late.ts';
import { BACKGROUND_ROWS } from '../analysis/limits.ts';
import { PanelFindings } from '../analysis/panel-findings.ts';
import { checkPlan } from '../analysis/plan.ts';
import { draftPlan } from '../analysis/plan-draft.ts';
import { movesOf } from '../analysis/moves.ts';
import type { Conditions, Finding } from '../analysis/results.ts';
import { ventLine } from '../analysis/vent-line.ts';
import { unlimited } from '../base/budget.ts';
import type { Budget } from '../base/budget.ts';
import type { Circuit } from '../circuit/model.ts';
import { StateTable } from '../engine/table/state-table.ts';
import type { TableData } from '../engine/table/table-data.ts';
import { planeBuffers } from './buffers.ts';
import { Held } from './held.ts';
import type { Holding, Question, Reply } from './messages.ts';

const scope = self as unknown as {
  postMessage(reply: Reply, handOver?: ArrayBuffer[]): void;
  onmessage: ((event: MessageEvent<Question | Holding>) => void) | null;
};

const held = new Held();
const panel = new PanelFindings();
const late = new Late();

scope.onmessage = ({ data: question }) => {
  if (question.ask === 'hold') {
    held.take(question.data);
    return;
  }
  try {
    send(answer(question));
  } catch (error) {
    scope.postMessage({
      id: question.id,
      say: 'failed',
      message: error instanceof Error ? error.message : String(error),
    });
  }
};

/** Nobody here reads a table once it is answered, so its planes go over without a copy. */
function send(reply: Reply): void {
  const table = reply.say === 'open-paths' ? reply.table : reply.say === 'table' ? reply : undefined;
  if (table) scope.postMessage(reply, planeBuffers(table.data));
  else scope.postMessage(reply);
}

function answer(question: Question): Reply {
  const { id, circuit, conditions } = question;
  // Who names a position for every lever holds none.
  const { held: _, ...free } = conditions;
  switch (question.ask) {
    case 'table':
      return answerTable(id, circuit, conditions);
    case 'open-paths':
      return { id, say: 'open-paths', table: openPaths(circuit, conditions) };
    case 'late':
      return { id, say: 'late', rows: late.rows(circuit, conditions, question.rows) };
    case 'explain':
      return { id, say: 'explanation', explanation: explainRow(circuit, conditions, question.row, question.units) };
    case 'check':
      return { id, say: 'check', result: checkRules(circuit, conditions, rulesOf(circuit), tell(id), held.table) };
    case 'read-rule':
      return { id, say: 'rule-read', problems: ruleProblems(circuit, question.text) };
    case 'fold':
      return { id, say: 'fold', result: held.fold(circuit, conditions, question.by, tell(id)) };
    case 'influence':
      return { id, say: 'influence', result: held.influence(circuit, conditions, tell(id)) };
    case 'rows':
      return { id, say: 'rows', result: askTable(circuit, conditions, question.text, tell(id), held.table) };
    case 'continue':
      return { id, say: 'continue', next: continueText(circuit, question.text, question.as) };
    case 'bleed':
      refuseHeld(conditions);
      return { id, say: 'bleed', plan: bleedPlan(circuit, conditions, question.row) };
    case 'power-loss':
      refuseHeld(conditions);
      return { id, say: 'power-loss', loss: powerLoss(circuit, conditions, question.row) };
    case 'moves': {
      const { positions, units } = question;
      return { id, say: 'moves', moves: movesOf(circuit, free, positions, { budget: tell(id), units }) };
    }
    case 'vent': {
      const { line, positions, units } = question;
      const options = { budget: tell(id), units };
      return { id, say: 'vent', result: ventLine(circuit, free, line, positions, options) };
    }
    case 'plan':
      return { id, say: 'plan', report: checkPlan(circuit, question.plan, conditions, tell(id)) };
    case 'coil-logic':
      return { id, say: 'coil-logic', result: coilLogic(circuit, question.plan, tell(id)) };
    case 'draft-plan':
      return { id, say: 'draft-plan', result: draftPlan(circuit, question.text, conditions.loadCase, tell(id)) };
    case 'numbers':
      return { id, say: 'numbers', numbers: numbersOf(circuit, conditions, question.rows) };
  }
}

/** Lists of moves start from a row of the whole table, and held levers could not move in them. */
function refuseHeld({ held }: Conditions): void {
  if (held) throw new Error('The circuit has too many combinations to list. Ask about a part of it by itself.');
}

/** Rows whose pressures take a tenth of a second or so: nothing need be shown before them. */
const SOON = 700;
/** Giving up ends the whole thread, so there is nobody to ask. */
const tell = (id: number): Budget => ({
  cancelled: () => false,
  progress: (share) => scope.postMessage({ id, say: 'progress', share }),
});

function answerTable(id: number, circuit: Circuit, conditions: Conditions): Reply {
  const began = performance.now();
  const budget = tell(id);
  if (conditions.held) {
    const faults = panel.of(circuit, conditions);
    const reply = (early: boolean, data: TableData): Reply => {
      return { id, say: 'table', early, data, findings: faults, took: performance.now() - began };
    };
    // What moves of held levers leave behind takes a search for each of them.
    send(reply(true, tabulate(circuit, conditions, budget)));
    return reply(false, tabulateHeld(circuit, conditions, budget));
  }
  const { data, faults } = tableBy(circuit, conditions, budget, BACKGROUND_ROWS);
  return { id, say: 'table', early: false, data, findings: faults, took: performance.now() - began };
}

/** Undefined where the pressures take too short a time to show anything before them. */
function openPaths(circuit: Circuit, conditions: Conditions): Extract<Reply, { say: 'open-paths' }>['table'] {
  const began = performance.now();
  const rows = networkOf(circuit).inputs.reduce((n, input) => n * input.positions.length, 1);
  // Held levers leave few rows, and are answered early by themselves.
  if (conditions.held || rows <= SOON) return undefined;
  const { data, faults } = tableBy(circuit, conditions, unlimited, 0);
  return { data, findings: faults, took: performance.now() - began };
}

function tableBy(
  circuit: Circuit,
  conditions: Conditions,
  budget: Budget,
  pressureRows: number,
): { readonly data: TableData; readonly faults: readonly Finding[] } {
  const options = { pressureRows };
  const data = tabulate(circuit, conditions, budget, options);
  const running =
    conditions.pumps === 'running' ? data : tabulate(circuit, { ...conditions, pumps: 'running' }, budget, options);
  return { data, faults: findings(circuit, new StateTable(running), conditions) };
}
