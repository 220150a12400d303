import { expect, test } from 'vitest';
import type { Primitive } from '../../src/base/primitives.ts';
import type { Circuit, ValveData } from '../../src/circuit/model.ts';
import { searchCatalogue } from '../../src/parts/catalogue.ts';
import { checkParts } from '../../src/parts/check.ts';
import { fileValveEntries, fileValveId, fileValveOf } from '../../src/parts/file-valves.ts';
import { adviseValve, inWords } from '../../src/parts/valve-advice.ts';
import { checkValve } from '../../src/parts/valve-check.ts';
import { VALVE_FORMS } from '../../src/parts/valve-forms.ts';
import { presetOf, presetsFor } from '../../src/parts/valve-presets.ts';
import { spreadValve } from '../../src/parts/valve-spread.ts';
import { need } from './need.ts';

const form = (id: string): ValveData => need(VALVE_FORMS.find((each) => each.id === id)?.make().valve);
const SHUT = form('valve-4/3-shut');
const whats = (valve: ValveData): string[] => adviseValve(valve).map(({ what }) => what);

test('advice on a valve that can be saved: unused ports, twins, no rest, coils that lead nowhere', () => {
  const unknown = 'What is open while it shifts is not known.';
  expect(whats(SHUT)).toEqual([unknown]);
  expect(whats({ ...SHUT, crossovers: [[], []] })).toEqual([]);
  expect(whats({ ...SHUT, crossovers: [[]] })).toEqual(['Not every crossover is known.']);
  expect(whats({ ...SHUT, ports: [...SHUT.ports, { id: 'C', side: 'top' }] })).toEqual([
    'Port C is shut in every position.',
    unknown,
  ]);
  const positions = SHUT.positions.with(2, { name: 'b', paths: ['T-B', 'P-A'] });
  expect(whats({ ...SHUT, positions })).toEqual(['Position b opens the same paths as a.', unknown]);
  const { rest: _, ...loose } = { ...SHUT, left: ['lever'], right: [] } satisfies ValveData;
  expect(whats(loose)).toEqual(['Nothing says where the valve stands when nobody moves it.', unknown]);
  const coils = form('valve-4/3-shut-coils');
  expect(
    whats({
      ...coils,
      coils: [
        { name: 'a', position: 0 },
        { name: 'b', position: 0 },
      ],
    }),
  ).toEqual(['No coil leads to position b, and it is not the rest position.', unknown]);
});

test('a problem of the check is told with its place in the valve in words', () => {
  const valve: ValveData = {
    ...SHUT,
    ports: [...SHUT.ports, { id: '1', side: 'top' }],
    crossovers: [['P-P'], []],
    coils: [{ name: 'y', position: 1 }],
  };
  const places = new Set(checkValve(valve).map((each) => inWords(valve, each).where));
  expect(places).toEqual(new Set(['port 1', 'crossover a–0', 'coil y', 'coils']));
});

test('the usual fillings of a box are those that its ports allow, known again however they are written', () => {
  const titles = (valve: ValveData): string[] => presetsFor(valve).map(({ id }) => id);
  // Centre conditions in trade use (from memory).
  expect(titles(SHUT)).toEqual([
    'shut',
    'bypass',
    'float',
    'float-restricted',
    'joined',
    'a-t',
    'b-t',
    'regenerative',
    'p-a',
    'p-b',
    'pa-bt',
    'pb-at',
  ]);
  expect(titles(form('valve-2/2-shut-coil'))).toEqual(['shut', 'joined', 'p-a']);
  expect(titles(form('valve-6/3-carry-over'))).toContain('carry-over');
  const box = { of: 'position', index: 1 } as const;
  const positions = SHUT.positions.with(1, { name: '0', paths: ['T~B', 'T~A'] });
  expect(presetOf({ ...SHUT, positions }, box)?.id).toBe('float-restricted');
  expect(presetOf({ ...SHUT, positions: positions.with(1, { name: '0', paths: ['P>A'] }) }, box)).toBeUndefined();
});

type Group = Extract<Primitive, { type: 'group' }>;
const groups = (list: readonly Primitive[], role: Group['role']): Group[] =>
  list.flatMap((each) => (each.type === 'group' && each.role === role ? [each] : []));

test('laid out to be worked on, boxes stand side by side, crossovers dashed between positions, drawn by the same strokes', () => {
  const spread = spreadValve({ ...SHUT, crossovers: [['P-A', 'B-T'], []] });
  expect(spread.boxes.map(({ box, x }) => `${box.of} ${box.index} ${x}`)).toEqual([
    'position 0 0',
    'crossover 0 4',
    'position 1 8',
    'crossover 1 12',
    'position 2 16',
  ]);
  const drawn = groups(spread.primitives, 'box');
  const outlines = drawn.map(({ children }) => children.find((each) => each.type === 'box')?.pen);
  expect(outlines).toEqual(['symbol', 'pilot', 'symbol', 'pilot', 'symbol']);
  // The crossover has the paths of position a, and so its strokes.
  const strokes = (group: Group | undefined): readonly Primitive[] =>
    need(group).children.filter((each) => each.type === 'polyline' && each.pen === 'active');
  expect(strokes(drawn[1])).toEqual(strokes(drawn[0]));
  expect(strokes(drawn[0])).not.toHaveLength(0);
  // Lines meet the box of the rest position (ISO 1219-1, from memory).
  const stubs = drawn.map(
    ({ children }) => children.filter((each) => each.type === 'polyline' && each.pen === 'symbol').length,
  );
  expect(stubs).toEqual([0, 0, 4, 0, 0]);
  for (const { x } of spread.boxes) expect(spread.bounds.x + spread.bounds.width).toBeGreaterThan(x + 2);
});

test('ready-made valves of a file are offered like those of the catalogue, and checked like placed ones', () => {
  const circuit: Circuit = {
    name: 'own',
    parts: [],
    connections: [],
    readyMadeValves: [
      { id: 'v1', title: 'Damped float', valve: SHUT },
      { id: 'v2', title: 'Pump', kind: 'fixed-pump', valve: SHUT },
      { id: 'v3', title: 'Broken', kind: 'pilot-valve', valve: { ...SHUT, positions: SHUT.positions.slice(0, 1) } },
    ],
  };
  const entries = fileValveEntries(circuit);
  expect(entries.map(({ kind, readyMade }) => `${kind.kind} ${readyMade.title}`)).toEqual([
    'directional-valve Damped float',
    'pilot-valve Broken',
  ]);
  expect(fileValveOf(need(entries[0]).readyMade.id)).toBe('v1');
  expect(fileValveOf('valve-4/3-shut')).toBeUndefined();
  expect(searchCatalogue('damp', entries).map(({ readyMade }) => readyMade.id)).toEqual([fileValveId('v1')]);
  expect(checkParts(circuit).map(({ level, where }) => `${level} ${where}`)).toEqual(
    expect.arrayContaining(['warning readyMadeValves[1].kind', 'error readyMadeValves[2].valve.positions']),
  );
});
