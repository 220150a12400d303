import fc from 'fast-check';
import { expect, test } from 'vitest';
import { coilConditions, holds } from '../../../src/engine/sequence/coil-conditions.ts';
import type { CoilConditions, Expression } from '../../../src/engine/sequence/coil-conditions.ts';
import type { LogicEnd, LogicPlan, LogicStep, Place } from '../../../src/engine/sequence/step-logic.ts';
import { endProblems } from '../../../src/engine/sequence/step-logic.ts';
import type { MotionStep } from '../../../src/engine/sequence/notation.ts';
import { CYLINDERS, diceOf, plans } from './random-plan.ts';

const step = (coils: number[], motions: MotionStep, end: LogicEnd = { by: 'motion' }): LogicStep => ({
  name: '',
  coils,
  motions,
  end,
});
const move = (actuator: number, way: '+' | '-'): MotionStep => [{ actuator, way }];
const plan = (steps: LogicStep[], coils = ['Y1', 'Y2']): LogicPlan => ({
  actuators: CYLINDERS.slice(0, 2),
  start: ['in', 'in'],
  switches: ['PS1'],
  coils,
  steps,
});

const say = (e: Expression | undefined, { signals }: CoilConditions): string => {
  if (!e) return 'no';
  switch (e.type) {
    case 'all':
      return e.of.map((x) => say(x, { signals } as CoilConditions)).join('·');
    case 'any':
      return e.of.map((x) => say(x, { signals } as CoilConditions)).join(' + ');
    case 'not':
      return `/${say(e.of, { signals } as CoilConditions)}`;
    case 'signal': {
      const s = signals[e.signal];
      return s?.type === 'sensor' ? `${CYLINDERS[s.actuator]?.label} ${s.at}` : 'PS1';
    }
    case 'step':
      return `S${e.step + 1}`;
    case 'timer':
      return `T${e.step + 1}`;
  }
};

test('A+ B+ A- B- with one coil each: sensors alone are enough', () => {
  // By hand: Y1 on in steps 1 and 2 is b0 + a1·/b1; Y2 on in steps 2 and 3 is a1 + /a0·b1, or the like with /b0.
  const found = coilConditions(
    plan([step([0], move(0, '+')), step([0, 1], move(1, '+')), step([1], move(0, '-')), step([], move(1, '-'))]),
  );
  expect(found.clashes).toEqual([]);
  expect(found.closed).toBe(true);
  expect(found.coils.map(({ bySignals }) => say(bySignals?.expression, found))).toEqual([
    'B in + A out·/B out',
    'A out + B out·/A in',
  ]);
  expect(found.coils.every(({ bySignals }) => bySignals?.least)).toBe(true);
  expect(found.ends.map((end) => say(end, found))).toEqual(['A out', 'B out', 'A in', 'B in']);
});

test('A+ B+ B- A- with one coil each: the opposed signals show as steps that look alike', () => {
  const found = coilConditions(
    plan([step([0], move(0, '+')), step([0, 1], move(1, '+')), step([0], move(1, '-')), step([], move(0, '-'))]),
  );
  // Opposed at B- (step 3, against A out) and at the start (against B in): Q1 of the sequences, from memory.
  expect(found.coils.map(({ clashes }) => clashes)).toEqual([
    [
      { on: 0, off: 3 },
      { on: 1, off: 3 },
    ],
    [
      { on: 1, off: 2 },
      { on: 1, off: 3 },
    ],
  ]);
  expect(found.coils.map(({ bySignals, bySteps }) => [bySignals, say(bySteps, found)])).toEqual([
    [undefined, 'S1 + S2 + S3'],
    [undefined, 'S2'],
  ]);
  expect(found.clashes.map(({ steps }) => steps)).toEqual([
    [0, 3],
    [1, 2],
    [1, 3],
  ]);
});

test('a pressure switch ends a step, and is not relied on in others', () => {
  const found = coilConditions(
    plan([
      step([0], move(0, '+'), { by: 'pressure', switch: 0, turns: 'on' }),
      step([0], move(1, '+')),
      step([], [...move(0, '-'), ...move(1, '-')]),
    ]),
  );
  expect(found.ends.map((end) => say(end, found))).toEqual(['PS1', 'B out', 'A in·B in']);
  expect(found.coils[0]?.clashes.length).toBeGreaterThan(0);
});

test('a step that ends by time cannot be told from the next by signals', () => {
  const found = coilConditions(
    plan([step([0], move(0, '+')), step([0], [], { by: 'time', after: 2 }), step([], move(0, '-'))]),
  );
  expect(say(found.ends[1], found)).toBe('T2');
  expect(found.coils[0]?.clashes).toEqual([
    { on: 0, off: 2 },
    { on: 1, off: 2 },
  ]);
});

test('a motor has no end stop to end a step by', () => {
  const motor: LogicPlan = { ...plan([step([0], move(0, '+'))]), actuators: [{ label: 'M', rotary: true }] };
  expect(endProblems(motor).map((p) => p.what)).toEqual([
    'It ends when M+ comes to its end stop, and a motor has none.',
  ]);
});

/** Plays a plan with strokes of 0.4 m and speeds from `dice`, and calls back with the signals and the step all along. */
function play(
  of: LogicPlan,
  { signals }: CoilConditions,
  dice: () => number,
  see: (on: Set<number>, step: number) => void,
): void {
  const at = [0, 0, 0];
  for (const [i, { motions, end }] of of.steps.entries()) {
    let ended = false;
    const speed = motions.map(() => 1 + Math.floor(dice() * 3));
    let pressed = dice() < 0.5 && !(end.by === 'pressure');
    // Hundredths of a stroke, so that no sensor is run past.
    for (let t = 0; t < 300; t++) {
      const on = new Set<number>();
      const place = (p: Place): number => (p === 'in' ? 0 : p === 'out' ? 40 : Math.round(p * 100));
      signals.forEach((s, k) => {
        if (s.type === 'sensor' ? at[s.actuator] === place(s.at) : pressed) on.add(k);
      });
      const isThere = motions.every(({ actuator, way }) => at[actuator] === (way === '+' ? 40 : 0));
      const done =
        end.by === 'motion'
          ? isThere
          : end.by === 'sensor'
            ? at[end.actuator] === place(end.at)
            : end.by === 'time'
              ? t > 20
              : pressed;
      if (done) {
        ended = true;
        break;
      }
      see(on, i);
      motions.forEach(({ actuator, way }, m) => {
        if (t % (speed[m] as number) === 0)
          at[actuator] = Math.max(0, Math.min(40, (at[actuator] as number) + (way === '+' ? 1 : -1)));
      });
      pressed = end.by === 'pressure' ? t > 15 && dice() < 0.1 : dice() < 0.5;
    }
    // Nothing follows a step that never ends: a sensor that its actuator moves away from, say.
    if (!ended) return;
  }
}

test('played with any speeds, every condition is true exactly while its coil is to be on', () => {
  let told = 0;
  fc.assert(
    fc.property(plans, fc.nat(), (of, seed) => {
      const found = coilConditions(of);
      play(of, found, diceOf(seed), (on, i) => {
        for (const { coil, bySignals, bySteps } of found.coils) {
          const wanted = of.steps[i]?.coils.includes(coil);
          const now = { signals: on, step: i, timer: false };
          expect(holds(bySteps, now)).toBe(wanted);
          if (!bySignals) continue;
          told += 1;
          expect(holds(bySignals.expression, now), `step ${i + 1} ${say(bySignals.expression, found)}`).toBe(wanted);
        }
      });
    }),
    { numRuns: 30 },
  );
  expect(told).toBeGreaterThan(1000);
});
