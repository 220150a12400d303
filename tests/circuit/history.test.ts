import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import * as build from '../../src/circuit/build.ts';
import { all, changeCircuit, changeConnection, changeLabel, changePart, type Edit } from '../../src/circuit/edit.ts';
import { readCircuit, writeCircuit } from '../../src/circuit/file.ts';
import {
  begin,
  canRedo,
  canUndo,
  commit,
  endBurst,
  isSaved,
  loadHistory,
  markSaved,
  redo,
  saveHistory,
  undo,
  type History,
} from '../../src/circuit/history.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { RefusedEdit } from '../../src/circuit/refused.ts';
import { circuit } from '../notation.ts';
import { anyCircuit, connectionFields, partFields, point, words } from './generate.ts';

const PRESS = circuit('P1 fixed-pump, T1 tank, V1 directional-valve, C1 cylinder | P1.P V1.P | V1.A C1.A | V1.T T1.T', {
  P1: { at: { x: 0, y: 0 } },
  C1: { at: { x: 9, y: 9 }, label: 'RAM' },
});
const drag = (x: number): Edit => changePart('P1', { at: { x, y: 0 } });
const loaded = (history: History): History => {
  const result = loadHistory(saveHistory(history));
  if (!result.ok) throw new Error(JSON.stringify(result.problems));
  return result.value;
};

describe('steps', () => {
  test('undo and redo go back and forth; at the ends nothing happens', () => {
    const start = begin(PRESS);
    const moved = commit(start, drag(5));
    const back = undo(moved);
    expect(back.present).toStrictEqual(PRESS);
    expect(redo(back)).toStrictEqual(moved);
    expect(undo(back)).toBe(back);
    expect(redo(moved)).toBe(moved);
    expect([canUndo(back), canRedo(back), canUndo(moved), canRedo(moved)]).toEqual([false, true, true, false]);
  });
  test('a new edit drops what could be redone', () => {
    const branched = commit(undo(commit(begin(PRESS), drag(5))), drag(7));
    expect(canRedo(branched)).toBe(false);
    expect(branched.present.parts[0]?.at?.x).toBe(7);
  });
  test('an edit that does not fit leaves the history as it was', () => {
    const start = begin(PRESS);
    expect(() => commit(start, { type: 'remove-part', id: 'V1' })).toThrow(RefusedEdit);
    expect(start).toStrictEqual(begin(PRESS));
  });
});

describe('bursts', () => {
  test('a drag of hundreds of moves is one step of one edit', () => {
    let history = begin(PRESS);
    for (let x = 1; x <= 300; x++) history = commit(history, drag(x), 'drag 1');
    expect(history.past).toEqual([{ edit: drag(300), inverse: drag(0) }]);
    expect(undo(history).present).toStrictEqual(PRESS);
    expect(redo(undo(history)).present).toStrictEqual(history.present);
  });
  test('another key, no key, the end of the burst, an undo and a save begin a new step', () => {
    const one = commit(begin(PRESS), drag(1), 'a');
    expect(commit(one, drag(2), 'b').past.length).toBe(2);
    expect(commit(one, drag(2)).past.length).toBe(2);
    expect(commit(endBurst(one), drag(2), 'a').past.length).toBe(2);
    expect(commit(redo(undo(one)), drag(2), 'a').past.length).toBe(2);
    expect(commit(markSaved(one), drag(2), 'a').past.length).toBe(2);
    expect(commit(one, drag(2), 'a').past.length).toBe(1);
  });
  test('puts and changes in one burst come back in order', () => {
    let history = begin(PRESS);
    history = commit(history, build.placePart(history.present, 'T', { kind: 'tank' }), 'place');
    history = commit(history, changePart('T2', { at: { x: 3, y: 3 } }), 'place');
    history = commit(history, changePart('T2', { at: undefined, turn: 90 }), 'place');
    expect(history.past.length).toBe(1);
    expect(history.present.parts.at(-1)).toStrictEqual({ id: 'T2', kind: 'tank', turn: 90 });
    expect(undo(history).present).toStrictEqual(PRESS);
    expect(redo(undo(history)).present).toStrictEqual(history.present);
  });
  test('labels handed round in one burst fit again on undo and redo', () => {
    let history = begin(PRESS);
    const edits = [
      changePart('T1', { label: 'TMP' }),
      changePart('C1', { label: 'SUMP' }),
      changePart('T1', { label: 'RAM' }),
    ];
    for (const edit of edits) history = commit(history, edit, 'swap');
    expect(undo(history).present).toStrictEqual(PRESS);
    expect(redo(undo(history)).present).toStrictEqual(history.present);
  });
  test('typing in one field: a field set, removed and set again', () => {
    let history = begin(PRESS);
    for (const notes of ['a', undefined, 'ab']) history = commit(history, changeCircuit({ notes }), 'notes');
    expect(history.past).toEqual([
      { edit: changeCircuit({ notes: 'ab' }), inverse: changeCircuit({ notes: undefined }) },
    ]);
    expect('notes' in undo(history).present).toBe(false);
  });
});

