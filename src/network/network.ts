/**
 * A circuit as dense integers: lines, open paths between them, inputs, sources, actuators.
 * Every array is indexed by the number that the others refer to; -1 means none.
 */
export interface Network {
  readonly lines: readonly NetLine[];
  /** The first `shown` lines are drawn; the others are single open ports, plugged. */
  readonly shown: number;
  readonly inputs: readonly NetInput[];
  /** Valves that pressures or actuators move. `NetPath.input` counts on into them: input `inputs.length + d` is dependent d. */
  readonly dependents: readonly NetDependent[];
  readonly paths: readonly NetPath[];
  readonly pumps: readonly NetPump[];
  readonly reliefs: readonly NetRelief[];
  readonly valves: readonly NetPressureValve[];
  readonly dividers: readonly NetDivider[];
  readonly accumulators: readonly NetAccumulator[];
  readonly actuators: readonly NetActuator[];
  readonly switches: readonly NetPressureSwitch[];
  readonly ratings: readonly NetRating[];
  readonly parts: readonly NetPart[];
  /** Ports with nothing on them that have something to say about it. */
  readonly openPorts: readonly NetOpenPort[];
  /** `V1.A` (part id) → line. */
  readonly lineOf: ReadonlyMap<string, number>;
}

export interface NetLine {
  readonly name: string;
  /** `V1.A`, part ids, in document order. */
  readonly ports: readonly string[];
  readonly connections: readonly string[];
  /** A tank symbol stands on it: it absorbs, and gives suction. */
  readonly tank: boolean;
}

export interface NetPart {
  readonly id: string;
  readonly label: string;
  readonly kind: string;
}

export interface NetInput {
  readonly part: number;
  readonly positions: readonly string[];
  readonly rest?: number;
  readonly by: 'lever' | 'pedal' | 'button' | 'coil' | 'hand' | 'coupling';
  readonly coils: readonly { readonly name: string; readonly position: number }[];
  /** Its open paths while it shifts, `input` being -1 in them; absent = nothing but its positions is to be looked at. */
  readonly crossing?: NetCrossing;
}

export interface NetCrossing {
  /** Between position i and i + 1; undefined = not known. */
  readonly between: readonly (readonly NetPath[] | undefined)[];
  /** All ways joined, for what is not known. */
  readonly allJoined: readonly NetPath[];
}

/** A valve whose position is no input of a state but follows from it. */
export interface NetDependent {
  readonly part: number;
  /** Follows the label where the part is an input as well. */
  readonly called?: string;
  readonly positions: readonly string[];
  /** Where springs put it; absent = it stays where it was left. */
  readonly rest?: number;
  /** The first that acts decides. */
  readonly shifts: readonly NetShift[];
}

export type NetShift = NetPressureShift | NetRollerShift;

/** Acts while Σ factor·p of its lines is at least the setting, Pa. */
export interface NetPressureShift {
  readonly by: 'pressure';
  readonly position: number;
  /** The pilot stage: acts only while this input stands in one of `stages` (bit mask); -1: none. */
  readonly input: number;
  readonly stages: number;
  readonly signals: readonly { readonly line: number; readonly factor: number }[];
  readonly setting: number;
}

export interface NetRollerShift {
  readonly by: 'roller';
  readonly position: number;
  /** -1: there is none. */
  readonly actuator: number;
  /** At a stop, from a travel outwards, or up to one; m from the inner stop. */
  readonly trip: { readonly at: 'in' | 'out' } | { readonly from: number } | { readonly upTo: number };
}

export interface NetPath {
  readonly part: number;
  readonly from: number;
  readonly to: number;
  readonly fromPort: string;
  readonly toPort: string;
  readonly oneWay: boolean;
  readonly throttled: boolean;
  /** -1: open whatever the inputs are. `inputs.length` and above: a dependent. */
  readonly input: number;
  /** Bit p set: open in position p of `input`. */
  readonly positions: number;
  /** Line whose pressure opens it; -1: none. */
  readonly pilot: number;
  /** Line that has to be open to tank, and pressed on by nothing, for this path to be open; -1: none. */
  readonly vent: number;
  /** Area ratio by which the pilot outweighs what it opens against. */
  readonly pilotRatio: number;
  /** Pa. */
  readonly cracking: number;
  /** m³/s at Pa of drop. */
  readonly rated?: { readonly flow: number; readonly drop: number };
  /** m³/s that it passes at most from → to (flow control). */
  readonly limit?: number;
  /** The pressure valve (duty `closes`) whose open state this path is: for open paths it is a path, for pressures that valve stands for it. */
  readonly valve?: number;
  /** The flow divider and its outlet (0, 1) that this path stands for where only open paths count. */
  readonly divider?: { readonly index: number; readonly outlet: 0 | 1 };
}

