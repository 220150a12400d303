import type { NetActuator, Network } from '../../../network/network.ts';
import type { Adjacency } from '../edges.ts';
import { isEqualSided, loadAgainst, pushes } from '../actuator-bits.ts';
import { compileLinks, sourceLines } from '../reach.ts';
import type { PathConditions } from '../reach.ts';
import type { Diagram } from './diagrams.ts';
import { ALL, NONE } from './diagrams.ts';
import type { OpenPathSets } from './open-paths.ts';
import { spreadSets } from './spread.ts';
import type { LineSets, SetSpread } from './spread.ts';

/** What the chambers of one actuator can do; see `Chambers` for the same over bit planes. */
export interface ChamberSets {
  readonly exitA: Diagram;
  readonly exitB: Diagram;
  readonly fillA: Diagram;
  readonly fillB: Diagram;
  readonly fromBtoA: Diagram;
  readonly fromAtoB: Diagram;
}

/** Motion of one actuator; see `Motion`. */
export interface ActuatorMotion extends ChamberSets {
  readonly fedA: Diagram;
  readonly fedB: Diagram;
  out: Diagram;
  in: Diagram;
  displaced: Diagram;
  /** Open paths leave the motion to the pressures. */
  rests: Diagram;
}

export interface MotionSets {
  readonly actuators: readonly ActuatorMotion[];
  readonly underPressure: LineSets;
  /** Lines through which displaced oil goes from one actuator into another. */
  readonly carries: LineSets;
}