describe('the saved marker', () => {
  test('follows undo and redo', () => {
    const saved = markSaved(commit(begin(PRESS), drag(1)));
    const on = commit(saved, drag(2));
    expect([
      isSaved(saved),
      isSaved(on),
      isSaved(undo(on)),
      isSaved(undo(undo(on))),
      isSaved(redo(undo(undo(on)))),
    ]).toEqual([true, false, true, false, true]);
  });
  test('is lost when the saved state is undone and another edit made', () => {
    const saved = markSaved(commit(begin(PRESS), drag(1)));
    const other = commit(undo(saved), drag(2));
    expect(isSaved(other)).toBe(false);
    expect(isSaved(undo(other))).toBe(false);
    expect('saved' in other).toBe(false);
  });
  test('a circuit that stands in no file is not saved', () => {
    expect(isSaved(begin(PRESS))).toBe(true);
    expect(isSaved(begin(PRESS, false))).toBe(false);
  });
});

describe('across a reload', () => {
  test('undo, redo and the marker go on', () => {
    const history = undo(commit(markSaved(commit(begin(PRESS), drag(1))), build.removeParts(PRESS, ['V1'])));
    const again = loaded(history);
    expect(again).toStrictEqual(history);
    expect(isSaved(again)).toBe(true);
    expect(redo(again).present).toStrictEqual(redo(history).present);
  });
  test.each([
    ['no JSON', 'x'],
    ['no history', '{}'],
    ['null', 'null'],
    [
      'steps that do not fit',
      JSON.stringify({
        past: [{ edit: all([]), inverse: { type: 'remove-part', id: 'X' } }],
        present: PRESS,
        future: [],
      }),
    ],
    [
      'a step of no known type',
      JSON.stringify({ past: [{ edit: all([]), inverse: { type: 'explode' } }], present: PRESS, future: [] }),
    ],
    [
      'a circuit that no file could hold',
      JSON.stringify({ past: [], present: { ...PRESS, name: '\u0007' }, future: [] }),
    ],
    ['a wrong marker', JSON.stringify({ past: [], present: PRESS, future: [], saved: -1 })],
    ['reserved names', '{"past":[],"future":[],"present":{"__proto__":{}}}'],
  ])('%s is refused', (_, text) => {
    expect(loadHistory(text)).toMatchObject({ ok: false });
  });
});

/** A random edit is a recipe: numbers that choose among what the circuit has at that moment. */
const recipe = fc.record({
  what: fc.constantFrom(
    ...([
      'part',
      'part fields',
      'connect',
      'connection fields',
      'remove',
      'heal',
      'move',
      'turn',
      'flip',
      'rename',
      'name line',
      'setting',
    ] as const),
    ...(['tee', 'duplicate', 'label', 'label text', 'no label', 'circuit', 'disconnect', 'drop field'] as const),
  ),
  a: fc.nat(20),
  b: fc.nat(20),
  word: words,
  at: point,
  part: partFields,
  connection: connectionFields,
  burst: fc.option(fc.constantFrom('x', 'y'), { nil: undefined }),
});
type Recipe = typeof recipe extends fc.Arbitrary<infer T> ? T : never;

