import type { ValveData, ValvePort, ValvePosition } from '../circuit/model.ts';
import type { ReadyMade } from './contract.ts';

/** The ready-made directional valves. Position `a` leads P to A, position `b` leads P to B. */
export interface Actuation extends Pick<ValveData, 'left' | 'right' | 'rest' | 'coils'> {
  readonly id: string;
  readonly title: string;
  readonly words: readonly string[];
}

const top = (...ids: string[]): ValvePort[] => ids.map((id) => ({ id, side: 'top' }));
const bottom = (...ids: string[]): ValvePort[] => ids.map((id) => ({ id, side: 'bottom' }));
export const position = (name: string, ...paths: string[]): ValvePosition => ({ name, paths });

export const coil = (name: string, index: number): { name: string; position: number } => ({ name, position: index });

// Two positions: the spring stands on the right and puts the right box to the ports.
const BY_COIL: Actuation = {
  id: 'coil',
  title: 'coil, spring offset',
  words: ['solenoid', 'electric'],
  left: ['coil'],
  right: ['spring'],
  rest: 1,
  coils: [coil('a', 0)],
};
const BY_BUTTON: Actuation = {
  id: 'button',
  title: 'push-button, spring offset',
  words: ['manual', 'push button'],
  left: ['button'],
  right: ['spring'],
  rest: 1,
};
const BY_LEVER_DETENT: Actuation = {
  id: 'lever',
  title: 'lever, detent',
  words: ['manual', 'hand lever'],
  left: ['lever'],
  right: ['detent'],
};
const BY_TWO_COILS_DETENT: Actuation = {
  id: 'two-coils',
  title: 'two coils, detent',
  words: ['solenoid', 'memory', 'double solenoid'],
  left: ['coil'],
  right: ['coil', 'detent'],
  coils: [coil('a', 0), coil('b', 1)],
};
// Three positions, centred by springs.
const CENTRED_LEVER: Actuation = {
  id: 'lever',
  title: 'lever',
  words: ['manual', 'hand lever', 'spring centred'],
  left: ['lever', 'spring'],
  right: ['spring'],
  rest: 1,
};
const CENTRED_COILS: Actuation = {
  id: 'coils',
  title: 'two coils',
  words: ['solenoid', 'double solenoid', 'spring centred', 'electric'],
  left: ['coil', 'spring'],
  right: ['coil', 'spring'],
  rest: 1,
  coils: [coil('a', 0), coil('b', 2)],
};

export function valve(
  id: string,
  title: string,
  words: readonly string[],
  by: Actuation,
  ports: readonly ValvePort[],
  positions: readonly ValvePosition[],
): ReadyMade {
  const { left, right, rest, coils } = by;
  const data: ValveData = {
    ports,
    positions,
    left,
    right,
    ...(rest === undefined ? {} : { rest }),
    ...(coils ? { coils } : {}),
  };
  return {
    id,
    title: `${title}, ${by.title}`,
    words: [...words, ...by.words],
    make: () => ({ valve: structuredClone(data) }),
  };
}

export const PORTS_2 = [...top('A'), ...bottom('P')];
export const PORTS_3 = [...top('A'), ...bottom('P', 'T')];
export const PORTS_4 = [...top('A', 'B'), ...bottom('P', 'T')];
const PORTS_5 = [...top('A', 'B'), ...bottom('T1', 'P', 'T2')];
const PORTS_6 = [...top('A', 'C2', 'B'), ...bottom('P', 'C1', 'T')];

/** What a directional valve without data of its own is: 4/3, by lever, all ports shut. */
export const DEFAULT_VALVE: ValveData = {
  ports: PORTS_4,
  positions: [position('a', 'P-A', 'B-T'), position('0'), position('b', 'P-B', 'A-T')],
  left: CENTRED_LEVER.left,
  right: CENTRED_LEVER.right,
  rest: 1,
};

/** The centre conditions on offer for 4/3 valves. */
export const CENTRES: readonly {
  readonly id: string;
  readonly title: string;
  readonly words: readonly string[];
  readonly paths: readonly string[];
}[] = [
  { id: 'shut', title: 'all ports shut', words: ['closed centre', 'blocked centre'], paths: [] },
  { id: 'bypass', title: 'bypass centre (P–T, A and B shut)', words: ['tandem centre', 'unloading'], paths: ['P-T'] },
  { id: 'float', title: 'float centre (A, B–T, P shut)', words: ['floating', 'motor spool'], paths: ['A-B-T'] },
  {
    id: 'float-restricted',
    title: 'float centre, restricted (A, B–T throttled, P shut)',
    words: ['throttled float', 'soft'],
    paths: ['A~T', 'B~T'],
  },
  { id: 'joined', title: 'all ports joined', words: ['open centre'], paths: ['P-A-B-T'] },
  { id: 'a-t', title: 'A–T, P and B shut', words: ['one side vented'], paths: ['A-T'] },
  { id: 'b-t', title: 'B–T, P and A shut', words: ['one side vented'], paths: ['B-T'] },
  {
    id: 'regenerative',
    title: 'regenerative centre (P–A–B, T shut)',
    words: ['differential', 'fast forward'],
    paths: ['P-A-B'],
  },
  { id: 'p-a', title: 'P–A, B and T shut', words: ['one side fed'], paths: ['P-A'] },
  { id: 'p-b', title: 'P–B, A and T shut', words: ['one side fed'], paths: ['P-B'] },
];

