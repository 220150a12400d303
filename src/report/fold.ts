import type { AskAnswer, Conditions, FoldAnswer, Influence } from '../analysis/results.ts';
import type { LoadCase } from '../circuit/model.ts';
import { members } from '../base/bits.ts';
import { sayConditions } from './conditions.ts';
import { idleWords, partWords, sayProduct } from './influence-words.ts';
import { REPORT_VERSION } from './json.ts';
import { pathsOnly } from './paths-only.ts';
import { plain, widthOf } from './width.ts';

/** What the reports about a whole table have in common. */
export interface WholeSource {
  /** Of this program. */
  readonly version: string;
  readonly circuit: string;
  readonly conditions: Conditions;
  readonly loadCases: readonly LoadCase[];
}

const say = (n: bigint | number): string => n.toLocaleString('en');
/** Counts past 2⁵³ are strings of digits, since JSON readers would round them. */
const number = (n: bigint): number | string => (n <= BigInt(Number.MAX_SAFE_INTEGER) ? Number(n) : n.toString());

/** `any`, or `a/0`. */
const sayMask = (mask: number, positions: readonly string[]): string =>
  mask === (1 << positions.length) - 1 ? 'any' : positionsOf(mask, positions).join('/');
const positionsOf = (mask: number, positions: readonly string[]): string[] =>
  positions.filter((_, p) => ((mask >>> p) & 1) === 1);

function head({ version, circuit, conditions }: WholeSource): object {
  return { spooltable: { version, report: REPORT_VERSION }, circuit, conditions };
}

/** Columns as wide as they need to be. */
function* table(rows: readonly (readonly string[])[]): Generator<string> {
  const clean = rows.map((row) => row.map(plain));
  const widths = (clean[0] ?? []).map((_, c) => Math.max(...clean.map((row) => widthOf(row[c] ?? ''))));
  for (const row of clean)
    yield row
      .map((cell, c) => cell + ' '.repeat(Math.max(0, (widths[c] ?? 0) - widthOf(cell))))
      .join('  ')
      .trimEnd();
}

function* ended(lines: Iterable<string>): Generator<string> {
  for (const line of lines) yield `${plain(line).trimEnd()}\n`;
}

/** Folds, one after the other; `refused`: what could not be folded, with the reason. */
export function writeFoldText(
  source: WholeSource,
  folds: readonly FoldAnswer[],
  refused: readonly string[],
): Iterable<string> {
  return ended(foldLines(source, folds, refused));
}

function* foldLines(
  { circuit, conditions, loadCases }: WholeSource,
  folds: readonly FoldAnswer[],
  refused: readonly string[],
): Generator<string> {
  yield circuit;
  const unlisted = folds.find(({ listed }) => !listed);
  yield `Folded, ${sayConditions(conditions, loadCases)}${unlisted ? pathsOnly(unlisted.followers) : ''}`;
  for (const { items, inputs, rows, otherwise, combinations } of folds) {
    yield '';
    yield `${items.map(({ label }) => label).join(' + ')}: ${say(rows.length)} row${rows.length === 1 ? '' : 's'} and the rest for ${say(combinations)} combinations, checked equal to all of them`;
    yield* table([
      ['', ...inputs.map(({ label }) => label), ...items.map(({ label }) => label), 'combinations'],
      ...rows.map(({ positions, outcome, count }) => [
        '',
        ...inputs.map((input, i) => sayMask(positions[i] ?? 0, input.positions)),
        ...outcome,
        say(count),
      ]),
      ['', ...inputs.map((_, i) => (i === 0 ? 'else' : '')), ...otherwise.outcome, say(otherwise.count)],
    ]);
  }
  for (const one of refused) {
    yield '';
    yield one;
  }
  yield '';
  yield 'Rows of one outcome may share combinations.';
}

export function writeFoldJson(source: WholeSource, folds: readonly FoldAnswer[], refused: readonly string[]): string {
  const report = {
    ...head(source),
    folds: folds.map(({ items, inputs, rows, otherwise, combinations, least, listed }) => {
      const outcome = (words: readonly string[]): object =>
        Object.fromEntries(items.map(({ label }, i) => [label, words[i] ?? '']));
      return {
        by: items.map(({ of, label }) => ({ of, label })),
        listed,
        combinations: number(combinations),
        fewestRows: least,
        rows: rows.map((row) => ({
          when: Object.fromEntries(
            inputs.flatMap(({ label, positions }, i) => {
              const mask = row.positions[i] ?? 0;
              return mask === (1 << positions.length) - 1 ? [] : [[label, positionsOf(mask, positions)]];
            }),
          ),
          outcome: outcome(row.outcome),
          combinations: number(row.count),
        })),
        else: { outcome: outcome(otherwise.outcome), combinations: number(otherwise.count) },
      };
    }),
    refused,
  };
  return `${JSON.stringify(report, null, 2)}\n`;
}

const OF = { actuator: '', pump: '', line: 'line ', blocked: 'blocked: line ', trapped: 'trapped: line ' } as const;

export function writeInfluenceText(source: WholeSource, found: Influence): Iterable<string> {
  return ended(influenceLines(source, found));
}

