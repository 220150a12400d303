import type { Operator, ValveData } from '../../circuit/model.ts';
import { kindBetween, pathsIn, type BoxRef, type PathKind } from '../../circuit/valve-box.ts';
import { parsePath } from '../../circuit/valve-path.ts';

/** How the valve maker says what stands in a valve. */

export const KIND_WORDS: Readonly<Record<PathKind, string>> = {
  none: 'none',
  open: 'open',
  there: 'one way there',
  back: 'one way back',
  throttled: 'throttled',
  'throttled-there': 'throttled one way there',
  'throttled-back': 'throttled one way back',
  joined: 'joined',
};

export const OPERATOR_WORDS: Readonly<Record<Operator, string>> = {
  lever: 'lever',
  pedal: 'pedal',
  button: 'push-button',
  hand: 'hand, general',
  coil: 'coil',
  spring: 'spring',
  detent: 'detent',
  pilot: 'pilot',
  roller: 'roller',
};

export const sayBox = ({ positions }: ValveData, { of, index }: BoxRef): string =>
  of === 'position'
    ? `position ${positions[index]?.name ?? ''}`
    : `crossover ${positions[index]?.name ?? ''}–${positions[index + 1]?.name ?? ''}`;

/** `P–A open`, `P to A one way`. */
export function sayPair(from: string, to: string, kind: PathKind): string {
  switch (kind) {
    case 'none':
      return `${from}–${to} no path`;
    case 'there':
      return `${from} to ${to} one way`;
    case 'back':
      return `${to} to ${from} one way`;
    case 'throttled-there':
      return `${from} to ${to} throttled, one way`;
    case 'throttled-back':
      return `${to} to ${from} throttled, one way`;
    default:
      return `${from}–${to} ${KIND_WORDS[kind]}`;
  }
}

export const sayBetween = (valve: ValveData, box: BoxRef, from: string, to: string): string =>
  sayPair(from, to, kindBetween(valve, box, from, to));

/** What a port leads to in a box, for its button. */
export function sayLeads(valve: ValveData, box: BoxRef, port: string): string {
  const pairs = pathsIn(valve, box).flatMap((text) => {
    const path = parsePath(text);
    if (!path.ok || !path.value.ports.includes(port)) return [];
    return path.value.ports.filter((other) => other !== port);
  });
  const others = [...new Set(pairs)];
  if (others.length === 0) return `${port}, shut`;
  return `${port}: ${others.map((other) => sayBetween(valve, box, port, other)).join(', ')}`;
}
