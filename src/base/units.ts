import { bad, good, type Result } from './result.ts';

/** Physical quantities the program knows. Inside everything is SI. */
export type Quantity =
  | 'pressure'
  | 'flow'
  | 'length'
  | 'speed'
  | 'force'
  | 'torque'
  | 'power'
  | 'displacement'
  | 'volume'
  | 'area'
  | 'time'
  | 'temperature'
  | 'frequency'
  | 'ratio';

export type UnitSystem = 'metric' | 'us';

/** `SI value = number · factor + offset`. */
export interface Unit {
  readonly symbol: string;
  readonly factor: number;
  readonly offset?: number;
  /** Other spellings, after `normalise`. */
  readonly also?: readonly string[];
  /** Upper and lower case differ in meaning (`MPa`), so a sloppy spelling is not guessed at. */
  readonly exactCase?: boolean;
}

// Exact by definition (NIST SP 811, appendix B): inch, pound-force, US gallon, kilogram-force.
const INCH = 0.0254;
const POUND = 4.4482216152605;
const GALLON = 231 * INCH ** 3;
const PSI = POUND / INCH ** 2;
/** Mechanical horsepower, 550 ft·lbf/s. */
const HORSEPOWER = 550 * 12 * INCH * POUND;
const KILOGRAM_FORCE = 9.80665;
const TURN = 2 * Math.PI;

/**
 * Units of each quantity. SI: Pa, m³/s, m, m/s, N, N·m, W, m³/rad (displacement), m³, m², s, K,
 * Hz (turns per second), 1. Displacement is held per radian so that torque = pressure · displacement.
 */
const UNITS: Readonly<Record<Quantity, readonly Unit[]>> = {
  pressure: [
    { symbol: 'bar', factor: 1e5 },
    { symbol: 'mbar', factor: 100, exactCase: true },
    { symbol: 'MPa', factor: 1e6, exactCase: true },
    { symbol: 'kPa', factor: 1e3 },
    { symbol: 'Pa', factor: 1 },
    { symbol: 'psi', factor: PSI, also: ['lbf/in2', 'psig'] },
  ],
  flow: [
    { symbol: 'L/min', factor: 1e-3 / 60, also: ['lpm', 'dm3/min'] },
    { symbol: 'L/s', factor: 1e-3, also: ['dm3/s'] },
    { symbol: 'cm³/s', factor: 1e-6, also: ['mL/s', 'cc/s'] },
    { symbol: 'cm³/min', factor: 1e-6 / 60, also: ['mL/min', 'cc/min'] },
    { symbol: 'm³/h', factor: 1 / 3600 },
    { symbol: 'm³/s', factor: 1 },
    { symbol: 'gpm', factor: GALLON / 60, also: ['gal/min', 'USgpm', 'gpm(US)'] },
    { symbol: 'in³/s', factor: INCH ** 3, also: ['cis'] },
    { symbol: 'in³/min', factor: INCH ** 3 / 60, also: ['cim'] },
  ],
  length: [
    { symbol: 'mm', factor: 1e-3 },
    { symbol: 'cm', factor: 1e-2 },
    { symbol: 'm', factor: 1 },
    { symbol: 'in', factor: INCH, also: ['"', 'inch'] },
    { symbol: 'ft', factor: 12 * INCH },
  ],
  speed: [
    { symbol: 'mm/s', factor: 1e-3 },
    { symbol: 'm/s', factor: 1 },
    { symbol: 'm/min', factor: 1 / 60 },
    { symbol: 'in/s', factor: INCH, also: ['ips'] },
    { symbol: 'in/min', factor: INCH / 60 },
    { symbol: 'ft/s', factor: 12 * INCH },
    { symbol: 'ft/min', factor: (12 * INCH) / 60 },
  ],
  force: [
    { symbol: 'kN', factor: 1e3 },
    { symbol: 'N', factor: 1 },
    { symbol: 'daN', factor: 10 },
    { symbol: 'kgf', factor: KILOGRAM_FORCE, also: ['kp'] },
    { symbol: 'lbf', factor: POUND, also: ['lb'] },
  ],
  torque: [
    { symbol: 'N·m', factor: 1 },
    { symbol: 'daN·m', factor: 10 },
    { symbol: 'kN·m', factor: 1e3 },
    { symbol: 'lbf·ft', factor: POUND * 12 * INCH, also: ['ftlbf', 'lbft', 'ftlb'] },
    { symbol: 'lbf·in', factor: POUND * INCH, also: ['inlbf', 'lbin', 'inlb'] },
  ],
  power: [
    { symbol: 'kW', factor: 1e3 },
    { symbol: 'W', factor: 1 },
    { symbol: 'hp', factor: HORSEPOWER },
  ],
  displacement: [
    { symbol: 'cm³/rev', factor: 1e-6 / TURN, also: ['cc/rev', 'mL/rev', 'cm3', 'cc'] },
    { symbol: 'L/rev', factor: 1e-3 / TURN },
    { symbol: 'm³/rad', factor: 1 },
    { symbol: 'in³/rev', factor: INCH ** 3 / TURN, also: ['in3', 'cir'] },
  ],
  volume: [
    { symbol: 'L', factor: 1e-3, also: ['dm3'] },
    { symbol: 'cm³', factor: 1e-6, also: ['mL', 'cc'] },
    { symbol: 'm³', factor: 1 },
    { symbol: 'gal', factor: GALLON },
    { symbol: 'in³', factor: INCH ** 3 },
  ],
  area: [
    { symbol: 'cm²', factor: 1e-4 },
    { symbol: 'mm²', factor: 1e-6 },
    { symbol: 'm²', factor: 1 },
    { symbol: 'in²', factor: INCH ** 2 },
  ],
  time: [
    { symbol: 's', factor: 1 },
    { symbol: 'ms', factor: 1e-3 },
    { symbol: 'min', factor: 60 },
    { symbol: 'h', factor: 3600 },
  ],
  temperature: [
    { symbol: '°C', factor: 1, offset: 273.15, also: ['C'] },
    { symbol: 'K', factor: 1 },
    { symbol: '°F', factor: 5 / 9, offset: 273.15 - (32 * 5) / 9, also: ['F'] },
  ],
  frequency: [
    { symbol: 'rpm', factor: 1 / 60, also: ['1/min', 'rev/min', 'r/min'] },
    { symbol: 'Hz', factor: 1, also: ['1/s', 'rev/s'] },
  ],
  ratio: [
    { symbol: '', factor: 1, also: [':1'] },
    { symbol: '%', factor: 0.01 },
  ],
};

