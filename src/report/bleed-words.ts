import type { BleedAnswer, BleedLine, BleedStep, LeftLine } from '../analysis/results.ts';

/** Order of isolation as 29 CFR 1910.147(d) names it; the rest is common practice and published safety alerts. */
export const BLEED_BEFORE: readonly string[] = [
  'Before: the order of isolation, as 29 CFR 1910.147(d) names it: know the energy, shut down, isolate, lock, relieve or restrain stored energy, verify.',
  'This list is about relieving stored pressure only. A lever or coil valve in its centre is not an isolating device.',
  'Support or restrain every load that can move.',
];
export const BLEED_AFTER: readonly string[] = [
  'After: verify at every line that nothing is left, and keep verifying where pressure can build up again (a load, heat, a passing valve).',
  'Cracking a fitting is not an accepted way to take pressure off. Oil from about 7 bar up can be injected through the skin: that is a surgical emergency.',
  'The list is worked out from the open paths of the drawing; it knows no wear, no stuck valve and no part that is not drawn.',
  'The documents of the machine, the local codes and qualified people decide what is done; they go before this list.',
];
export const NOTHING_HELD = 'No drawn line holds pressure once the pumps have stopped in this state. Verify it.';
export const HELD_HEAD = 'Under pressure with the pumps stopped:';
export const CUT_SHORT = 'The search was cut short: a shorter list, or one that leaves less, may exist.';

export const measureOf = ({ measure }: BleedLine): string =>
  measure.length > 0 ? `measure at ${measure.join(', ')}` : 'no gauge or test point is drawn on it';

export const sayMove = ({ label, from, to }: BleedStep): string => `Move ${label} from ${from} to ${to}.`;

/** Where a spring works against the move; undefined = none does. */
export function sayKeep({ springsTo, keptUntil }: BleedStep): string | undefined {
  if (springsTo === undefined) return undefined;
  const until = keptUntil === undefined ? 'to the end of the list' : `until step ${keptUntil + 1}`;
  return `Keep it there ${until}: let go, it returns to ${springsTo}.`;
}

/** Undefined: the move lets nothing down. */
export const sayVents = ({ vents }: BleedStep): string | undefined =>
  vents.length > 0
    ? `Wait until down: ${vents.map((line) => `${line.name} (${measureOf(line)})`).join('; ')}`
    : undefined;

export const sayHeld = (held: readonly BleedLine[]): string =>
  `Still under pressure: ${held.map(({ name }) => name).join(', ') || 'none'}`;

/** Lines that stay under pressure, by why they do; a group is left out if it has none. */
export function leftGroups(
  left: readonly LeftLine[],
): { readonly head: string; readonly lines: readonly LeftLine[] }[] {
  const groups = [
    {
      head: 'No lever position opens these to tank; they stay under pressure:',
      lines: left.filter((line) => line.never),
    },
    {
      head: 'No list of lever moves lets these down together with the rest; they stay under pressure:',
      lines: left.filter((line) => !line.never),
    },
  ];
  return groups.filter(({ lines }) => lines.length > 0);
}

export const sayPoints = ({ points }: NonNullable<BleedAnswer['points']>): string =>
  `With a bleed valve to tank on ${points.map(({ name }) => name).join(', ')}, opened first and left open:`;
