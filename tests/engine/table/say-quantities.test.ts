import { expect, test } from 'vitest';
import { sayFlow, sayForce, sayPressure, saySpeed } from '../../../src/engine/table/say-quantities.ts';

// 1 bar = 14.5038 psi, 1 US gal = 3.785412 L, 1 in = 25.4 mm, 1 lbf = 4.448222 N (NIST SP 811, appendix B).
test('quantities of a sentence in either system', () => {
  expect([sayPressure(45.63e5, 'metric'), sayPressure(45.63e5, 'us')]).toEqual(['46 bar', '662 psi']);
  expect([sayPressure(1.25e5, 'metric'), sayPressure(1.25e5, 'us')]).toEqual(['1.3 bar', '18.1 psi']);
  expect([sayFlow(40e-3 / 60, 'metric'), sayFlow(40e-3 / 60, 'us')]).toEqual(['40 L/min', '10.6 gpm']);
  expect(saySpeed(-0.254, false, 'metric')).toBe('254 mm/s');
  expect(saySpeed(-0.254, false, 'us')).toBe('10 in/s');
  expect(saySpeed(2 * Math.PI, true, 'us')).toBe('60 rpm');
  expect(sayForce(4448.222, false, 'us')).toBe('1000 lbf');
});
