import fc from 'fast-check';
import { expect, test } from 'vitest';
import {
  defaultUnit,
  formatNumber,
  formatQuantity,
  fromUnit,
  parseQuantity,
  QUANTITIES,
  toUnit,
  unitsOf,
  type Quantity,
  type UnitSystem,
} from '../../src/base/units.ts';

const si = (text: string, quantity: Quantity): number => {
  const parsed = parseQuantity(text, quantity);
  if (!parsed.ok) throw new Error(parsed.problems.map((problem) => problem.what).join(' '));
  return parsed.value;
};
const problemOf = (text: string, quantity: Quantity): { where: string; what: string; remedy: string } => {
  const parsed = parseQuantity(text, quantity, 'parts[3].settings.flow');
  if (parsed.ok) throw new Error(`"${text}" was read as ${parsed.value}`);
  const [problem] = parsed.problems;
  if (!problem) throw new Error('no problem is given');
  return problem;
};

// NIST Special Publication 811 (2008), appendix B.8 "Factors for units listed alphabetically",
// to the digits printed there; `exact` where it prints the factor in bold.
test.each<[string, Quantity, number, 'exact' | 'printed']>([
  ['1 psi', 'pressure', 6.894757e3, 'printed'],
  ['1 bar', 'pressure', 1e5, 'exact'],
  ['1 gpm', 'flow', 6.30902e-5, 'printed'],
  ['1 L/min', 'flow', 1.666667e-5, 'printed'],
  ['1 in', 'length', 2.54e-2, 'exact'],
  ['1 ft', 'length', 3.048e-1, 'exact'],
  ['1 in/s', 'speed', 2.54e-2, 'exact'],
  ['1 ft/min', 'speed', 5.08e-3, 'exact'],
  ['1 lbf', 'force', 4.448222, 'printed'],
  // Footnotes of the same table: the pound-force and the US gallon are exact by definition.
  ['1 lbf', 'force', 4.4482216152605, 'exact'],
  ['1 gal', 'volume', 3.785411784e-3, 'exact'],
  ['1 kgf', 'force', 9.80665, 'exact'],
  ['1 lbf·ft', 'torque', 1.355818, 'printed'],
  ['1 lbf·in', 'torque', 1.129848e-1, 'printed'],
  ['1 hp', 'power', 7.456999e2, 'printed'],
  ['1 gal', 'volume', 3.785412e-3, 'printed'],
  ['1 in³', 'volume', 1.638706e-5, 'printed'],
  ['1 in²', 'area', 6.4516e-4, 'exact'],
])('%s of %s is %d in SI (NIST SP 811)', (text, quantity, factor, kind) => {
  expect(Math.abs(si(text, quantity) / factor - 1)).toBeLessThan(kind === 'exact' ? 1e-14 : 5e-7);
});

// NIST SP 811, B.8: t/K = t/°C + 273.15; t/K = (t/°F + 459.67)/1.8.
test('temperatures have their offsets', () => {
  expect(si('20 °C', 'temperature')).toBeCloseTo(293.15, 10);
  expect(si('68 °F', 'temperature')).toBeCloseTo((68 + 459.67) / 1.8, 10);
  expect(toUnit(273.15, 'temperature', '°F')).toBeCloseTo(32, 10);
});

// Handbook laws of the trade, in the mixed units they are printed in (common practice).
test('speed in in/s = 231·gpm/(60·in²)', () => {
  expect(toUnit(si('20 gpm', 'flow') / si('25 in²', 'area'), 'speed', 'in/s')).toBeCloseTo((231 * 20) / (60 * 25), 12);
});

test('hp = psi·gpm/1714, where 1714 is rounded from 1714.29', () => {
  const power = toUnit(si('1000 psi', 'pressure') * si('20 gpm', 'flow'), 'power', 'hp');
  expect(Math.abs(power / ((1000 * 20) / 1714) - 1)).toBeLessThan(2e-4);
  // The exact law: 231 in³ · 1 lbf/in² a minute over 550·12·60 lbf·in a minute.
  expect(power).toBeCloseTo((1000 * 20 * 231) / (550 * 12 * 60), 10);
});

