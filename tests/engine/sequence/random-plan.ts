import fc from 'fast-check';
import type { MotionStep } from '../../../src/engine/sequence/notation.ts';
import type { LogicEnd, LogicPlan, LogicStep } from '../../../src/engine/sequence/step-logic.ts';

export const CYLINDERS = ['A', 'B', 'C'].map((label) => ({ label, rotary: false }));

/** Closed plans of three cylinders; a step may move two, and end by both, by a sensor, a switch or a time. */
export const plans = fc
  .array(
    fc.record({
      movers: fc.uniqueArray(fc.nat({ max: 2 }), { minLength: 1, maxLength: 2 }),
      coils: fc.uniqueArray(fc.nat({ max: 3 }), { maxLength: 3 }),
      end: fc.constantFrom<'motion' | 'sensor' | 'mid' | 'pressure' | 'time'>(
        'motion',
        'motion',
        'motion',
        'sensor',
        'mid',
        'pressure',
        'time',
      ),
    }),
    { minLength: 2, maxLength: 7 },
  )
  .map((drafts): LogicPlan => {
    const ways: ('+' | '-')[] = ['-', '-', '-'];
    const steps = drafts.map(({ movers, coils, end }): LogicStep => {
      const motions = movers.map((actuator): MotionStep[number] => ({
        actuator,
        way: (ways[actuator] = ways[actuator] === '+' ? '-' : '+'),
      }));
      const { actuator, way } = motions[0] as MotionStep[number];
      const ends: Record<typeof end, LogicEnd> = {
        motion: { by: 'motion' },
        sensor: { by: 'sensor', actuator, at: way === '+' ? 'out' : 'in' },
        mid: { by: 'sensor', actuator, at: 0.2 },
        pressure: { by: 'pressure', switch: 0, turns: 'on' },
        time: { by: 'time', after: 1 },
      };
      return { name: '', coils, motions, end: ends[end] };
    });
    return {
      actuators: CYLINDERS,
      start: ['in', 'in', 'in'],
      switches: ['PS1'],
      coils: ['Y1', 'Y2', 'Y3', 'Y4'],
      steps,
    };
  });

/** Numbers from 0 to 1 that look random, the same for the same seed (a linear congruence). */
export function diceOf(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}