function cook(c: Circuit, r: Recipe): Edit {
  const pick = <T>(list: readonly T[], n: number): T => {
    const found = list[n % Math.max(1, list.length)];
    if (found === undefined) throw new RefusedEdit('test', 'Nothing to choose from.', '');
    return found;
  };
  const one = (): string => pick(c.parts, r.a).id;
  const line = (): string => pick(c.connections, r.a).id;
  const port = (n: number): { part: string; port: string } => ({
    part: pick(c.parts, n).id,
    port: pick(['A', 'B', 'P'], n),
  });
  switch (r.what) {
    case 'part':
      return { type: 'put-part', index: r.a % (c.parts.length + 1), part: build.placePart(c, 'X', r.part).part };
    case 'part fields':
      return changePart(one(), r.part);
    case 'drop field':
      return changePart(one(), { at: undefined, settings: undefined, extra: undefined });
    case 'connect':
      return build.connect(c, port(r.a), port(r.b), r.connection);
    case 'connection fields':
      return changeConnection(line(), r.b % 2 ? r.connection : { bends: undefined, to: port(r.b) });
    case 'disconnect':
      return build.removeConnections([line()]);
    case 'remove':
    case 'heal':
      return build.removeParts(c, new Set([one(), pick(c.parts, r.b).id]), { heal: r.what === 'heal' });
    case 'move':
      return build.moveParts(c, [one()], r.b, -r.b, new Map(c.parts.map((p) => [p.id, r.at])));
    case 'turn':
      return build.turnParts(
        c,
        c.parts.map((p) => p.id),
        90,
        new Map(c.parts.map((p) => [p.id, r.at])),
      );
    case 'flip':
      return build.flipParts(c, [one()]);
    case 'rename':
      return build.renamePart(c, one(), r.b % 3 === 0 ? '' : r.word);
    case 'name line':
      return build.renameLine(c, line(), r.word);
    case 'setting':
      return build.setSetting(c, one(), pick(['flow', 'bore'], r.b), r.b % 3 === 0 ? undefined : r.word);
    case 'tee':
      return build.connectToConnection(c, port(r.b), line(), r.at);
    case 'duplicate':
      return build.duplicate(c, new Set([one(), pick(c.parts, r.b).id]), 3, 3, () => []).edit;
    case 'label':
      return build.placeLabel(c, r.at, r.word);
    case 'label text':
      return changeLabel(pick(c.labels ?? [], r.a).id, { text: r.word });
    case 'no label':
      return build.removeLabels([pick(c.labels ?? [], r.a).id]);
    case 'circuit':
      return changeCircuit(r.b % 2 ? { name: r.word, notes: undefined } : { notes: r.word, title: { by: r.word } });
  }
}

describe('any run of edits', () => {
  test('is undone to the very start and redone to the very end, and every state fits a file', () => {
    const made = new Map<string, number>();
    fc.assert(
      fc.property(anyCircuit, fc.array(recipe, { minLength: 1, maxLength: 25 }), (start, recipes) => {
        const before = structuredClone(start);
        let history = begin(start);
        for (const one of recipes) {
          try {
            history = commit(history, cook(history.present, one), one.burst);
            made.set(one.what, (made.get(one.what) ?? 0) + 1);
          } catch (error) {
            if (!(error instanceof RefusedEdit)) throw error;
          }
          const read = readCircuit(writeCircuit(history.present));
          if (!read.ok) throw new Error(JSON.stringify(read.problems));
          expect(read.value).toStrictEqual(history.present);
        }
        expect(start).toStrictEqual(before);
        const end = history.present;
        const steps = history.past.length;
        history = loaded(history);
        while (canUndo(history)) history = undo(history);
        expect(history.present).toStrictEqual(start);
        expect(writeCircuit(history.present)).toBe(writeCircuit(start));
        history = loaded(history);
        while (canRedo(history)) history = redo(history);
        expect(history.present).toStrictEqual(end);
        expect(writeCircuit(history.present)).toBe(writeCircuit(end));
        expect(history.past.length).toBe(steps);
      }),
      // Without a limit a failure would be made smaller for many minutes.
      { numRuns: 60, interruptAfterTimeLimit: 25_000, markInterruptAsFailure: true },
    );
    // Each sort of edit took part and was not always refused.
    expect(made.size).toBe(20);
    expect(Math.min(...made.values())).toBeGreaterThan(0);
  });
});
