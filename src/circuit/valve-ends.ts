import { isOneLine } from './limits.ts';
import type { Operator, ValveCoil, ValveData } from './model.ts';
import { RefusedEdit } from './refused.ts';
import { coilPlaces, withoutCoil, type End } from './valve-shape.ts';

/** Changes of what moves a valve. Coils that are bound and coils that are drawn stay in step. */

export const OPERATORS: readonly Operator[] = [
  'lever',
  'pedal',
  'button',
  'hand',
  'coil',
  'spring',
  'detent',
  'pilot',
  'roller',
];

const COIL_NAMES = ['a', 'b', 'c', 'd', 'e', 'f', 'g', 'h'];
/** Drawn side by side they would not fit on a sheet. */
const MOST = 6;

/** Outermost at that end. A coil is bound at once: to the nearest position that is no rest and that no coil has yet. */
export function addOperator(valve: ValveData, end: End, operator: Operator): ValveData {
  if (valve[end].length >= MOST)
    throw new RefusedEdit(`valve ${end} end`, `An end holds at most ${MOST} operators.`, 'Remove one first.');
  const drawn: ValveData = { ...valve, [end]: [...valve[end], operator] };
  if (operator !== 'coil') return drawn;
  const index = coilPlaces(drawn).findIndex((place) => place.end === end && place.at === valve[end].length);
  return { ...drawn, coils: (valve.coils ?? []).toSpliced(index, 0, newCoil(valve, end)) };
}

function newCoil(valve: ValveData, end: End): ValveCoil {
  const coils = valve.coils ?? [];
  const name = COIL_NAMES.find((each) => !coils.some((coil) => coil.name === each)) ?? `c${coils.length + 1}`;
  const places = valve.positions.map((_, i) => i);
  const near = end === 'left' ? places : places.toReversed();
  const position =
    near.find((i) => i !== valve.rest && !coils.some((coil) => coil.position === i)) ??
    near.find((i) => i !== valve.rest) ??
    0;
  return { name, position };
}

/** A coil goes with its binding. */
export function removeOperator(valve: ValveData, end: End, at: number): ValveData {
  operatorAt(valve, end, at);
  const coil = coilAt(valve, end, at);
  return coil === undefined ? { ...valve, [end]: valve[end].toSpliced(at, 1) } : withoutCoil(valve, coil);
}

/** By so many places outwards; stays on its end. */
export function moveOperator(valve: ValveData, end: End, at: number, by: number): ValveData {
  const operator = operatorAt(valve, end, at);
  const to = Math.min(valve[end].length - 1, Math.max(0, at + by));
  const coil = coilAt(valve, end, at);
  const moved: ValveData = { ...valve, [end]: valve[end].toSpliced(at, 1).toSpliced(to, 0, operator) };
  const bound = coil === undefined ? undefined : valve.coils?.[coil];
  if (coil === undefined || bound === undefined) return moved;
  const place = coilPlaces(moved).findIndex((each) => each.end === end && each.at === to);
  return { ...moved, coils: (valve.coils ?? []).toSpliced(coil, 1).toSpliced(place, 0, bound) };
}

/** Names a coil or binds it to a position: which coil leads to which box differs between makers. */
export function changeCoil(
  valve: ValveData,
  coil: number,
  to: { readonly name?: string; readonly position?: number },
): ValveData {
  const coils = valve.coils ?? [];
  const old = coils[coil];
  if (!old) throw new RefusedEdit('valve coils', `There is no coil ${coil + 1}.`, 'It may have been removed before.');
  const name = (to.name ?? old.name).trim();
  if (name === '' || !isOneLine(name))
    throw new RefusedEdit('valve coils', 'A coil needs a name of one line.', 'Type one, such as a or Y1.');
  if (coils.some((each, i) => i !== coil && each.name === name))
    throw new RefusedEdit('valve coils', `Another coil is called "${name}".`, 'Choose another name.');
  const position = to.position ?? old.position;
  if (!valve.positions[position])
    throw new RefusedEdit('valve coils', `The valve has no position ${position + 1}.`, 'Bind the coil to another one.');
  return { ...valve, coils: coils.with(coil, { ...old, name, position }) };
}

/** Index in `coils` of a drawn coil; undefined = it is none, or nothing is bound to it. */
export function coilAt(valve: ValveData, end: End, at: number): number | undefined {
  const index = coilPlaces(valve).findIndex((place) => place.end === end && place.at === at);
  return index >= 0 && index < (valve.coils?.length ?? 0) ? index : undefined;
}

function operatorAt(valve: ValveData, end: End, at: number): Operator {
  const operator = valve[end][at];
  if (operator) return operator;
  throw new RefusedEdit(`valve ${end} end`, 'There is no such operator.', 'It may have been removed before.');
}
