import type { Network } from '../../network/network.ts';
import type { EdgeSet } from './edges.ts';
import { complement, orderFrom } from './field.ts';
import { pushes } from './actuator-bits.ts';
import type { Field, Link, Spreader } from './field.ts';

/** What holds for every state of a table. */
export interface PathConditions {
  readonly pumpsRunning: boolean;
  /** Per actuator: where it stands. */
  readonly places: readonly ('between' | 'in' | 'out')[];
}

/** Which lines oil can get to, in every state of a block. One plane per line in each field. */
export interface Reach {
  /** From a running pump or charged accumulator by open paths. */
  readonly fromSource: Field;
  /** To a tank by open paths; by free (unthrottled) ones. */
  readonly toTank: Field;
  readonly freeToTank: Field;
  readonly notFreeToTank: Field;
  readonly notToTank: Field;
  /** Per source: lines it presses on, that is, none of them freely open to tank on the way. */
  readonly pressed: readonly Field[];
  /** The same through free paths only. */
  readonly pressedFree: readonly Field[];
  readonly anyPressed: Field;
  readonly notPressed: Field;
  /** Under pressure by a source, or through an actuator that passes pressure on. */
  readonly underPressure: Field;
  /** To a pressure valve that lets out to tank. */
  readonly toRelief: Field;
  /** Can take in oil that something else pushes out, ways through other actuators included. */
  readonly exits: Field;
  readonly freeExits: Field;
  /** The same, also into lines under pump pressure. */
  readonly softExits: Field;
  /** Like `softExits` and `anyPressed`, with the ways through valves that pressures may open; undefined where there are none. */
  readonly valves: { readonly exits: Field; readonly pressed: Field } | undefined;
  /**
   * May come under pressure as long as the state stands: what moves comes to its stop sooner or later, and then
   * pressure valves open. For what is left behind.
   */
  readonly leaves: Field;
  /** Can give oil to a growing chamber. */
  readonly fills: Field;
  /** The same without ways through actuators. */
  readonly plainFills: Field;
}

/** Orders to search in, so that few lines are met twice. */
export interface Orders {
  readonly fromSources: Int32Array;
  readonly fromTanks: Int32Array;
  readonly backFromTanks: Int32Array;
}

export function compileOrders(net: Network, edges: EdgeSet, links: Links): Orders {
  const lines = net.lines.length;
  const tanks = tankLines(net);
  const sources = [...net.pumps.map((pump) => pump.outlet), ...net.accumulators.map((store) => store.line)];
  return {
    fromSources: orderFrom(sources, lines, edges.forward, links.push),
    fromTanks: orderFrom(tanks, lines, edges.forward, links.push),
    backFromTanks: orderFrom(tanks, lines, edges.backward, links.pull),
  };
}

const tankLines = (net: Network): number[] => net.lines.flatMap((line, index) => (line.tank ? [index] : []));

export interface Links {
  /** Oil that presses into `from` is pushed out at `to`. */
  readonly push: readonly (readonly Link[])[];
  /** The reverse, for searches that start at the tank. */
  readonly pull: readonly (readonly Link[])[];
}

export function compileLinks(net: Network, places: PathConditions['places']): Links {
  const push: Link[][] = net.lines.map(() => []);
  const pull: Link[][] = net.lines.map(() => []);
  net.actuators.forEach(({ a, b }, actuator) => {
    if (b < 0) return;
    if (places[actuator] !== 'out') {
      push[a]?.push({ from: a, to: b, actuator });
      pull[b]?.push({ from: b, to: a, actuator });
    }
    if (places[actuator] !== 'in') {
      push[b]?.push({ from: b, to: a, actuator });
      pull[a]?.push({ from: a, to: b, actuator });
    }
  });
  return { push, pull };
}

/** Everything that has oil under pressure behind it: pumps in circuit order, then charged accumulators. */
export function sourceLines(net: Network, conditions: PathConditions): number[] {
  return [
    ...net.pumps.map((pump) => (conditions.pumpsRunning && !pump.atRest ? pump.outlet : -1)),
    ...net.accumulators.map((store) => (store.charged ? store.line : -1)),
  ];
}

