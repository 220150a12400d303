import type { ActuatorVerdict, TrapReason } from '../engine/table/words.ts';

/** Something to know before a step; `kind` for marks and filters, `text` for people. */
export interface BleedCaution {
  readonly kind: 'drop' | 'driven' | 'discharge' | 'leak' | 'spread' | 'coil' | 'coupling';
  readonly text: string;
  /** Indices of lines in the table. */
  readonly lines: readonly number[];
  /** Part ids. */
  readonly parts: readonly string[];
}

/** A line and where its pressure can be read. */
export interface BleedLine {
  readonly line: number;
  readonly name: string;
  /** Labels of the gauges and test points on it; empty = none is drawn. */
  readonly measure: readonly string[];
}

export interface HeldLine extends BleedLine {
  readonly reasons: readonly { readonly kind: TrapReason | 'joined'; readonly text: string }[];
}

export interface LeftLine extends BleedLine {
  /** No combination of positions opens it to tank. */
  readonly never: boolean;
  /** What is usually added there. */
  readonly remedy: string;
}

/** One lever move. */
export interface BleedStep {
  readonly part: string;
  readonly label: string;
  readonly from: string;
  readonly to: string;
  /** 0-based row that it leads to. */
  readonly row: number;
  /** A spring would take it back to this position: it has to be kept in place. */
  readonly springsTo?: string;
  /** Index of the step that moves the same lever again; absent = none does. */
  readonly keptUntil?: number;
  readonly cautions: readonly BleedCaution[];
  /** Lines that come down to tank, and lines that still hold pressure after it. */
  readonly vents: readonly BleedLine[];
  readonly held: readonly BleedLine[];
}

/** What the levers do once bleed valves stand open on some lines. */
export interface BleedPoints {
  readonly points: readonly BleedLine[];
  readonly cautions: readonly BleedCaution[];
  readonly held: readonly BleedLine[];
  readonly steps: readonly BleedStep[];
  readonly left: readonly LeftLine[];
}

/** How to let the pressure down from one state, the pumps being stopped in it. */
export interface BleedAnswer {
  /** 0-based. */
  readonly row: number;
  readonly positions: readonly number[];
  readonly start: readonly HeldLine[];
  /** What moves or empties when the pumps stop. */
  readonly stopping: readonly BleedCaution[];
  readonly steps: readonly BleedStep[];
  readonly left: readonly LeftLine[];
  readonly points?: BleedPoints;
  /** False: the search was cut short; a shorter list, or one that leaves less, may exist. */
  readonly proven: boolean;
}

export interface PowerLossActuator {
  readonly part: string;
  readonly label: string;
  readonly before: ActuatorVerdict;
  /** Verdict after it with the coils off, pumps running on and stopped; and with the pumps stopped alone. */
  readonly running: PowerLossVerdict;
  readonly stopped: PowerLossVerdict;
  readonly alone: PowerLossVerdict;
}

/** `comes`: what the verdict means against the state before. */
export interface PowerLossVerdict {
  readonly verdict: ActuatorVerdict;
  readonly comes: PowerLossOutcome;
}

/** `open`: the circuit or its values leave it open. */
export type PowerLossOutcome = 'drops' | 'moves by spring' | 'goes on' | 'starts' | 'holds' | 'floats' | 'open';

/** Coils off, pumps running on or stopped; or the pumps stopped and the coils kept on. Levers stay where they are. */
export interface PowerLossAnswer {
  /** 0-based rows. */
  readonly before: number;
  readonly after: number;
  readonly returned: readonly {
    readonly part: string;
    readonly label: string;
    readonly from: string;
    readonly to: string;
  }[];
  readonly actuators: readonly PowerLossActuator[];
  readonly underPressure: {
    readonly running: readonly BleedLine[];
    readonly stopped: readonly BleedLine[];
    readonly alone: readonly BleedLine[];
  };
  /** What comes down, is driven or empties when the coils go and the pumps stop, and when the pumps stop alone. */
  readonly cautions: readonly BleedCaution[];
  readonly aloneCautions: readonly BleedCaution[];
}

/** Where pressure stays trapped, over all rows. */
export interface TrappedSummary {
  readonly lines: readonly (BleedLine & { readonly reasons: readonly TrappedReason[] })[];
}

export interface TrappedReason {
  readonly kind: TrapReason;
  readonly rowCount: number;
  /** A few of the rows, 0-based, with what is said in them. */
  readonly examples: readonly { readonly row: number; readonly text: string }[];
}

/** The same for panels of any size, by open paths alone. */
export interface TrappedPanel {
  /** Combinations of positions. */
  readonly total: bigint;
  readonly lines: readonly (BleedLine & { readonly reasons: readonly TrappedPanelReason[] })[];
}

export interface TrappedPanelReason {
  readonly kind: TrapReason;
  readonly count: bigint;
  /** The levers that it depends on, as they stand in one of the combinations. */
  readonly levers: readonly { readonly label: string; readonly position: string }[];
  /** What is said of this combination. */
  readonly text: string;
}
