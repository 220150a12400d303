import type { BitSet } from '../../base/bits.ts';

/** One bit per row. Absent = empty. All bits past the last row are 0. */
export type Plane = BitSet;

export interface TableInput {
  readonly part: string;
  readonly label: string;
  readonly positions: readonly string[];
  readonly rest?: number;
  readonly by: 'lever' | 'pedal' | 'button' | 'coil' | 'hand' | 'coupling';
  readonly coils: readonly { readonly name: string; readonly position: number }[];
}

/** A valve that is no input: its position follows from pressures or from where an actuator stands. */
export interface TableDependent {
  readonly part: string;
  /** Label of the part, and `main spool` behind it where the part is an input as well. */
  readonly label: string;
  readonly positions: readonly string[];
  /** Where springs put it; absent = it stays. */
  readonly rest?: number;
}

export interface TableActuator {
  readonly part: string;
  readonly label: string;
  readonly motion: 'linear' | 'rotary';
}

export interface TablePump {
  readonly part: string;
  readonly label: string;
}

export interface TableLine {
  readonly name: string;
  /** `V1.A` style, part ids. */
  readonly ports: readonly string[];
  /** Ids of the drawn connections it consists of. */
  readonly connections: readonly string[];
}

/**
 * The whole state table as plain data that crosses a thread: inputs, and bit planes over the rows.
 * Rows are counted in mixed radix, the first input slowest.
 */
export interface TableData {
  readonly pumpsRunning: boolean;
  readonly inputs: readonly TableInput[];
  readonly dependents: readonly TableDependent[];
  readonly actuators: readonly TableActuator[];
  readonly pumps: readonly TablePump[];
  readonly lines: readonly TableLine[];
  readonly count: number;
  /** Coil and lever combinations with two opposed coils on, and all of them. */
  readonly notPermitted: number;
  readonly commandCombinations: number;
  /** [actuator][verdict index of ACTUATOR_VERDICTS] */
  readonly actuatorPlanes: readonly (readonly (Plane | undefined)[])[];
  /** [actuator][note index of ACTUATOR_NOTES] */
  readonly actuatorNotes: readonly (readonly (Plane | undefined)[])[];
  /** [actuator][reason index of REST_REASONS]: why open paths leave it to the pressures. */
  readonly actuatorRests: readonly (readonly (Plane | undefined)[])[];
  /** [pump][verdict index of PUMP_VERDICTS] */
  readonly pumpPlanes: readonly (readonly (Plane | undefined)[])[];
  /** [line][class index of LINE_CLASSES] */
  readonly linePlanes: readonly (readonly (Plane | undefined)[])[];
  /** [line][kind index of BLOCKED_KINDS] */
  readonly blockedPlanes: readonly (readonly (Plane | undefined)[])[];
  /** [line][reason index of TRAP_REASONS] */
  readonly trapPlanes: readonly (readonly (Plane | undefined)[])[];
  /** Rows whose verdicts the pressures decided: they rest on entered or assumed values. */
  readonly valued: Plane | undefined;
  /** [actuator], [pump]: the same for each verdict; in other rows it holds for any values. */
  readonly valuedActuators: readonly (Plane | undefined)[];
  readonly valuedPumps: readonly (Plane | undefined)[];
  /** [dependent][position]: where it stands; in rows that hunt, one of the settings that they run through. */
  readonly dependentPlanes: readonly (readonly (Plane | undefined)[])[];
  /** [dependent]: rows in which where it stands is for pressures that nobody has computed; `dependentPlanes` then goes by open paths. */
  readonly dependentRests: readonly (Plane | undefined)[];
  /** Rows in which no setting of the dependent valves agrees with the pressures that it causes. */
  readonly dependentHunts: Plane | undefined;
  /** [dependent][position]: another setting that agrees has it there; which one holds depends on what came before. */
  readonly dependentOthers: readonly (readonly (Plane | undefined)[])[];
  /** False where there were too many settings to look for others. */
  readonly dependentsSearched: boolean;
}
