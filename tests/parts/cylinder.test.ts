import { expect, test } from 'vitest';
import type { Part } from '../../src/circuit/model.ts';
import type { ActuatorElement } from '../../src/parts/contract.ts';
import { areasOf } from '../../src/parts/cylinder-body.ts';
import { needKind } from './need.ts';

const partOf = (kind: string, settings: Part['settings']): Part => ({
  id: 'C1',
  kind,
  ...(settings ? { settings } : {}),
});
function actuator(kind: string, settings: Part['settings'] = {}): ActuatorElement {
  const element = needKind(kind).elements(partOf(kind, settings))[0];
  if (element?.type !== 'actuator') throw new Error('no actuator');
  return element;
}
const problems = (kind: string, settings: Part['settings']): string[] =>
  (needKind(kind).check?.(partOf(kind, settings)) ?? []).map((problem) => `${problem.where}: ${problem.what}`);

// Bores and rods of ISO 3320 (formerly ISO 7181; classes from memory); φ = A/a follows from the diameters.
test.each([
  [50, 36, 2.076],
  [63, 45, 2.042],
  [80, 56, 1.961],
  [100, 70, 1.961],
  [125, 90, 2.076],
  [160, 110, 1.896],
  [200, 140, 1.961],
  [50, 22, 1.24],
  [63, 28, 1.246],
  [80, 36, 1.254],
  [100, 45, 1.254],
  [125, 56, 1.251],
  [50, 28, 1.457],
  [63, 36, 1.485],
  [80, 45, 1.463],
  [100, 56, 1.457],
  [125, 70, 1.457],
])('%d/%d has the area ratio %d', (bore, rod, ratio) => {
  const element = actuator('cylinder', { bore: `${bore} mm`, rod: `${rod} mm` });
  expect((element.areaA / element.areaB).toFixed(3)).toBe(ratio.toFixed(3));
});

// A = π·D²/4 and a = A − π·d²/4, cm² to the printed digits.
test.each([
  [50, 36, 19.63, 9.46],
  [63, 45, 31.17, 15.27],
  [80, 56, 50.27, 25.64],
  [100, 70, 78.54, 40.06],
])('%d/%d has the areas %d and %d cm²', (bore, rod, piston, annulus) => {
  const areas = areasOf(bore / 1000, rod / 1000);
  expect((areas.piston * 1e4).toFixed(2)).toBe(piston.toFixed(2));
  expect((areas.annulus * 1e4).toFixed(2)).toBe(annulus.toFixed(2));
});

test('a double-rod cylinder has the annulus on both sides', () => {
  const element = actuator('double-rod-cylinder', { bore: '50 mm', rod: '36 mm' });
  expect(element.areaA).toBe(element.areaB);
  expect((element.areaA * 1e4).toFixed(2)).toBe('9.46');
});

test('a single-acting cylinder has one port and comes back by its spring, or by the load', () => {
  expect(actuator('single-acting-cylinder')).toMatchObject({ a: 'A', spring: 'in', springForce: 500 });
  expect('b' in actuator('single-acting-cylinder')).toBe(false);
  expect(
    'spring' in actuator('single-acting-cylinder', { return: 'load', load: '10 kN', loadSense: 'pushes in' }),
  ).toBe(false);
});

test.each([
  ['none', 'none', 0],
  ['resisting', 'resisting', 20000],
  ['pushes in', 'in', 20000],
  ['pulls out', 'out', 20000],
])('a load that acts "%s"', (loadSense, sense, size) => {
  expect(actuator('cylinder', { load: '20 kN', loadSense }).load).toEqual({ sense, size });
});

test.each([
  ['drives A to B', 'out'],
  ['drives B to A', 'in'],
])('a motor load that %s', (loadSense, sense) => {
  expect(actuator('motor', { load: '110 N·m', loadSense }).load).toEqual({ sense, size: 110 });
});

test('a motor holds its displacement per radian, so that torque is pressure times area', () => {
  // Esposito, Fluid Power with Applications, example 7-5: 82 cm³/rev at 70 bar give 91.4 N·m.
  const element = actuator('motor', { displacement: '82 cm³/rev' });
  expect(element.areaA * 70e5).toBeCloseTo(91.4, 1);
  expect(element.areaA).toBe(element.areaB);
  expect(element.motion).toBe('rotary');
});

test.each([
  [{ bore: '50 mm', rod: '50 mm' }, 'settings.rod'],
  [{ bore: '40 mm', rod: '45 mm' }, 'settings.rod'],
  [{ bore: '30 mm' }, 'settings.bore'],
  [{ rod: '2 in' }, 'settings.rod'],
])('a rod that does not fit is reported: %o', (settings, where) => {
  expect(problems('cylinder', settings)).toEqual([
    expect.stringMatching(new RegExp(`^${where}: The rod .* is not thinner than the bore`)),
  ]);
  // And the areas stay usable.
  expect(actuator('cylinder', settings).areaB).toBeGreaterThan(0);
});

test('a load without a direction, and a direction without a load, are pointed out', () => {
  expect(problems('cylinder', { load: '20 kN' })).toEqual([expect.stringContaining('settings.loadSense')]);
  expect(problems('cylinder', { loadSense: 'resisting' })).toEqual([expect.stringContaining('settings.load:')]);
  expect(problems('cylinder', { load: '20 kN', loadSense: 'resisting' })).toEqual([]);
});

test('the piston goes from end to end with the stroke', () => {
  const kind = needKind('cylinder');
  const shift = (stroke: number): number => {
    const group = kind.draw(partOf('cylinder', {}), { stroke }).find((each) => each.type === 'group');
    return group?.type === 'group' ? group.shift.x : NaN;
  };
  expect([shift(0), shift(0.5), shift(1), shift(2), shift(-1)]).toEqual([0, 3, 6, 6, 0]);
});
