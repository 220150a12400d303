import fc from 'fast-check';
import { expect, test } from 'vitest';
import { signalGroups } from '../../../src/engine/sequence/groups.ts';
import type { SignalGroups } from '../../../src/engine/sequence/groups.ts';
import { parseMotions, sayMotion } from '../../../src/engine/sequence/notation.ts';
import type { MotionStep, NotedActuator } from '../../../src/engine/sequence/notation.ts';

const RIG: readonly NotedActuator[] = [
  ...['A', 'B', 'C', 'D', 'E'].map((label) => ({ label, rotary: false })),
  { label: 'M', rotary: true },
];

const motions = (text: string): readonly MotionStep[] => {
  const read = parseMotions(text, RIG);
  if (!read.ok) throw new Error(text);
  return read.value;
};
const groupsOf = (text: string): SignalGroups => {
  const found = signalGroups(motions(text), RIG);
  if (!found.ok) throw new Error(found.problems.map((p) => p.what).join(' '));
  return found.value;
};
/** `A+ B+ / B- A-`, and the steps (from 1) at which an opposed signal stands, with that signal. */
const said = (text: string): unknown => {
  const steps = motions(text);
  const found = groupsOf(text);
  const words = (of: MotionStep): string => of.map((m) => sayMotion(m, RIG)).join('');
  return {
    groups: found.division
      .map(({ from, to }) =>
        steps
          .slice(from, to + 1)
          .map(words)
          .join(' '),
      )
      .join(' / '),
    count: found.count,
    opposed: found.opposed.map(
      ({ step, motion, signal }) => `${step + 1}: ${sayMotion(motion, RIG)} against ${words(signal)}`,
    ),
  };
};

// Q1 to Q4: the law of the cascade method, from memory; counted by hand.
test('Q1: A+ B+ B- A- needs two groups; signals stand opposed at B- and at the start', () => {
  expect(said('A+ B+ B- A-')).toEqual({
    groups: 'A+ B+ / B- A-',
    count: 2,
    opposed: ['1: A+ against B-', '3: B- against A+'],
  });
  expect(groupsOf('A+ B+ B- A-').changeOvers).toEqual([
    { after: 1, from: 0, to: 1 },
    { after: 3, from: 1, to: 0 },
  ]);
});

test('Q2: A+ B+ A- B- has no opposed signals', () => {
  expect(said('A+ B+ A- B-')).toMatchObject({ opposed: [] });
});

test('Q3: A+ B+ B- C+ C- A- needs three groups', () => {
  expect(said('A+ B+ B- C+ C- A-')).toMatchObject({ groups: 'A+ B+ / B- C+ / C- A-', count: 3 });
});

test('Q4: A+ A+ B- is refused: A goes out twice, and the cycle is not closed', () => {
  const found = signalGroups(motions('A+ A+ B-'), RIG);
  expect(found.ok ? [] : found.problems.map(({ where, what }) => `${where}: ${what}`)).toEqual([
    'step 1: The cycle is not closed: it ends with A where A+ is to take it, so the next cycle cannot start.',
    'step 2: A+ comes again, though A went there in step 1 and nothing took it back.',
    'step 3: The cycle is not closed: it ends with B where B- is to take it, so the next cycle cannot start.',
  ]);
});

test('the last group joins the first where no actuator is in both', () => {
  // Counted by hand: {B- A+} and {A- B+} in the ring, three runs as written.
  expect(said('A+ A- B+ B-')).toEqual({
    groups: 'A+ / A- B+ / B-',
    count: 2,
    opposed: ['2: A- against B-', '4: B- against A-'],
  });
  expect(groupsOf('A+ A- B+ B-')).toMatchObject({
    lastJoinsFirst: true,
    changeOvers: [
      { after: 0, from: 0, to: 1 },
      { after: 2, from: 1, to: 0 },
    ],
  });
});

test('motions at one time count as one step, and a motor changes between turning and rest', () => {
  expect(said('A+ (B+ C+) (B- C-) A-')).toMatchObject({ groups: 'A+ B+C+ / B-C- A-', count: 2 });
  expect(said('M+ A+ A- M0')).toEqual({ groups: 'M+ A+ / A- M0', count: 2, opposed: ['1: M+ against A-'] });
  expect(signalGroups(motions('M+ A+ A-'), RIG)).toMatchObject({ ok: false, problems: [{ where: 'step 1' }] });
  expect(signalGroups([[], []], RIG)).toMatchObject({ ok: false, problems: [{ where: 'motions' }] });
});

