import type { Network } from '../network/network.ts';

/** Names of the lines whose pressures tell most in a step diagram: at the pumps, then at both sides of each actuator. */
export function diagramLines({ pumps, actuators, lines, shown }: Network): readonly string[] {
  const wanted = [...pumps.map(({ outlet }) => outlet), ...actuators.flatMap(({ a, b }) => [a, b])];
  const found = [...new Set(wanted)].filter((line) => line >= 0 && line < shown && lines[line]?.tank !== true);
  return found.flatMap((line) => lines[line]?.name ?? []);
}