export function reach(
  net: Network,
  edges: EdgeSet,
  links: Links,
  conditions: PathConditions,
  orders: Orders,
  s: Spreader,
): Reach {
  const sources = sourceLines(net, conditions);
  const tanks = tankLines(net);
  const { fromSources, fromTanks, backFromTanks } = orders;

  const fromSource = s.field();
  for (const line of sources) if (line >= 0) s.seed(fromSource, line);
  s.spread(fromSource, edges.forward, { order: fromSources });

  const freeToTank = s.field();
  for (const line of tanks) s.seed(freeToTank, line);
  s.spread(freeToTank, edges.freeBackward, { fromTank: true, order: backFromTanks });

  const toTank = freeToTank.slice();
  if (!conditions.pumpsRunning) {
    // A stopped pump leaks its outlet line down to tank, slowly.
    for (const pump of net.pumps) if (!pump.tightWhenStopped) s.seed(toTank, pump.outlet);
  }
  s.spread(toTank, edges.backward, { fromTank: true, order: backFromTanks });

  const notFreeToTank = complement(freeToTank, s.masks, s.width);
  const notToTank = complement(toTank, s.masks, s.width);
  const press = (from: number, adjacency: EdgeSet['forward']): Field => {
    const field = s.field();
    if (from < 0) return field;
    s.seed(field, from);
    and(field, notFreeToTank);
    s.spread(field, adjacency, { gate: notFreeToTank, order: fromSources });
    return field;
  };
  const pressed = sources.map((line) => press(line, edges.forward));
  const pressedFree = sources.map((line) => press(line, edges.freeForward));
  const anyPressed = s.field();
  for (const field of pressed) or(anyPressed, field);
  const notPressed = complement(anyPressed, s.masks, s.width);

  const underPressure = anyPressed.slice();
  s.spread(underPressure, edges.forward, { gate: notFreeToTank, links: links.push, order: fromSources });

  const toRelief = s.field();
  for (const relief of net.reliefs) {
    for (let w = 0; w < s.width; w++) {
      const at = relief.from * s.width + w;
      toRelief[at] = (toRelief[at] as number) | (toTank[relief.to * s.width + w] as number);
    }
  }
  for (const valve of net.valves) {
    // One that its own inlet opens lets out as a relief valve does.
    if (!valve.signals.some((signal) => signal.line === valve.from && signal.factor > 0)) continue;
    for (let w = 0; w < s.width; w++) {
      const at = valve.from * s.width + w;
      toRelief[at] = (toRelief[at] as number) | (toTank[valve.to * s.width + w] as number);
    }
  }
  s.spread(toRelief, edges.backward);

  const takesOil = (field: Field, without: number): void => takeIn(net, conditions, s, field, without);
  const exits = toTank.slice();
  takesOil(exits, -1);
  const softExits = exits.slice();
  // Oil may also be forced into a line under pressure, by the ratio of areas.
  or(softExits, anyPressed);
  // An actuator that stands straight on a tank line lets oil out through itself too.
  s.spread(exits, edges.backward, { gate: notPressed, links: links.pull, fromTank: true, order: backFromTanks });
  s.spread(softExits, edges.backward, { links: links.pull, fromTank: true, order: backFromTanks });
  const freeExits = freeToTank.slice();
  takesOil(freeExits, -1);
  s.spread(freeExits, edges.freeBackward, {
    gate: notPressed,
    links: links.pull,
    fromTank: true,
    order: backFromTanks,
  });

  let valves: Reach['valves'];
  for (const { relief, mask } of edges.reliefs) {
    const to = net.reliefs[relief]?.to ?? 0;
    s.setMask(mask, notToTank, to * s.width);
  }
  if (edges.loadPilots.length > 0) {
    const pressedByLoad = loadedLines(net, conditions, s, notToTank);
    s.spread(pressedByLoad, edges.forward, { gate: notToTank, links: links.push });
    for (const { line, mask } of edges.loadPilots) s.setMask(mask, pressedByLoad, line * s.width);
  }
  for (const { pilot, to, other, mask } of edges.backs) {
    const plane = new Uint32Array(s.width);
    for (let w = 0; w < s.width; w++) {
      const pressing = (line: number): number =>
        (fromSource[line * s.width + w] as number) | (underPressure[line * s.width + w] as number);
      const open = s.masks[(edges.masks.length + pilot) * s.width + w] as number;
      plane[w] = (s.masks[w] as number) & ~open & (~pressing(other) | pressing(to));
    }
    s.setMask(mask, plane, 0);
  }
  const led = [...edges.reliefs, ...edges.loadPilots, ...edges.backs];
  const mayOpen = led.some(({ mask }) => s.maskLive[mask] === 1);
  if (net.valves.length > 0 || mayOpen) {
    const valveExits = softExits.slice();
    s.spread(valveExits, edges.valveBackward, { links: links.pull, fromTank: true });
    const valvePressed = anyPressed.slice();
    s.spread(valvePressed, edges.valveForward, { gate: notFreeToTank, links: links.push });
    // A state in which none of them may open must not hang on the others of its block.
    const live = new Uint32Array(s.width);
    for (const { mask } of led) {
      for (let w = 0; w < s.width; w++) live[w] = (live[w] as number) | (s.masks[mask * s.width + w] as number);
    }
    if (net.valves.length === 0) for (const field of [valveExits, valvePressed]) keep(field, live, s.width);
    valves = { exits: valveExits, pressed: valvePressed };
  }
  const leaves = valves ? underPressure.slice() : underPressure;
  if (valves) or(leaves, valves.pressed);

  const plainFills = fromSource.slice();
  for (const line of tanks) s.seed(plainFills, line);
  s.spread(plainFills, edges.forward, { fromTank: true, order: fromTanks });
  const fills = plainFills.slice();
  s.spread(fills, edges.forward, { links: links.push, fromTank: true, order: fromTanks });

  return {
    fromSource,
    toTank,
    freeToTank,
    notFreeToTank,
    pressed,
    pressedFree,
    anyPressed,
    notPressed,
    underPressure,
    toRelief,
    exits,
    freeExits,
    softExits,
    valves,
    leaves,
    fills,
    plainFills,
    notToTank,
  };
}