/** A closed cycle: motions of each actuator alternate, and some steps hold two. */
const cycle = fc
  .tuple(
    fc.array(fc.nat({ max: 4 }), { minLength: 1, maxLength: 5 }),
    fc.array(fc.boolean(), { maxLength: 12 }),
    fc.nat(),
  )
  .map(([half, joined, seed]) => {
    const order = [...half, ...half].map((actuator, i) => ({ actuator, key: (seed * (i + 7) * 2654435761) % 1009 }));
    const ways = new Map<number, '+' | '-'>();
    const steps: MotionStep[] = [];
    order
      .sort((a, b) => a.key - b.key)
      .forEach(({ actuator }, i) => {
        const way = ways.get(actuator) === '+' ? '-' : '+';
        ways.set(actuator, way);
        const last = steps.at(-1);
        if (last && joined[i] === true && last.every((m) => m.actuator !== actuator))
          steps[steps.length - 1] = [...last, { actuator, way }];
        else steps.push([{ actuator, way }]);
      });
    return steps;
  });

const distinct = (steps: readonly MotionStep[]): boolean => {
  const all = steps.flat().map((m) => m.actuator);
  return new Set(all).size === all.length;
};

test('no division into runs without an actuator twice has fewer of them: all tried, as written and as a ring', () => {
  fc.assert(
    fc.property(cycle, (steps) => {
      const n = steps.length;
      let written = Infinity;
      let ring = Infinity;
      // Bit i: a group ends after step i.
      for (let cuts = 1; cuts < 1 << n; cuts++) {
        const ends = steps.flatMap((_, i) => ((cuts >> i) & 1 ? [i] : []));
        const fits = ends.every((end, k) => {
          const before = k === 0 ? (ends.at(-1) as number) - n : (ends[k - 1] as number);
          return distinct(
            Array.from({ length: end - before }, (_, j) => steps[(before + 1 + j + n) % n] as MotionStep),
          );
        });
        if (!fits) continue;
        ring = Math.min(ring, ends.length);
        if (((cuts >> (n - 1)) & 1) === 1) written = Math.min(written, ends.length);
      }
      const found = signalGroups(steps, RIG);
      if (!found.ok) throw new Error(found.problems.map((p) => p.what).join(' '));
      const { division, count, lastJoinsFirst } = found.value;
      expect(division.flatMap(({ from, to }) => Array.from({ length: to - from + 1 }, (_, i) => from + i))).toEqual(
        steps.map((_, i) => i),
      );
      for (const { from, to } of division) expect(distinct(steps.slice(from, to + 1))).toBe(true);
      expect(division).toHaveLength(written);
      expect(count).toBe(ring);
      expect(lastJoinsFirst).toBe(ring < written);
      if (lastJoinsFirst) {
        const [first, last] = [division[0], division.at(-1)];
        expect(distinct([...steps.slice(last?.from), ...steps.slice(0, (first?.to ?? 0) + 1)])).toBe(true);
      }
    }),
    { numRuns: 300 },
  );
});

test('a signal stands opposed exactly where a run of the cycle shows it', () => {
  fc.assert(
    fc.property(cycle, (steps) => {
      const n = steps.length;
      const expected: string[] = [];
      // Two cycles: the first brings every actuator to where the second starts.
      const at = new Map<number, string>();
      for (let t = 0; t < 2 * n; t++) {
        const step = t % n;
        if (t >= n) {
          for (const { actuator, way } of steps[step] as MotionStep) {
            steps.forEach((other, opposite) => {
              if (!other.some((m) => m.actuator === actuator && m.way !== way)) return;
              const signal = steps[(opposite - 1 + n) % n] as MotionStep;
              if (signal.every((m) => at.get(m.actuator) === m.way)) expected.push(`${step} ${actuator} ${opposite}`);
            });
          }
        }
        for (const { actuator, way } of steps[step] as MotionStep) at.set(actuator, way);
      }
      const found = signalGroups(steps, RIG);
      expect(found.ok && found.value.opposed.map((o) => `${o.step} ${o.motion.actuator} ${o.opposite}`)).toEqual(
        expected,
      );
    }),
    { numRuns: 300 },
  );
});
