import { networkOf } from '../analysis/analyse.ts';
import { powerLoss } from '../analysis/bleed.ts';
import { movesOf } from '../analysis/moves.ts';
import { ventLine } from '../analysis/vent-line.ts';
import type { Circuit } from '../circuit/model.ts';
import { writeMovesJson, writeMovesText, writeVentJson, writeVentText } from '../report/moves.ts';
import { writePowerLossJson, writePowerLossText } from '../report/power-loss.ts';
import type { Command } from './arguments.ts';
import type { Written } from './bleed.ts';
import { conditionsOf } from './conditions.ts';
import { EXIT, Failure, sayProblems } from './failure.ts';
import { listedRow, stateOf } from './standing.ts';

type Named<N> = Extract<Command, { name: N }>;

/** Every move of one lever from one state; panels of any size. */
export function moves(
  { file, format, state, units, ...rest }: Named<'moves'>,
  circuit: Circuit,
  version: string,
): Written {
  const conditions = conditionsOf({ file, ...rest }, circuit);
  const { positions, ...standing } = stateOf(file, networkOf(circuit), state);
  const answer = movesOf(circuit, conditions, positions, { units });
  const source = {
    version,
    circuit: circuit.name,
    conditions,
    loadCases: circuit.loadCases ?? [],
    answer,
    ...standing,
  };
  return { pieces: format === 'json' ? [writeMovesJson(source)] : writeMovesText(source), exit: EXIT.done };
}

/** The fewest moves that open one line to tank. Exit code 1 when no combination does. */
export function vent(
  { file, format, state, ...rest }: Named<'trapped'>,
  line: string,
  circuit: Circuit,
  version: string,
): Written {
  const conditions = conditionsOf({ file, ...rest }, circuit);
  const net = networkOf(circuit);
  const lines = net.lines.slice(0, net.shown);
  const index = lines.findIndex(({ name }) => name === line);
  if (index < 0) {
    const known = lines.map(({ name }) => name).join(', ');
    throw new Failure(`${file}: --line: There is no line "${line}". Use one of ${known}.`);
  }
  const { positions, ...standing } = stateOf(file, net, state);
  const found = ventLine(circuit, conditions, index, positions);
  if (!found.ok) throw new Failure(sayProblems(file, found.problems));
  const answer = found.value;
  const source = {
    version,
    circuit: circuit.name,
    conditions,
    loadCases: circuit.loadCases ?? [],
    answer,
    ...standing,
  };
  return {
    pieces: format === 'json' ? [writeVentJson(source)] : writeVentText(source),
    exit: answer.outcome === 'never' ? EXIT.checkFailed : EXIT.done,
  };
}

/** What the loss of power does in one state. Exit code 1 when something comes down or starts by itself. */
export function loseAllPower(
  { file, format, load, state }: Named<'powerloss'>,
  circuit: Circuit,
  version: string,
): Written {
  const net = networkOf(circuit);
  const { positions, ...standing } = stateOf(file, net, state);
  const conditions = conditionsOf({ file, pumps: 'running', load }, circuit);
  const answer = powerLoss(circuit, conditions, listedRow(file, net, positions));
  const source = {
    version,
    circuit: circuit.name,
    conditions,
    loadCases: circuit.loadCases ?? [],
    answer,
    ...standing,
  };
  const moved = answer.actuators.some((actuator) =>
    [actuator.running, actuator.stopped, actuator.alone].some(({ comes }) => comes === 'drops' || comes === 'starts'),
  );
  return {
    pieces: format === 'json' ? [writePowerLossJson(source)] : writePowerLossText(source),
    exit: moved ? EXIT.checkFailed : EXIT.done,
  };
}