function* influenceLines({ circuit, conditions, loadCases }: WholeSource, found: Influence): Generator<string> {
  const { inputs, rows, parts, listed } = found;
  yield circuit;
  yield `Which lever can change what, ${sayConditions(conditions, loadCases)}${listed ? '' : pathsOnly(found.followers)}`;
  yield '';
  yield* table([
    ['', ...inputs.map(({ label }) => label)],
    ...rows.map((row) => [`${OF[row.of]}${row.label}`, ...inputs.map((_, i) => (row.inputs.includes(i) ? 'x' : '.'))]),
  ]);
  yield '';
  const idle = idleWords(found);
  if (idle.length === 0) yield 'Every position of every lever does something that no other does.';
  yield* idle;
  const several = parts.filter((part) => part.inputs.length > 0);
  yield several.length > 1 ? sayProduct(found) : 'No part of the circuit is independent of the rest.';
  if (several.length > 1) {
    for (const part of several) yield `  ${partWords(found, part)}: ${say(part.combinations)}`;
    yield 'The table of one of them: table --part, with the name of any actuator, pump or lever in it.';
  }
}

export function writeInfluenceJson(source: WholeSource, found: Influence): string {
  const { inputs, rows, alike, parts, combinations, listed } = found;
  const labels = (of: 'actuator' | 'pump' | 'line', list: readonly number[]): string[] =>
    list.map((index) => rows.find((row) => row.of === of && row.index === index)?.label ?? '');
  const report = {
    ...head(source),
    listed,
    combinations: number(combinations),
    influence: rows.map((row) => ({
      of: row.of,
      label: row.label,
      levers: row.inputs.map((i) => inputs[i]?.label ?? ''),
    })),
    alike: inputs.flatMap(({ label, positions }, i) =>
      (alike[i] ?? []).flatMap((group) =>
        group.length > 1 ? [{ lever: label, positions: group.map((p) => positions[p] ?? '') }] : [],
      ),
    ),
    parts: parts.map((part) => ({
      levers: part.inputs.map((i) => inputs[i]?.label ?? ''),
      actuators: labels('actuator', part.actuators),
      pumps: labels('pump', part.pumps),
      lines: labels('line', part.lines),
      combinations: number(part.combinations),
    })),
  };
  return `${JSON.stringify(report, null, 2)}\n`;
}

interface Listed {
  readonly row: number;
  readonly state: readonly string[];
}

/** The first rows in which it holds, 1-based, with the position of each lever. */
function listed({ inputs, rows }: AskAnswer, limit: number): Listed[] {
  const out: Listed[] = [];
  if (!rows) return out;
  for (const row of members(rows.matches)) {
    if (out.length === limit) break;
    let left = row;
    const state = new Array<string>(inputs.length).fill('');
    for (let i = inputs.length - 1; i >= 0; i--) {
      const positions = inputs[i]?.positions ?? [''];
      state[i] = positions[left % positions.length] ?? '';
      left = Math.floor(left / positions.length);
    }
    out.push({ row: row + 1, state });
  }
  return out;
}

export function writeAskText(source: WholeSource, answer: AskAnswer, limit: number): Iterable<string> {
  return ended(askLines(source, answer, limit));
}

function* askLines(
  { circuit, conditions, loadCases }: WholeSource,
  answer: AskAnswer,
  limit: number,
): Generator<string> {
  const { text, inputs, matches, undecided, combinations, rows, cases } = answer;
  yield circuit;
  yield `${text}, ${sayConditions(conditions, loadCases)}: in ${say(matches)} of ${say(combinations)} combinations${undecided > 0n ? `, not decided in ${say(undecided)}` : ''}${rows ? '' : pathsOnly(answer.followers)}`;
  if (rows && matches > 0n && limit > 0) {
    yield '';
    const shown = listed(answer, limit);
    yield* table([
      ['row', ...inputs.map(({ label }) => label)],
      ...shown.map(({ row, state }) => [say(row), ...state]),
    ]);
    if (matches > BigInt(shown.length))
      yield `and ${say(matches - BigInt(shown.length))} more; --limit lists more of them`;
  } else if (cases && limit > 0) {
    yield '';
    const shown = cases.terms.slice(0, limit);
    for (const [i, term] of shown.entries()) yield `${i === 0 ? '  ' : 'or '}${term}`;
    if (cases.terms.length > shown.length)
      yield `or ${say(cases.terms.length - shown.length)} more terms; --limit lists more of them`;
  }
}

export function writeAskJson(source: WholeSource, answer: AskAnswer, limit: number): string {
  const { text, inputs, matches, undecided, combinations, cases } = answer;
  const report = {
    ...head(source),
    question: text,
    listed: answer.rows !== undefined,
    combinations: number(combinations),
    matches: number(matches),
    undecided: number(undecided),
    ...(answer.rows && {
      rows: listed(answer, limit).map(({ row, state }) => ({
        row,
        state: Object.fromEntries(inputs.map(({ label }, i) => [label, state[i] ?? ''])),
      })),
    }),
    ...(cases && { terms: cases.terms }),
  };
  return `${JSON.stringify(report, null, 2)}\n`;
}
