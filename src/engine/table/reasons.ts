import { dependentLabel } from '../../network/dependents.ts';
import type { NetActuator } from '../../network/network.ts';
import { spreadFrom } from './one-state.ts';
import type { OneState, Way } from './one-state.ts';

/** One link of a reason, as the analysis floor hands it on. */
export interface Step {
  readonly text: string;
  readonly lines: readonly number[];
  readonly parts: readonly string[];
}

export const step = (text: string, lines: readonly number[] = [], parts: readonly string[] = []): Step => ({
  text,
  lines,
  parts,
});

export const partId = (state: OneState, part: number): string => state.net.parts[part]?.id ?? '';
export const partLabel = (state: OneState, part: number): string => state.net.parts[part]?.label ?? '';
export const lineName = (state: OneState, line: number): string => state.net.lines[line]?.name ?? 'an open port';

/** `V1 at raise`, or the plain label of a part that nobody moves. */
export function partInState(state: OneState, part: number): string {
  const { net } = state;
  const dependent = net.dependents.findIndex((entry) => entry.part === part);
  if (dependent >= 0) {
    const at = state.settled.setting[dependent] ?? 0;
    return `${dependentLabel(net, dependent)} at ${net.dependents[dependent]?.positions[at] ?? '?'}`;
  }
  const input = state.net.inputs.findIndex((entry) => entry.part === part);
  const label = partLabel(state, part);
  if (input < 0) return label;
  return `${label} at ${state.net.inputs[input]?.positions[state.position(input)] ?? '?'}`;
}

/** What the trade calls the two sides of an actuator. */
export function sideName(state: OneState, actuator: NetActuator, side: 'a' | 'b'): string {
  const kind = state.net.parts[actuator.part]?.kind;
  if (kind === 'cylinder' || kind === 'single-acting-cylinder') return side === 'a' ? 'cap side' : 'rod side';
  return side === 'a' ? 'side A' : 'side B';
}

/** The hops of a way in words, one step each. */
export function waySteps(state: OneState, way: Way): Step[] {
  return way.hops.map((hop) => {
    const through = partInState(state, hop.path.part);
    const kind =
      hop.path.pilot >= 0
        ? `is held open by ${lineName(state, hop.path.pilot)} and passes`
        : hop.path.vent >= 0
          ? `has nothing pressing at its other inlet (${lineName(state, hop.path.vent)}) and passes`
          : hop.path.throttled
            ? 'throttles'
            : 'passes';
    return step(
      `${through} ${kind} oil from ${hop.fromPort} to ${hop.toPort}, into ${lineName(state, hop.to)}.`,
      [hop.from, hop.to],
      [partId(state, hop.path.part)],
    );
  });
}

/** What shuts a line in: every part on the lines it spreads to that has no open path out of them. */
export function enclosing(state: OneState, line: number, except: number): Step {
  const region = spreadFrom(state, line);
  const inside = new Set(region);
  const walls = new Map<number, Set<string>>();
  for (const here of region) {
    for (const port of state.net.lines[here]?.ports ?? []) {
      const dot = port.lastIndexOf('.');
      const part = state.net.parts.findIndex((entry) => entry.id === port.slice(0, dot));
      const paths = state.net.paths.filter((path) => path.part === part && (path.from === here || path.to === here));
      const leaves = state.hops.some(
        (hop) => hop.path.part === part && hop.from === here && inside.has(hop.to) && hop.to !== here,
      );
      const actuator = part !== except && state.net.actuators.some((entry) => entry.part === part);
      if (part === except || (paths.length === 0 && !actuator) || leaves) continue;
      const ports = walls.get(part) ?? new Set<string>();
      ports.add(port.slice(dot + 1));
      walls.set(part, ports);
    }
  }
  const said = [...walls].map(([part, ports]) =>
    state.net.actuators.some((entry) => entry.part === part)
      ? `it ends at ${[...ports].join(' and ')} of ${partLabel(state, part)}`
      : `${partInState(state, part)} shuts ${[...ports].join(' and ')}`,
  );
  const text =
    said.length > 0
      ? `${lineName(state, line)} is shut in: ${said.join('; ')}.`
      : `${lineName(state, line)} has nowhere to go: nothing on it leads on.`;
  return step(
    text,
    region,
    [...walls.keys()].map((part) => partId(state, part)),
  );
}
