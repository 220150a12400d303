import { describe, expect, test } from 'vitest';
import type { NetAccumulator, NetActuator } from '../../../../src/network/network.ts';
import {
  fullAt,
  gasPressure,
  gasStiffness,
  oilAt,
  springForce,
  springRate,
  stopAt,
} from '../../../../src/engine/sequence/play/machine.ts';

const BAR = 1e5;
const store: NetAccumulator = {
  part: 0,
  line: 0,
  charged: false,
  precharge: 90 * BAR,
  pressure: 90 * BAR,
  volume: 4e-3,
};

describe('gas', () => {
  test('follows p·V = const of absolute pressures (isothermal law), there and back', () => {
    expect(gasPressure(store, 0)).toBeCloseTo(90 * BAR, 3);
    // Half the gas volume: twice 91.013 bar absolute.
    expect(gasPressure(store, 2e-3) / BAR).toBeCloseTo(2 * 91.01325 - 1.01325, 6);
    expect(oilAt(store, gasPressure(store, 1e-3))).toBeCloseTo(1e-3, 12);
    expect(oilAt(store, 50 * BAR)).toBe(0);
  });

  test('its stiffness is the slope of its pressure', () => {
    const h = 1e-9;
    const slope = (gasPressure(store, 1e-3 + h) - gasPressure(store, 1e-3 - h)) / (2 * h);
    expect(gasStiffness(store, 1e-3) / slope).toBeCloseTo(1, 5);
  });

  test('it is full at a compression of 4:1 (common practice), or at what it is said to be charged to', () => {
    expect(fullAt(store)).toBeCloseTo(3e-3, 12);
    const more = { ...store, charged: true, pressure: 500 * BAR };
    expect(fullAt(more)).toBeCloseTo(oilAt(more, 500 * BAR), 12);
  });

  test('without a volume it keeps its pressure', () => {
    expect(gasPressure({ ...store, volume: 0, charged: true, pressure: 120 * BAR }, 5)).toBe(120 * BAR);
  });
});

test('a spring has its given force at mid stroke, a quarter less and more at its ends, whichever way it pushes', () => {
  const of = (spring: number): NetActuator => ({
    part: 0,
    a: 0,
    b: -1,
    rotary: false,
    areaA: 1e-3,
    areaB: 1e-3,
    stroke: 0.1,
    push: { way: spring > 0 ? 'in' : 'out', by: 'spring', size: 0 },
    leakage: 0,
    resisting: false,
    forces: { pressing: 0, resisting: 0, friction: 0, spring },
  });
  expect([0, 0.05, 0.1].map((at) => springForce(of(400), at))).toEqual([300, 400, 500]);
  expect([0, 0.05, 0.1].map((at) => springForce(of(-400), at))).toEqual([-500, -400, -300]);
  expect(springRate(of(-400))).toBeCloseTo(2000, 9);
  expect([0, 0.05, 0.1].map((at) => stopAt(of(400), at))).toEqual(['in', 'between', 'out']);
});