/** Motions in every combination by the rules of `reach`, `chambersOf`, `findMotion` and `driveByDisplaced`. */
export function motionSets(net: Network, conditions: PathConditions, paths: OpenPathSets): MotionSets {
  const { sets, edges, toTank, freeToTank, fromSource } = paths;
  const links = compileLinks(net, conditions.places);
  const spread = (field: LineSets, ways: Adjacency, options: SetSpread = {}): LineSets => {
    spreadSets(sets, net, field, ways, edges.open, options);
    return field;
  };
  const { and, or, minus, not } = operations(paths);
  const none = (): LineSets => net.lines.map(() => NONE);
  const at = (field: LineSets, line: number): Diagram => (line < 0 ? NONE : (field[line] as Diagram));

  const notFree = freeToTank.map((set) => not(set));
  const pressed = sourceLines(net, conditions).map((line) => {
    const field = none();
    if (line >= 0) field[line] = notFree[line] as Diagram;
    return spread(field, edges.forward, { gate: notFree });
  });
  const anyPressed = net.lines.map((_, line) => or(...pressed.map((field) => at(field, line))));
  const notPressed = anyPressed.map((set) => not(set));
  const underPressure = spread([...anyPressed], edges.forward, { gate: notFree, links: links.push });
  const toRelief = none();
  for (const relief of net.reliefs) toRelief[relief.from] = or(at(toRelief, relief.from), at(toTank, relief.to));
  for (const valve of net.valves) {
    // One that its own inlet opens lets out as a relief valve does.
    if (valve.signals.some((signal) => signal.line === valve.from && signal.factor > 0))
      toRelief[valve.from] = or(at(toRelief, valve.from), at(toTank, valve.to));
  }
  spread(toRelief, edges.backward);
  const notToTank = toTank.map((set) => not(set));

  const takesOil = (without: number): LineSets => {
    const field = [...toTank];
    net.actuators.forEach(({ a, b }, i) => {
      if (b < 0 && i !== without && conditions.places[i] !== 'out') field[a] = ALL;
    });
    for (const store of net.accumulators) if (!store.charged) field[store.line] = ALL;
    return field;
  };
  const sharedExits = spread(takesOil(-1), edges.backward, { gate: notPressed, links: links.pull });
  // Oil may also be forced into a line under pressure, by the ratio of areas.
  const sharedSoft = spread(takesOil(-1), edges.backward, { links: links.pull }).map((set, line) =>
    or(set, at(anyPressed, line)),
  );
  const valves = waysOverValves();
  const plainFills = fromSource.map((set, line) => (net.lines[line]?.tank ? ALL : set));
  spread(plainFills, edges.forward, { fromTank: true });
  const sharedFills = spread([...plainFills], edges.forward, { links: links.push, fromTank: true });

  /** Some actuator's oil may be forced back into a line under pressure. */
  let ring: Diagram = NONE;
  const actuators = net.actuators.map((actuator, i) => start(actuator, i));
  markRivals();
  return { actuators, underPressure, carries: carrying(driveByDisplaced()) };

  function pushing(actuator: NetActuator, way: 'in' | 'out'): Diagram {
    return pushes(actuator, way) === 0 ? NONE : ALL;
  }

  /** Exits and pressure over valves that pressures may open; undefined where there are none. */
  function waysOverValves(): { readonly exits: LineSets; readonly pressed: LineSets } | undefined {
    for (const { relief, mask } of edges.reliefs) edges.open[mask] = at(notToTank, net.reliefs[relief]?.to ?? 0);
    if (edges.loadPilots.length > 0) {
      const field = none();
      net.actuators.forEach((actuator, i) => {
        if (conditions.places[i] !== 'in' && pushing(actuator, 'in') === ALL)
          field[actuator.a] = at(notToTank, actuator.a);
        if (conditions.places[i] !== 'out' && pushing(actuator, 'out') === ALL && actuator.b >= 0)
          field[actuator.b] = at(notToTank, actuator.b);
      });
      spread(field, edges.forward, { gate: notToTank, links: links.push });
      for (const { line, mask } of edges.loadPilots) edges.open[mask] = at(field, line);
    }
    const mayOpen = [...edges.reliefs, ...edges.loadPilots].some(({ mask }) => edges.open[mask] !== NONE);
    if (net.valves.length === 0 && !mayOpen) return undefined;
    return {
      exits: spread([...sharedSoft], edges.valveBackward, { links: links.pull, fromTank: true }),
      pressed: spread([...anyPressed], edges.valveForward, { gate: notFree, links: links.push }),
    };
  }

  function start(actuator: NetActuator, i: number): ActuatorMotion {
    const { a, b } = actuator;
    const single = b < 0;
    // The shared searches pass through this actuator too; where that can mislead, search again without it.
    const borrowed = (field: LineSets, plain: LineSets): Diagram =>
      single
        ? minus(at(field, a), at(plain, a))
        : minus(and(at(field, a), at(field, b)), and(at(plain, a), at(plain, b)));
    const without = { links: links.pull, without: i };
    const fedA = at(anyPressed, a);
    const fedB = at(anyPressed, b);
    let exits = sharedExits;
    if (borrowed(exits, toTank) !== NONE) exits = spread(takesOil(i), edges.backward, { ...without, gate: notPressed });
    let soft = sharedSoft;
    const stuck = or(single ? NONE : minus(fedA, at(exits, b)), minus(fedB, at(exits, a)));
    if (and(borrowed(soft, toTank), stuck) !== NONE) soft = spread(takesOil(i), edges.backward, without);
    let fills = sharedFills;
    const free = minus(single ? ALL : or(at(exits, a), at(exits, b)), or(fedA, fedB));
    if (and(borrowed(fills, plainFills), free) !== NONE) {
      fills = spread([...plainFills], edges.forward, { links: links.push, without: i, fromTank: true });
    }
    const across = (from: number, to: number): Diagram => {
      if (from < 0 || to < 0) return NONE;
      if (from === to) return ALL;
      const field = none();
      field[from] = and(at(notToTank, from), at(notToTank, to));
      return at(spread(field, edges.forward, { gate: notToTank }), to);
    };
    const sideB = (field: LineSets): Diagram => (single ? ALL : at(field, b));
    const [exitA, exitB, fillA, fillB] = [at(exits, a), sideB(exits), at(fills, a), sideB(fills)];
    const [fromBtoA, fromAtoB] = [across(b, a), across(a, b)];

    const place = conditions.places[i];
    const notOut = place === 'out' ? NONE : ALL;
    const notIn = place === 'in' ? NONE : ALL;
    const equal = isEqualSided(actuator) ? ALL : NONE;
    const [tankA, tankB] = [at(toTank, a), at(toTank, b)];
    const regenerative = minus(and(fedA, fromBtoA), equal);
    const balanced = and(equal, fedA, fedB, fromBtoA, fromAtoB);
    const goOut = minus(and(fedA, or(exitB, regenerative), notOut), balanced);
    const goIn = minus(and(fedB, exitA, notIn), or(balanced, goOut));
    const stuckOut = minus(and(fedA, notOut), or(exitB, regenerative, balanced));
    const stuckIn = minus(and(fedB, notIn), or(exitA, balanced, goOut));
    const against = (sense: 'in' | 'out'): Diagram => (loadAgainst(actuator)(sense) === 0 ? NONE : ALL);
    const overValve = (): Diagram => {
      if (!valves) return NONE;
      const [wayOutA, wayOutB] = [at(valves.exits, a), at(valves.exits, b)];
      const [softA, softB] = [at(valves.pressed, a), at(valves.pressed, b)];
      return minus(
        or(
          and(minus(fedA, goOut), wayOutB, notOut),
          and(minus(fedB, goIn), wayOutA, notIn),
          and(minus(softA, fedA), or(wayOutB, minus(fromBtoA, equal)), notOut),
          and(minus(softB, fedB), wayOutA, notIn),
          and(goOut, wayOutA),
          and(goIn, wayOutB),
          and(minus(pushing(actuator, 'in'), exitA), wayOutA, notIn),
          and(minus(pushing(actuator, 'out'), exitB), wayOutB, notOut),
        ),
        balanced,
      );
    };
    const pressedLine = or(and(minus(stuckOut, fedB), sideB(soft)), and(minus(stuckIn, fedA), at(soft, a)));
    ring = or(ring, pressedLine);
    const rests = or(
      overValve(),
      pressedLine,
      and(or(goOut, stuckOut), against('in')),
      and(or(goIn, stuckIn), against('out')),
      and(goOut, tankA),
      and(goIn, tankB),
      and(stuckOut, tankA, fillB),
      and(stuckIn, tankB, fillA),
      minus(and(fedA, fedB, or(exitA, exitB, and(equal, or(fromBtoA, fromAtoB)))), or(regenerative, balanced)),
      and(minus(stuckOut, fedB), single ? NONE : at(toRelief, b)),
      and(minus(stuckIn, fedA), at(toRelief, a)),
    );
    return { exitA, exitB, fillA, fillB, fromBtoA, fromAtoB, fedA, fedB, out: goOut, in: goIn, displaced: NONE, rests };
  }

  /** Two actuators that one source could move at once: which goes first, only pressures tell. */
  function markRivals(): void {
    for (const field of pressed) {
      const offered = net.actuators.map(({ a, b }, i) => {
        const { out, in: inward } = actuators[i] as ActuatorMotion;
        return or(and(out, at(field, a)), and(inward, at(field, b)));
      });
      let once: Diagram = NONE;
      let twice: Diagram = NONE;
      for (const set of offered) {
        twice = or(twice, and(once, set));
        once = or(once, set);
      }
      offered.forEach((set, i) => {
        const motion = actuators[i] as ActuatorMotion;
        motion.rests = or(motion.rests, and(set, twice));
      });
    }
  }

  /** What a moving actuator pushes out may drive the next one, and so on. Returns the lines that this oil gets to. */
  function driveByDisplaced(): LineSets {
    const pushed = none();
    let doubtful = or(...actuators.map((motion) => motion.rests));
    // A load whose oil has no free way to tank may drive other actuators with it; its own oil does not drive it back.
    const yielding = net.actuators.map((actuator, i) => {
      const m = actuators[i] as ActuatorMotion;
      const push = (line: number, way: 'in' | 'out', exit: Diagram, fed: Diagram): Diagram => {
        if (line < 0) return NONE;
        const set = minus(and(pushing(actuator, way), exit, at(notFree, line)), fed);
        pushed[line] = or(at(pushed, line), set);
        return set;
      };
      return or(push(actuator.a, 'in', m.exitA, m.fedA), push(actuator.b, 'out', m.exitB, m.fedB));
    });
    doubtful = or(doubtful, ...yielding);
    spread(pushed, edges.forward, { gate: notFree });
    let moved = net.actuators.map((_, i) => i);
    let first = pushed.some((set) => set !== NONE);
    while (moved.length > 0) {
      const before = first ? none() : [...pushed];
      first = false;
      for (const i of moved) {
        const { a, b } = net.actuators[i] as NetActuator;
        const { out, in: inward } = actuators[i] as ActuatorMotion;
        if (b >= 0) pushed[b] = or(at(pushed, b), and(out, at(notFree, b)));
        pushed[a] = or(at(pushed, a), and(inward, at(notFree, a)));
      }
      spread(pushed, edges.forward, { gate: notFree });
      const touched = (line: number): boolean => line >= 0 && before[line] !== pushed[line];
      moved = net.actuators.flatMap(({ a, b }, i) => (touched(a) || touched(b) ? [i] : [])).filter(drive);
    }
    // Oil forced back into a line under pressure may turn a whole ring of actuators.
    net.actuators.forEach(({ a, b }, i) => {
      const m = actuators[i] as ActuatorMotion;
      m.rests = or(m.rests, minus(and(ring, or(at(underPressure, a), at(underPressure, b))), or(m.out, m.in)));
    });
    return pushed;

    function drive(i: number): boolean {
      const { a, b } = net.actuators[i] as NetActuator;
      const m = actuators[i] as ActuatorMotion;
      const others = or(
        ...actuators.flatMap((other, j) => (j === i ? [] : [other.out, other.in, yielding[j] as Diagram])),
      );
      const moving = or(m.out, m.in, minus(yielding[i] as Diagram, others));
      const oilA = minus(at(pushed, a), or(m.fedA, moving));
      const oilB = minus(at(pushed, b), or(m.fedB, moving));
      const goOut = conditions.places[i] === 'out' ? NONE : and(minus(oilA, oilB), m.exitB);
      const goIn = conditions.places[i] === 'in' ? NONE : and(minus(oilB, oilA), m.exitA);
      const both = and(oilA, oilB, or(m.exitA, m.exitB));
      const now = or(goOut, goIn);
      m.out = or(m.out, goOut);
      m.in = or(m.in, goIn);
      m.displaced = or(m.displaced, now);
      const bleeds = or(and(goOut, at(toTank, a)), and(goIn, at(toTank, b)));
      const against = loadAgainst(net.actuators[i] as NetActuator);
      const loaded = or(against('in') === 0 ? NONE : goOut, against('out') === 0 ? NONE : goIn);
      m.rests = or(m.rests, and(now, doubtful), loaded, bleeds, both);
      doubtful = or(doubtful, loaded, bleeds, both);
      return now !== NONE;
    }
  }

  function carrying(pushed: LineSets): LineSets {
    const into = none();
    net.actuators.forEach(({ a, b }, i) => {
      const { out, in: inward, displaced } = actuators[i] as ActuatorMotion;
      into[a] = or(at(into, a), and(out, displaced));
      if (b >= 0) into[b] = or(at(into, b), and(inward, displaced));
    });
    spread(into, edges.backward, { gate: notFree });
    return into.map((set, line) => and(set, at(pushed, line)));
  }
}

interface Operations {
  readonly and: (...list: Diagram[]) => Diagram;
  readonly or: (...list: Diagram[]) => Diagram;
  readonly minus: (a: Diagram, b: Diagram) => Diagram;
  readonly not: (a: Diagram) => Diagram;
}

/** The operations on any number of sets. */
export function operations({ sets }: Pick<OpenPathSets, 'sets'>): Operations {
  return {
    and: (...list) => list.reduce((a, b) => sets.and(a, b), ALL),
    or: (...list) => list.reduce((a, b) => sets.or(a, b), NONE),
    minus: (a, b) => sets.minus(a, b),
    not: (a) => sets.not(a),
  };
}
