import { posix } from 'node:path';
import { scan } from './scan.ts';
import type { Scan } from './scan.ts';

/** One breach of a house rule: where, and the rule with its reason. */
export interface Breach {
  readonly rule: string;
  readonly file: string;
  readonly what: string;
}

/** Path from the top of the project → text. */
export type Files = ReadonlyMap<string, string>;

/** From the ground up: a folder may import those before it, never those after it. */
export const FLOORS = [
  'base',
  'circuit',
  'parts',
  'network',
  'drawing',
  'engine/paths',
  'engine/flow',
  'engine/table',
  'engine/sequence',
  'findings',
  'analysis',
  'report',
  'worker',
  'cli',
  'app',
] as const;
export type Floor = (typeof FLOORS)[number];

/** Floors that see less than everything below them. */
const SEES: Partial<Record<Floor, readonly Floor[]>> = {
  'engine/paths': ['base', 'network'],
  'engine/flow': ['base', 'network'],
  'engine/table': ['base', 'network', 'engine/paths', 'engine/flow'],
  'engine/sequence': ['base', 'network', 'engine/paths', 'engine/flow'],
  app: ['base', 'circuit', 'parts', 'drawing', 'report'],
};

/** Single files that a floor may import beyond the floors it sees. */
const ALSO: Partial<Record<Floor, readonly string[]>> = {
  app: ['src/worker/client.ts'],
};

/** A report reads results; what makes them is none of its business. */
const REPORT_READS = ['base', 'circuit', 'drawing'];
const RESULTS = [
  'src/analysis/results.ts',
  'src/engine/table/state-table.ts',
  'src/engine/table/table-data.ts',
  'src/engine/table/words.ts',
];

const VIEW_FLOORS: readonly Floor[] = ['app', 'worker'];
const PURE: readonly Floor[] = FLOORS.filter((floor) => !['worker', 'cli', 'app'].includes(floor));

const DOM = [
  ...['document', 'window', 'self', 'navigator', 'location', 'history', 'screen', 'localStorage', 'sessionStorage'],
  ...['indexedDB', 'fetch', 'XMLHttpRequest', 'Worker', 'postMessage', 'alert', 'confirm', 'prompt'],
  ...[
    'requestAnimationFrame',
    'getComputedStyle',
    'matchMedia',
    'HTMLElement',
    'SVGElement',
    'Element',
    'Node',
    'Event',
  ],
  ...['DOMParser', 'Image', 'CustomEvent', 'KeyboardEvent', 'PointerEvent', 'ResizeObserver'],
];
const MACHINE = ['process', 'Buffer', 'require', '__dirname', '__filename'];
const TIMERS = [
  'setTimeout',
  'setInterval',
  'setImmediate',
  'requestAnimationFrame',
  'requestIdleCallback',
  'performance',
];

export function floorOf(file: string): Floor | undefined {
  return FLOORS.find((floor) => file.startsWith(`src/${floor}/`));
}

interface Source extends Scan {
  readonly file: string;
  readonly floor: Floor | undefined;
  /** Project files it imports, as paths from the top. */
  readonly targets: readonly string[];
}

function read(files: Files): Source[] {
  return [...files]
    .filter(([file]) => /^src\/.*\.(ts|svelte|mjs|js)$/.test(file))
    .map(([file, text]) => {
      const found = scan(file, text);
      const targets = found.imports
        .filter((name) => name.startsWith('.'))
        .map((name) => posix.join(posix.dirname(file), name.replace(/\?.*$/, '')));
      return { file, floor: floorOf(file), targets, ...found };
    });
}

interface Rule {
  readonly name: string;
  readonly why: string;
  readonly check: (source: Source) => readonly string[];
}

