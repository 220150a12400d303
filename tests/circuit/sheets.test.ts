import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { copyOut, duplicate, paste, removeParts, connectToConnection } from '../../src/circuit/build.ts';
import { applyBoth, applyEdit } from '../../src/circuit/edit.ts';
import type { Edit } from '../../src/circuit/edit.ts';
import { addSheet, moveSheet, moveToSheet, removeSheet, renameSheet } from '../../src/circuit/edit-sheets.ts';
import { readCircuit, writeCircuit } from '../../src/circuit/file.ts';
import type { Circuit } from '../../src/circuit/model.ts';
import { changedSheets, saySheet, sheetLookup, sheetOf, sheetsOf } from '../../src/circuit/sheets.ts';
import { anyCircuit } from './generate.ts';

const part = (id: string, kind: string, x: number, sheet?: string): Circuit['parts'][number] => ({
  id,
  kind,
  ...(sheet !== undefined && { sheet }),
  at: { x, y: 0 },
});

const RIG: Circuit = {
  name: 'Rig',
  sheets: [
    { id: 's1', name: 'Power unit' },
    { id: 's2', name: 'Clamp station' },
  ],
  parts: [part('HP1', 'fixed-pump', 0), part('F1', 'filter', 10), part('V1', 'directional-valve', 0, 's2')],
  connections: [
    { id: 'c1', from: { part: 'HP1', port: 'P' }, to: { part: 'F1', port: 'A' }, bends: [{ x: 4, y: 2 }] },
    { id: 'c2', from: { part: 'F1', port: 'B' }, to: { part: 'V1', port: 'P' } },
  ],
  labels: [{ id: 't1', at: { x: 1, y: 1 }, text: 'tank side' }],
};
const on = (circuit: Circuit): Record<string, string> =>
  Object.fromEntries(circuit.parts.map((each) => [each.id, sheetOf(circuit, each)]));
const done = (edit: Edit, circuit = RIG): Circuit => applyEdit(circuit, edit);
const naming = (): readonly string[] => [];

const said = (text: string): string[] => {
  const result = readCircuit(text);
  return result.ok ? [] : result.problems.map((p) => `${p.where}: ${p.what} ${p.remedy}`);
};

describe('in the file', () => {
  test('a circuit of one sheet says nothing of sheets', () => {
    const plain: Circuit = { name: 'Plain', parts: [part('HP1', 'fixed-pump', 0)], connections: [] };
    expect(writeCircuit(plain)).not.toContain('sheet');
    expect(sheetsOf(plain)).toHaveLength(1);
    expect(sheetOf(plain, plain.parts[0] ?? {})).toBe(sheetsOf(plain)[0]?.id);
  });

  test('a part or a text on a sheet that is not there is told where, and what to do', () => {
    expect(said(writeCircuit({ ...RIG, parts: [part('V9', 'tank', 0, 's7')], connections: [] }))).toEqual([
      'parts[0].sheet: There is no sheet "s7". Write "s1", "s2", or leave the field out for the first sheet.',
    ]);
    const label = { id: 't2', sheet: 's2', at: { x: 0, y: 0 }, text: 'x' };
    expect(said(writeCircuit({ name: 'Old', parts: [], connections: [], labels: [label] }))).toEqual([
      'labels[0].sheet: There is no sheet "s2". List it under "sheets" with id and name, or leave the field out.',
    ]);
  });

  test('doubled ids, an empty list and an empty name are refused', () => {
    const twice = { ...RIG, sheets: [...(RIG.sheets ?? []), { id: 's1', name: 'Again' }] };
    expect(said(writeCircuit(twice))).toEqual(['sheets[2].id: The id "s1" is taken by sheets[0]. Give it another id.']);
    expect(said(writeCircuit({ name: 'None', sheets: [], parts: [], connections: [] }))[0]).toContain(
      'sheets: The list of sheets is empty.',
    );
    expect(said(writeCircuit({ ...RIG, sheets: [{ id: 's2', name: '' }] }))[0]).toContain('sheets[0].name');
  });
});

