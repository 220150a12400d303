import { describe, expect, test } from 'vitest';
import { crossings, junctionDots } from '../../src/drawing/joints.ts';
import { routeAll } from '../../src/drawing/routing.ts';
import { sheetFaults } from './sheet-faults.ts';
import { exampleSheets, randomSheets, readyMadeSheets, stateWords, unplacedSheets } from './some-sheets.ts';
import type { Sheet } from './some-sheets.ts';
import { circuit, joins, part, valve } from './samples.ts';

const CLEAN = { labels: [], labelsOnLines: [], lines: [], letters: [], doubled: [] };

describe.each([...exampleSheets(), ...readyMadeSheets(), ...unplacedSheets()])('$name', ({ circuit: sheet }) => {
  const routes = routeAll(sheet);

  test('nothing that is written or drawn lies on anything else', () => {
    expect(sheetFaults(sheet, routes)).toEqual(CLEAN);
  });

  test('nor does it with what a state says beside the names, whatever positions are shown', () => {
    expect(sheetFaults(sheet, routes, stateWords)).toEqual(CLEAN);
  });

  test('lines that cross are not joined where they cross', () => {
    const dots = new Set(junctionDots(sheet, routes).map(({ at }) => `${at.x} ${at.y}`));
    expect(crossings(sheet, routes).filter(({ x, y }) => dots.has(`${x} ${y}`))).toEqual([]);
  });
});

test('on sheets that are joined at random no label lies on another, on a symbol or on a line, and no line runs through a symbol or letter', () => {
  const found = randomSheets(50).flatMap(({ name, circuit: sheet }: Sheet) => {
    const routes = routeAll(sheet);
    return [undefined, stateWords].flatMap((words) => {
      const { labels, labelsOnLines, lines, letters } = sheetFaults(sheet, routes, words);
      return [...labels, ...labelsOnLines, ...lines, ...letters].map((fault) => `${name}: ${fault}`);
    });
  });
  expect(found).toEqual([]);
});

test('the faults that are looked for are found where there are some', () => {
  const check = { ...part('C', 'check-valve', { x: 0, y: -20 }), label: 'CHECK', turn: 90 as const };
  const sheet = {
    ...circuit(
      [
        valve('V', { x: 0, y: 0 }),
        check,
        part('J1', 'junction', { x: -30, y: -3 }),
        part('J2', 'junction', { x: 30, y: -3 }),
      ],
      joins('J1.J J2.J', 'V.A J1.J'),
    ),
    labels: [
      { id: 'n1', at: { x: 0, y: -19 }, text: 'on the check' },
      { id: 'n2', at: { x: 10, y: -2.8 }, text: 'on the line' },
      { id: 'n3', at: { x: 12, y: -2.8 }, text: 'on the text' },
    ],
  };
  const routes = new Map([
    [
      'c1',
      [
        { x: -30, y: -3 },
        { x: 30, y: -3 },
      ],
    ],
    [
      'c2',
      [
        { x: -1, y: -2 },
        { x: -1, y: -20 },
        { x: -30, y: -20 },
        { x: -30, y: -3 },
      ],
    ],
  ]);
  const faults = sheetFaults(sheet, routes);
  expect(faults.labels).toEqual([
    '“on the check” of n1 on the symbol of C',
    '“on the line” of n2 on “on the text” of n3',
  ]);
  expect(faults.labelsOnLines).toContain('“on the line” of n2 on the line c1');
  expect(faults.letters).toEqual(['c1 through “A” of V', 'c1 through “B” of V']);
  // The ball of the lever reaches up to the line, too.
  expect(new Set(faults.lines)).toEqual(new Set(['c1 through V', 'c2 through C']));
});
