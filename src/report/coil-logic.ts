import type { CoilLogic } from '../analysis/results.ts';
import { REPORT_VERSION } from './json.ts';
import { padEnd, plain, widthOf } from './width.ts';

export interface CoilLogicSource {
  /** Of this program. */
  readonly version: string;
  readonly circuit: string;
  readonly logic: readonly CoilLogic[];
}

export const COIL_LOGIC_CAUTION =
  'Caution: conditions of a step plan are no safety functions. Have them reviewed by a qualified person against the documents of the machine and the local codes.';

/** For each plan the steps, the condition of every coil, what needs a memory, groups and interlocks; a line at a time. */
export function* writeCoilLogicText({ circuit, logic }: CoilLogicSource): Generator<string> {
  for (const [i, one] of logic.entries()) {
    if (i > 0) yield '\n';
    for (const line of lines(circuit, one)) yield `${plain(line).trimEnd()}\n`;
  }
}

export const writeCoilLogicJson = ({ version, circuit, logic }: CoilLogicSource): string =>
  `${JSON.stringify({ spooltable: { version, report: REPORT_VERSION }, circuit, plans: logic }, undefined, 2)}\n`;

function* lines(circuit: string, logic: CoilLogic): Generator<string> {
  const numbers = (steps: readonly number[]): string => steps.map((step) => step + 1).join(', ');
  yield circuit;
  yield `Plan ${logic.name}: when each coil has to be on`;
  yield '';
  yield* columns([
    ['Step', 'On', 'Moves', 'Goes on when'],
    ...logic.steps.map(({ name, coils, motions, ends }, i) => [
      name === String(i + 1) ? name : `${i + 1} ${name}`,
      coils.join(' ') || '–',
      motions || '–',
      ends,
    ]),
  ]);
  yield '';
  yield* columns([
    ['Coil', 'Steps', 'By sensors, while the cycle runs', 'By step memory'],
    ...logic.coils.map(({ name, on, bySignals, bySteps, clashes }) => [
      name,
      on.length === 0 ? 'none' : numbers(on),
      bySignals
        ? `${bySignals.words}${bySignals.least ? '' : ' (a shorter one may exist)'}`
        : clashes.length > 0
          ? `– step ${clashes.map((c) => `${c.on + 1} looks like ${c.off + 1}`).join(', ')}`
          : '–',
      bySteps.words,
    ]),
  ]);
  if (logic.clashes.length > 0) {
    yield '';
    yield 'Steps that look alike to all sensors, so that a memory has to tell them apart';
    for (const { steps, signals, coils } of logic.clashes)
      yield `${numbers(steps)}: ${signals.length > 0 ? `with ${signals.join(', ')} on` : 'with no sensor on'}; ${coils.join(', ')} differ`;
  }
  yield '';
  yield* groupLines(logic);
  if (logic.interlocks.length > 0) {
    yield '';
    yield 'Interlocks from the rules';
    for (const { rule, terms } of logic.interlocks) yield `${rule}: never ${terms.join(', nor ')}`;
  }
  for (const { rule, why } of logic.unexpressed) yield `No interlock for "${rule}": ${why}.`;
  for (const { where, what, remedy } of logic.warnings) {
    yield '';
    yield `Caution, ${where}: ${what}`;
    yield `  ${remedy}`;
  }
  yield '';
  yield 'A sensor counts as on only while its actuator stands at its place.';
  yield COIL_LOGIC_CAUTION;
}

function* groupLines({ groups, groupProblems }: CoilLogic): Generator<string> {
  if (!groups) {
    yield `No signal groups: ${groupProblems.map(({ where, what }) => `${where}: ${what}`).join(' ')}`;
    return;
  }
  const { motions, division, count, lastJoinsFirst, opposed } = groups;
  const runs = division.map(({ from, to }) =>
    motions
      .slice(from, to + 1)
      .map(({ text }) => text)
      .join(' '),
  );
  yield `${count} signal ${count === 1 ? 'group' : 'groups'}: ${runs.join(' / ')}${lastJoinsFirst ? '; the last joins the first' : ''}`;
  if (opposed.length === 0) yield 'No opposed signals.';
  for (const { text } of opposed) yield `Opposed signals: ${text}`;
}

function* columns(rows: readonly (readonly string[])[]): Generator<string> {
  const widths = (rows[0] ?? []).map((_, i) => Math.max(...rows.map((row) => widthOf(plain(row[i] ?? '')))));
  for (const row of rows) yield row.map((cell, i) => padEnd(plain(cell), widths[i] ?? 0)).join('  ');
}