describe('edits', () => {
  test('the first sheet more names both, and undo leaves no trace', () => {
    const plain: Circuit = { name: 'Plain', parts: [part('HP1', 'fixed-pump', 0)], connections: [] };
    const { edit, id } = addSheet(plain, undefined, 'Clamps');
    const { circuit, inverse } = applyBoth(plain, edit);
    expect(circuit.sheets).toEqual([
      { id: 's1', name: 'Sheet 1' },
      { id, name: 'Clamps' },
    ]);
    expect(circuit.parts).toBe(plain.parts);
    expect(writeCircuit(applyEdit(circuit, inverse))).toBe(writeCircuit(plain));
  });

  test('a sheet goes in behind another', () => {
    const { edit, id } = addSheet(RIG, 's1');
    expect(sheetsOf(done(edit)).map((sheet) => sheet.id)).toEqual(['s1', id, 's2']);
    expect(sheetsOf(done(edit))[1]?.name).toBe('Sheet 3');
  });

  test('when another sheet becomes the first, all stay where they are', () => {
    const moved = done(moveSheet(RIG, 's2', -1));
    expect(sheetsOf(moved).map(({ id }) => id)).toEqual(['s2', 's1']);
    expect(on(moved)).toEqual(on(RIG));
    expect(sheetOf(moved, moved.labels?.[0] ?? {})).toBe('s1');
    expect(() => moveSheet(RIG, 's1', -1)).toThrow('the first sheet');
  });

  test('a deleted sheet takes its parts, texts and lines, and no others', () => {
    const left = done(removeSheet(RIG, 's1'));
    expect(left.parts.map(({ id }) => id)).toEqual(['V1']);
    expect(left.connections).toEqual([]);
    expect(left.labels ?? []).toEqual([]);
    expect(() => removeSheet(left, 's2')).toThrow('the only sheet');
    const right = done(removeSheet(RIG, 's2'));
    expect(right.connections.map(({ id }) => id)).toEqual(['c1']);
  });

  test('names are trimmed, and must say something', () => {
    expect(done(renameSheet(RIG, 's2', ' Press ')).sheets?.[1]?.name).toBe('Press');
    expect(() => renameSheet(RIG, 's2', '  ')).toThrow('name of one line');
    expect(() => renameSheet(RIG, 's9', 'x')).toThrow('gone');
    expect(saySheet(RIG, 's2')).toBe('sheet 2, Clamp station');
  });

  test('what moves to another sheet keeps its lines; only bends of lines between two sheets go', () => {
    const one = done(moveToSheet(RIG, { parts: ['F1'], labels: ['t1'] }, 's2', { dx: 3 }));
    expect(on(one)).toEqual({ HP1: 's1', F1: 's2', V1: 's2' });
    expect(one.parts[1]?.at).toEqual({ x: 13, y: 0 });
    expect(one.connections.map(({ id, bends }) => [id, bends])).toEqual([
      ['c1', undefined],
      ['c2', undefined],
    ]);
    expect(sheetOf(one, one.labels?.[0] ?? {})).toBe('s2');
    const both = done(moveToSheet(RIG, { parts: ['HP1', 'F1'] }, 's2', { dx: 3 }));
    expect(both.connections[0]?.bends).toEqual([{ x: 7, y: 2 }]);
    const back = done(moveToSheet(one, { parts: ['F1'] }, 's1'), one);
    expect(back.parts[1]).not.toHaveProperty('sheet');
  });

  test('an edit that leaves a part on no sheet is refused', () => {
    expect(() => done({ type: 'change-part', id: 'V1', fields: { sheet: 's9' } })).toThrow('no sheet "s9"');
    expect(() => done({ type: 'change-circuit', fields: {}, without: ['sheets'] })).toThrow('no sheet "s2"');
  });

  test('any move of sheets is taken back to the letter', () => {
    fc.assert(
      fc.property(anyCircuit, fc.nat(5), fc.boolean(), (circuit, pick, left) => {
        const sheets = sheetsOf(circuit);
        const id = sheets[pick % sheets.length]?.id ?? '';
        const tries: (() => Edit)[] = [
          () => addSheet(circuit, id).edit,
          () => moveSheet(circuit, id, left ? -1 : 1),
          () => removeSheet(circuit, id),
          () => moveToSheet(circuit, { parts: circuit.parts.slice(0, 2).map((each) => each.id) }, id),
        ];
        for (const attempt of tries) {
          let edit: Edit;
          try {
            edit = attempt();
          } catch {
            continue;
          }
          const { circuit: after, inverse } = applyBoth(circuit, edit);
          expect(readCircuit(writeCircuit(after)).ok).toBe(true);
          expect(writeCircuit(applyEdit(after, inverse))).toBe(writeCircuit(circuit));
        }
      }),
      { numRuns: 30 },
    );
  });
});

describe('other edits know of sheets', () => {
  test('a copy goes to the sheet that is asked for, and the copied text is a file by itself', () => {
    const fragment = copyOut(RIG, ['V1'], ['t1']);
    expect(readCircuit(writeCircuit(fragment)).ok).toBe(true);
    const pasted = paste(RIG, fragment, 1, 1, naming, 's2');
    const after = done(pasted.edit);
    expect(after.parts.at(-1)?.sheet).toBe('s2');
    expect(after.labels?.at(-1)?.sheet).toBe('s2');
    expect(done(paste(RIG, fragment, 1, 1, naming).edit).parts.at(-1)).not.toHaveProperty('sheet');
    expect(done(duplicate(RIG, ['V1'], 1, 1, naming, [], 's2').edit).parts.at(-1)?.sheet).toBe('s2');
  });

  test('a junction in a line stands on the sheet of that line', () => {
    const tee = (id: string, sheet?: string): string | undefined =>
      done(
        connectToConnection(RIG, { part: 'V1', port: 'T' }, id, { x: 5, y: 0 }, sheet === undefined ? {} : { sheet }),
      ).parts.at(-1)?.sheet;
    expect(tee('c1', 's2')).toBeUndefined();
    expect(tee('c2', 's2')).toBe('s2');
    expect(tee('c2')).toBeUndefined();
  });

  test('a line healed between two sheets has no bends', () => {
    const healed = done(removeParts(RIG, ['F1'], { heal: true }));
    expect(healed.connections).toEqual([{ id: 'c1', from: { part: 'HP1', port: 'P' }, to: { part: 'V1', port: 'P' } }]);
  });

  test('what changed lies on these sheets', () => {
    const changed = (edit: Edit): readonly string[] => changedSheets(RIG, done(edit));
    expect(changed(moveToSheet(RIG, { parts: ['F1'] }, 's2'))).toEqual(['s1', 's2']);
    expect(changed({ type: 'remove-connection', id: 'c2' })).toEqual(['s1', 's2']);
    expect(changed({ type: 'remove-connection', id: 'c1' })).toEqual(['s1']);
    expect(changed({ type: 'remove-label', id: 't1' })).toEqual(['s1']);
    expect(changed(renameSheet(RIG, 's2', 'Press'))).toEqual(['s2']);
    expect(changed(removeSheet(RIG, 's2'))).toEqual(['s1']);
    expect(sheetLookup(RIG)('nobody')).toBe('s1');
  });
});
