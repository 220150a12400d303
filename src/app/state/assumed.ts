import type { Circuit, Part } from '../../circuit/model.ts';
import { kindOf } from '../../parts/catalogue.ts';
import { readSetting } from '../../parts/settings.ts';
import type { NumberSpec, QuantitySpec } from '../../parts/settings.ts';
import type { SettingSpec } from '../../parts/contract.ts';
import type { RowNumbers, StateTable } from '../../worker/client.ts';

/** Which figures rest on values that nobody entered. */
export interface Assumed {
  /** Somewhere in the circuit: every pressure that comes about by flow rests on it. */
  readonly anywhere: boolean;
  /** Actuators and pumps whose sizes are: bore, rod, displacement, delivery. */
  readonly sizes: ReadonlySet<string>;
  /** Actuators whose sizes, load or friction are assumed. */
  readonly forces: ReadonlySet<string>;
  /** Of some pump. */
  readonly delivery: boolean;
  /** m² (m³/rad) of both sides of each actuator. */
  readonly areas: ReadonlyMap<string, Areas>;
}

interface Areas {
  readonly a: number;
  readonly b: number;
}

const SIZES: ReadonlySet<string> = new Set(['bore', 'rod', 'displacement', 'flow']);
const FORCES: ReadonlySet<string> = new Set([...SIZES, 'load', 'friction', 'springForce']);

const measured = (spec: SettingSpec): spec is QuantitySpec | NumberSpec =>
  spec.value.type === 'quantity' || spec.value.type === 'number';

/** Numbers of a part that stand at their defaults. */
export const assumedSettings = (part: Part): string[] =>
  (kindOf(part.kind)?.settings ?? []).filter(measured).filter((spec) => readSetting(part, spec).assumed).map(({ id }) => id);

export function assumedIn(circuit: Circuit): Assumed {
  const forces = new Set<string>();
  const sizes = new Set<string>();
  const areas = new Map<string, Areas>();
  let anywhere = false;
  let delivery = false;
  for (const part of circuit.parts) {
    const elements = kindOf(part.kind)?.elements(part) ?? [];
    const actuator = elements.find((each) => each.type === 'actuator');
    if (actuator) areas.set(part.id, { a: actuator.areaA, b: actuator.areaB });
    const ids = assumedSettings(part);
    if (ids.length === 0) continue;
    anywhere = true;
    const pump = elements.some(({ type }) => type === 'pump');
    if (!actuator && !pump) continue;
    if (actuator && ids.some((id) => FORCES.has(id))) forces.add(part.id);
    if (!ids.some((id) => SIZES.has(id))) continue;
    sizes.add(part.id);
    if (pump) delivery = true;
  }
  return { anywhere, sizes, forces, delivery, areas };
}

/**
 * Which speeds rest on assumed values, by actuator. Where the whole flow of a pump, or of an actuator before it, goes
 * in, sizes alone give the speed; where a load drives or flows split, pressures and with them all losses have a say.
 */
export function speedsAssumed(assumed: Assumed, table: StateTable, { actuators, pumps }: RowNumbers): boolean[] {
  const sources = pumps.map(({ delivered }) => ({ flow: delivered, assumed: assumed.delivery }));
  const out = actuators.map(() => assumed.anywhere);
  const open = new Set(actuators.keys());
  for (let found = true; found; ) {
    found = false;
    for (const i of open) {
      const part = table.data.actuators[i]?.part ?? '';
      const speed = actuators[i]?.speed ?? 0;
      const [into, from] = flows(assumed.areas.get(part), speed);
      const source = sources.find(({ flow }) => Math.abs(flow - into) <= SAME * flow);
      if (!source || into === 0) continue;
      out[i] = source.assumed || assumed.sizes.has(part);
      sources.push({ flow: from, assumed: out[i] ?? true });
      open.delete(i);
      found = true;
    }
  }
  return out;
}

/** Flows are the same within a part in two hundred: leakage and solver leave that much. */
const SAME = 0.005;

function flows(areas: Areas | undefined, speed: number): [number, number] {
  const { a, b } = areas ?? { a: 0, b: 0 };
  return speed > 0 ? [a * speed, b * speed] : [-b * speed, -a * speed];
}

/** A load on shut-in oil gives a pressure by its own cylinder, load and friction alone; any other comes about by flow and losses. */
export function lineAssumed(assumed: Assumed, table: StateTable, line: number, row: number): boolean {
  if (table.line(line, row) !== 'cut off') return assumed.anywhere;
  const ports = table.data.lines[line]?.ports ?? [];
  const own = table.data.actuators.filter(({ part }) => ports.some((port) => port.startsWith(`${part}.`)));
  // Past a throttle or a check the load stands on another line: then any of them may have a say.
  return own.length > 0 ? own.some(({ part }) => assumed.forces.has(part)) : assumed.forces.size > 0;
}

/**
 * Whether the pressure in a line can be worked out at all. In one that is cut off only a load gives one: what an
 * earlier state left behind, or heat may do, nobody knows, and to say nought of it would be dangerous.
 */
export function pressureKnown(table: StateTable, line: number, row: number): boolean {
  const reasons = table.trapped(line, row);
  if (reasons.includes('load')) return true;
  const kind = table.line(line, row);
  return kind === 'vented' ? reasons.length === 0 : kind !== 'cut off';
}
