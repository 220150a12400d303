import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { ValveData } from '../../src/circuit/model.ts';
import { parsePath, pathsOf, valveElements } from '../../src/parts/valve-paths.ts';

const RATED = { flow: 1e-3, drop: 1e5 };

test.each([
  ['P-A', ['P', 'A'], 'both', false],
  ['P>A', ['P', 'A'], 'one-way', false],
  ['P~A', ['P', 'A'], 'both', true],
  ['P~>A', ['P', 'A'], 'one-way', true],
  ['P-A-B', ['P', 'A', 'B'], 'both', false],
  [' C1 - C2 ', ['C1', 'C2'], 'both', false],
])('"%s" is read', (text, ports, way, throttled) => {
  expect(parsePath(text)).toEqual({ ok: true, value: { ports, way, throttled }, warnings: [] });
});

test.each([
  ['', /not a path/],
  ['P', /not a path/],
  ['P-', /not a path/],
  ['-A', /not a path/],
  ['P--A', /not a path/],
  ['P<A', /not a path/],
  ['P=A', /not a path/],
  ['1-A', /not a path/],
  ['P>A>B', /mixes/],
  ['P-A>B', /mixes/],
  ['P~A~B', /mixes/],
  ['P-P', /twice/],
  ['P-A-P', /twice/],
])('"%s" is refused', (text, what) => {
  const parsed = parsePath(text, 'valve.positions[1].paths[0]');
  expect(parsed.ok).toBe(false);
  if (parsed.ok) return;
  expect(parsed.problems[0]?.what).toMatch(what);
  expect(parsed.problems[0]?.where).toBe('valve.positions[1].paths[0]');
  expect(parsed.problems[0]?.remedy).not.toBe('');
});

const valve = (positions: readonly (readonly string[])[], ports = ['P', 'T', 'A', 'B']): ValveData => ({
  ports: ports.map((id) => ({ id, side: 'bottom' })),
  positions: positions.map((paths, index) => ({ name: `p${index}`, paths })),
  left: ['lever'],
  right: [],
});

test('a path that several positions share is one element with all of them', () => {
  expect(valveElements(valve([['P-A'], ['A-P'], ['P>A']]), RATED)).toEqual([
    { type: 'path', from: 'P', to: 'A', way: 'both', throttled: false, positions: [0, 1], rated: RATED },
    { type: 'path', from: 'P', to: 'A', way: 'one-way', throttled: false, positions: [2], rated: RATED },
  ]);
});

test('joined ports give every pair, whatever the order', () => {
  const pairs = (text: string): string[] =>
    valveElements(valve([[text]]), RATED)
      .map(({ from, to }) => [from, to].sort().join(''))
      .sort();
  expect(pairs('P-A-B')).toEqual(['AB', 'AP', 'BP']);
  expect(pairs('B-P-A')).toEqual(pairs('P-A-B'));
});

test('paths that cannot be read or name strange ports are left out', () => {
  expect(pathsOf(valve([['P-A', 'P=B', 'A-Z']]), 0).map((path) => path.ports)).toEqual([['P', 'A']]);
});

/** The plain reading: which port reaches which in one step, position by position, straight from the text. */
function plainReading(data: ValveData, position: number): Set<string> {
  const steps = new Set<string>();
  for (const text of data.positions[position]?.paths ?? []) {
    const mark = text.includes('~') ? 'throttled' : 'open';
    const ports = text.split(/[-~>]+/);
    for (const from of ports) {
      for (const to of ports) {
        if (from === to) continue;
        if (text.includes('>') && ports.indexOf(from) > ports.indexOf(to)) continue;
        steps.add(`${from}→${to} ${mark}`);
      }
    }
  }
  return steps;
}

const PORTS = ['P', 'T', 'A', 'B', 'C1', 'C2'];
const anyPath = fc
  .tuple(fc.shuffledSubarray(PORTS, { minLength: 2, maxLength: 4 }), fc.constantFrom('-', '>', '~', '~>'))
  .map(([ports, sign]) => (sign === '-' ? ports.join('-') : ports.slice(0, 2).join(sign)));
const anyValve = fc
  .array(fc.array(anyPath, { maxLength: 5 }), { minLength: 2, maxLength: 4 })
  .map((positions) => valve(positions, PORTS));

test('elements of any valve say what its text says, position by position', () => {
  fc.assert(
    fc.property(anyValve, (data) => {
      const elements = valveElements(data, RATED);
      data.positions.forEach((_, position) => {
        const steps = new Set<string>();
        for (const element of elements) {
          if (!element.positions?.includes(position)) continue;
          const mark = element.throttled ? 'throttled' : 'open';
          steps.add(`${element.from}→${element.to} ${mark}`);
          if (element.way === 'both') steps.add(`${element.to}→${element.from} ${mark}`);
        }
        expect([...steps].sort()).toEqual([...plainReading(data, position)].sort());
      });
    }),
  );
});

test('no element is there twice', () => {
  fc.assert(
    fc.property(anyValve, (data) => {
      const keys = valveElements(data, RATED).map(
        (e) => `${e.way === 'both' ? [e.from, e.to].sort().join() : `${e.from},${e.to}`} ${e.way} ${e.throttled}`,
      );
      expect(new Set(keys).size).toBe(keys.length);
    }),
  );
});