test('kW = bar·(L/min)/600', () => {
  expect(toUnit(si('200 bar', 'pressure') * si('30 L/min', 'flow'), 'power', 'kW')).toBeCloseTo((200 * 30) / 600, 12);
});

test('torque = pressure · displacement / 2π', () => {
  // Esposito, Fluid Power with Applications, examples 7-5 and 7-2: 91.4 N·m; 795 lbf·in (printed digits).
  expect(si('82 cm³/rev', 'displacement') * si('70 bar', 'pressure')).toBeCloseTo(91.4, 1);
  expect(toUnit(si('5 in³/rev', 'displacement') * si('1000 psi', 'pressure'), 'torque', 'lbf·in')).toBeCloseTo(
    795.8,
    1,
  );
});

test.each<[string, string, Quantity]>([
  ['82 cm3/rev', '82 cm³/rev', 'displacement'],
  ['82 cc/rev', '82 cm³/rev', 'displacement'],
  ['30L/min', '30 L/min', 'flow'],
  ['30 l/min', '30 L/min', 'flow'],
  ['30 lpm', '30 L/min', 'flow'],
  ['5 GPM', '5 gpm', 'flow'],
  ['1 000 mm', '1000 mm', 'length'],
  ['1/2 in', '0.5 in', 'length'],
  ['1 1/2 in', '1.5 in', 'length'],
  ['1-1/2"', '1.5 in', 'length'],
  ['½ in', '0.5 in', 'length'],
  ['−3 kN', '-3 kN', 'force'],
  ['110 Nm', '110 N·m', 'torque'],
  ['110 N*m', '110 N·m', 'torque'],
  ['80 ft-lbf', '80 lbf·ft', 'torque'],
  ['1e2 bar', '100 bar', 'pressure'],
  ['  200   bar ', '200 bar', 'pressure'],
  ['3', '300 %', 'ratio'],
  ['3:1', '3', 'ratio'],
])('"%s" reads as "%s"', (text, same, quantity) => {
  expect(si(text, quantity)).toBeCloseTo(si(same, quantity), 12);
});

test('a comma is refused with both readings offered', () => {
  const problem = problemOf('1,5 bar', 'pressure');
  expect(problem.what).toContain('comma');
  expect(problem.remedy).toContain('1.5 bar');
  expect(problem.remedy).toContain('15 bar');
  expect(problem.where).toBe('parts[3].settings.flow');
});

test.each<[string, Quantity, RegExp, RegExp]>([
  ['', 'flow', /missing/, /30 L\/min/],
  ['30', 'flow', /no unit/, /gpm/],
  ['30 mm', 'flow', /is a length, where a flow is wanted/, /L\/min/],
  ['30 furlong', 'flow', /"furlong" is not a unit of flow/, /L\/min/],
  ['fast', 'flow', /does not start with a number/, /number and a unit/],
  ['NaN bar', 'pressure', /does not start with a number/, /bar/],
  ['1e999 bar', 'pressure', /not a finite number/, /bar/],
  ['1.2.3 bar', 'pressure', /not a unit/, /bar/],
  ['20 mpa', 'pressure', /not a unit/, /MPa/],
  ['1/0 in', 'length', /not a finite number/, /mm/],
])('"%s" for a %s is refused: %s', (text, quantity, what, remedy) => {
  const problem = problemOf(text, quantity);
  expect(problem.what).toMatch(what);
  expect(problem.remedy).toMatch(remedy);
});

test('each system writes in the units of the trade', () => {
  const wanted: Partial<Record<Quantity, readonly [string, string]>> = {
    pressure: ['bar', 'psi'],
    flow: ['L/min', 'gpm'],
    length: ['mm', 'in'],
    speed: ['mm/s', 'in/s'],
    force: ['kN', 'lbf'],
    torque: ['N·m', 'lbf·ft'],
    power: ['kW', 'hp'],
    displacement: ['cm³/rev', 'in³/rev'],
  };
  for (const [quantity, [metric, us]] of Object.entries(wanted)) {
    expect(defaultUnit(quantity as Quantity, 'metric')).toBe(metric);
    expect(defaultUnit(quantity as Quantity, 'us')).toBe(us);
  }
  for (const quantity of QUANTITIES) {
    for (const system of ['metric', 'us'] as const) expect(unitsOf(quantity)).toContain(defaultUnit(quantity, system));
  }
});

