import type { Circuit, Part } from '../circuit/model.ts';
import { labelOf } from '../circuit/model.ts';
import type {
  ActuatorElement,
  DividerElement,
  DependentSpec,
  InputSpec,
  PartKind,
  PathElement,
  PressureValveElement,
} from '../parts/contract.ts';
import { findLines } from './lines.ts';
import type {
  NetAccumulator,
  NetDivider,
  NetActuator,
  NetDependent,
  NetInput,
  NetOpenPort,
  NetPath,
  NetPressureSwitch,
  NetPressureValve,
  NetPump,
  NetRating,
  NetRelief,
  Network,
} from './network.ts';

/**
 * Circuit + part kinds → dense arrays. The circuit must have passed the checks of the parts floor:
 * known kinds, connections between ports that exist.
 */
export function compileNetwork(circuit: Circuit, kindOf: (kind: string) => PartKind): Network {
  const { lines, shown, lineOf } = findLines(circuit, kindOf);
  const inputs: NetInput[] = [];
  const paths: NetPath[] = [];
  const pumps: NetPump[] = [];
  const reliefs: NetRelief[] = [];
  const valves: NetPressureValve[] = [];
  const dividers: NetDivider[] = [];
  const accumulators: NetAccumulator[] = [];
  const actuators: NetActuator[] = [];
  const switches: NetPressureSwitch[] = [];
  const ratings: NetRating[] = [];
  const openPorts: NetOpenPort[] = [];
  const commanded = circuit.parts.filter((part) => kindOf(part.kind).input?.(part)).length;
  const found: FoundDependent[] = [];

  circuit.parts.forEach((part, index) => {
    const kind = kindOf(part.kind);
    const at = (port: string): number => {
      const line = lineOf.get(`${part.id}.${port}`);
      if (line === undefined) throw new Error(`${kind.kind} has an element at port ${port}, which it does not have`);
      return line;
    };
    const spec = kind.input?.(part);
    const own = spec ? inputs.length : -1;
    if (spec) inputs.push(compileInput(spec, index, at));
    const dependent = kind.dependent?.(part);
    const input = dependent ? commanded + found.length : own;
    if (dependent) found.push({ part: index, input: own, at, spec: dependent });

    for (const element of kind.elements(part)) {
      switch (element.type) {
        case 'path':
          paths.push(compilePath(element, index, input, at));
          break;
        case 'pressure-valve':
          if (element.duty === 'closes') paths.push(openState(element, index, valves.length, at));
          valves.push({
            part: index,
            from: at(element.from),
            to: at(element.to),
            fromPort: element.from,
            toPort: element.to,
            duty: element.duty,
            signals: element.signals.map(({ port, factor }) => ({ line: at(port), factor })),
            setting: element.setting,
            override: element.override ? element.override.rise / element.override.flow : 0,
            ...(element.rated && { rated: element.rated }),
          });
          break;
        case 'pressure-opened':
          reliefs.push({
            part: index,
            from: at(element.from),
            to: at(element.to),
            setting: element.setting,
            override: element.override ? element.override.rise / element.override.flow : 0,
            ...(element.vent && { vent: { line: at(element.vent.port), pressure: element.vent.pressure } }),
          });
          break;
        case 'pump':
          pumps.push({
            part: index,
            outlet: at(element.outlet),
            suction: at(element.suction),
            compensated: element.form === 'compensated',
            tightWhenStopped: element.tightWhenStopped,
            atRest: element.atRest ?? false,
            flow: element.flow,
            setting: element.setting ?? 0,
          });
          break;
        case 'divider':
          paths.push(...dividerPaths(element, index, dividers.length, at));
          dividers.push(compileDivider(element, index, at));
          break;
        case 'accumulator':
          accumulators.push({
            part: index,
            line: at(element.port),
            charged: element.charged,
            precharge: element.precharge ?? 0,
            pressure: Math.max(element.pressure ?? 0, element.precharge ?? 0),
            ...(element.volume !== undefined && { volume: element.volume }),
          });
          break;
        case 'pressure-switch':
          switches.push({ part: index, line: at(element.port), on: element.on, off: element.off });
          break;
        case 'actuator':
          actuators.push(compileActuator(element, index, at));
          break;
        case 'tank':
          break;
      }
    }
    for (const { ports, ...rating } of kind.ratings?.(part) ?? [])
      for (const port of ports) ratings.push({ part: index, line: at(port), port, ...rating });
    for (const port of kind.ports(part)) {
      const line = at(port.id);
      if (line >= shown && port.leftOpen) openPorts.push({ part: index, port: port.id, line, ...port.leftOpen });
    }
  });

  const parts = circuit.parts.map((part: Part) => ({ id: part.id, label: labelOf(part), kind: part.kind }));
  return {
    lines,
    shown,
    inputs,
    dependents: found.map((entry) =>
      compileDependent(entry, (id) => actuators.findIndex((a) => parts[a.part]?.id === id)),
    ),
    paths,
    pumps,
    reliefs,
    valves,
    dividers,
    accumulators,
    actuators,
    switches,
    ratings,
    parts,
    openPorts,
    lineOf,
  };
}

