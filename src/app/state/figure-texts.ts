import { formatNumber, defaultUnit, formatQuantity, toUnit } from '../../base/units.ts';
import type { Quantity, UnitSystem } from '../../base/units.ts';
import type { PumpVerdict } from '../../worker/client.ts';

/** Figures are read at a glance: two digits, or all of a whole number. */
const DIGITS = 2;
/** Slower than a tenth of a millimetre a second, or a turn in ten minutes (rad/s), is no motion worth a figure. */
const STILL = { linear: 1e-4, rotary: 0.01 } as const;
/** Pa: what a line to tank may stand at without a word. */
export const NEAR_NOTHING = 5e4;

export type Motion = 'linear' | 'rotary';

/** The unit that stands in a column head. */
export const speedUnit = (motion: Motion, units: UnitSystem): string =>
  defaultUnit(motion === 'linear' ? 'speed' : 'frequency', units);
export const pressureUnit = (units: UnitSystem): string => defaultUnit('pressure', units);

const plain = (si: number, quantity: Quantity, units: UnitSystem): string =>
  formatNumber(toUnit(si, quantity, defaultUnit(quantity, units)), DIGITS);

/** m/s or rad/s either way → how fast, in words or without the unit; undefined = it stands. */
export function saySpeed(speed: number, motion: Motion, units: UnitSystem, bare = false): string | undefined {
  const size = Math.abs(speed);
  if (!(size >= STILL[motion])) return undefined;
  const [si, quantity] =
    motion === 'linear' ? ([size, 'speed'] as const) : ([size / (2 * Math.PI), 'frequency'] as const);
  return bare ? plain(si, quantity, units) : formatQuantity(si, quantity, units, { digits: DIGITS });
}

/** N or N·m that the oil exerts, either way; undefined = next to none. */
export function sayForce(force: number, motion: Motion, units: UnitSystem): string | undefined {
  const size = Math.abs(force);
  return size < 1
    ? undefined
    : formatQuantity(size, motion === 'linear' ? 'force' : 'torque', units, { digits: DIGITS });
}

/** Pa, over the air. Below a tenth of a bar there is nothing to say but nought. */
export function sayPressure(pressure: number, units: UnitSystem, bare = false): string {
  const si = Math.abs(pressure) < 1e4 ? 0 : pressure;
  return bare ? plain(si, 'pressure', units) : formatQuantity(si, 'pressure', units, { digits: DIGITS });
}

/** A pump's pressure; a stopped pump with nothing at its outlet needs no figure. */
export function sayPump(
  pressure: number | undefined,
  verdict: PumpVerdict,
  units: UnitSystem,
  bare = false,
): string | undefined {
  if (pressure === undefined || (verdict === 'stopped' && pressure < NEAR_NOTHING)) return undefined;
  return sayPressure(pressure, units, bare);
}
