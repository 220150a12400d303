import type { Circuit, Part } from '../circuit/model.ts';
import { findLines } from '../network/lines.ts';
import { kindOf } from '../parts/catalogue.ts';
import { isStripValve } from '../parts/valve-kinds.ts';
import { partBox } from './shapes.ts';
import { nameless } from './nameless.ts';

/**
 * Part codes in the manner of ISO 1219-2 (from memory): `1-H2.3` is system 1, medium H (hydraulic oil), circuit 2, part 3;
 * the system is left out where there is only one.
 */
const CODE = /^(?:(.+)-)?H(\d+)\.(\d+)$/;
/** Drawn as part of a line, or standing for the one tank. */
const UNCODED: ReadonlySet<string> = new Set(['tank', 'junction', 'plug']);
const ASIDE: ReadonlySet<string> = new Set(['pilot', 'drain', 'measure']);

/**
 * Codes for all parts that have none of their own, by part id; own codes are kept and their numbers are not used again.
 * Each actuator, with what stands on its lines up to and with its directional valve, is a circuit of its own; actuators that
 * share a line or a valve are one. What is left is circuit 0, the power unit. Circuits are counted from the left,
 * parts of a circuit from the bottom up and then from the left. A circuit whose parts have codes keeps their number.
 */
export function partCodes(circuit: Circuit, system = ''): ReadonlyMap<string, string> {
  const groups = circuitsOf(circuit);
  const coded = circuit.parts.flatMap(({ id, code }) => {
    const found = CODE.exec(code ?? '');
    return found && (found[1] ?? '') === system ? [{ id, circuit: Number(found[2]), number: Number(found[3]) }] : [];
  });
  const numberOf = new Map(coded.map(({ id, circuit: number }) => [id, number]));
  const taken = new Set(coded.map(({ circuit: number }) => number));
  const out = new Map<string, string>();
  let free = 1;
  for (const { parts, isPowerUnit } of groups) {
    const own = parts.flatMap(({ id }) => numberOf.get(id) ?? []).sort((a, b) => a - b)[0];
    while (!isPowerUnit && own === undefined && taken.has(free)) free++;
    const number = isPowerUnit ? 0 : (own ?? free);
    taken.add(number);
    const used = new Set(coded.filter((each) => each.circuit === number).map((each) => each.number));
    let next = 1;
    for (const part of parts) {
      if (part.code !== undefined && part.code !== '') continue;
      while (used.has(next)) next++;
      used.add(next);
      out.set(part.id, `${system === '' ? '' : `${system}-`}H${number}.${next}`);
    }
  }
  return out;
}

interface Group {
  readonly parts: readonly Part[];
  readonly isPowerUnit: boolean;
}

/** Circuits from the left, then the power unit; parts in the order in which they are counted. */
function circuitsOf(circuit: Circuit): Group[] {
  const isActuator = (part: Part): boolean =>
    kindOf(part.kind)
      ?.elements(part)
      .some(({ type }) => type === 'actuator') ?? false;
  const reach = reachFinder(circuit);
  const group = new Map<string, number>();
  const merged: number[] = [];
  const rootOf = (i: number): number => {
    const up = merged[i] ?? i;
    return up === i ? i : rootOf(up);
  };
  for (const actuator of circuit.parts.filter(isActuator)) {
    const own = merged.length;
    merged.push(own);
    for (const id of reach(actuator.id)) {
      const before = group.get(id);
      if (before === undefined) group.set(id, own);
      else merged[rootOf(before)] = rootOf(own);
    }
  }
  const members = new Map<number, Part[]>();
  const rest: Part[] = [];
  for (const part of circuit.parts) {
    if (UNCODED.has(part.kind)) continue;
    const at = group.get(part.id);
    if (at === undefined) rest.push(part);
    else members.set(rootOf(at), [...(members.get(rootOf(at)) ?? []), part]);
  }
  const left = (parts: readonly Part[]): number => Math.min(...parts.filter(isActuator).map((part) => partBox(part).x));
  return [
    ...[...members.values()]
      .sort((a, b) => left(a) - left(b))
      .map((parts): Group => ({ parts: inOrder(parts), isPowerUnit: false })),
    { parts: inOrder(rest), isPowerUnit: true },
  ];
}

/** Parts stand beside one another when their lower edges are this close, in modules. */
const ROW = 4;

/** From the bottom up, then from the left. */
function inOrder(parts: readonly Part[]): Part[] {
  const level = (part: Part): number => {
    const { y, height } = partBox(part);
    return Math.round((y + height) / ROW);
  };
  return [...parts].sort((a, b) => level(b) - level(a) || partBox(a).x - partBox(b).x || (a.id < b.id ? -1 : 1));
}

/** Ids of the parts on the lines of an actuator, itself included. */
function reachFinder(circuit: Circuit): (actuator: string) => ReadonlySet<string> {
  const { lines, lineOf } = findLines(circuit, (kind) => kindOf(kind) ?? nameless(kind));
  const partOf = new Map(circuit.parts.map((part) => [part.id, part]));
  const portsOf = (part: Part): string[] =>
    (kindOf(part.kind)?.ports(part) ?? []).filter(({ role }) => !ASIDE.has(role)).map(({ id }) => `${part.id}.${id}`);
  const isAside = (port: string): boolean => {
    const part = partOf.get(port.slice(0, port.indexOf('.')));
    const spec =
      part &&
      kindOf(part.kind)
        ?.ports(part)
        .find(({ id }) => port === `${part.id}.${id}`);
    // A gauge or pressure switch has no other port: it stands on the line that it measures.
    return spec !== undefined && (spec.role === 'pilot' || spec.role === 'drain');
  };
  const isSupply = (part: Part): boolean =>
    kindOf(part.kind)
      ?.elements(part)
      .some(({ type }) => type === 'pump') ?? false;
  return (actuator) => {
    const found = new Set([actuator]);
    const seen = new Set<number>();
    const open = [actuator];
    for (let id = open.pop(); id !== undefined; id = open.pop()) {
      const part = partOf.get(id);
      if (!part) continue;
      for (const port of portsOf(part)) {
        const at = lineOf.get(port);
        const line = at === undefined ? undefined : lines[at];
        if (at === undefined || !line || seen.has(at)) continue;
        seen.add(at);
        const on = line.ports
          .filter((each) => !isAside(each))
          .flatMap((each) => partOf.get(each.slice(0, each.indexOf('.'))) ?? []);
        if (line.tank || on.some(isSupply)) continue;
        for (const other of on) {
          if (found.has(other.id)) continue;
          found.add(other.id);
          if (!isStripValve(other.kind)) open.push(other.id);
        }
      }
    }
    return found;
  };
}
