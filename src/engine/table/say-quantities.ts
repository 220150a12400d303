import { defaultUnit, toUnit } from '../../base/units.ts';
import type { UnitSystem } from '../../base/units.ts';

const round = (value: number): string =>
  Math.abs(value) >= 100 ? value.toFixed(0) : Number(value.toPrecision(3)).toString();

/** SI quantities as the sentences of an explanation give them, in the units of a system. */
export const sayPressure = (pascal: number, units: UnitSystem): string =>
  units === 'us'
    ? `${round(toUnit(pascal, 'pressure', 'psi'))} psi`
    : `${(pascal / 1e5).toFixed(Math.abs(pascal) < 10e5 ? 1 : 0)} bar`;

export const sayFlow = (flow: number, units: UnitSystem): string => inDefault(flow, 'flow', units);

/** m/s, or rad/s of a motor; without a sign. */
export const saySpeed = (speed: number, rotary: boolean, units: UnitSystem): string =>
  rotary ? `${round((Math.abs(speed) * 60) / (2 * Math.PI))} rpm` : inDefault(Math.abs(speed), 'speed', units);

/** N, or N·m of a motor. */
export const sayForce = (force: number, rotary: boolean, units: UnitSystem): string =>
  inDefault(force, rotary ? 'torque' : 'force', units);

function inDefault(si: number, quantity: 'flow' | 'speed' | 'force' | 'torque', units: UnitSystem): string {
  const unit = defaultUnit(quantity, units);
  return `${round(toUnit(si, quantity, unit))} ${unit}`;
}
