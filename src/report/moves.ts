import type { Conditions, LeverMove, MoveNote, MovesAnswer, MoveStage, VentAnswer } from '../analysis/results.ts';
import type { LoadCase } from '../circuit/model.ts';
import { sayConditions } from './conditions.ts';
import { REPORT_VERSION } from './json.ts';
import {
  CROSSOVER_UNKNOWN,
  EITHER,
  FOLLOWS,
  IF_JOINED,
  IF_SHUT,
  MOVE_WORDS,
  NO_CHANGE,
  sayLever,
  saySprings,
  sayStage,
  sayVent,
  VENT_WORDS,
} from './move-words.ts';
import { plain } from './width.ts';

export interface MovesSource<A> {
  /** Of this program. */
  readonly version: string;
  readonly circuit: string;
  readonly conditions: Conditions;
  readonly loadCases?: readonly LoadCase[];
  readonly answer: A;
  readonly state: Readonly<Record<string, string>>;
  readonly assumed: Readonly<Record<string, string>>;
}

/** A line at a time; every line ends with a line feed. */
export function* writeMovesText(source: MovesSource<MovesAnswer>): Generator<string> {
  for (const line of movesLines(source)) yield `${plain(line).trimEnd()}\n`;
}

function* movesLines(source: MovesSource<MovesAnswer>): Generator<string> {
  yield* headLines(source, 'Moves of one lever');
  for (const move of source.answer.moves) {
    yield '';
    yield* moveLines(move, '');
  }
  yield '';
  yield* MOVE_WORDS;
}

/** How to vent one line, as `writeMovesText`. */
export function* writeVentText(source: MovesSource<VentAnswer>): Generator<string> {
  for (const line of ventLines(source)) yield `${plain(line).trimEnd()}\n`;
}

function* ventLines(source: MovesSource<VentAnswer>): Generator<string> {
  const { answer } = source;
  yield* headLines(source, `To vent ${answer.name}`);
  yield '';
  yield sayVent(answer);
  for (const [i, move] of answer.steps.entries()) yield* moveLines(move, `${i + 1}. `);
  if (answer.others.length > 0) yield `As short: ${answer.others.map(sayList).join('; ')}`;
  yield '';
  yield* VENT_WORDS;
}

const sayList = (list: VentAnswer['others'][number]): string =>
  list.map(({ label, to }) => `${label} to ${to}`).join(' and ');

function* headLines(
  { circuit, conditions, loadCases, answer, state, assumed }: MovesSource<MovesAnswer | VentAnswer>,
  title: string,
): Generator<string> {
  const row = answer.row === undefined ? 'this state' : `row ${(answer.row + 1).toLocaleString('en')}`;
  yield circuit;
  yield `${title} from ${row}: ${pairs(state) || 'nothing to command'}; ${sayConditions(conditions, loadCases)}`;
  if (Object.keys(assumed).length > 0) yield `Not given, taken at rest: ${pairs(assumed)}`;
}

function* moveLines(move: LeverMove, number: string): Generator<string> {
  const springs = saySprings(move);
  const row = move.row === undefined ? '' : ` (row ${(move.row + 1).toLocaleString('en')})`;
  yield `${number}${sayLever(move)}${row}${springs === undefined ? '' : `. ${springs}`}`;
  if (move.effects.length === 0) yield `    ${NO_CHANGE}`;
  for (const { kind, text } of move.effects) yield `    ${kind === 'drops' ? 'Caution: ' : ''}${text}`;
  if (move.follows) yield `    ${FOLLOWS}`;
  for (const stage of move.stages) yield* stageLines(stage);
}

function* stageLines(stage: MoveStage): Generator<string> {
  const list = (head: string, notes: readonly MoveNote[]): string[] =>
    notes.length === 0 ? [] : [`    ${head}: ${notes.map(({ text }) => text).join(' ')}`];
  const where = `On the way, ${sayStage(stage)}`;
  if (stage.known) yield* list(where, stage.notes);
  else {
    yield* list(`${where}, ${EITHER}`, stage.notes);
    yield* list(`${where}, ${IF_SHUT} (${CROSSOVER_UNKNOWN})`, stage.ifShut);
    yield* list(`${where}, ${IF_JOINED} (${CROSSOVER_UNKNOWN})`, stage.ifJoined);
  }
}

const pairs = (record: Readonly<Record<string, string>>): string =>
  Object.entries(record)
    .map(([key, value]) => `${key} ${value}`)
    .join(', ');

/** The same as one JSON object; rows 1-based. */
export function writeMovesJson(source: MovesSource<MovesAnswer>): string {
  return `${JSON.stringify({ ...headJson(source), moves: source.answer.moves.map(moveJson), words: MOVE_WORDS }, null, 2)}\n`;
}

export function writeVentJson(source: MovesSource<VentAnswer>): string {
  const { name, outcome, flows, slow, steps, others } = source.answer;
  const vent = { line: name, outcome, flows, slow, steps: steps.map(moveJson), others, words: VENT_WORDS };
  return `${JSON.stringify({ ...headJson(source), ...vent }, null, 2)}\n`;
}

const headJson = ({ version, circuit, conditions, answer, state, assumed }: MovesSource<MovesAnswer | VentAnswer>) => ({
  spooltable: { version, report: REPORT_VERSION },
  circuit,
  conditions,
  ...(answer.row !== undefined && { row: answer.row + 1 }),
  state,
  assumed,
});

function moveJson({ label, from, to, row, springsTo, effects, stages, follows }: LeverMove): unknown {
  const notes = (list: readonly { readonly kind: string; readonly text: string }[]): unknown =>
    list.map(({ kind, text }) => ({ kind, text }));
  return {
    valve: label,
    from,
    to,
    ...(row !== undefined && { row: row + 1 }),
    ...(springsTo !== undefined && { springsTo }),
    effects: notes(effects),
    onTheWay: stages.map((stage) => ({
      kind: stage.kind,
      names: stage.names,
      known: stage.known,
      notes: notes(stage.notes),
      ...(!stage.known && { ifShut: notes(stage.ifShut), ifJoined: notes(stage.ifJoined) }),
    })),
    ...(follows && { follows }),
  };
}
