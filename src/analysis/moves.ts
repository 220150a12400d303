import type { Budget } from '../base/budget.ts';
import { Cancelled, unlimited } from '../base/budget.ts';
import type { UnitSystem } from '../base/units.ts';
import type { Circuit } from '../circuit/model.ts';
import { stagesOf } from '../engine/sequence/move.ts';
import type { Moment, Stage } from '../engine/sequence/move.ts';
import { networkOf, pathConditions } from './analyse.ts';
import { MoveBench } from './move-bench.ts';
import type { Snapshot } from './move-bench.ts';
import { MoveWords } from './move-words.ts';
import type { LeverMove, MoveNote, MovesAnswer, MoveStage } from './moves-results.ts';
import type { Conditions } from './results.ts';

/**
 * Every move of one lever from where the inputs stand in `positions`: what it changes, and what its crossovers do on
 * the way. Each moment is solved as a row of the table is, by itself, so that panels of any size are answered.
 * Throws `Cancelled`, and a RangeError for positions that the inputs do not have.
 */
export function movesOf(
  circuit: Circuit,
  conditions: Conditions,
  positions: readonly number[],
  options: { readonly budget?: Budget; readonly units?: UnitSystem } = {},
): MovesAnswer {
  const { budget = unlimited, units = 'metric' } = options;
  const mover = new Mover(circuit, conditions, units);
  const { inputs } = mover.bench.net;
  mover.check(positions);
  const total = inputs.reduce((n, input) => n + input.positions.length - 1, 0);
  const moves: LeverMove[] = [];
  inputs.forEach((input, i) => {
    input.positions.forEach((_, to) => {
      if (to === positions[i]) return;
      if (budget.cancelled()) throw new Cancelled();
      moves.push(mover.move(positions, i, to));
      budget.progress(moves.length / total);
    });
  });
  return { positions, ...mover.rowOf(positions), moves };
}

/** Works out single moves of one circuit. */
export class Mover {
  readonly bench: MoveBench;
  readonly words: MoveWords;
  readonly #starts = new Map<string, { readonly snapshot: Snapshot; readonly most: readonly number[] }>();

  constructor(circuit: Circuit, conditions: Conditions, units: UnitSystem) {
    const net = networkOf(circuit, conditions);
    this.bench = new MoveBench(net, pathConditions(net, conditions));
    this.words = new MoveWords(net, units);
  }

  check(positions: readonly number[]): void {
    const { inputs } = this.bench.net;
    const wrong = inputs.some((input, i) => input.positions[positions[i] ?? -1] === undefined);
    if (wrong || positions.length !== inputs.length) throw new RangeError('the inputs have no such positions');
  }

  /** Empty where the rows are more than a number counts exactly. */
  rowOf(positions: readonly number[]): { readonly row?: number } {
    const { inputs } = this.bench.net;
    const row = positions.reduce((at, position, i) => at * (inputs[i]?.positions.length ?? 1) + position, 0);
    const count = inputs.reduce((n, input) => n * input.positions.length, 1);
    return count <= Number.MAX_SAFE_INTEGER ? { row } : {};
  }

  move(positions: readonly number[], input: number, to: number): LeverMove {
    const { bench, words } = this;
    const { net } = bench;
    const spec = net.inputs[input];
    const { snapshot: before, most } = this.#start(positions);
    const reached = positions.map((position, i) => (i === input ? to : position));
    const after = bench.next(bench.at(reached), before);
    const stages = stagesOf(net, positions, input, to).map((stage) => this.#stage(stage, input, before, after));
    const part = net.parts[spec?.part ?? -1];
    const { rest } = spec ?? {};
    return {
      input,
      part: part?.id ?? '',
      label: part?.label ?? '',
      from: spec?.positions[positions[input] ?? 0] ?? '',
      to: spec?.positions[to] ?? '',
      position: to,
      positions: reached,
      ...this.rowOf(reached),
      ...(rest !== undefined && rest !== to && { springsTo: spec?.positions[rest] ?? '' }),
      effects: words.effects(before, after, most),
      stages: stages.filter(({ notes, ifShut, ifJoined }) => notes.length + ifShut.length + ifJoined.length > 0),
      follows: net.dependents.some((dependent) => dependent.part === spec?.part),
    };
  }

  #start(positions: readonly number[]): { readonly snapshot: Snapshot; readonly most: readonly number[] } {
    const key = positions.join();
    const known = this.#starts.get(key);
    if (known) return known;
    const snapshot = this.bench.start(positions);
    const made = { snapshot, most: this.bench.most(snapshot.net) };
    this.#starts.set(key, made);
    return made;
  }

  #stage(stage: Stage, input: number, before: Snapshot, after: Snapshot): MoveStage {
    const name = (position: number): string => this.bench.net.inputs[input]?.positions[position] ?? '';
    const notesOf = (moment: Moment): MoveNote[] => {
      const during = this.bench.next(moment.net, before);
      return this.words.notes(before, during, after, moment.paths, this.bench.heldIn(after.net, during));
    };
    const names = stage.kind === 'passing' ? [name(stage.position)] : [name(stage.from), name(stage.to)];
    const head = { kind: stage.kind, names };
    if (stage.known) return { ...head, known: true, notes: notesOf(stage.known), ifShut: [], ifJoined: [] };
    const shut = notesOf(stage.shut);
    const joined = notesOf(stage.joined);
    const same = (a: MoveNote, list: readonly MoveNote[]): boolean => list.some((b) => a.text === b.text);
    return {
      ...head,
      known: false,
      notes: shut.filter((note) => same(note, joined)),
      ifShut: shut.filter((note) => !same(note, joined)),
      ifJoined: joined.filter((note) => !same(note, shut)),
    };
  }
}
