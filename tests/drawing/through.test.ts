import { expect, test } from 'vitest';
import { applyEdit, invertEdit } from '../../src/circuit/edit.ts';
import { insertInto, swapPart } from '../../src/circuit/insert.ts';
import { removeParts } from '../../src/circuit/build.ts';
import { CATALOGUE } from '../../src/parts/catalogue.ts';
import { insertionAt, throughPairs } from '../../src/drawing/through.ts';
import { circuit, joins, part, valve } from './samples.ts';

const UP = { connection: 'c1', a: { x: 0, y: 20 }, b: { x: 0, y: 0 } };
const ACROSS = { connection: 'c1', a: { x: 0, y: 5 }, b: { x: 30, y: 5 } };

test('lines end at pumps and actuators, and run through what has two working ports', () => {
  const through = CATALOGUE.flatMap((kind) => {
    const sample = { id: 'X', kind: kind.kind, ...kind.readyMade[0]?.make() };
    return throughPairs(sample).length > 0 ? [kind.kind] : [];
  });
  expect(through).toEqual(
    expect.arrayContaining([
      'filter',
      'check-valve',
      'throttle',
      'one-way-throttle',
      'lock-check',
      'double-lock-check',
      'shut-off-valve',
      'relief-valve',
      'junction',
    ]),
  );
  for (const end of ['cylinder', 'motor', 'fixed-pump', 'tank', 'gauge', 'plug', 'accumulator'])
    expect(through).not.toContain(end);
});

test.each([
  ['throttle', UP],
  ['throttle', ACROSS],
  ['filter', ACROSS],
  ['check-valve', UP],
  ['lock-check', ACROSS],
] as const)('a %s is turned to lie along the line, both ports on it, the near one first', (kind, stretch) => {
  const found = insertionAt(part('X', kind), stretch, { x: stretch.a.x + 1, y: 6 }, true);
  expect(found).toBeDefined();
  const [entry, exit] = found?.ends ?? [];
  const flat = stretch === ACROSS;
  for (const end of [entry, exit]) expect(flat ? end?.y : end?.x).toBe(flat ? 5 : 0);
  const near = (p = { x: 0, y: 0 }): number => Math.abs(p.x - stretch.a.x) + Math.abs(p.y - stretch.a.y);
  expect(near(entry)).toBeLessThan(near(exit));
});

test('what the user has turned stays turned', () => {
  expect(insertionAt(part('X', 'throttle', undefined, 90), UP, { x: 0, y: 10 }, false)?.turn).toBe(90);
});

test('the line is cut and joined; bends are shared out; taking the part out with healing brings one line back', () => {
  const line = {
    ...(joins('V1.A V2.A')[0] as ReturnType<typeof joins>[0]),
    name: 'LIFT',
    use: 'working' as const,
    size: '12x1.5',
    bends: [
      { x: -1, y: 10 },
      { x: 39, y: 10 },
    ],
  };
  const sheet = circuit(
    [valve('V1', { x: 0, y: 30 }), valve('V2', { x: 40, y: 30 }), part('F1', 'filter', { x: 20, y: 10 })],
    [line],
  );
  const edit = insertInto(sheet, 'c1', 'F1', { entry: 'A', exit: 'B' }, { x: 20, y: 10 });
  const cut = applyEdit(sheet, edit);
  expect(cut.connections).toEqual([
    { ...line, to: { part: 'F1', port: 'A' }, bends: [{ x: -1, y: 10 }] },
    {
      id: 'c2',
      from: { part: 'F1', port: 'B' },
      to: line.to,
      use: 'working',
      size: '12x1.5',
      bends: [{ x: 39, y: 10 }],
    },
  ]);
  expect(applyEdit(cut, invertEdit(sheet, edit))).toEqual(sheet);
  expect(applyEdit(cut, removeParts(cut, ['F1'], { heal: true })).connections).toEqual([line]);
  expect(() => insertInto(sheet, 'c1', 'V1', { entry: 'P', exit: 'T' }, { x: 0, y: 10 })).toThrow(
    'an end of that line',
  );
});

test('a swap keeps lines of the same letters and settings that mean the same, and tells the rest', () => {
  const old = { ...part('K1', 'lock-check', { x: 0, y: 0 }), settings: { ratio: 3, cracking: '2 bar' } };
  const sheet = circuit([old, valve('V1', { x: 0, y: 30 })], joins('V1.A K1.V', 'V1.B K1.X'));
  const into = { kind: 'check-valve', settings: { flow: '30 L/min' }, ports: ['V', 'B'], keeps: new Set(['cracking']) };
  const { edit, lostPorts, lostSettings } = swapPart(sheet, 'K1', into);
  const swapped = applyEdit(sheet, edit);
  expect(swapped.parts[0]).toEqual({ ...old, kind: 'check-valve', settings: { flow: '30 L/min', cracking: '2 bar' } });
  expect(swapped.connections.map(({ id }) => id)).toEqual(['c1']);
  expect([lostPorts, lostSettings]).toEqual([['X'], ['ratio']]);
  expect(applyEdit(swapped, invertEdit(sheet, edit))).toEqual(sheet);
});
