import type { Box, Point, Side } from '../base/points.ts';
import type { Primitive } from '../base/primitives.ts';
import type { Problem } from '../base/result.ts';
import type { Quantity } from '../base/units.ts';
import type { Part, ValveData } from '../circuit/model.ts';

/**
 * A part kind: one module says everything about it. A new part is one module and one line in
 * `catalogue.ts`.
 */
export interface PartKind {
  /** Name in the file, e.g. `fixed-pump`. */
  readonly kind: string;
  readonly title: string;
  readonly group: PartGroup;
  /** One line in trade words. */
  readonly help: string;
  /** Synonyms for the search in the parts tray. */
  readonly words: readonly string[];
  /** Letter(s) for automatic labels. */
  readonly prefix: string;
  readonly settings: readonly SettingSpec[];
  /** Ready-made forms in the tray, at least one; the first is the default. */
  readonly readyMade: readonly ReadyMade[];
  readonly ports: (part: Part) => readonly PortSpec[];
  /** What it does between its ports. */
  readonly elements: (part: Part) => readonly Element[];
  /** Commanded positions; undefined for a part that nobody moves. */
  readonly input?: (part: Part) => InputSpec | undefined;
  /** What moves it besides a hand; its paths' `positions` are then those of this spool. A two-stage valve has an input too. */
  readonly dependent?: (part: Part) => DependentSpec | undefined;
  readonly draw: (part: Part, look: Look) => readonly Primitive[];
  /** Outline on the sheet in its own frame, without lines. */
  readonly bounds: (part: Part) => Box;
  /** Outline over all positions, where it is larger than `bounds` (a valve's strip slides). */
  readonly reach?: (part: Part) => Box;
  /** Pressures that its ports are built for. */
  readonly ratings?: (part: Part) => readonly Rating[];
  /** Checks of its own data beyond the settings (the directional valve's). */
  readonly check?: (part: Part) => readonly PartProblem[];
}

export interface Rating {
  readonly ports: readonly string[];
  /** Pa */
  readonly pressure: number;
  /** Nobody entered it. */
  readonly assumed: boolean;
  /** Return ports of a valve, which often stand less than the others. */
  readonly tankPort: boolean;
}

/** `where` is relative to the part, e.g. `settings.flow`; an error unless it says otherwise. */
export interface PartProblem extends Problem {
  readonly level?: 'error' | 'warning';
}

export type PartGroup =
  'Supply' | 'Motion' | 'Direction' | 'Pressure' | 'Flow and check' | 'Store' | 'Measure and joints';
export const PART_GROUPS: readonly PartGroup[] = [
  'Supply',
  'Motion',
  'Direction',
  'Pressure',
  'Flow and check',
  'Store',
  'Measure and joints',
];

export interface ReadyMade {
  /** Unique in the catalogue, e.g. `valve-4/3-bypass`. */
  readonly id: string;
  readonly title: string;
  readonly words?: readonly string[];
  /** What the placed part starts with besides id, kind and place. */
  readonly make: () => Pick<Part, 'settings' | 'valve'>;
}

export interface PortSpec {
  readonly id: string;
  readonly at: Point;
  readonly side: Side;
  /** `joint`: a junction point, any number of lines; others take one or more too, drawn with a dot. */
  readonly role: 'supply' | 'return' | 'working' | 'pilot' | 'drain' | 'measure' | 'joint';
  /** What it means if nothing is connected; undefined = nothing to say. */
  readonly leftOpen?: { readonly level: 'danger' | 'caution' | 'note'; readonly what: string; readonly remedy: string };
}

/** How a part is to be drawn now. */
export interface Look {
  /** Index of the active position; undefined = rest or first. */
  readonly position?: number;
  /** Actuators: 0 in, 1 out. */
  readonly stroke?: number;
}

