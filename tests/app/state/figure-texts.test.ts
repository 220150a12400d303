import { expect, test } from 'vitest';
import { sayPressure, saySpeed, speedUnit } from '../../../src/app/state/figure-texts.ts';

test('speeds are said without their sense, in whole numbers once there are two digits', () => {
  expect(saySpeed(0.0509, 'linear', 'metric')).toBe('51 mm/s');
  expect(saySpeed(-0.2183, 'linear', 'metric', true)).toBe('218');
  expect(saySpeed(0.00213, 'linear', 'metric')).toBe('2.1 mm/s');
  // 1 in = 25.4 mm exactly (NIST SP 811).
  expect(saySpeed(0.0508, 'linear', 'us')).toBe('2 in/s');
});

test('a shaft turns in rpm: 2π rad/s are 60 of them', () => {
  expect(saySpeed(2 * Math.PI, 'rotary', 'metric')).toBe('60 rpm');
  expect(speedUnit('rotary', 'us')).toBe('rpm');
});

test('what creeps or stands has no speed', () => {
  expect(saySpeed(5e-5, 'linear', 'metric')).toBeUndefined();
  expect(saySpeed(NaN, 'linear', 'metric')).toBeUndefined();
});

test('pressures keep two digits, and next to nothing is nought', () => {
  expect(sayPressure(121.4e5, 'metric')).toBe('121 bar');
  expect(sayPressure(2.34e5, 'metric', true)).toBe('2.3');
  expect(sayPressure(-3, 'metric')).toBe('0 bar');
  // 1 bar = 14.504 psi (NIST SP 811).
  expect(sayPressure(100e5, 'us')).toBe('1450 psi');
});