export interface NetPump {
  readonly part: number;
  readonly outlet: number;
  readonly suction: number;
  readonly compensated: boolean;
  readonly tightWhenStopped: boolean;
  /** Stopped whatever the condition of the table: a hand pump that nobody works. */
  readonly atRest: boolean;
  /** m³/s. */
  readonly flow: number;
  /** Pa, compensated ones. */
  readonly setting: number;
}

export interface NetRelief {
  readonly part: number;
  readonly from: number;
  readonly to: number;
  /** Pa. */
  readonly setting: number;
  /** Pa for each m³/s over it; 0 = not given. */
  readonly override: number;
  /** Pilot operated: it opens already `pressure` Pa over that line, in which its pilot stage lets no more stand than `setting` less this. */
  readonly vent?: { readonly line: number; readonly pressure: number };
}

/** A valve that pressures open or close: sequence, unloading, counterbalance, reducing. Shut backwards. */
export interface NetPressureValve {
  readonly part: number;
  readonly from: number;
  readonly to: number;
  readonly fromPort: string;
  readonly toPort: string;
  /** `closes`: open until its outlet reaches the setting; the others are shut until Σ factor·p passes it. */
  readonly duty: 'sequence' | 'unloading' | 'counterbalance' | 'closes';
  /** Lines whose pressures act on it, with the area ratio of each; the reference (drain, spring chamber) counts negative. */
  readonly signals: readonly { readonly line: number; readonly factor: number }[];
  /** Pa. */
  readonly setting: number;
  /** Pa for each m³/s of opening; 0 = not given. */
  readonly override: number;
  /** m³/s at Pa of drop when fully open. */
  readonly rated?: { readonly flow: number; readonly drop: number };
}

/** A flow divider: see `DividerElement`. */
export interface NetDivider {
  readonly part: number;
  readonly inlet: number;
  readonly outlets: readonly [number, number];
  /** Names of the inlet and of the two outlets. */
  readonly ports: readonly [string, string, string];
  readonly share: number;
  readonly rest: number;
  readonly form: 'spool' | 'gear';
  readonly combines: boolean;
  /** m³/s at Pa of drop. */
  readonly rated: { readonly flow: number; readonly drop: number };
}

export interface NetAccumulator {
  readonly part: number;
  readonly line: number;
  readonly charged: boolean;
  /** Pa of gas when empty of oil; 0 = not given. */
  readonly precharge: number;
  /** Pa at which it stands when charged; never below `precharge`. */
  readonly pressure: number;
  /** m³ of gas when empty of oil; absent = not given. */
  readonly volume?: number;
}

/** A port of a part stands on this line and is built for no more than `pressure` Pa. */
export interface NetRating {
  readonly part: number;
  readonly line: number;
  readonly port: string;
  readonly pressure: number;
  /** Nobody entered it. */
  readonly assumed: boolean;
  readonly tankPort: boolean;
}

/** Comes on at or above `on` Pa, goes off at or below `off`, and keeps what it was between the two. */
export interface NetPressureSwitch {
  readonly part: number;
  readonly line: number;
  readonly on: number;
  readonly off: number;
}

export interface NetActuator {
  readonly part: number;
  readonly a: number;
  /** -1: single acting, that side breathes. */
  readonly b: number;
  readonly rotary: boolean;
  /** m²; rotary: m³/rad. */
  readonly areaA: number;
  readonly areaB: number;
  /** m from stop to stop; absent = endless, as a motor is. */
  readonly stroke?: number;
  /** What pushes it at rest, with its size (N; rotary: N·m). */
  readonly push: {
    readonly way: 'none' | 'in' | 'out' | 'both';
    readonly by: 'load' | 'spring';
    readonly size: number;
  };
  /** m³/s per Pa that slips past it between a and b. */
  readonly leakage: number;
  /** Line of its case drain with m³/s per Pa from each port into it; absent without one. */
  readonly drain?: { readonly line: number; readonly leakage: number };
  /** A load that only resists motion. */
  readonly resisting: boolean;
  /** N, or N·m: pressing positive when it pushes in (B→A). */
  readonly forces: {
    readonly pressing: number;
    readonly resisting: number;
    readonly friction: number;
    readonly spring: number;
  };
}

export interface NetOpenPort {
  readonly part: number;
  readonly port: string;
  readonly line: number;
  readonly level: 'danger' | 'caution' | 'note';
  readonly what: string;
  readonly remedy: string;
}