const DEFAULTS: Readonly<Record<UnitSystem, Readonly<Record<Quantity, string>>>> = {
  metric: {
    pressure: 'bar',
    flow: 'L/min',
    length: 'mm',
    speed: 'mm/s',
    force: 'kN',
    torque: 'N·m',
    power: 'kW',
    displacement: 'cm³/rev',
    volume: 'L',
    area: 'cm²',
    time: 's',
    temperature: '°C',
    frequency: 'rpm',
    ratio: '',
  },
  us: {
    pressure: 'psi',
    flow: 'gpm',
    length: 'in',
    speed: 'in/s',
    force: 'lbf',
    torque: 'lbf·ft',
    power: 'hp',
    displacement: 'in³/rev',
    volume: 'gal',
    area: 'in²',
    time: 's',
    temperature: '°F',
    frequency: 'rpm',
    ratio: '',
  },
};

export const QUANTITIES = Object.keys(UNITS) as readonly Quantity[];

/** Symbols of the units a quantity can be typed in. */
export const unitsOf = (quantity: Quantity): readonly string[] => UNITS[quantity].map((unit) => unit.symbol);

export const defaultUnit = (quantity: Quantity, system: UnitSystem): string => DEFAULTS[system][quantity];

/** `cm³/rev`, `cm3 / rev` → `cm3/rev`; `N·m`, `N m`, `N*m` → `Nm`. */
const normalise = (text: string): string =>
  text
    .normalize('NFKC')
    .replace(/\u2044/g, '/')
    .replace(/[\s·⋅•*^.]/g, '')
    .replace(/(?<=\p{L})-(?=\p{L})/gu, '');

function findUnit(text: string, quantity: Quantity): Unit | undefined {
  const wanted = normalise(text);
  const spellings = (unit: Unit): string[] => [unit.symbol, ...(unit.also ?? [])].map(normalise);
  const exact = UNITS[quantity].find((unit) => spellings(unit).includes(wanted));
  if (exact) return exact;
  const loose = wanted.toLowerCase();
  return UNITS[quantity].find(
    (unit) => unit.exactCase !== true && spellings(unit).some((spelling) => spelling.toLowerCase() === loose),
  );
}