/** Takes the states out of every line of a field that are not in `set`. */
function keep(field: Field, set: Uint32Array, width: number): void {
  for (let i = 0; i < field.length; i++) field[i] = (field[i] as number) & (set[i % width] as number);
}

/** Chamber lines that a load or spring presses on at rest, where nothing lets them down. */
function loadedLines(net: Network, conditions: PathConditions, s: Spreader, notToTank: Field): Field {
  const field = s.field();
  net.actuators.forEach((actuator, i) => {
    if (pushes(actuator, 'in') !== 0 && conditions.places[i] !== 'in') s.seed(field, actuator.a);
    if (pushes(actuator, 'out') !== 0 && conditions.places[i] !== 'out' && actuator.b >= 0) s.seed(field, actuator.b);
  });
  and(field, notToTank);
  return field;
}

/** Lines that swallow oil by themselves: single-acting cylinders that can still go out, accumulators not yet full. */
export function takeIn(net: Network, conditions: PathConditions, s: Spreader, field: Field, without: number): void {
  net.actuators.forEach((actuator, index) => {
    if (actuator.b < 0 && index !== without && conditions.places[index] !== 'out') s.seed(field, actuator.a);
  });
  for (const store of net.accumulators) if (!store.charged) s.seed(field, store.line);
}

export function and(target: Field, other: Field): void {
  for (let i = 0; i < target.length; i++) target[i] = (target[i] as number) & (other[i] as number);
}

export function or(target: Field, other: Field): void {
  for (let i = 0; i < target.length; i++) target[i] = (target[i] as number) | (other[i] as number);
}