export interface SettingSpec {
  readonly id: string;
  /** Left out it means none, which is no assumption. */
  readonly optional?: boolean;
  readonly title: string;
  readonly help: string;
  readonly value:
    | {
        readonly type: 'quantity';
        readonly quantity: Quantity;
        readonly default: string;
        readonly min?: string;
        readonly max?: string;
      }
    | { readonly type: 'choice'; readonly options: readonly string[]; readonly default: string }
    | { readonly type: 'switch'; readonly default: boolean }
    /** Id of an actuator of the circuit; empty = none. */
    | { readonly type: 'actuator'; readonly default: '' }
    | { readonly type: 'number'; readonly default: number; readonly min?: number; readonly max?: number };
}

/** One input of a state: a commanded valve, shut-off or coupling. */
export interface InputSpec {
  readonly positions: readonly string[];
  /** Where springs put it; absent = it stays where it was left. */
  readonly rest?: number;
  readonly by: 'lever' | 'pedal' | 'button' | 'coil' | 'hand' | 'coupling';
  readonly coils: readonly { readonly name: string; readonly position: number }[];
  /** What is open while it shifts; absent = nothing but its positions is to be looked at. */
  readonly crossing?: CrossingSpec;
}

/** Paths of a valve on its way from one position to the next. */
export interface CrossingSpec {
  /** Between position i and i + 1; an entry that is not there is not known. */
  readonly between: readonly (readonly PathElement[] | undefined)[];
  /** All its ways joined: one of the two bounds of what is not known, the other being all shut. */
  readonly allJoined: readonly PathElement[];
}

/** A valve whose position follows from pressures, or from where an actuator stands, in the same state. */
export interface DependentSpec {
  /** What it is called behind the part's label, where the part is an input as well: `main spool`. */
  readonly called?: string;
  readonly positions: readonly string[];
  /** Where springs put it when nothing shifts it; absent = detent, it stays. */
  readonly rest?: number;
  /** The first that acts decides. */
  readonly shifts: readonly ShiftSpec[];
}

export type ShiftSpec =
  | {
      readonly by: 'pressure';
      readonly position: number;
      /** Positions of the part's own input in which it can act; absent = any. */
      readonly stage?: readonly number[];
      /** It acts while Σ factor·p is at least the setting, Pa; drain or the other pilot counts negative. */
      readonly signals: readonly { readonly port: string; readonly factor: number }[];
      readonly setting: number;
    }
  | {
      readonly by: 'roller';
      readonly position: number;
      /** Part id. */
      readonly actuator: string;
      readonly trip: RollerTrip;
    };

/** At a stop, from a travel outwards, or up to a travel (m from the inner stop). */
export type RollerTrip = { readonly at: 'in' | 'out' } | { readonly from: number } | { readonly upTo: number };

/** What a part does, in terms the network and the engines understand. Values are SI. */
export type Element =
  | PathElement
  | {
      readonly type: 'pressure-opened';
      readonly from: string;
      readonly to: string;
      readonly setting: number;
      readonly duty: 'relief';
      /** Rise over the setting, Pa, at a flow, m³/s. */ readonly override?: {
        readonly rise: number;
        readonly flow: number;
      };
      /** Pilot operated: opens already this many Pa over the pressure at `port`, which its pilot stage limits. A path from → port feeds it. */
      readonly vent?: { readonly port: string; readonly pressure: number };
    }
  | {
      readonly type: 'pump';
      readonly outlet: string;
      readonly suction: string;
      readonly form: 'fixed' | 'compensated';
      /** m³/s */ readonly flow: number;
      /** Pa, compensated only */ readonly setting?: number;
      readonly tightWhenStopped: boolean;
      /** A hand pump that nobody works: stopped whatever the condition of the table. */
      readonly atRest?: boolean;
    }
  | { readonly type: 'tank'; readonly port: string }
  | {
      readonly type: 'accumulator';
      readonly port: string;
      readonly charged: boolean;
      /** Gas volume, m³ */ readonly volume?: number;
      /** Gas pressure when empty of oil, Pa */ readonly precharge?: number;
      /** Gas and oil pressure when charged, Pa */ readonly pressure?: number;
    }
  | {
      readonly type: 'pressure-switch';
      readonly port: string;
      /** Pa: comes on at or above `on`, goes off at or below `off`, keeps what it was between. */
      readonly on: number;
      readonly off: number;
    }
  | DividerElement
  | PressureValveElement
  | ActuatorElement;