const NUMBER = /^([+-]?)((?:\d{1,3}(?: \d{3})+|\d+)(?:\.\d*)?|\.\d+)(e[+-]?\d+)?/i;
const FRACTION = /^([+-]?)(?:(\d+)[ -])?(\d+)\/(\d+)(?=\s|"|$|[a-z])/i;

/** The number a text starts with, and what follows it. */
function splitNumber(text: string): { number: number; rest: string } | undefined {
  const fraction = FRACTION.exec(text);
  if (fraction) {
    const [all, sign, whole, over, under] = fraction;
    const size = Number(whole ?? 0) + Number(over) / Number(under);
    return { number: sign === '-' ? -size : size, rest: text.slice(all.length) };
  }
  const plain = NUMBER.exec(text);
  if (!plain) return undefined;
  return { number: Number(plain[0].replaceAll(' ', '')), rest: text.slice(plain[0].length) };
}

const article = (word: string): string => (/^[aeiou]/.test(word) ? `an ${word}` : `a ${word}`);

/**
 * A typed quantity in SI. The unit must be typed, except for a ratio. Fails with what is wrong and what to type.
 * `where` names the place for the message.
 */
export function parseQuantity(text: string, quantity: Quantity, where = 'value'): Result<number> {
  const example = quantity === 'ratio' ? '3' : `30 ${DEFAULTS.metric[quantity]}`;
  const remedy = `Type a number and a unit, such as "${example}".`;
  const clean = text
    .normalize('NFKC')
    .replace(/\u2044/g, '/')
    .replace(/\u2212/g, '-')
    .replace(/\s+/g, ' ')
    .trim();
  if (clean === '') return bad({ where, what: `A ${quantity} is missing.`, remedy });
  if (/\d,|,\d/.test(clean)) {
    return bad({
      where,
      what: `The comma in "${text}" can be a decimal mark or part a thousand from a hundred.`,
      remedy: `Write a decimal point ("${clean.replace(',', '.')}") or leave the comma out ("${clean.replaceAll(',', '')}").`,
    });
  }
  const split = splitNumber(clean);
  if (!split) return bad({ where, what: `"${text}" does not start with a number.`, remedy });
  if (!Number.isFinite(split.number)) return bad({ where, what: `"${text}" is not a finite number.`, remedy });
  const rest = split.rest.trim();
  const unit = findUnit(rest, quantity);
  if (unit) {
    const si = split.number * unit.factor + (unit.offset ?? 0);
    if (!Number.isFinite(si)) return bad({ where, what: `"${text}" is out of all bounds.`, remedy });
    return good(si);
  }
  if (rest === '')
    return bad({ where, what: `"${text}" has no unit.`, remedy: `Add one: ${unitsOf(quantity).join(', ')}.` });
  const other = QUANTITIES.find((candidate) => candidate !== quantity && findUnit(rest, candidate));
  const what = other
    ? `"${text}" is ${article(other)}, where ${article(quantity)} is wanted.`
    : `"${rest}" is not a unit of ${quantity}.`;
  const known = unitsOf(quantity)
    .filter((symbol) => symbol !== '')
    .join(', ');
  return bad({ where, what, remedy: `Use one of ${known}${quantity === 'ratio' ? ' or no unit' : ''}.` });
}

function knownUnit(quantity: Quantity, symbol: string): Unit {
  const unit = findUnit(symbol, quantity);
  if (!unit) throw new RangeError(`"${symbol}" is not a unit of ${quantity}`);
  return unit;
}

/** SI → number in the named unit. Throws RangeError for a unit of another quantity. */
export function toUnit(si: number, quantity: Quantity, symbol: string): number {
  const unit = knownUnit(quantity, symbol);
  return (si - (unit.offset ?? 0)) / unit.factor;
}

/** Number in the named unit → SI. Throws RangeError for a unit of another quantity. */
export function fromUnit(number: number, quantity: Quantity, symbol: string): number {
  const unit = knownUnit(quantity, symbol);
  return number * unit.factor + (unit.offset ?? 0);
}

/** A number to so many significant digits, without exponent or trailing zeros; `–` when not finite. */
export function formatNumber(value: number, digits = 4): string {
  if (!Number.isFinite(value)) return '–';
  if (value === 0) return '0';
  const places = digits - 1 - Math.floor(Math.log10(Math.abs(value)));
  if (places <= 0) return String(Math.round(value));
  const fixed = value.toFixed(Math.min(places, 100)).replace(/\.?0+$/, '');
  return fixed === '-0' ? '0' : fixed;
}

export interface FormatOptions {
  /** Significant digits, 4 by default. */
  readonly digits?: number;
  /** Another unit than the system's default. */
  readonly unit?: string;
}

/** SI → `"200 bar"`, readable again by `parseQuantity`. */
export function formatQuantity(
  si: number,
  quantity: Quantity,
  system: UnitSystem,
  options: FormatOptions = {},
): string {
  const symbol = options.unit ?? DEFAULTS[system][quantity];
  const number = formatNumber(toUnit(si, quantity, symbol), options.digits);
  return symbol === '' ? number : `${number} ${symbol}`;
}
