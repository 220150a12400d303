import { expect, test } from 'vitest';
import type { Part } from '../../src/circuit/model.ts';
import { readyMadeOf } from '../../src/parts/catalogue.ts';
import { CENTRES, VALVE_FORMS } from '../../src/parts/valve-forms.ts';

const partOf = (id: string): { part: Part; entry: NonNullable<ReturnType<typeof readyMadeOf>> } => {
  const entry = readyMadeOf(id);
  if (!entry) throw new Error(`no ready-made part "${id}"`);
  return { entry, part: { id: 'V1', kind: entry.kind.kind, ...entry.readyMade.make() } };
};

/** Groups of ports that one position joins, as text; shut ports are groups of one. */
function joined(id: string, position: number): string {
  const { entry, part } = partOf(id);
  let groups = entry.kind.ports(part).map((port) => new Set([port.id]));
  for (const element of entry.kind.elements(part)) {
    if (element.type !== 'path' || !element.positions?.includes(position)) continue;
    const touched = groups.filter((group) => group.has(element.from) || group.has(element.to));
    groups = [...groups.filter((group) => !touched.includes(group)), new Set(touched.flatMap((group) => [...group]))];
  }
  return groups
    .map((group) => [...group].sort().join('+'))
    .sort()
    .join(' ');
}

// Centre conditions of the trade (common practice; US Army FM 5-499 shows the first four).
const WANTED: Readonly<Record<string, string>> = {
  shut: 'A B P T',
  bypass: 'A B P+T',
  float: 'A+B+T P',
  'float-restricted': 'A+B+T P',
  joined: 'A+B+P+T',
  'a-t': 'A+T B P',
  'b-t': 'A B+T P',
  regenerative: 'A+B+P T',
  'p-a': 'A+P B T',
  'p-b': 'A B+P T',
};

test('every centre condition is on offer, by lever and by two coils', () => {
  expect(CENTRES.map((centre) => centre.id).sort()).toEqual(Object.keys(WANTED).sort());
  for (const id of Object.keys(WANTED))
    for (const suffix of ['', '-coils']) expect(readyMadeOf(`valve-4/3-${id}${suffix}`)).toBeDefined();
});

test.each(
  Object.entries(WANTED).flatMap(
    ([id, sets]) =>
      [
        ['', id, sets],
        ['-coils', id, sets],
      ] as const,
  ),
)('4/3%s %s joins %s at rest', (suffix, id, sets) => {
  const name = `valve-4/3-${id}${suffix}`;
  const { entry, part } = partOf(name);
  expect(entry.kind.input?.(part)).toMatchObject({ positions: ['a', '0', 'b'], rest: 1 });
  expect(joined(name, 0)).toBe('A+P B+T');
  expect(joined(name, 1)).toBe(sets);
  expect(joined(name, 2)).toBe('A+T B+P');
});

test('only the restricted float is throttled', () => {
  for (const { id } of CENTRES) {
    const { entry, part } = partOf(`valve-4/3-${id}`);
    const throttled = entry.kind.elements(part).filter((element) => element.type === 'path' && element.throttled);
    expect(throttled.length).toBe(id === 'float-restricted' ? 2 : 0);
  }
});

test.each([
  ['valve-2/2-shut-coil', ['A+P', 'A P'], 1],
  ['valve-2/2-open-coil', ['A P', 'A+P'], 1],
  ['valve-2/2-shut-button', ['A+P', 'A P'], 1],
  ['valve-2/2-open-button', ['A P', 'A+P'], 1],
  ['valve-3/2-coil', ['A+P T', 'A+T P'], 1],
  ['valve-3/2-button', ['A+P T', 'A+T P'], 1],
  ['valve-4/2-coil', ['A+P B+T', 'A+T B+P'], 1],
  ['valve-4/2-two-coils', ['A+P B+T', 'A+T B+P'], undefined],
  ['valve-4/2-lever', ['A+P B+T', 'A+T B+P'], undefined],
  ['valve-5/2-coil', ['A+P B+T2 T1', 'A+T1 B+P T2'], 1],
  ['valve-5/2-two-coils', ['A+P B+T2 T1', 'A+T1 B+P T2'], undefined],
  ['valve-5/3-shut', ['A+P B+T2 T1', 'A B P T1 T2', 'A+T1 B+P T2'], 1],
  ['valve-5/3-float', ['A+P B+T2 T1', 'A+T1 B+T2 P', 'A+T1 B+P T2'], 1],
  ['valve-5/3-fed', ['A+P B+T2 T1', 'A+B+P T1 T2', 'A+T1 B+P T2'], 1],
  // Carry-over section: neutral passes the flow through, shifted takes all of it (US Army FM 5-499).
  ['valve-6/3-carry-over', ['A+P B+T C1 C2', 'A B C1+C2 P T', 'A+T B+P C1 C2'], 1],
  ['valve-4/4-float', ['A+P B+T', 'A B P T', 'A+T B+P', 'A+B+T P'], 1],
])('%s joins its ports as said', (id, sets, rest) => {
  sets.forEach((set, position) => expect(joined(id, position)).toBe(set));
  const { entry, part } = partOf(id);
  expect(entry.kind.input?.(part)?.positions.length).toBe(sets.length);
  expect(entry.kind.input?.(part)?.rest).toBe(rest);
});

test.each([
  ['valve-4/3-shut', 'lever', []],
  [
    'valve-4/3-shut-coils',
    'coil',
    [
      { name: 'a', position: 0 },
      { name: 'b', position: 2 },
    ],
  ],
  ['valve-4/2-coil', 'coil', [{ name: 'a', position: 0 }]],
  [
    'valve-4/2-two-coils',
    'coil',
    [
      { name: 'a', position: 0 },
      { name: 'b', position: 1 },
    ],
  ],
  ['valve-3/2-button', 'button', []],
])('%s is moved by a %s', (id, by, coils) => {
  const { entry, part } = partOf(id);
  expect(entry.kind.input?.(part)).toMatchObject({ by, coils });
});

test('titles use the count of ways and positions that the data have', () => {
  for (const form of VALVE_FORMS) {
    const { valve } = form.make();
    const [, ways, positions] = /^(\d)\/(\d)/.exec(form.title) ?? [];
    expect([valve?.ports.length, valve?.positions.length]).toEqual([Number(ways), Number(positions)]);
  }
});