/** Divides what enters at the inlet between two outlets in a fixed ratio; backwards it combines them if it can. */
export interface DividerElement {
  readonly type: 'divider';
  readonly inlet: string;
  readonly outlets: readonly [string, string];
  /** Part of the flow of the first outlet, 0 … 1. */
  readonly share: number;
  /** Share of its rated flow that an outlet passes while the other is blocked. */
  readonly rest: number;
  /** `spool` throttles the lighter outlet, `gear` are two motors on one shaft. */
  readonly form: 'spool' | 'gear';
  readonly combines: boolean;
  /** m³/s at Pa of drop for the whole of it. */
  readonly rated: { readonly flow: number; readonly drop: number };
}

/**
 * A way from → to that pressures open or close. `closes` (reducing) stands open until Σ factor·p comes up
 * to the setting; the other duties are shut until it passes it. Drain and spring chamber count negative.
 * Oil never passes it backwards: a bypass check is a path of its own. A `closes` valve is also the open
 * path from → to; the part must not lay that path a second time.
 */
export interface PressureValveElement {
  readonly type: 'pressure-valve';
  readonly duty: 'sequence' | 'unloading' | 'counterbalance' | 'closes';
  readonly from: string;
  readonly to: string;
  readonly signals: readonly { readonly port: string; readonly factor: number }[];
  /** Pa */
  readonly setting: number;
  /** Rise over the setting (`closes`: fall below it), Pa, at a flow, m³/s. */
  readonly override?: { readonly rise: number; readonly flow: number };
  /** m³/s at Pa of drop when fully open. */
  readonly rated?: { readonly flow: number; readonly drop: number };
}

/** An open path. `positions`: input positions in which it exists; absent = always. */
export interface PathElement {
  readonly type: 'path';
  readonly from: string;
  readonly to: string;
  readonly way: 'both' | 'one-way';
  readonly throttled: boolean;
  readonly positions?: readonly number[];
  /** Pa over which a one-way path opens. */
  readonly cracking?: number;
  /** Reverse path of a lock check: open while this port is fed and not freely open to tank. */
  readonly pilot?: { readonly port: string; readonly ratio: number };
  /** Way back through a shuttle valve: open while this port, the other inlet, is open to tank and nothing presses on it. */
  readonly vent?: string;
  /** m³/s at Pa of drop, for the pressure layer. */
  readonly rated?: { readonly flow: number; readonly drop: number };
  /** m³/s that it passes at most from → to, whatever the drop (flow control). */
  readonly limit?: number;
}

/** Port `a` grows when it extends (turns A→B); `b` undefined: single acting, that side breathes. */
export interface ActuatorElement {
  readonly type: 'actuator';
  readonly a: string;
  readonly b?: string;
  readonly motion: 'linear' | 'rotary';
  /** m²; rotary: m³/rad for both. */
  readonly areaA: number;
  readonly areaB: number;
  /** Spring that pushes it this way. */
  readonly spring?: 'in' | 'out';
  /** N, at mid stroke. */
  readonly springForce?: number;
  /** N or N·m against any motion. */
  readonly friction?: number;
  /** m³/s per Pa that slips past it from the higher port to the lower; 0 = none. */
  readonly leakage?: number;
  /** Case drain: m³/s per Pa from each port into it. */
  readonly drain?: { readonly port: string; readonly leakage: number };
  /** m; absent for a motor. */
  readonly stroke?: number;
  /** N or N·m against any motion, besides `load`: what the machine works on. */
  readonly work?: number;
  /** N or N·m that acts from outside: `in`/`out` (motor: `B→A`/`A→B`) presses also at rest, `resisting` only against motion. */
  readonly load: { readonly sense: 'none' | 'resisting' | 'in' | 'out'; readonly size: number };
}

export type { ValveData };