const fourThree = (by: Actuation, suffix: string): ReadyMade[] =>
  CENTRES.map((centre) =>
    valve(
      `valve-4/3-${centre.id}${suffix}`,
      `4/3 valve, ${centre.title}`,
      ['directional valve', 'spool', ...centre.words],
      by,
      PORTS_4,
      [position('a', 'P-A', 'B-T'), position('0', ...centre.paths), position('b', 'P-B', 'A-T')],
    ),
  );

const twoTwo = (by: Actuation): ReadyMade[] => [
  valve(
    `valve-2/2-shut-${by.id}`,
    '2/2 valve, shut at rest',
    ['normally closed', 'NC', 'on-off', 'poppet'],
    by,
    PORTS_2,
    [position('a', 'P-A'), position('0')],
  ),
  valve(
    `valve-2/2-open-${by.id}`,
    '2/2 valve, open at rest',
    ['normally open', 'NO', 'on-off', 'unloading', 'poppet'],
    by,
    PORTS_2,
    [position('a'), position('0', 'P-A')],
  ),
];

const threeTwo = (by: Actuation): ReadyMade =>
  valve(`valve-3/2-${by.id}`, '3/2 valve, A to T at rest', ['single acting'], by, PORTS_3, [
    position('a', 'P-A'),
    position('0', 'A-T'),
  ]);

const fourTwo = (by: Actuation, second: string): ReadyMade =>
  valve(`valve-4/2-${by.id}`, '4/2 valve', ['directional valve', 'reversing'], by, PORTS_4, [
    position('a', 'P-A', 'B-T'),
    position(second, 'P-B', 'A-T'),
  ]);

const fiveTwo = (by: Actuation, second: string): ReadyMade =>
  valve(`valve-5/2-${by.id}`, '5/2 valve, two returns', ['directional valve', 'separate exhausts'], by, PORTS_5, [
    position('a', 'P-A', 'B-T2'),
    position(second, 'P-B', 'A-T1'),
  ]);

const fiveThree = (by: Actuation, suffix: string): ReadyMade[] =>
  (
    [
      ['shut', 'all ports shut', 'closed centre', []],
      ['float', 'A–T1, B–T2, P shut', 'open centre exhaust', ['A-T1', 'B-T2']],
      ['fed', 'P–A–B, returns shut', 'pressure centre', ['P-A-B']],
    ] as const
  ).map(([id, title, word, paths]) =>
    valve(
      `valve-5/3-${id}${suffix}`,
      `5/3 valve, ${title}`,
      ['directional valve', 'separate exhausts', word],
      by,
      PORTS_5,
      [position('a', 'P-A', 'B-T2'), position('0', ...paths), position('b', 'P-B', 'A-T1')],
    ),
  );

const section = (by: Actuation, suffix: string): ReadyMade =>
  valve(
    `valve-6/3-carry-over${suffix}`,
    '6/3 section with carry-over',
    ['mobile', 'open centre section', 'sectional', 'stack', 'monoblock'],
    by,
    PORTS_6,
    [position('a', 'P-A', 'B-T'), position('0', 'C1-C2'), position('b', 'P-B', 'A-T')],
  );

const fourFour: ReadyMade = valve(
  'valve-4/4-float',
  '4/4 valve with float position',
  ['directional valve', 'mobile', 'floating', 'loader'],
  {
    id: 'lever',
    title: 'lever, spring centred, float held by detent',
    words: ['manual', 'hand lever'],
    left: ['lever', 'spring'],
    right: ['spring', 'detent'],
    rest: 1,
  },
  PORTS_4,
  [position('a', 'P-A', 'B-T'), position('0'), position('b', 'P-B', 'A-T'), position('float', 'A-B-T')],
);

export const VALVE_FORMS: readonly ReadyMade[] = [
  ...fourThree(CENTRED_LEVER, ''),
  ...fourThree(CENTRED_COILS, '-coils'),
  fourTwo(BY_COIL, '0'),
  fourTwo(BY_TWO_COILS_DETENT, 'b'),
  fourTwo(BY_LEVER_DETENT, 'b'),
  threeTwo(BY_COIL),
  threeTwo(BY_BUTTON),
  ...twoTwo(BY_COIL),
  ...twoTwo(BY_BUTTON),
  section(CENTRED_LEVER, ''),
  section(CENTRED_COILS, '-coils'),
  fourFour,
  fiveTwo(BY_COIL, '0'),
  fiveTwo(BY_TWO_COILS_DETENT, 'b'),
  fiveTwo(BY_LEVER_DETENT, 'b'),
  ...fiveThree(CENTRED_LEVER, ''),
  ...fiveThree(CENTRED_COILS, '-coils'),
];
