import type { Point, Turn } from '../base/points.ts';
import type { Paper } from './paper.ts';
import type { StepPlan } from './plan.ts';

/**
 * The circuit document: plain data, as it stands in a `*.spool.json` file. Nothing here is computed.
 * Fields that a newer or other program added are kept in `extra` and written back.
 */
export interface Circuit {
  readonly name: string;
  readonly notes?: string;
  /** Fields of the title block, see `TITLE_FIELDS`; others are kept. */
  readonly title?: Readonly<Record<string, string>>;
  /** What it is printed on; `DEFAULT_PAPER` when absent. */
  readonly paper?: Paper;
  /** Sheets that the circuit is drawn on, in their order; one without a name when absent. Never empty. */
  readonly sheets?: readonly CircuitSheet[];
  readonly parts: readonly Part[];
  readonly connections: readonly Connection[];
  /** Free text on the sheet. */
  readonly labels?: readonly Label[];
  /** What must never or must always be, in the words of the rules' language. */
  readonly rules?: readonly RuleText[];
  /** Named sets of loads, for the same machine in other work. */
  readonly loadCases?: readonly LoadCase[];
  /** Sequences to be checked against the circuit. */
  readonly plans?: readonly StepPlan[];
  /** Parts drawn inside one enclosure, such as a manifold block. */
  readonly groups?: readonly PartGroup[];
  /** Valves of this circuit's own make, to be placed again. */
  readonly readyMadeValves?: readonly ReadyMadeValve[];
  readonly extra?: Extra;
}

/** One sheet of the drawing. The circuit is one, whichever sheets its parts stand on. */
export interface CircuitSheet {
  readonly id: string;
  readonly name: string;
  readonly extra?: Extra;
}

export type Extra = Readonly<Record<string, unknown>>;

export interface Part {
  /** Unique, stable: letters, digits, `-` and `_`, no dot. Connections refer to it. */
  readonly id: string;
  readonly kind: string;
  /** Shown name, unique in the circuit; the id when absent. */
  readonly label?: string;
  /** Second line of the label, such as `H1.1`. */
  readonly code?: string;
  /** Id of the sheet that it stands on; the first when absent. */
  readonly sheet?: string;
  /** Origin of the symbol in modules; absent = the sheet places the part. */
  readonly at?: Point;
  readonly turn?: Turn;
  readonly flip?: boolean;
  /** As the user typed it: quantities with their unit (`"30 L/min"`), choices by name, switches. */
  readonly settings?: Readonly<Record<string, Setting>>;
  /** Directional valves only: ways, positions and operators as data. */
  readonly valve?: ValveData;
  readonly extra?: Extra;
}

export type Setting = string | number | boolean;

/** A drawn connection between two ports; connected ports form one line. */
export interface Connection {
  readonly id: string;
  readonly from: PortRef;
  readonly to: PortRef;
  /** Names the line that this connection belongs to. */
  readonly name?: string;
  readonly use?: 'working' | 'pilot' | 'drain';
  /** Size of tube or hose as the user notes it, such as `12x1.5`; drawn, not computed with. */
  readonly size?: string;
  /** Bend points set by the user, in modules; without effect while the ends stand on two sheets. */
  readonly bends?: readonly Point[];
  readonly extra?: Extra;
}

/** In the file: `"V1.A"`. */
export interface PortRef {
  readonly part: string;
  readonly port: string;
}

export interface Label {
  readonly id: string;
  /** As of a part. */
  readonly sheet?: string;
  readonly at: Point;
  readonly text: string;
  readonly extra?: Extra;
}

/** Drawn as a dash-dot enclosure with its name; its parts move together. Ids of parts that are gone mean nothing. */
export interface PartGroup {
  readonly id: string;
  readonly name: string;
  readonly parts: readonly string[];
  readonly extra?: Extra;
}

/** Placed parts are copies: they do not change with it unless somebody says so. */
export interface ReadyMadeValve {
  readonly id: string;
  /** Shown, unique in the circuit. */
  readonly title: string;
  /** Kind of the placed part; `directional-valve` when absent. */
  readonly kind?: string;
  readonly valve: ValveData;
  readonly extra?: Extra;
}

/** Not read here: a rule may speak of parts that are drawn later. */
export interface RuleText {
  readonly id: string;
  readonly text: string;
  readonly extra?: Extra;
}

/** Loads that stand in for those of the parts: settings by part id; what a case leaves out stays as the part says. */
export interface LoadCase {
  readonly id: string;
  readonly name: string;
  readonly loads: Readonly<Record<string, Readonly<Record<string, Setting>>>>;
  readonly extra?: Extra;
}

/** A directional valve: 2–4 positions, 2–8 ways. */
export interface ValveData {
  /** In drawn order; `top` ports stand on the upper edge of the box, the rest on the lower one. */
  readonly ports: readonly ValvePort[];
  /** In drawn order, left to right. */
  readonly positions: readonly ValvePosition[];
  /** Paths while shifting between position i and i + 1; absent = not known. */
  readonly crossovers?: readonly (readonly string[])[];
  /** Index of the position the spring returns to; absent = detent, keeps the last. */
  readonly rest?: number;
  /** Drawn at the left and right end, from the box outwards. */
  readonly left: readonly Operator[];
  readonly right: readonly Operator[];
  /** Which coil leads to which position; two coils on at once are not permitted. */
  readonly coils?: readonly ValveCoil[];
  readonly extra?: Extra;
}

export interface ValveCoil {
  readonly name: string;
  readonly position: number;
  readonly extra?: Extra;
}

export interface ValvePort {
  readonly id: string;
  readonly side: 'top' | 'bottom';
  readonly extra?: Extra;
}

export interface ValvePosition {
  /** `a`, `0`, `b` unless the user names them: `raise`, `hold`, `lower`. */
  readonly name: string;
  /**
   * `P-A` open both ways, `P>A` one way, `P~A` throttled, `P~>A` throttled one way,
   * `P-A-B` all joined. A port that no path names is shut.
   */
  readonly paths: readonly string[];
  readonly extra?: Extra;
}

export type Operator = 'lever' | 'pedal' | 'button' | 'coil' | 'spring' | 'detent' | 'hand' | 'roller' | 'pilot';

export const labelOf = (part: Part): string => part.label ?? part.id;
export const sayPort = (ref: PortRef): string => `${ref.part}.${ref.port}`;