test.each<[number, number | undefined, string]>([
  [200, undefined, '200'],
  [0.1, undefined, '0.1'],
  [1234567, undefined, '1234567'],
  [63.24999, undefined, '63.25'],
  [0, undefined, '0'],
  [-0.00001234, undefined, '-0.00001234'],
  [2.0004, undefined, '2'],
  [99.996, undefined, '100'],
  [Number.NaN, undefined, '–'],
  [12.34, 2, '12'],
])('number %d to %s digits is "%s"', (value, digits, text) => {
  expect(formatNumber(value, digits)).toBe(text);
});

test('a formatted quantity carries its unit', () => {
  expect(formatQuantity(2e7, 'pressure', 'metric')).toBe('200 bar');
  expect(formatQuantity(2e7, 'pressure', 'us')).toBe('2901 psi');
  expect(formatQuantity(3, 'ratio', 'metric')).toBe('3');
  expect(formatQuantity(0.0508, 'length', 'metric', { unit: 'in' })).toBe('2 in');
  expect(() => toUnit(1, 'length', 'bar')).toThrow(RangeError);
});

test('every unit of every quantity is read back, also in plain letters', () => {
  for (const quantity of QUANTITIES) {
    for (const symbol of unitsOf(quantity)) {
      const plain = symbol.replaceAll('³', '3').replaceAll('²', '2').replaceAll('·', ' ');
      expect(si(`7 ${symbol}`, quantity)).toBe(fromUnit(7, quantity, symbol));
      expect(si(`7 ${plain}`, quantity)).toBe(fromUnit(7, quantity, symbol));
    }
  }
});

const anyUnit = fc
  .constantFrom(...QUANTITIES)
  .chain((quantity) => fc.tuple(fc.constant(quantity), fc.constantFrom(...unitsOf(quantity))));

test('unit → SI → unit is the identity', () => {
  fc.assert(
    fc.property(anyUnit, fc.double({ min: -1e6, max: 1e6, noNaN: true }), ([quantity, symbol], number) => {
      const back = toUnit(fromUnit(number, quantity, symbol), quantity, symbol);
      // Temperatures lose the digits of their offset.
      return Math.abs(back - number) <= 1e-12 * Math.abs(number) + 1e-9;
    }),
  );
});

test('what is formatted is read back to the digits shown', () => {
  const system = fc.constantFrom<UnitSystem>('metric', 'us');
  fc.assert(
    fc.property(
      anyUnit,
      system,
      fc.double({ min: 1e-3, max: 1e6, noNaN: true }),
      fc.integer({ min: 3, max: 9 }),
      ([quantity, symbol], units, number, digits) => {
        const value = fromUnit(number, quantity, symbol);
        const text = formatQuantity(value, quantity, units, { digits, unit: symbol });
        const back = toUnit(si(text, quantity), quantity, symbol);
        return Math.abs(back - number) <= 0.51 * 10 ** (Math.floor(Math.log10(number)) + 1 - digits) + 1e-9;
      },
    ),
  );
});

test('no text makes the parser throw', () => {
  fc.assert(
    fc.property(
      fc.oneof(fc.string(), fc.stringMatching(/^[0-9.,e+\- /]{0,8} ?[a-zA-Z³/·%°]{0,7}$/)),
      fc.constantFrom(...QUANTITIES),
      (text, quantity) => {
        const parsed = parseQuantity(text, quantity);
        return parsed.ok
          ? Number.isFinite(parsed.value)
          : parsed.problems.every((problem) => problem.what !== '' && problem.remedy !== '');
      },
    ),
  );
});