const RULES: readonly Rule[] = [
  {
    name: 'every source stands on a floor',
    why: 'a file outside the floors escapes every other rule',
    check: ({ floor }) => (floor ? [] : ['lies in no floor']),
  },
  {
    name: 'imports go down',
    why: 'a lower floor that knows a higher one can be neither tested nor reused without it',
    check: ({ floor, targets }) =>
      targets.filter((target) => {
        const below = floorOf(target);
        return floor && below && FLOORS.indexOf(below) > FLOORS.indexOf(floor);
      }),
  },
  {
    name: 'engines see only network and base; table and sequence also paths and flow',
    why: 'an engine works on dense arrays, so that a new part kind or file field never touches it',
    check: (source) => beyond(source, ['engine/paths', 'engine/flow', 'engine/table', 'engine/sequence']),
  },
  {
    name: 'the app asks the analysis through src/worker/client.ts only',
    why: 'long work must never stop the screen, so there is one door, and it crosses a thread',
    check: (source) => beyond(source, ['app']),
  },
  {
    name: 'reports read results, base, circuit and drawing',
    why: 'a writer that computes would say something else than the screen',
    check: ({ floor, targets }) =>
      floor !== 'report'
        ? []
        : targets.filter((target) => {
            const other = floorOf(target);
            return other && other !== 'report' && !REPORT_READS.includes(other) && !RESULTS.includes(target);
          }),
  },
  {
    name: 'no DOM below the worker',
    why: 'the same answers have to come from the command line, a thread and a test',
    check: ({ floor, globals }) =>
      floor && !VIEW_FLOORS.includes(floor) ? DOM.filter((name) => globals.has(name)) : [],
  },
  {
    name: 'no view library outside the app',
    why: 'engines and reports run where there is no screen',
    check: ({ floor, imports, file }) =>
      floor === 'app'
        ? []
        : [
            ...imports.filter((name) => /^(svelte|@svelte-put\/|@tanstack\/svelte)/.test(name)),
            ...(/\.svelte(\.ts)?$/.test(file) ? ['is a Svelte file'] : []),
          ],
  },
  {
    name: 'no files and no Node outside the command line',
    why: 'everything else also runs in a browser',
    check: ({ floor, imports, globals }) =>
      floor === 'cli'
        ? []
        : [
            ...imports.filter((name) =>
              /^(node:|fs|path|os|child_process|process|url|util|worker_threads)(\/|$|(?<=:))/.test(name),
            ),
            ...MACHINE.filter((name) => globals.has(name)),
          ],
  },
  {
    name: 'no clock in pure floors',
    why: 'the same circuit has to give the same answer every time; only a budget hands time in',
    check: ({ floor, globals, clocks }) =>
      floor && PURE.includes(floor) ? [...clocks, ...TIMERS.filter((name) => globals.has(name))] : [],
  },
  {
    name: 'no printing in pure floors',
    why: 'they return text; only the command line and the app show it',
    check: ({ floor, globals }) => (floor && PURE.includes(floor) && globals.has('console') ? ['console'] : []),
  },
  {
    name: 'project imports name a floor and its file',
    why: 'a path out of src, or one that is computed, cannot be checked',
    check: ({ file, imports, targets }) => [
      ...imports.filter((name) => name === '(computed)' && file !== LAUNCHER),
      ...targets.filter((target) => !target.startsWith('src/') && target !== 'package.json' && file !== LAUNCHER),
    ],
  },
];

/** Plain JavaScript that starts the built command line; in a checkout it may build it first. */
const LAUNCHER = 'src/cli/bin.mjs';

function beyond({ floor, targets }: Source, floors: readonly Floor[]): string[] {
  const sees = floor && floors.includes(floor) ? SEES[floor] : undefined;
  if (!floor || !sees) return [];
  return targets.filter((target) => {
    const other = floorOf(target);
    return other && other !== floor && !sees.includes(other) && !ALSO[floor]?.includes(target);
  });
}

export function checkFloors(files: Files): Breach[] {
  const sources = read(files);
  const breaches = sources.flatMap((source) =>
    RULES.flatMap(({ name, why, check }) =>
      check(source).map((what) => ({ rule: `${name} (${why})`, file: source.file, what })),
    ),
  );
  return [...breaches, ...cycles(sources)];
}

/** Each file that can reach itself, type-only imports included, with one way round. */
function cycles(sources: readonly Source[]): Breach[] {
  // A component that draws a tree has to import itself; that ring has one file in it.
  const next = new Map(sources.map(({ file, targets }) => [file, targets.filter((target) => target !== file)]));
  const state = new Map<string, 'open' | 'done'>();
  const found: Breach[] = [];
  const trail: string[] = [];
  const visit = (file: string): void => {
    if (state.get(file) === 'done') return;
    if (state.get(file) === 'open') {
      const round = [...trail.slice(trail.indexOf(file)), file];
      found.push({
        rule: 'no cycles (files in a ring can only be understood all at once)',
        file,
        what: round.join(' → '),
      });
      return;
    }
    state.set(file, 'open');
    trail.push(file);
    for (const target of next.get(file) ?? []) visit(target);
    trail.pop();
    state.set(file, 'done');
  };
  for (const { file } of sources) visit(file);
  return found;
}