function compileInput({ crossing, ...spec }: InputSpec, part: number, at: (port: string) => number): NetInput {
  if (!crossing) return { part, ...spec };
  const paths = (list: readonly PathElement[]): NetPath[] => list.map((path) => compilePath(path, part, -1, at));
  return {
    part,
    ...spec,
    crossing: { between: crossing.between.map((list) => list && paths(list)), allJoined: paths(crossing.allJoined) },
  };
}

const compilePath = (element: PathElement, part: number, input: number, at: (port: string) => number): NetPath => ({
  part,
  from: at(element.from),
  to: at(element.to),
  fromPort: element.from,
  toPort: element.to,
  oneWay: element.way === 'one-way',
  throttled: element.throttled,
  input: element.positions ? input : -1,
  positions: (element.positions ?? []).reduce((mask, p) => mask | (1 << p), 0),
  pilot: element.pilot ? at(element.pilot.port) : -1,
  pilotRatio: element.pilot?.ratio ?? 0,
  vent: element.vent === undefined ? -1 : at(element.vent),
  cracking: element.cracking ?? 0,
  ...(element.rated && { rated: element.rated }),
  ...(element.limit !== undefined && { limit: element.limit }),
});

interface FoundDependent {
  readonly part: number;
  /** Its pilot stage; -1: none. */
  readonly input: number;
  readonly at: (port: string) => number;
  readonly spec: DependentSpec;
}

function compileDependent({ part, input, at, spec }: FoundDependent, actuator: (id: string) => number): NetDependent {
  const { shifts, ...rest } = spec;
  return {
    part,
    ...rest,
    shifts: shifts.map((shift) =>
      shift.by === 'roller'
        ? { ...shift, actuator: actuator(shift.actuator) }
        : {
            by: 'pressure',
            position: shift.position,
            input: shift.stage ? input : -1,
            stages: (shift.stage ?? []).reduce((mask, p) => mask | (1 << p), 0),
            signals: shift.signals.map(({ port, factor }) => ({ line: at(port), factor })),
            setting: shift.setting,
          },
    ),
  };
}

/** A reducing valve is open until its outlet is up: a path that takes pressure away. */
function openState(element: PressureValveElement, part: number, valve: number, at: (port: string) => number): NetPath {
  return {
    part,
    from: at(element.from),
    to: at(element.to),
    fromPort: element.from,
    toPort: element.to,
    oneWay: true,
    throttled: true,
    input: -1,
    positions: 0,
    pilot: -1,
    pilotRatio: 0,
    vent: -1,
    cracking: 0,
    ...(element.rated && { rated: element.rated }),
    valve,
  };
}

const compileDivider = (element: DividerElement, part: number, at: (port: string) => number): NetDivider => ({
  part,
  inlet: at(element.inlet),
  outlets: [at(element.outlets[0]), at(element.outlets[1])],
  ports: [element.inlet, ...element.outlets],
  share: element.share,
  rest: element.rest,
  form: element.form,
  combines: element.combines,
  rated: element.rated,
});

/** For open paths a divider is a throttled way to each outlet: what passes there depends on the other. */
const dividerPaths = (element: DividerElement, part: number, index: number, at: (port: string) => number): NetPath[] =>
  ([0, 1] as const).map((outlet) => ({
    part,
    from: at(element.inlet),
    to: at(element.outlets[outlet]),
    fromPort: element.inlet,
    toPort: element.outlets[outlet],
    oneWay: !element.combines,
    throttled: true,
    input: -1,
    positions: 0,
    pilot: -1,
    pilotRatio: 0,
    vent: -1,
    cracking: 0,
    divider: { index, outlet },
  }));

function compileActuator(element: ActuatorElement, part: number, at: (port: string) => number): NetActuator {
  const { spring, load, work = 0 } = element;
  const gravity = load.size > 0 && (load.sense === 'in' || load.sense === 'out') ? load.sense : undefined;
  const way = gravity && spring && gravity !== spring ? 'both' : (gravity ?? spring ?? 'none');
  return {
    part,
    a: at(element.a),
    b: element.b === undefined ? -1 : at(element.b),
    rotary: element.motion === 'rotary',
    areaA: element.areaA,
    areaB: element.areaB,
    ...(element.stroke !== undefined && { stroke: element.stroke }),
    push: { way, by: gravity ? 'load' : 'spring', size: gravity ? load.size : 0 },
    leakage: element.leakage ?? 0,
    ...(element.drain && { drain: { line: at(element.drain.port), leakage: element.drain.leakage } }),
    resisting: work > 0 || (load.sense === 'resisting' && load.size > 0),
    forces: {
      pressing: gravity === 'in' ? load.size : gravity === 'out' ? -load.size : 0,
      resisting: work + (load.sense === 'resisting' ? load.size : 0),
      friction: element.friction ?? 0,
      spring: spring === undefined ? 0 : (element.springForce ?? 0) * (spring === 'in' ? 1 : -1),
    },
  };
}
